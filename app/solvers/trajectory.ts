import { SolverError } from "./errors.ts";
import { type Linearised, linearise, type Normalised, normalise } from "./linear.ts";
import { branches } from "./offspring.ts";
import { add, divide, exponential, logarithm, multiply, negate, ONE, pair, subtract, toNumber, ZERO } from "./pairs.ts";
import { growthSpread, HALF_UNIT, rateSpread, rootSpread } from "./process.ts";
import type { Answer, Knot, Pair, ProcessModel, Trajectory, Turning } from "./types.ts";
import {
  crossing,
  FULL_WALK,
  firstKnot,
  moved,
  type OriginSeries,
  originSeries,
  type PairKnot,
  type WalkSettings,
  walk,
} from "./walk.ts";

/** Solves the trajectory of D w″ + drift w′ + f(w) = 0 that leaves w = 1 along its fast direction, in the regime `away`.
 *
 *  Method: power series of u = 1 − w in z = e^{−decay x}, then Taylor steps towards the barrier, the stable direction,
 *  in double-doubles; on z > 0 past w = 0 (amplitude B_0, slope at the barrier), on z < 0 up to where w turns back (s0).
 *  Source: J. Berestycki, É. Brunet, S. C. Harris, P. Miłoś, J. Funct. Anal. 273 (2017) 2107–2143, for the trajectory.
 *  @returns the trajectory, or the reason why this regime has none.
 *  @throws SolverError "bad_parameter" on misuse, "not_converged" where the walk does not end or fails its check. */
export function solveTrajectory(model: ProcessModel): Answer<Trajectory> {
  const linear = linearise(model);
  if (linear.regime !== "away") return { refused: refusal(model, linear) };
  const n = normalise(model, linear);
  const path = follow(n, FULL_WALK);
  const spread = spreads(model, linear, path);
  return {
    model,
    decay: n.decay,
    ratio: n.ratio,
    strength: n.strength,
    series: Array.from(path.origin.series.high),
    seriesScale: path.origin.scale,
    seriesReach: path.origin.reach,
    below: path.below,
    above: path.above,
    amplitude: path.amplitude,
    slopeAtBarrier: multiply(negate(path.slope), n.decay),
    turning: path.turning === null ? { refused: NO_TURNING } : { ...path.turning, ...spread.turning },
    decaySpread: spread.decay,
    amplitudeSpread: spread.amplitude,
    slopeSpread: spread.slope,
  };
}

const NO_TURNING =
  "No particle ever has two or more children, so at most the particles present at the start are absorbed: w is a polynomial in s, s0 is infinite and there is no tail.";

function refusal(model: ProcessModel, linear: Linearised): string {
  if (typeof linear.regime !== "string") return linear.regime.refused;
  const critical = Math.sqrt(4 * model.diffusion * toNumber(linear.growth));
  return `With drift ${model.drift} the regime is ${linear.regime}: the critical drift is ${critical.toPrecision(6)}, and this trajectory needs a drift of at least that.`;
}

/** Both branches of a trajectory, with the constants found on them. */
interface Path {
  readonly origin: OriginSeries;
  readonly below: Knot[];
  readonly above: Knot[];
  readonly amplitude: Pair;
  /** du/dξ where w = 0 */
  readonly slope: Pair;
  readonly turning: Pick<Turning, "s0" | "excess" | "amplitude"> | null;
}

function follow(n: Normalised, settings: WalkSettings): Path {
  const origin = originSeries(n, settings);
  const start = negate(logarithm(pair(origin.reach)));
  const { knots: below, barrier } = followBelow(n, firstKnot(origin, 1, settings.order, start), settings);
  const shared = { origin, below, amplitude: exponential(negate(barrier.xi)), slope: barrier.slope };
  const first = firstKnot(origin, -1, settings.order, start);
  if (!branches(n.law)) return { ...shared, above: [plain(first)], turning: null };
  const { knots: above, top } = followAbove(n, first, settings);
  const excess = negate(top.u);
  return { ...shared, above, turning: { s0: add(ONE, excess), excess, amplitude: exponential(negate(top.xi)) } };
}

function plain(knot: PairKnot): Knot {
  return { xi: toNumber(knot.xi), u: toNumber(knot.u), slope: toNumber(knot.slope) };
}

/** From w near 1 down past w = −1; |w(x, s)| ≤ w(x, |s|) keeps the trajectory falling until there. */
function followBelow(n: Normalised, first: PairKnot, settings: WalkSettings): { knots: Knot[]; barrier: PairKnot } {
  const knots = [plain(first)];
  let barrier: PairKnot | null = null;
  walk(
    n,
    first,
    settings,
    (knot) => knot.u[0] >= 2,
    (from, c, to) => {
      knots.push(plain(to));
      if (barrier !== null || to.u[0] < 1) return;
      const h = crossing(c, settings.order, toNumber(subtract(from.xi, to.xi)), "value", ONE);
      barrier = moved(from, c, h, settings.order);
    },
  );
  if (barrier === null) throw new SolverError("not_converged", "The trajectory never met w = 0.");
  return { knots, barrier };
}

/** From w near 1 up to the turning point, where the last knot stands. */
function followAbove(n: Normalised, first: PairKnot, settings: WalkSettings): { knots: Knot[]; top: PairKnot } {
  const knots = [plain(first)];
  let top = first;
  walk(
    n,
    first,
    settings,
    (knot) => knot.slope[0] <= 0,
    (from, c, to) => {
      if (to.slope[0] > 0) {
        knots.push(plain(to));
        return;
      }
      const h = crossing(c, settings.order, toNumber(subtract(from.xi, to.xi)), "slope", ZERO);
      const turned = moved(from, c, h, settings.order);
      top = { ...turned, slope: ZERO };
      knots.push({ ...plain(top), slope: 0 });
    },
  );
  return { knots, top };
}

/** Coarser walk, for the check of the fine one and for its sensitivity to the inputs. */
const COARSE_WALK: WalkSettings = { order: 16, tolerance: 2 ** -44 };
/** Shift of √(drift² − 4 D f'(1)) for the sensitivity, relative to the drift: the trajectory is analytic in it, even at 0. */
const SHIFT = 2 ** -14;
/** The two walks may differ by this; more means that one of them went wrong. */
const AGREEMENT = 1e-9;

interface Spreads {
  readonly decay: number;
  readonly amplitude: number;
  readonly slope: number;
  readonly turning: Pick<Turning, "excessSpread" | "amplitudeSpread">;
}

/** Bounds on what half a unit in the last place of every input does to the constants.
 *  Near the critical drift all of them move through the root √(drift² − 4 D f'(1)), whose change is amplified by its own inverse;
 *  that part is measured by walking again with the root shifted. The rest is bounded by a few half units. */
function spreads(model: ProcessModel, linear: Linearised, path: Path): Spreads {
  const growth = linear.growth[0];
  const relative = growthSpread(linear.law);
  const root = rootSpread(model.drift, model.diffusion, growth, linear.discriminant[0], relative);
  const coarse = follow(normalise(model, linear), COARSE_WALK);
  checkAgreement(path, coarse);
  const scale = Math.abs(model.drift) + Math.sqrt(linear.discriminant[0]);
  const shifted = follow(shiftRoot(model, linear, scale * SHIFT), COARSE_WALK);
  const moves = root / (scale * SHIFT);
  const plainPart = relative + BASE_SPREAD * (1 + degree(linear)) * HALF_UNIT;
  const change = (a: Pair, b: Pair) => Math.abs(toNumber(subtract(a, b)) / toNumber(a)) * moves + plainPart;
  const decay = rateSpread(model, growth, linear.discriminant[0], relative);
  return {
    decay,
    amplitude: change(coarse.amplitude, shifted.amplitude),
    slope: change(coarse.slope, shifted.slope) + decay,
    turning: {
      excessSpread: turningChange(coarse, shifted, (t) => t.excess, change),
      amplitudeSpread: turningChange(coarse, shifted, (t) => t.amplitude, change),
    },
  };
}

/** Half units that a change of rate, diffusion or probabilities at fixed root may move a constant by, per degree of freedom. */
const BASE_SPREAD = 2;

function degree(linear: Linearised): number {
  return linear.law.law === "finite" ? linear.law.aboutZero.length : 2;
}

function turningChange(
  a: Path,
  b: Path,
  read: (t: NonNullable<Path["turning"]>) => Pair,
  change: (a: Pair, b: Pair) => number,
): number {
  return a.turning === null || b.turning === null ? 0 : change(read(a.turning), read(b.turning));
}

/** The same process with a larger root: above the critical drift by raising the drift, or the drift itself where f'(1) ≤ 0. */
function shiftRoot(model: ProcessModel, linear: Linearised, by: number): Normalised {
  const root = Math.sqrt(linear.discriminant[0]) + by;
  const fixed = 4 * model.diffusion * linear.growth[0];
  const drift = fixed > 0 ? Math.sqrt(root * root + fixed) : model.drift + by;
  const discriminant = fixed > 0 ? pair(root * root) : pair(drift * drift - fixed);
  return normalise({ ...model, drift }, { ...linear, discriminant });
}

function checkAgreement(fine: Path, coarse: Path): void {
  const differ = (a: Pair, b: Pair) => !(Math.abs(toNumber(divide(subtract(a, b), a))) < AGREEMENT);
  const turned = fine.turning !== null && coarse.turning !== null;
  if (
    differ(fine.amplitude, coarse.amplitude) ||
    differ(fine.slope, coarse.slope) ||
    (turned &&
      (differ(fine.turning.excess, coarse.turning.excess) || differ(fine.turning.amplitude, coarse.turning.amplitude)))
  )
    throw new SolverError(
      "not_converged",
      "Two walks of the trajectory, one coarse and one fine, do not agree; its constants cannot be vouched for.",
    );
}

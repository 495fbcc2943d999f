import { SolverError } from "./errors.ts";
import { inputUnit, lawUnit } from "./input-rounding.ts";
import { type Linearised, type Normalised, normalise } from "./linear.ts";
import { growthSpread, rateSpread, rootSpread } from "./linear-spread.ts";
import { divide, pair, subtract, toNumber } from "./pairs.ts";
import { follow, type Path } from "./path.ts";
import type { Pair, ProcessModel, Turning } from "./types.ts";
import type { WalkSettings } from "./walk.ts";

/** Coarser walk, for the check of the fine one and for its sensitivity to the inputs. */
export const COARSE_WALK: WalkSettings = { order: 24, tolerance: 2 ** -44 };
/** Shift of √(drift² − 4 D f'(1)) for the sensitivity, relative to the drift: the trajectory is analytic in it, even at 0. */
const SHIFT = 2 ** -14;
/** The two walks may differ by this; more means that one of them went wrong. */
const AGREEMENT = 1e-7;

/** Bounds on the relative changes of a trajectory's constants when every input moves within its rounding. */
export interface Spreads {
  readonly decay: number;
  readonly amplitude: number;
  readonly slope: number;
  readonly turning: Pick<Turning, "excessSpread" | "amplitudeSpread">;
}

/** Checks a path against a coarser walk, and measures by a third one how far the inputs' rounding moves its constants.
 *  At a fixed law of offspring the normalised trajectory depends on the inputs only through √(drift² − 4 D f'(1))/drift
 *  (through the drift, where f'(1) ≤ 0); near the critical drift this root amplifies their rounding by its own inverse.
 *  @throws SolverError "not_converged" where the walks disagree. */
export function constantSpreads(model: ProcessModel, linear: Linearised, path: Path): Spreads {
  const relative = growthSpread(model, linear.law);
  const coarse = follow(normalise(model, linear), COARSE_WALK);
  checkAgreement(path, coarse);
  const shift = shiftInputs(model, linear, relative);
  const shifted = follow(shift.normalised, COARSE_WALK);
  const lawPart = (LAW_FACTOR * (1 + degree(linear)) + excessFactor(linear)) * lawUnit(model.offspring);
  const change = (a: Pair, b: Pair) => Math.abs(toNumber(divide(subtract(a, b), a))) * shift.share + lawPart;
  const decay = rateSpread(model, linear.growth[0], linear.discriminant[0], relative);
  const turned = coarse.turning !== null && shifted.turning !== null;
  return {
    decay,
    amplitude: change(coarse.amplitude, shifted.amplitude),
    slope: change(coarse.slope, shifted.slope) + decay,
    turning: {
      excessSpread: turned ? change(coarse.turning.excess, shifted.turning.excess) : 0,
      amplitudeSpread: turned ? change(coarse.turning.amplitude, shifted.turning.amplitude) : 0,
    },
  };
}

/** Roundings of the probabilities, each of which moves the strength of one power of w. */
const LAW_FACTOR = 2;

/** The mean's excess over 1 is a difference: its roundings, relative to it. */
function excessFactor(linear: Linearised): number {
  const excess = Math.abs(linear.law.excess[0]);
  return excess === 0 ? 0 : (linear.law.mean[0] + 1) / excess;
}

function degree(linear: Linearised): number {
  return linear.law.law === "finite" ? linear.law.aboutZero.length : 2;
}

/** A process a little off, and which share of the way there the inputs' rounding may go. */
function shiftInputs(
  model: ProcessModel,
  linear: Linearised,
  relative: number,
): { normalised: Normalised; share: number } {
  const growth = linear.growth[0];
  const { drift, diffusion } = model;
  const root = Math.sqrt(linear.discriminant[0]);
  const by = (Math.abs(drift) + root) * SHIFT;
  const fixed = 4 * diffusion * growth;
  if (growth > 0) {
    const raised = Math.sqrt((root + by) ** 2 + fixed);
    const discriminant = pair((root + by) ** 2);
    const spread = rootSpread(model, growth, linear.discriminant[0], relative) + root * inputUnit(drift);
    return {
      normalised: normalise({ ...model, drift: raised }, { ...linear, discriminant }),
      share: spread / drift / ((root + by) / raised - root / drift),
    };
  }
  const raised = drift + by;
  const discriminant = pair(raised * raised - fixed);
  const units = inputUnit(drift) + inputUnit(model.rate) + inputUnit(diffusion) + relative;
  return {
    normalised: normalise({ ...model, drift: raised }, { ...linear, discriminant }),
    share: units / SHIFT,
  };
}

export function checkAgreement(fine: Path, coarse: Path): void {
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

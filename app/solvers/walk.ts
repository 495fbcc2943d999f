import { SolverError } from "./errors.ts";
import type { Normalised } from "./linear.ts";
import { PairSeries, pairComposer } from "./pair-series.ts";
import { add, divide, multiply, negate, ONE, pair, scale, subtract, toNumber } from "./pairs.ts";
import type { Pair } from "./types.ts";

/** The trajectory in double-doubles: its power series at the far end, and Taylor steps towards the barrier.
 *  In ξ = decay·x, u = 1 − w: u″ + (1 + ratio) u′ + ratio u = strength·M(u); see numerics of types.ts. */

/** How finely the trajectory is walked. */
export interface WalkSettings {
  /** terms of each Taylor expansion */
  readonly order: number;
  /** local relative error of each step */
  readonly tolerance: number;
}

/** Fine enough that s0^{−100000} keeps 15 digits. */
export const FULL_WALK: WalkSettings = { order: 42, tolerance: 2 ** -80 };

/** State (ξ, u, du/dξ) carried in double-doubles. */
export interface PairKnot {
  readonly xi: Pair;
  readonly u: Pair;
  readonly slope: Pair;
}

/** u = Σ c_k (z/scale)^k near z = 0, used for |z| ≤ reach. */
export interface OriginSeries {
  readonly scale: number;
  readonly series: PairSeries;
  readonly reach: number;
}

/** Largest |z| at which the series hands over to the steps, below B_0 and B_{s0} whenever the law hardly branches. */
const REACH_CAP = 1 / 8;

/** A series that must be cut off nearer to 0 than this is none. */
const SMALLEST_REACH = 1e-200;

/** Series of u at z = 0. The bracket (k − 1)(k − ratio) > 0 for k ≥ 2, so no drift ≥ critical is resonant.
 *  Source: substitution of the power series into the equation; Koenigs' linearisation of the flow at w = 1. */
export function originSeries(n: Normalised, settings: WalkSettings): OriginSeries {
  const { order, tolerance } = settings;
  // The curvature of M sets the radius of convergence; scaling by it keeps the coefficients within the double's range.
  const unit = 2 ** -Math.round(Math.log2(1 + n.strength[0] * n.law.mean[0] ** 2));
  const series = linearisingSeries(n, order, unit);
  let largest = 0;
  for (let k = order - 3; k <= order; k += 1)
    largest = Math.max(largest, (Math.abs(series.high[k] as number) / unit) ** (1 / (k - 1)));
  let reach = Math.min(
    REACH_CAP,
    unit * tolerance ** (1 / order) * (largest > 0 ? 1 / largest : Number.POSITIVE_INFINITY),
  );
  // On both sides the hand-over must come well before u = 1 and before the turning point.
  const slopeAt = (z: number) => toNumber(series.evaluate(pair(z / unit), order).derivative) / unit;
  while (!(slopeAt(reach) < 2 && slopeAt(-reach) > 1 / 2 && slopeAt(reach) > 1 / 2)) {
    reach /= 2;
    if (!(reach > SMALLEST_REACH))
      throw new SolverError(
        "not_converged",
        "The power series near w = 1 has no usable radius; the parameters are too far apart in size.",
      );
  }
  return { scale: unit, series, reach: 2 ** Math.floor(Math.log2(reach)) };
}

/** Coefficients of u = Σ c_k (z/unit)^k, c_1 = unit, for k up to `order` < ratio, or any where the ratio is no integer above 1. */
export function linearisingSeries(
  n: Pick<Normalised, "law" | "ratio" | "strength">,
  order: number,
  unit: number,
): PairSeries {
  const series = new PairSeries(order + 1);
  const compose = pairComposer(n.law, series);
  compose(0);
  series.set(1, pair(unit));
  compose(1);
  for (let k = 2; k <= order; k += 1) {
    const source = multiply(n.strength, compose(k));
    series.set(k, divide(source, scale(subtract(pair(k), n.ratio), k - 1)));
    compose(k);
  }
  return series;
}

/** The knot at z = sign·reach, where ξ = −ln reach. */
export function firstKnot(origin: OriginSeries, sign: 1 | -1, order: number, minusLog: Pair): PairKnot {
  const z = pair((sign * origin.reach) / origin.scale);
  const { value, derivative } = origin.series.evaluate(z, order);
  // du/dξ = −z du/dz
  return { xi: minusLog, u: value, slope: negate(multiply(z, derivative)) };
}

/** Taylor coefficients of u about a knot, by the equation itself; where the damping is strong, those of the slow motion through u. */
export function expand(n: Normalised, knot: PairKnot, order: number): PairSeries {
  const slow = n.ratio[0] < SLOW_RATIO ? expandSlow(n, knot.u, order) : null;
  if (slow !== null) return slow;
  const c = new PairSeries(order + 1);
  c.set(0, knot.u);
  c.set(1, knot.slope);
  const compose = pairComposer(n.law, c);
  const damping = add(ONE, n.ratio);
  for (let k = 0; k + 2 <= order; k += 1) {
    const pull = add(multiply(n.ratio, c.at(k)), scale(multiply(damping, c.at(k + 1)), k + 1));
    c.set(k + 2, divide(subtract(multiply(n.strength, compose(k)), pull), pair((k + 1) * (k + 2))));
  }
  return c;
}

/** (1 + ratio) u′ = strength·M(u) − ratio u − u″, solved again and again with the last u″: the trajectory differs from what this comes to
 *  by e^{−|ratio|} or so. Each round wins a factor of the order of the number of the coefficient over the damping's excess; null where it
 *  wins none, because M is steep there.
 *  Source: slow motion at strong damping; N. Fenichel, J. Differential Equations 31 (1979) 53–98. */
function expandSlow(n: Normalised, u: Pair, order: number): PairSeries | null {
  const c = new PairSeries(order + 3);
  c.set(0, u);
  const damping = add(ONE, n.ratio);
  let before = Number.POSITIVE_INFINITY;
  for (let round = 0; round < SLOW_ROUNDS; round += 1) {
    const compose = pairComposer(n.law, c);
    let moved = 0;
    for (let k = 0; k < order; k += 1) {
      const pull = add(multiply(n.ratio, c.at(k)), scale(c.at(k + 2), (k + 1) * (k + 2)));
      const next = divide(subtract(multiply(n.strength, compose(k)), pull), scale(damping, k + 1));
      // a step is a fraction of the radius of convergence, so that later coefficients count less
      const own = Math.abs(toNumber(subtract(next, c.at(k + 1)))) / Math.abs(next[0]);
      if (next[0] !== 0) moved += own * 4 ** -k;
      c.set(k + 1, next);
    }
    if (moved <= SETTLED) return c;
    if (!(moved < SLOW_GAIN * before)) return null;
    before = moved;
  }
  return null;
}

/** Slow over fast rate below which the trajectory is told from the slow motion by less than any rounding. */
export const SLOW_RATIO = -1200;
const SLOW_ROUNDS = 160;
/** What a round must win, and what ends them. */
const SLOW_GAIN = 0.7;
const SETTLED = 2 ** -98;

/** Length of the step over which the expansion's last terms stay below the tolerance relative to u, and the fast damping is resolved. */
function stepLength(c: PairSeries, n: Normalised, settings: WalkSettings): number {
  const { order, tolerance } = settings;
  const size = Math.abs(c.high[0] as number);
  // a series of the slow motion goes on beyond the order that the equation itself fills
  const isSlow = c.high.length > order + 1;
  let length = isSlow ? SLOW_STEP : order / (4 * (1 + Math.abs(n.ratio[0])));
  for (const k of [order - 1, order]) {
    const last = Math.abs(c.high[k] as number);
    if (last > 0) length = Math.min(length, ((tolerance * size) / last) ** (1 / k));
  }
  return length;
}

/** Longest step of the slow motion. */
const SLOW_STEP = 1 / 4;

/** u and du/dξ at ξ + h. */
export function moved(knot: PairKnot, c: PairSeries, h: Pair, order: number): PairKnot {
  const { value, derivative } = c.evaluate(h, order);
  return { xi: add(knot.xi, h), u: value, slope: derivative };
}

/** More steps than any trajectory needs; reached only if the equation runs away. */
const MOST_STEPS = 5000;

/** Walks from `start` towards the barrier (ξ decreasing) until `passed`, giving each knot with its expansion to `visit`. */
export function walk(
  n: Normalised,
  start: PairKnot,
  settings: WalkSettings,
  passed: (knot: PairKnot) => boolean,
  visit: (from: PairKnot, expansion: PairSeries, to: PairKnot) => void,
): void {
  let knot = start;
  for (let step = 0; step < MOST_STEPS; step += 1) {
    const c = expand(n, knot, settings.order);
    const next = moved(knot, c, pair(-stepLength(c, n, settings)), settings.order);
    if (!Number.isFinite(next.u[0])) break;
    visit(knot, c, next);
    if (passed(next)) return;
    knot = next;
  }
  throw new SolverError(
    "not_converged",
    `The trajectory did not reach its end within ${MOST_STEPS} steps (it stood at w = ${1 - toNumber(knot.u)}). The parameters may be too far apart in size.`,
  );
}

/** Where within a step the quantity (value, or slope) crosses `target`: Newton's method in double-doubles from a bracketed double root. */
export function crossing(c: PairSeries, order: number, h: number, what: "value" | "slope", target: Pair): Pair {
  const series = what === "value" ? c : differentiated(c, order);
  const top = what === "value" ? order : order - 1;
  const gapAt = (at: number) => series.evaluateRoughly(at, top).value - target[0];
  let near = 0;
  let far = -h;
  const signNear = Math.sign(gapAt(0));
  for (let round = 0; round < BISECTIONS; round += 1) {
    const middle = (near + far) / 2;
    if (Math.sign(gapAt(middle)) === signNear) near = middle;
    else far = middle;
  }
  let guess = (near + far) / 2;
  for (let round = 0; round < ROUGH_STEPS; round += 1) {
    const { value, derivative } = series.evaluateRoughly(guess, top);
    guess -= (value - target[0]) / derivative;
  }
  let root: Pair = pair(guess);
  for (let round = 0; round < NEWTON_STEPS; round += 1) {
    const { value, derivative } = series.evaluate(root, top);
    root = subtract(root, divide(subtract(value, target), derivative));
  }
  return root;
}

/** From a bracket of one step to 2^−12 of it, in doubles to their rounding, then past 2^−104 in double-doubles: Newton's method
 *  doubles the digits, and even where a double's rounding leaves it half of its own, three steps do. */
const BISECTIONS = 12;
const ROUGH_STEPS = 3;
const NEWTON_STEPS = 3;

function differentiated(c: PairSeries, order: number): PairSeries {
  const d = new PairSeries(order + 1);
  for (let k = 1; k <= order; k += 1) d.set(k - 1, scale(c.at(k), k));
  return d;
}

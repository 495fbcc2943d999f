import { SolverError } from "./errors.ts";
import { finiteFactorialMoment, finiteMoments, infiniteProbability, MOST_FINITE_MOMENTS } from "./finite-moments.ts";
import { lawUnit } from "./input-rounding.ts";
import type { Normalised } from "./linear.ts";
import { prepareOffspring } from "./offspring.ts";
import { cauchy, PairSeries } from "./pair-series.ts";
import {
  add,
  divide,
  exponential,
  multiply,
  negate,
  ONE,
  PAIR_EPSILON,
  pair,
  scale,
  subtract,
  toNumber,
  ZERO,
} from "./pairs.ts";
import { zeroOf } from "./prepared.ts";
import { profileAt } from "./profile.ts";
import { ROUNDING, readerOf } from "./reader.ts";
import { checkStarts } from "./sources.ts";
import type { AbsorbedMoments, Answer, Estimate, Pair, Passage, Refusal, Start, Starts, Trajectory } from "./types.ts";
import { linearisingSeries, originSeries } from "./walk.ts";

/** Highest factorial moment given. */
const MOST_MOMENTS = 40;

/** P(K = 0), P(K = ∞), E K and Var K, both given that K is finite; for "far" those of the limit law given K > 0.
 *  Source: J. Berestycki, É. Brunet, S. C. Harris, P. Miłoś, J. Funct. Anal. 273 (2017) 2107–2143: E_x K = e^{−decay x}; the variance from
 *  two derivatives of w(x, s) = W(B_s e^{−decay x}) at s = 1.
 *  @throws SolverError "bad_parameter" for a start that is none. */
export function absorbedMoments(t: Trajectory, starts: Starts): AbsorbedMoments {
  if (t.regime === "between" && starts !== "far") {
    const infinite = infiniteProbability(t, starts);
    return { zero: zeroEstimate(t, starts), ...finiteMoments(t, starts), infinite };
  }
  if (t.passage !== null && starts !== "far")
    return { zero: zeroEstimate(t, starts), ...momentsToward(t, starts), infinite: NONE };
  const [, mean, second] = factorialSeries(t, starts, 2) as [Expanded, Expanded, Expanded];
  return {
    zero: starts === "far" ? NONE : zeroEstimate(t, starts),
    mean: toEstimate(mean),
    variance: varianceOf(mean, second),
    infinite: NONE,
  };
}

const NONE: Estimate = { value: 0, error: 0 };

/** In the regime `toward` the mean is a sum of e^{λ_s x}; the variance is infinite where d ≤ 2. */
function momentsToward(t: Trajectory, starts: readonly Start[]): Pick<AbsorbedMoments, "mean" | "variance"> {
  const infinite = refusedMoment(t, 2, "variance");
  const [, mean, second] = factorialSeries(t, starts, infinite === null ? 2 : 1) as [Expanded, Expanded, Expanded?];
  const first = toEstimate(mean);
  if (infinite !== null || second === undefined) return { mean: first, variance: infinite ?? NONE };
  return { mean: first, variance: varianceOf(mean, second) };
}

function varianceOf(mean: Expanded, second: Expanded): Estimate {
  const variance = add(scale(second.value, 2), subtract(mean.value, multiply(mean.value, mean.value)));
  const first = toEstimate(mean);
  const spread = 2 * second.size * second.spread + (1 + 2 * first.value) * first.error;
  return { value: toNumber(variance), error: spread + ROUNDING * Math.abs(variance[0]) };
}

/** Why a moment of order j is infinite in the regime `toward`; null where it is not. */
function refusedMoment(t: Trajectory, j: number, what: string): Refusal | null {
  if (t.passage === null) return null;
  const { index, indexSpread } = t.passage;
  const d = toNumber(index);
  if (j < d * (1 - indexSpread)) return null;
  const shown = Number(d.toPrecision(6));
  return {
    refused: `The ${what} is infinite: with this drift toward the barrier P(K = n) falls like n^(−1−d) with d = ${shown}, and moments of order d or more do not exist.`,
  };
}

/** E[K (K − 1) … (K − j + 1)], j ≥ 1; for "far" that of the limit law given K > 0.
 *  Source: j! times the coefficient of (s − 1)^j in E[s^K], by composing the power series of W, its inverse, and the shift e^{−decay x}.
 *  @throws SolverError "bad_parameter" for a j that is no integer between 1 and 40, or a start that is none. */
export function factorialMoment(t: Trajectory, starts: Starts, j: number): Answer<Estimate> {
  if (!(Number.isInteger(j) && j >= 1 && j <= MOST_MOMENTS))
    throw new SolverError(
      "bad_parameter",
      `The factorial moment of order ${j} is asked for; orders from 1 to ${MOST_MOMENTS} are given.`,
    );
  if (t.regime === "between" && starts !== "far") {
    if (j <= MOST_FINITE_MOMENTS) return finiteFactorialMoment(t, starts, j);
    return {
      refused: `Where K may be infinite, factorial moments given that it is finite are found up to order ${MOST_FINITE_MOMENTS}; ${j} is beyond.`,
    };
  }
  const infinite = refusedMoment(t, j, `factorial moment of order ${j}`);
  if (infinite !== null) return infinite;
  const coefficient = toEstimate(factorialSeries(t, starts, j)[j] as Expanded);
  let factorial = 1;
  for (let k = 2; k <= j; k += 1) factorial *= k;
  const value = coefficient.value * factorial;
  if (!Number.isFinite(value))
    return {
      refused: `The factorial moment of order ${j} exceeds the largest number that can be given, about 1.8·10^308.`,
    };
  return { value, error: coefficient.error * factorial + j * ROUNDING * value };
}

function zeroEstimate(t: Trajectory, starts: Exclude<Starts, "far">): Estimate {
  const checked = checkStarts(starts);
  const only = checked[0];
  if (checked.length === 1 && only !== undefined && only.particles === 1) {
    const w = profileAt(t, only.position, 0);
    if (!("refused" in w)) return only.position === 0 ? { value: 0, error: 0 } : w;
  }
  const { zero } = zeroOf(t, checked);
  return { value: zero.mantissa * 2 ** zero.exponent, error: zero.error * 2 ** zero.exponent };
}

/** A coefficient with the sum of the sizes that made it, and their relative spread under half a unit in each input. */
interface Expanded {
  readonly value: Pair;
  readonly size: number;
  readonly spread: number;
}

function toEstimate({ value, size, spread }: Expanded): Estimate {
  const read = toNumber(value);
  return { value: read, error: ROUNDING * Math.abs(read) + size * spread };
}

/** The linearising series at w = 1: u = Σ c_k z^k is moved by a way x to z e^{−decay x}; spreads relative, `unit` for each power of z. */
interface Linearising {
  readonly decay: Pair;
  readonly decaySpread: number;
  readonly c: readonly Pair[];
  readonly unit: number;
}

function aboutFast(t: Trajectory, order: number): Linearising {
  const normalised: Normalised = { law: readerOf(t).law, decay: t.decay, ratio: t.ratio, strength: t.strength };
  const origin = originSeries(normalised, { order: Math.max(order, 8), tolerance: PAIR_EPSILON });
  const c = Array.from({ length: order + 1 }, (_, k) => scale(origin.series.at(k), origin.scale ** -k));
  return { decay: t.decay, decaySpread: t.decaySpread, c, unit: t.decaySpread + 8 * ROUNDING + seriesSpread(t) };
}

/** Below the order d the fast direction of the node does not enter: c as at a fast direction with the roles of the rates exchanged. */
function aboutNode(t: Trajectory, { slow, index, slowSpread, indexSpread }: Passage, order: number): Linearising {
  const law = prepareOffspring(t.model.offspring);
  const series = linearisingSeries({ law, ratio: index, strength: divide(index, law.excess) }, order, 1);
  const c = Array.from({ length: order + 1 }, (_, k) => series.at(k));
  const d = toNumber(index);
  const nearest = Math.min(...Array.from({ length: order }, (_, k) => Math.abs(1 - (k + 1) / d)).slice(1), 1);
  const ofLaw = lawUnit(t.model.offspring) * (2 + (law.mean[0] + 1) / law.excess[0]);
  return {
    decay: negate(slow),
    decaySpread: slowSpread,
    c,
    unit: slowSpread + 8 * ROUNDING + indexSpread / nearest + ofLaw,
  };
}

/** Coefficients of E[(1 + ε)^K] in powers of ε up to `order`. */
function factorialSeries(t: Trajectory, starts: Starts, order: number): Expanded[] {
  const { decay, decaySpread, c, unit } = t.passage === null ? aboutFast(t, order) : aboutNode(t, t.passage, order);
  const z = inverse(c, order);
  if (starts === "far")
    return z.map((value, k) => {
      const q = divide(negate(value), t.amplitude);
      const spread = t.amplitudeSpread + k * unit;
      return { value: k === 0 ? ONE : q, size: Math.abs(q[0]), spread };
    });
  let product: Pair[] = [ONE, ...new Array<Pair>(order).fill(ZERO)];
  let way = 0;
  for (const { position, particles } of checkStarts(starts)) {
    const single = moved(c, z, exponential(negate(scale(decay, position))), order);
    product = times(product, power(single, particles, order), order);
    way = Math.max(way, Math.abs(toNumber(decay)) * position);
  }
  return product.map((value, k) => ({
    value,
    size: Math.abs(value[0]),
    spread: k * (unit + way * (decaySpread + 2 * ROUNDING)) + k * ROUNDING,
  }));
}

/** Spread of the series' coefficients per power of z, through the curvature of the offspring law. */
function seriesSpread(t: Trajectory): number {
  return t.amplitudeSpread;
}

/** z(ε) with u(z) = −ε: order by order from z = −ε − (nonlinear part). */
function inverse(c: readonly Pair[], order: number): Pair[] {
  const z: Pair[] = [ZERO, [-1, 0], ...new Array<Pair>(Math.max(0, order - 1)).fill(ZERO)];
  for (let k = 2; k <= order; k += 1) {
    // with z_k = 0 so far, the coefficient of ε^k in u(z) is what z_k has to cancel
    z[k] = negate(compose(c, z, k)[k] as Pair);
  }
  return z.slice(0, order + 1);
}

/** Σ c_k v^k up to `order`, for a series v without constant term. */
function compose(c: readonly Pair[], v: readonly Pair[], order: number): Pair[] {
  let value: Pair[] = [c[order] ?? ZERO, ...new Array<Pair>(order).fill(ZERO)];
  for (let k = order - 1; k >= 0; k -= 1) {
    value = times(value, v, order);
    value[0] = add(value[0] as Pair, c[k] ?? ZERO);
  }
  return value;
}

/** E[(1 + ε)^K] of one particle: 1 − u(e^{−decay x} z(ε)). */
function moved(c: readonly Pair[], z: readonly Pair[], factor: Pair, order: number): Pair[] {
  const shifted = z.map((v) => multiply(v, factor));
  return compose(c, shifted, order).map((v, k) => (k === 0 ? ONE : negate(v)));
}

function times(a: readonly Pair[], b: readonly Pair[], order: number): Pair[] {
  const x = toSeries(a, order);
  const y = toSeries(b, order);
  return Array.from({ length: order + 1 }, (_, k) => cauchy(x, y, k, 0, k));
}

function toSeries(a: readonly Pair[], order: number): PairSeries {
  const series = new PairSeries(order + 1);
  for (let k = 0; k <= order; k += 1) series.set(k, a[k] ?? ZERO);
  return series;
}

function power(a: readonly Pair[], exponent: number, order: number): Pair[] {
  let result: Pair[] | null = null;
  let square = [...a];
  for (let rest = exponent; rest > 0; rest = Math.floor(rest / 2)) {
    if (rest % 2 === 1) result = result === null ? square : times(result, square, order);
    if (rest > 1) square = times(square, square, order);
  }
  return result ?? [pair(1)];
}

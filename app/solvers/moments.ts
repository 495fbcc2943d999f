import { SolverError } from "./errors.ts";
import { finiteFactorialMoment, finiteMoments, infiniteProbability, MOST_FINITE_MOMENTS } from "./finite-moments.ts";
import type { Normalised } from "./linear.ts";
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
import type { AbsorbedMoments, Answer, Estimate, Pair, Starts, Trajectory } from "./types.ts";
import { originSeries } from "./walk.ts";

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
  const [, mean, second] = factorialSeries(t, starts, 2) as [Expanded, Expanded, Expanded];
  const variance = add(scale(second.value, 2), subtract(mean.value, multiply(mean.value, mean.value)));
  const first = toEstimate(mean);
  const varianceSpread = 2 * second.size * second.spread + (1 + 2 * first.value) * first.error;
  return {
    zero: starts === "far" ? { value: 0, error: 0 } : zeroEstimate(t, starts),
    mean: first,
    variance: { value: toNumber(variance), error: varianceSpread + ROUNDING * Math.abs(variance[0]) },
    infinite: { value: 0, error: 0 },
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

/** Coefficients of E[(1 + ε)^K] in powers of ε up to `order`. */
function factorialSeries(t: Trajectory, starts: Starts, order: number): Expanded[] {
  const reader = readerOf(t);
  const normalised: Normalised = { law: reader.law, decay: t.decay, ratio: t.ratio, strength: t.strength };
  const origin = originSeries(normalised, { order: Math.max(order, 8), tolerance: PAIR_EPSILON });
  // c_k of u = Σ c_k z^k, and z as a series in ε = −u
  const c = Array.from({ length: order + 1 }, (_, k) => scale(origin.series.at(k), origin.scale ** -k));
  const z = inverse(c, order);
  const unit = t.decaySpread + 8 * ROUNDING + seriesSpread(t);
  if (starts === "far")
    return z.map((value, k) => {
      const q = divide(negate(value), t.amplitude);
      const spread = t.amplitudeSpread + k * unit;
      return { value: k === 0 ? ONE : q, size: Math.abs(q[0]), spread };
    });
  let product: Pair[] = [ONE, ...new Array<Pair>(order).fill(ZERO)];
  let way = 0;
  for (const { position, particles } of checkStarts(starts)) {
    const single = moved(c, z, exponential(negate(scale(t.decay, position))), order);
    product = times(product, power(single, particles, order), order);
    way = Math.max(way, reader.decay * position);
  }
  return product.map((value, k) => ({
    value,
    size: Math.abs(value[0]),
    spread: k * (unit + way * (t.decaySpread + 2 * ROUNDING)) + k * ROUNDING,
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

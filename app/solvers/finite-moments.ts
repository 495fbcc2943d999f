import { SolverError } from "./errors.ts";
import { pointValue } from "./expansion.ts";
import { ROUNDING, readerOf, type TrajectoryReader } from "./reader.ts";
import { deviationOf } from "./saddle.ts";
import { checkStarts } from "./sources.ts";
import { survivalProbability } from "./survival.ts";
import { composed, multiplied, raised } from "./tail-series.ts";
import type { Estimate, Start, Trajectory } from "./types.ts";

/** Highest factorial moment read off one Taylor expansion in double precision. */
export const MOST_FINITE_MOMENTS = 16;

/** P(K = ∞) from all starts together, to its own relative accuracy.
 *  Source: independence; each particle's by survivalProbability.
 *  @throws SolverError as survivalProbability. */
export function infiniteProbability(t: Trajectory, starts: readonly Start[]): Estimate {
  if (t.regime !== "between") return { value: 0, error: 0 };
  let log = 0;
  let error = 0;
  for (const { position, particles } of checkStarts(starts)) {
    const u = survivalProbability(t.model, position);
    if ("refused" in u) throw new SolverError("not_converged", u.refused);
    log += particles * Math.log1p(-u.value);
    error += (particles * u.error) / Math.max(1 - u.value, Number.MIN_VALUE) + 2 * ROUNDING * Math.abs(log);
  }
  const value = -Math.expm1(log);
  return { value, error: Math.exp(log) * error + 2 * ROUNDING * value };
}

/** Mean and variance of K given that K is finite: sums over the particles, which are then independent still.
 *  Source: derivatives of E_x[s^K; K finite] at s = 1, a point inside its radius of convergence s0 > 1. */
export function finiteMoments(t: Trajectory, starts: readonly Start[]): { mean: Estimate; variance: Estimate } {
  let [mean, meanError, variance, varianceError] = [0, 0, 0, 0];
  for (const { position, particles } of checkStarts(starts)) {
    const { values, errors } = singleSeries(t, position, 2);
    const [, m = 0, half = 0] = values;
    const [, dm = 0, dHalf = 0] = errors;
    const one = 2 * half + m - m * m;
    mean += particles * m;
    meanError += particles * dm;
    variance += particles * one;
    varianceError += particles * (2 * dHalf + dm * Math.abs(1 - 2 * m) + 4 * ROUNDING * (2 * half + m + m * m));
  }
  return {
    mean: { value: mean, error: meanError + ROUNDING * mean },
    // particles at the barrier have none
    variance: { value: Math.max(0, variance), error: varianceError },
  };
}

/** E[K (K − 1) … (K − j + 1) | K finite], 1 ≤ j ≤ MOST_FINITE_MOMENTS.
 *  Source: as finiteMoments. */
export function finiteFactorialMoment(t: Trajectory, starts: readonly Start[], j: number): Estimate {
  let product = new Float64Array(j + 1);
  let bound = new Float64Array(j + 1);
  product[0] = 1;
  bound[0] = 1;
  for (const { position, particles } of checkStarts(starts)) {
    const { values, errors } = singleSeries(t, position, j);
    const upper = values.map((v, k) => Math.abs(v) + (errors[k] as number));
    product = new Float64Array(multiplied(product, raised(values, particles, j), j));
    bound = new Float64Array(multiplied(bound, raised(upper, particles, j), j));
  }
  let factorial = 1;
  for (let k = 2; k <= j; k += 1) factorial *= k;
  const value = product[j] as number;
  // all coefficients are ≥ 0, so what the upper ends give exceeds the value by at least its error
  const error = (bound[j] as number) - value + 4 * (j + 1) ** 2 * ROUNDING * (bound[j] as number);
  return { value: value * factorial, error: error * factorial };
}

/** Coefficients of E_x[(1 + ε)^K | K finite] for one particle, with bounds on their errors. */
function singleSeries(t: Trajectory, position: number, order: number): { values: Float64Array; errors: Float64Array } {
  const reader = readerOf(t);
  const values = new Float64Array(order + 1);
  values[0] = 1;
  if (position === 0) {
    if (order >= 1) values[1] = 1;
    return { values, errors: new Float64Array(order + 1) };
  }
  const { base, turning } = reader;
  const scale = base.scale[0];
  const place = reader.locate(deviationOf(base, 1));
  const way = reader.decay * position;
  // s − 1 = Σ b_k y^k about the place of s = 1, and w = Σ f_k y^k at the start
  const b = wAbout(reader, place.xi, scale);
  const f = wAbout(reader, place.xi + way, scale);
  const y = reversed(b, order, false);
  const w = composed(f, y, order);
  const size = composed(f.map(Math.abs), reversed(b, order, true), order);
  const total = w[0] as number;
  const s0 = turning === null ? Number.POSITIVE_INFINITY : turning.s0[0] * scale;
  const near = turning === null ? 0 : (turning.excessSpread * turning.excess[0] * scale) / (s0 - 1);
  const gap = Math.abs(place.xi - (t.above.at(-1)?.xi ?? place.xi)) + Number.MIN_VALUE;
  const shared = t.amplitudeSpread + (turning?.amplitudeSpread ?? 0) + t.base.scaleSpread + way * t.decaySpread;
  const errors = new Float64Array(order + 1);
  for (let k = 1; k <= order; k += 1) {
    values[k] = (w[k] as number) / total;
    const roundings = (k + 1) * (16 * ROUNDING + place.error / gap + ROUNDING * (way + Math.abs(place.xi)));
    errors[k] = ((size[k] as number) / total) * roundings + (values[k] as number) * (2 * shared + k * near);
  }
  return { values, errors };
}

/** Taylor coefficients of w in ξ. */
function wAbout(reader: TrajectoryReader, xi: number, scale: number): Float64Array {
  const at = pointValue();
  reader.evaluateAt("above", xi, at);
  const c = reader.expander.create();
  reader.expander.expand(xi, 0, at, c);
  const w = c.re.map((v) => -scale * v);
  w[0] = scale * (reader.base.centre - at.re);
  return w;
}

/** y(ε) with Σ_{k ≥ 1} b_k y^k = ε; `bounding` gives instead a series whose coefficients bound those of every sum on the way. */
function reversed(b: Float64Array, order: number, bounding: boolean): Float64Array {
  const first = bounding ? Math.abs(b[1] as number) : (b[1] as number);
  const rest = b.map((v, k) => (k < 2 ? 0 : bounding ? -Math.abs(v) : v));
  const y = new Float64Array(order + 1);
  if (order >= 1) y[1] = 1 / first;
  for (let k = 2; k <= order; k += 1) y[k] = -(composed(rest, y, k)[k] as number) / first;
  return y;
}

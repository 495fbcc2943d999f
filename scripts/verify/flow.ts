import type { Fixed } from "./fixed.ts";
import { at, composer, type FixedLaw, product } from "./generating.ts";

/** Power series in s of w(x, s) = E_x[s^K], by recursions in s alone at a fixed x. With w′ = a(w) along the trajectory:
 *
 *      D a a_s + drift a + f = 0,      a F_s = H,      D a H_s = −(drift H + f(F)),      F = w(x, s), H = ∂w/∂x
 *
 *  Source: the semigroup w(x + y, s) = w(x, w(y, s)) differentiated by y at 0; shares nothing with contours or with expansions in x. */
export interface FlowEquation {
  readonly law: FixedLaw;
  readonly drift: bigint;
  readonly rate: bigint;
  readonly diffusion: bigint;
}

/** Coefficients in s − s* of w(x, s) and of ∂w/∂x. */
export interface FlowSeries {
  readonly value: readonly bigint[];
  readonly slope: readonly bigint[];
}

/** Coefficients in s − s* of a(s), where a(s*) ≠ 0 is given. */
export function fieldSeries(f: Fixed, e: FlowEquation, centre: bigint, start: bigint, order: number): bigint[] {
  const s = [centre, f.one];
  const compose = composer(f, e.law, s);
  const a = [start];
  const leading = f.multiply(e.diffusion, start);
  for (let k = 0; k < order; k += 1) {
    const source = f.multiply(e.drift, at(a, k)) + f.multiply(e.rate, compose(k) - at(s, k));
    const rest = f.multiply(e.diffusion, convected(f, a, a, k, 1, k));
    a.push(-f.divide(source + rest, leading) / BigInt(k + 1));
  }
  return a;
}

/** Σ_{i = from}^{to} a_i (k + 1 − i) b_{k + 1 − i}: the coefficient of a b′ without some of its terms. */
function convected(f: Fixed, a: readonly bigint[], b: readonly bigint[], k: number, from: number, to: number): bigint {
  let sum = 0n;
  for (let i = from; i <= to; i += 1) sum += at(a, i) * at(b, k + 1 - i) * BigInt(k + 1 - i);
  return f.settle(sum);
}

/** The flow about s* where a(s*) = a_0 ≠ 0, from w(x, s*) and ∂w/∂x there. */
export function flowSeries(
  f: Fixed,
  e: FlowEquation,
  a: readonly bigint[],
  start: { value: bigint; slope: bigint },
  order: number,
): FlowSeries {
  const value = [start.value];
  const slope = [start.slope];
  const compose = composer(f, e.law, value);
  const leading = at(a, 0);
  const damped = f.multiply(e.diffusion, leading);
  for (let k = 0; k < order; k += 1) {
    const growth = f.multiply(e.rate, compose(k) - at(value, k));
    const source = f.multiply(e.drift, at(slope, k)) + growth;
    const rest = f.multiply(e.diffusion, convected(f, a, slope, k, 1, k));
    value.push(f.divide(at(slope, k) - convected(f, a, value, k, 1, k), leading) / BigInt(k + 1));
    slope.push(-f.divide(source + rest, damped) / BigInt(k + 1));
  }
  return { value, slope };
}

/** B about s* where a(s*) ≠ 0: a B_s = −decay·B, B(s*) given. */
export function linearisingSeries(
  f: Fixed,
  a: readonly bigint[],
  decay: bigint,
  start: bigint,
  order: number,
): bigint[] {
  const b = [start];
  for (let k = 0; k < order; k += 1) {
    const rest = convected(f, a, b, k, 1, k);
    b.push(f.divide(-f.multiply(decay, at(b, k)) - rest, at(a, 0)) / BigInt(k + 1));
  }
  return b;
}

/** The flow about a fixed point s* of G, which w(x, ·) keeps: a = rate·(s − s*) + …, and w(x, s) = s* + e^{rate x} (s − s*) + …
 *  @param rate a root of D rate² + drift rate + f′(s*) = 0, [1/length]; none of its multiples 2·rate, …, order·rate is the other root */
export function fixedPointSeries(
  f: Fixed,
  e: FlowEquation,
  centre: bigint,
  rate: bigint,
  x: bigint,
  order: number,
): FlowSeries {
  const a = fixedPointField(f, e, centre, rate, order);
  const factor = f.exponential(f.multiply(rate, x));
  const value = [centre, factor];
  const slope = [0n, f.multiply(rate, factor)];
  const compose = composer(f, e.law, value);
  compose(0);
  const linear = f.divide(f.multiply(e.rate, compose(1) - factor), factor);
  const unit = f.multiply(e.diffusion, rate);
  for (let k = 2; k <= order; k += 1) {
    value[k] = 0n;
    slope[k] = 0n;
    // rate k F_k − H_k = first;  f′ F_k + (drift + D rate k) H_k = second
    const first = -convected(f, a, value, k, 2, k);
    const second = -f.multiply(e.rate, compose(k)) - f.multiply(e.diffusion, convected(f, a, slope, k, 2, k));
    const across = e.drift + BigInt(k) * unit;
    const along = BigInt(k) * rate;
    value[k] = f.divide(second + f.multiply(across, first), linear + f.multiply(across, along));
    slope[k] = f.multiply(along, at(value, k)) - first;
    compose(k);
  }
  return { value, slope };
}

function fixedPointField(f: Fixed, e: FlowEquation, centre: bigint, rate: bigint, order: number): bigint[] {
  const s = [centre, f.one];
  const compose = composer(f, e.law, s);
  compose(0);
  compose(1);
  const a = [0n, rate];
  const unit = f.multiply(e.diffusion, rate);
  for (let k = 2; k <= order; k += 1) {
    const rest = f.multiply(e.diffusion, convected(f, a, a, k, 2, k - 1));
    const source = f.multiply(e.rate, compose(k));
    a[k] = f.divide(-(source + rest), e.drift + BigInt(k + 1) * unit);
  }
  return a;
}

/** a·b cut after `order`. */
export function multiplied(f: Fixed, a: readonly bigint[], b: readonly bigint[], order: number): bigint[] {
  return Array.from({ length: order + 1 }, (_, k) => product(f, a, b, k, 0, k));
}

/** B about the fixed point 1 that it vanishes at: B = −(s − 1) + …, a B_s = −decay·B. */
export function linearisingAtOne(f: Fixed, e: FlowEquation, decay: bigint, order: number): bigint[] {
  const a = fixedPointField(f, e, f.one, -decay, order);
  const b = [0n, -f.one];
  for (let k = 2; k <= order; k += 1) b[k] = f.divide(convected(f, a, b, k, 2, k), decay) / BigInt(k - 1);
  return b;
}

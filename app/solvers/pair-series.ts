import { type Branching, FORM_FACTOR } from "./offspring.ts";
import { add, divide, exactSum, exponential, multiply, negate, ONE, pair, scale, subtract, ZERO } from "./pairs.ts";
import type { Pair } from "./types.ts";

/** Coefficients of a power series as double-doubles, in two arrays side by side. */
export class PairSeries {
  readonly high: Float64Array;
  readonly low: Float64Array;

  constructor(length: number) {
    this.high = new Float64Array(length);
    this.low = new Float64Array(length);
  }

  at(k: number): Pair {
    return [this.high[k] as number, this.low[k] as number];
  }

  set(k: number, value: Pair): void {
    this.high[k] = value[0];
    this.low[k] = value[1];
  }

  /** Σ_{k ≤ order} c_k h^k and its derivative in h. */
  evaluate(h: Pair, order: number): { value: Pair; derivative: Pair } {
    const { high, low } = this;
    const [x, xLow] = h;
    const cx = SPLITTER * x;
    const x1 = cx - (cx - x);
    const x2 = x - x1;
    let [v, vLow, d, dLow] = [0, 0, 0, 0];
    for (let k = order; k >= 0; k -= 1) {
      // d = d h + v
      let product = d * x;
      let c = SPLITTER * d;
      let a1 = c - (c - d);
      let a2 = d - a1;
      let lost = a1 * x1 - product + a1 * x2 + a2 * x1 + a2 * x2 + (d * xLow + dLow * x);
      let sum = product + v;
      let shift = sum - product;
      let rest = product - (sum - shift) + (v - shift) + (lost + vLow);
      d = sum + rest;
      dLow = rest - (d - sum);
      // v = v h + c_k
      const next = high[k] as number;
      product = v * x;
      c = SPLITTER * v;
      a1 = c - (c - v);
      a2 = v - a1;
      lost = a1 * x1 - product + a1 * x2 + a2 * x1 + a2 * x2 + (v * xLow + vLow * x);
      sum = product + next;
      shift = sum - product;
      rest = product - (sum - shift) + (next - shift) + (lost + (low[k] as number));
      v = sum + rest;
      vLow = rest - (v - sum);
    }
    return { value: [v, vLow], derivative: [d, dLow] };
  }

  /** The same in doubles. */
  evaluateRoughly(h: number, order: number): { value: number; derivative: number } {
    const { high } = this;
    let value = 0;
    let derivative = 0;
    for (let k = order; k >= 0; k -= 1) {
      derivative = derivative * h + value;
      value = value * h + (high[k] as number);
    }
    return { value, derivative };
  }
}

/** 2^27 + 1, see pairs.ts, whose sums and products are written out here for speed. */
const SPLITTER = 134217729;

/** Σ_{i = from}^{to} a_i b_{k − i}: the Cauchy product's coefficient, with every product and sum carried to double-double. */
export function cauchy(a: PairSeries, b: PairSeries, k: number, from: number, to: number): Pair {
  const { high: ah, low: al } = a;
  const { high: bh, low: bl } = b;
  let sum = 0;
  let rest = 0;
  for (let i = from; i <= to; i += 1) {
    const x = ah[i] as number;
    const y = bh[k - i] as number;
    const product = x * y;
    const cx = SPLITTER * x;
    const x1 = cx - (cx - x);
    const x2 = x - x1;
    const cy = SPLITTER * y;
    const y1 = cy - (cy - y);
    const y2 = y - y1;
    const lost = x1 * y1 - product + x1 * y2 + x2 * y1 + x2 * y2;
    const next = sum + product;
    const shift = next - sum;
    rest += sum - (next - shift) + (product - shift) + (lost + (x * (bl[k - i] as number) + (al[i] as number) * y));
    sum = next;
  }
  return exactSum(sum, rest);
}

/** Gives [h^k] of M(u(h)) once u_0, …, u_k are set; may be asked again for the same k after u_k has changed.
 *  At u_0 = 0 the answer does not depend on u_k, because M has no linear part: ask with u_k = 0, set u_k, ask again. */
export type PairComposer = (k: number) => Pair;

/** The composer of an offspring law for the series u, which its caller fills term by term. */
export function pairComposer(law: Branching, u: PairSeries): PairComposer {
  switch (law.law) {
    case "geometric":
      return composeGeometric(law.mean, u);
    case "poisson":
      return composePoisson(law.mean, u);
    case "finite":
      return composeFinite(law, u);
  }
}

function composeFinite(law: Branching & { law: "finite" }, u: PairSeries): PairComposer {
  const u0 = u.high[0] as number;
  if (law.fromZero || 1 + Math.abs(u0) < FORM_FACTOR * Math.max(1, Math.abs(1 - u0)))
    return composePolynomial(law.aboutOne, u);
  const w = new PairSeries(u.high.length);
  const composeG = composePolynomial(law.aboutZero, w);
  return (k) => {
    const uk = u.at(k);
    w.set(k, k === 0 ? subtract(ONE, uk) : negate(uk));
    const value = add(composeG(k), multiply(law.mean, uk));
    return k === 0 ? subtract(value, ONE) : value;
  };
}

/** Σ a_j v^j by Horner's rule on series: rows[j] = a_j + v·rows[j + 1]. */
function composePolynomial(a: readonly Pair[], v: PairSeries): PairComposer {
  const degree = a.length - 1;
  if (degree < 1) return (k) => (k === 0 ? (a[0] ?? ZERO) : ZERO);
  const rows = Array.from({ length: degree }, () => new PairSeries(v.high.length));
  return (k) => {
    let value = multiply(a[degree] as Pair, v.at(k));
    for (let j = degree - 1; ; j -= 1) {
      if (k === 0) value = add(value, a[j] as Pair);
      (rows[j] as PairSeries).set(k, value);
      if (j === 0) return value;
      value = cauchy(v, rows[j] as PairSeries, k, 0, k);
    }
  };
}

/** M (1 + q) = q² with q = mean·u. */
function composeGeometric(mean: Pair, u: PairSeries): PairComposer {
  const q = new PairSeries(u.high.length);
  const m = new PairSeries(u.high.length);
  return (k) => {
    q.set(k, multiply(mean, u.at(k)));
    const numerator = subtract(cauchy(q, q, k, 0, k), cauchy(q, m, k, 1, k));
    m.set(k, divide(numerator, add(ONE, q.at(0))));
    return m.at(k);
  };
}

/** E = e^{−q} obeys E' = −q' E; M = E − 1 + q. */
function composePoisson(mean: Pair, u: PairSeries): PairComposer {
  const e = new PairSeries(u.high.length);
  const qSlope = new PairSeries(u.high.length);
  return (k) => {
    const q = multiply(mean, u.at(k));
    if (k === 0) {
      e.set(0, exponential(negate(q)));
      return add(subtract(e.at(0), ONE), q);
    }
    qSlope.set(k, scale(q, k));
    e.set(k, divide(negate(cauchy(qSlope, e, k, 1, k)), pair(k)));
    return add(e.at(k), q);
  };
}

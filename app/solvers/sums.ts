import type { Contour, Reference } from "./contour.ts";
import { multiply, ONE, subtract } from "./pairs.ts";
import { ROUNDING } from "./reader.ts";
import type { NodeValues } from "./sources.ts";
import type { Base, Pair } from "./types.ts";

/** Cauchy's formula on a contour as a sum over amplitudes that do not depend on n:
 *
 *      P(K = n) radius^n = Σ_j Re(amplitude_j e^{−n L_j}),   amplitude = (i/π)(u − u(radius)) dL
 *
 *  Source: P(K = n) = (1/2πi) ∮ E[s^K] s^{−n} ds/s with u = 1 − E[s^K]; the lower half of the contour is the mirror image of
 *  the upper; a constant adds nothing for n ≥ 1, and taking u(radius) out leaves only what the law is made of.
 *  For P(n < K < ∞) the factor s/(s − 1)·1/s enters: Σ_{k > n} s^{−k−1} = s^{−n−1}/(s − 1) for |s| > 1; on a lattice of step d,
 *  s^{−n−1}/(s^d − 1) for an n on it. */
export interface Sums {
  readonly logRe: Float64Array;
  readonly logIm: Float64Array;
  readonly re: Float64Array;
  readonly im: Float64Array;
  /** the first nodes whose amplitudes share a relative error beside rounding */
  readonly uncertain?: { readonly nodes: number; readonly share: number };
  /** nodes after these have a relative error `share` beside rounding, and resolve e^{−nL} only up to n Re L = reach; beyond, their
   *  terms are themselves the error */
  readonly resolved?: { readonly nodes: number; readonly reach: number; readonly share: number };
  /** terms below e^−negligible are left out; more where the amplitudes rise steeply */
  readonly negligible?: number;
}

/** "each": P(K = n), n ≥ 1. "above": P(K > n), n ≥ 0. */
export type Wanted = "each" | "above";

/** K lives on offset + base.period·ℕ. */
export interface Lattice {
  readonly base: Base;
  readonly offset: number;
}

/** Amplitudes of a law whose values u = 1 − E[s^K] are known at the nodes (for n ≥ 2 a multiple of s may be added to u at will). */
export function sumsOf(contour: Contour, reference: Reference, u: NodeValues, lattice: Lattice, wanted: Wanted): Sums {
  const { logRe, logIm, weightRe, weightIm } = contour;
  const count = logRe.length;
  const re = new Float64Array(count);
  const im = new Float64Array(count);
  const { period } = lattice.base;
  const atTop = u.re[0] as number;
  // what is taken out must be alike on all images of s0, and nothing that a law contains: a power of s below 0
  const removed = period === 1 ? 0 : (lattice.offset % period) - period;
  for (let j = 1; j < count; j += 1) {
    const size = removed === 0 ? atTop : atTop * Math.exp(removed * (logRe[j] as number));
    const turn = removed * (logIm[j] as number);
    const a = (period * ((u.re[j] as number) - size * Math.cos(turn))) / Math.PI;
    const b = (period * ((u.im[j] as number) - size * Math.sin(turn))) / Math.PI;
    const p = weightRe[j] as number;
    const q = weightIm[j] as number;
    re[j] = -(a * q + b * p);
    im[j] = a * p - b * q;
  }
  if (wanted === "above") overExcess(contour, poleOf(reference, lattice.base), period, re, im);
  return { logRe, logIm, re, im };
}

/** s^period on the circle through the reference, and its excess over 1. */
function poleOf(reference: Reference, base: Base): { power: Pair; excess: Pair } {
  const { radius } = reference;
  if (base.centre === 1 && base.scale[0] === 1) return { power: radius, excess: reference.excess };
  const s = multiply(radius, base.scale);
  let power = s;
  for (let k = 1; k < base.period; k += 1) power = multiply(power, s);
  return { power, excess: subtract(power, ONE) };
}

/** Divides by s^period − 1 = (power − 1) + power (e^{period L} − 1). */
function overExcess(
  contour: Contour,
  { power, excess }: { power: Pair; excess: Pair },
  period: number,
  re: Float64Array,
  im: Float64Array,
): void {
  const radius = power[0];
  for (let j = 1; j < re.length; j += 1) {
    const a = period * (contour.logRe[j] as number);
    const b = period * (contour.logIm[j] as number);
    const dRe = excess[0] + radius * (Math.expm1(a) * Math.cos(b) - 2 * Math.sin(b / 2) ** 2);
    const dIm = radius * Math.exp(a) * Math.sin(b);
    const size = dRe * dRe + dIm * dIm;
    const x = re[j] as number;
    const y = im[j] as number;
    re[j] = (x * dRe + y * dIm) / size;
    im[j] = (y * dRe - x * dIm) / size;
  }
}

/** Terms below e^−NEGLIGIBLE of the leading ones are left out, unless the sums say otherwise. */
const NEGLIGIBLE = 46;
/** Values of n between fresh exponentials; in between, factors are multiplied up. */
const BLOCK = 32;
/** Roundings of one term: value of u, weight, factor. */
const TERM_ROUNDINGS = 12;

/** P(K = n) radius^n (or P(K > n) radius^n) at one n, without a bound on its rounding. */
export function sumAt(s: Sums, n: number): number {
  const { re, im, logRe, logIm } = s;
  const negligible = s.negligible ?? NEGLIGIBLE;
  let sum = 0;
  for (let j = 1; j < re.length; j += 1) {
    const fall = n * (logRe[j] as number);
    if (fall > negligible) continue;
    const size = Math.exp(-fall);
    const angle = n * (logIm[j] as number);
    if (angle === 0) sum += (re[j] as number) * size;
    else sum += size * ((re[j] as number) * Math.cos(angle) + (im[j] as number) * Math.sin(angle));
  }
  return sum;
}

/** P(K = n) radius^n (or P(K > n) radius^n) for n = from, …, to, with a bound on the rounding of each. */
export function sumRange(sums: Sums, from: number, to: number): { values: Float64Array; rounding: Float64Array } {
  const count = to - from + 1;
  const values = new Float64Array(count);
  const rounding = new Float64Array(count);
  const bound: Bound = { first: 0, last: 0 };
  for (let start = 0; start < count; start += BLOCK) {
    const end = Math.min(count, start + BLOCK);
    bound.first = 0;
    bound.last = 0;
    for (let j = 1; j < sums.re.length; j += 1) addNode(sums, j, from, start, end, values, bound);
    spreadBound(bound, start, end, rounding);
  }
  return { values, rounding };
}

/** Bounds on the rounding at the first and at the last n of a block. */
interface Bound {
  first: number;
  last: number;
}

/** A sum of falling exponentials is convex in its logarithm: in between it lies below the straight line. */
function spreadBound({ first, last }: Bound, start: number, end: number, rounding: Float64Array): void {
  const ratio = first > 0 && end - start > 1 ? (last / first) ** (1 / (end - start - 1)) : 1;
  let size = first;
  for (let i = start; i < end; i += 1) {
    rounding[i] = size;
    size *= ratio;
  }
}

function addNode(
  s: Sums,
  j: number,
  from: number,
  start: number,
  end: number,
  values: Float64Array,
  bound: Bound,
): void {
  const n = from + start;
  const rate = s.logRe[j] as number;
  if (n * rate > (s.negligible ?? NEGLIGIBLE)) return;
  const angle = s.logIm[j] as number;
  const first = Math.exp(-n * rate);
  const a = s.re[j] as number;
  const b = s.im[j] as number;
  // without tilt a leg's term is the real part alone; the angle nθ is rounded like the rest
  const bulk = angle === 0 ? Math.abs(a) : Math.abs(a) + Math.abs(b);
  let shared = s.uncertain !== undefined && j <= s.uncertain.nodes ? s.uncertain.share : 0;
  if (s.resolved !== undefined && j > s.resolved.nodes) shared = n * rate > s.resolved.reach ? 1 : s.resolved.share;
  const size = (ROUNDING * (TERM_ROUNDINGS + BLOCK + (n + BLOCK) * (rate + angle)) + shared) * first * bulk;
  bound.first += size;
  bound.last += size * Math.exp(-(end - start - 1) * rate);
  const shrink = Math.exp(-rate);
  if (angle === 0) {
    let re = a * first;
    for (let i = start; i < end; i += 1) {
      values[i] = (values[i] as number) + re;
      re *= shrink;
    }
    return;
  }
  const firstRe = first * Math.cos(n * angle);
  const firstIm = -first * Math.sin(n * angle);
  let re = a * firstRe - b * firstIm;
  let im = a * firstIm + b * firstRe;
  const factorRe = shrink * Math.cos(angle);
  const factorIm = -shrink * Math.sin(angle);
  for (let i = start; i < end; i += 1) {
    values[i] = (values[i] as number) + re;
    const next = re * factorRe - im * factorIm;
    im = re * factorIm + im * factorRe;
    re = next;
  }
}

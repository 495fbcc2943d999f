import type { Contour } from "./contour.ts";
import { ROUNDING } from "./reader.ts";
import type { NodeValues } from "./sources.ts";
import type { Turning } from "./types.ts";

/** Cauchy's formula on a contour as sums over n-independent amplitudes:
 *
 *      P(K = n) s0^n = Σ_leg amplitude·e^{−n rate} + e^{−n arcRate} Σ_arc Re(amplitude·e^{−inθ})
 *
 *  Source: P(K = n) = (1/2πi) ∮ E[s^K] s^{−n−1} ds; the lower half of the contour is the mirror image of the upper.
 *  For P(K > n) the factor 1/(s − 1) enters: Σ_{k > n} s^{−k−1} = s^{−n−1}/(s − 1) for |s| > 1. */
export interface Sums {
  readonly legRate: Float64Array;
  readonly leg: Float64Array;
  readonly arcRate: number;
  readonly theta: Float64Array;
  readonly arcRe: Float64Array;
  readonly arcIm: Float64Array;
  /** Σ |arc amplitude|, which bounds the rounding of the arc's part */
  readonly arcSize: number;
}

/** "each": P(K = n), n ≥ 1. "above": P(K > n), n ≥ 0. */
export type Wanted = "each" | "above";

/** Amplitudes of a law whose values u = 1 − E[s^K] are known at the nodes (a constant or, for n ≥ 2, a multiple of s may be added to u at will). */
export function sumsOf(contour: Contour, turning: Turning, u: NodeValues, wanted: Wanted): Sums {
  const { legNodes, arcNodes, parameter, weight } = contour;
  const s0 = turning.s0[0];
  const excess = turning.excess[0];
  const legRate = new Float64Array(legNodes);
  const leg = new Float64Array(legNodes);
  for (let j = 0; j < legNodes; j += 1) {
    const square = (parameter[j] as number) ** 2;
    legRate[j] = Math.log1p(square);
    const factor = wanted === "each" ? 1 : 1 / (excess + s0 * square);
    leg[j] =
      ((-2 * (weight[j] as number) * (parameter[j] as number)) / (1 + square) / Math.PI) * (u.im[j] as number) * factor;
  }
  const theta = new Float64Array(arcNodes);
  const arcRe = new Float64Array(arcNodes);
  const arcIm = new Float64Array(arcNodes);
  let arcSize = 0;
  for (let i = 0; i < arcNodes; i += 1) {
    const j = legNodes + i;
    const angle = parameter[j] as number;
    let re = (-(weight[j] as number) / Math.PI) * (u.re[j] as number);
    let im = (-(weight[j] as number) / Math.PI) * (u.im[j] as number);
    if (wanted === "above") {
      const dRe = s0 * (1 + contour.width) * Math.cos(angle) - 1;
      const dIm = s0 * (1 + contour.width) * Math.sin(angle);
      const size = dRe * dRe + dIm * dIm;
      [re, im] = [(re * dRe + im * dIm) / size, (im * dRe - re * dIm) / size];
    }
    theta[i] = angle;
    arcRe[i] = re;
    arcIm[i] = im;
    arcSize += Math.hypot(re, im);
  }
  return { legRate, leg, arcRate: Math.log1p(contour.width), theta, arcRe, arcIm, arcSize };
}

/** Terms below e^−NEGLIGIBLE of the leading ones are left out. */
const NEGLIGIBLE = 46;
/** Values of n between fresh exponentials; in between, factors are multiplied up. */
const BLOCK = 32;
/** Roundings of one term: value of u, weight, factor. */
const TERM_ROUNDINGS = 12;

/** P(K = n) s0^n (or P(K > n) s0^n) for n = from, …, to, with a bound on the rounding of each. */
export function sumRange(sums: Sums, from: number, to: number): { values: Float64Array; rounding: Float64Array } {
  const count = to - from + 1;
  const values = new Float64Array(count);
  const sizes = new Float64Array(count);
  for (let start = 0; start < count; start += BLOCK) {
    const end = Math.min(count, start + BLOCK);
    addLeg(sums, from, start, end, values, sizes);
    addArc(sums, from, start, end, values, sizes);
  }
  for (let i = 0; i < count; i += 1) sizes[i] = (sizes[i] as number) * ROUNDING;
  return { values, rounding: sizes };
}

function addLeg(s: Sums, from: number, start: number, end: number, values: Float64Array, sizes: Float64Array): void {
  const n = from + start;
  for (let j = 0; j < s.leg.length; j += 1) {
    const rate = s.legRate[j] as number;
    // rates increase along the leg
    if (n * rate > NEGLIGIBLE) break;
    const ratio = Math.exp(-rate);
    let term = (s.leg[j] as number) * Math.exp(-n * rate);
    for (let i = start; i < end; i += 1) {
      values[i] = (values[i] as number) + term;
      sizes[i] = (sizes[i] as number) + Math.abs(term) * (TERM_ROUNDINGS + BLOCK / 2);
      term *= ratio;
    }
  }
}

function addArc(s: Sums, from: number, start: number, end: number, values: Float64Array, sizes: Float64Array): void {
  const n = from + start;
  if (n * s.arcRate > NEGLIGIBLE) return;
  const shrink = Math.exp(-s.arcRate);
  const first = Math.exp(-n * s.arcRate);
  for (let j = 0; j < s.theta.length; j += 1) {
    const angle = s.theta[j] as number;
    const cosine = shrink * Math.cos(angle);
    const sine = -shrink * Math.sin(angle);
    const startCosine = first * Math.cos(n * angle);
    const startSine = -first * Math.sin(n * angle);
    let re = (s.arcRe[j] as number) * startCosine - (s.arcIm[j] as number) * startSine;
    let im = (s.arcRe[j] as number) * startSine + (s.arcIm[j] as number) * startCosine;
    for (let i = start; i < end; i += 1) {
      values[i] = (values[i] as number) + re;
      const next = re * cosine - im * sine;
      im = re * sine + im * cosine;
      re = next;
    }
  }
  let size = s.arcSize * first;
  for (let i = start; i < end; i += 1) {
    // the angle nθ is rounded, too
    sizes[i] = (sizes[i] as number) + size * (TERM_ROUNDINGS + 2 * BLOCK + Math.PI * (from + i));
    size *= shrink;
  }
}

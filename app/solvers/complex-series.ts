import { type Branching, exponentialRest, FORM_FACTOR } from "./offspring.ts";
import type { Pair } from "./types.ts";

/** The nonlinearity M of complex power series in double precision: the working horse of all reading off the trajectory.
 *  A series is two arrays, real parts and imaginary parts, of equal length. */
export interface ComplexSeries {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/** A series of zeros. */
export function complexSeries(length: number): ComplexSeries {
  return { re: new Float64Array(length), im: new Float64Array(length) };
}

/** Real and imaginary part of the last number computed by the functions of this file: no allocation in loops. */
export interface Register {
  re: number;
  im: number;
}

/** out = Σ_{i = from}^{to} a_i b_{k − i}. */
function cauchy(a: ComplexSeries, b: ComplexSeries, k: number, from: number, to: number, out: Register): void {
  const { re: ar, im: ai } = a;
  const { re: br, im: bi } = b;
  let re = 0;
  let im = 0;
  for (let i = from; i <= to; i += 1) {
    const x = ar[i] as number;
    const y = ai[i] as number;
    const p = br[k - i] as number;
    const q = bi[k - i] as number;
    re += x * p - y * q;
    im += x * q + y * p;
  }
  out.re = re;
  out.im = im;
}

/** out = [h^k] M(u(h)), once u_0, …, u_k are set; to be asked for k = 0, 1, 2, … in order. */
export type Composer = (k: number, out: Register) => void;

/** A composer bound to one series and its own workspace, good for any number of expansions one after another. */
export function complexComposer(law: Branching, u: ComplexSeries): Composer {
  switch (law.law) {
    case "geometric":
      return composeGeometric(law.mean[0], u);
    case "poisson":
      return composePoisson(law.mean[0], u);
    case "finite":
      return composeFinite(law, u);
  }
}

function composeFinite(law: Branching & { law: "finite" }, u: ComplexSeries): Composer {
  const w = complexSeries(u.re.length);
  const aboutOne = composePolynomial(law.aboutOne, u);
  const aboutZero = composePolynomial(law.aboutZero, w);
  const mean = law.mean[0];
  let nearOne = true;
  return (k, out) => {
    const re = u.re[k] as number;
    const im = u.im[k] as number;
    if (k === 0) nearOne = law.fromZero || 1 + Math.hypot(re, im) < FORM_FACTOR * Math.max(1, Math.hypot(1 - re, im));
    if (nearOne) {
      aboutOne(k, out);
      return;
    }
    w.re[k] = k === 0 ? 1 - re : -re;
    w.im[k] = -im;
    aboutZero(k, out);
    out.re += mean * re - (k === 0 ? 1 : 0);
    out.im += mean * im;
  };
}

/** Σ a_j v^j by Horner's rule on series: rows[j] = a_j + v·rows[j + 1]. */
function composePolynomial(coefficients: readonly Pair[], v: ComplexSeries): Composer {
  const a = Float64Array.from(coefficients, (c) => c[0]);
  const degree = a.length - 1;
  if (degree < 1)
    return (k, out) => {
      out.re = k === 0 ? (a[0] ?? 0) : 0;
      out.im = 0;
    };
  const rows = Array.from({ length: degree }, () => complexSeries(v.re.length));
  return (k, out) => {
    out.re = (a[degree] as number) * (v.re[k] as number);
    out.im = (a[degree] as number) * (v.im[k] as number);
    for (let j = degree - 1; ; j -= 1) {
      if (k === 0) out.re += a[j] as number;
      const row = rows[j] as ComplexSeries;
      row.re[k] = out.re;
      row.im[k] = out.im;
      if (j === 0) return;
      cauchy(v, row, k, 0, k, out);
    }
  };
}

/** M (1 + q) = q² with q = mean·u. */
function composeGeometric(mean: number, u: ComplexSeries): Composer {
  const q = complexSeries(u.re.length);
  const m = complexSeries(u.re.length);
  const known: Register = { re: 0, im: 0 };
  return (k, out) => {
    q.re[k] = mean * (u.re[k] as number);
    q.im[k] = mean * (u.im[k] as number);
    cauchy(q, q, k, 0, k, out);
    cauchy(q, m, k, 1, k, known);
    divide(out.re - known.re, out.im - known.im, 1 + (q.re[0] as number), q.im[0] as number, out);
    m.re[k] = out.re;
    m.im[k] = out.im;
  };
}

/** E = e^{−q} obeys E' = −q' E; M = E − 1 + q. */
function composePoisson(mean: number, u: ComplexSeries): Composer {
  const e = complexSeries(u.re.length);
  const slope = complexSeries(u.re.length);
  return (k, out) => {
    const re = mean * (u.re[k] as number);
    const im = mean * (u.im[k] as number);
    if (k === 0) {
      const size = Math.exp(-re);
      e.re[0] = size * Math.cos(im);
      e.im[0] = -size * Math.sin(im);
      // Re M = (e^{−re} − 1 + re) − 2 e^{−re} sin²(im/2), without cancellation for small q on the real axis
      out.re = exponentialRest(re) - 2 * size * Math.sin(im / 2) ** 2;
      out.im = (e.im[0] as number) + im;
      return;
    }
    slope.re[k] = k * re;
    slope.im[k] = k * im;
    cauchy(slope, e, k, 1, k, out);
    e.re[k] = -out.re / k;
    e.im[k] = -out.im / k;
    out.re = (e.re[k] as number) + re;
    out.im = (e.im[k] as number) + im;
  };
}

/** out = (a + ib)/(c + id). */
export function divide(a: number, b: number, c: number, d: number, out: Register): void {
  const size = c * c + d * d;
  out.re = (a * c + b * d) / size;
  out.im = (b * c - a * d) / size;
}

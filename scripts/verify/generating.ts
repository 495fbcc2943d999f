import type { Fixed } from "./fixed.ts";

/** A law of the number of children in fixed point: its generating function G and the mean G'(1). */
export type FixedLaw =
  | { readonly law: "finite"; readonly probabilities: readonly bigint[] }
  | { readonly law: "geometric" | "poisson"; readonly mean: bigint };

/** Gives [h^k] G(w(h)) once w_0, …, w_k are set, for k = 0, 1, 2, … in order; may be asked again for the last k after w_k has changed. */
export type Composer = (k: number) => bigint;

/** The composer for a series w that its caller fills term by term.
 *  Source: Cauchy products; g (1 + mean − mean w) = 1 for a geometric law, g' = mean w' g for a Poisson law. */
export function composer(f: Fixed, law: FixedLaw, w: readonly bigint[]): Composer {
  if (law.law === "finite") return composeFinite(f, law.probabilities, w);
  const { mean } = law;
  const g: bigint[] = [];
  if (law.law === "geometric")
    return (k) => {
      const denominator = f.one + mean - f.multiply(mean, at(w, 0));
      if (k === 0) g[0] = f.divide(f.one, denominator);
      else g[k] = f.divide(f.multiply(mean, product(f, w, g, k, 1, k)), denominator);
      return at(g, k);
    };
  return (k) => {
    if (k === 0) g[0] = f.exponential(f.multiply(mean, at(w, 0) - f.one));
    else {
      let sum = 0n;
      for (let i = 1; i <= k; i += 1) sum += BigInt(i) * at(w, i) * at(g, k - i);
      g[k] = f.multiply(mean, f.settle(sum)) / BigInt(k);
    }
    return at(g, k);
  };
}

/** Horner's rule on series: rows[j] = p_j + w·rows[j + 1]. */
function composeFinite(f: Fixed, p: readonly bigint[], w: readonly bigint[]): Composer {
  const degree = p.length - 1;
  const rows: bigint[][] = Array.from({ length: degree }, () => []);
  return (k) => {
    if (degree === 0) return k === 0 ? at(p, 0) : 0n;
    let value = f.multiply(at(p, degree), at(w, k));
    for (let j = degree - 1; ; j -= 1) {
      if (k === 0) value += at(p, j);
      const row = rows[j] as bigint[];
      row[k] = value;
      if (j === 0) return value;
      value = product(f, w, row, k, 0, k);
    }
  };
}

/** Σ_{i = from}^{to} a_i b_{k − i}. */
export function product(
  f: Fixed,
  a: readonly bigint[],
  b: readonly bigint[],
  k: number,
  from: number,
  to: number,
): bigint {
  let sum = 0n;
  for (let i = from; i <= to; i += 1) sum += at(a, i) * at(b, k - i);
  return f.settle(sum);
}

/** The coefficient, 0 beyond the last one. */
export function at(series: readonly bigint[], k: number): bigint {
  return series[k] ?? 0n;
}

/** G and G' at w. */
export function generating(f: Fixed, law: FixedLaw, w: bigint): { value: bigint; slope: bigint } {
  const series = [w, f.one];
  const compose = composer(f, law, series);
  return { value: compose(0), slope: compose(1) };
}

/** Σ c_k h^k and its derivative in h. */
export function evaluate(f: Fixed, c: readonly bigint[], h: bigint): { value: bigint; slope: bigint } {
  let value = 0n;
  let slope = 0n;
  for (let k = c.length - 1; k >= 0; k -= 1) {
    slope = f.multiply(slope, h) + value;
    value = f.multiply(value, h) + at(c, k);
  }
  return { value, slope };
}

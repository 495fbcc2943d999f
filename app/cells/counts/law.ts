import type { AbsorbedLaw, ScaledEstimate } from "../../solvers/index.ts";

/** P(K = n) from a law that was computed to `upTo`; undefined beyond it. */
export function probabilityAt(law: AbsorbedLaw, n: number): ScaledEstimate | undefined {
  const mantissa = law.mantissa[n];
  const exponent = law.exponent[n];
  const error = law.error[n];
  if (mantissa === undefined || exponent === undefined || error === undefined) return undefined;
  return { mantissa, exponent, error };
}

/** log10 of a probability, without passing through the double's range; null for 0. */
export function log10Probability({ mantissa, exponent }: ScaledEstimate): number | null {
  return mantissa > 0 ? Math.log10(mantissa) + exponent * Math.LOG10E * Math.LN2 : null;
}

/** The probability as a double: 0 where it passes below the range. */
export function doubleProbability({ mantissa, exponent }: ScaledEstimate): number {
  return mantissa * 2 ** exponent;
}

/**
 * P(K > n) for some n up to the law's end, from P(K > upTo) by adding the law from its far end inwards: all terms are
 * positive, so relative accuracy is kept. Errors add; each sum may round by half a unit in its last place.
 */
export function probabilitiesAbove(
  law: AbsorbedLaw,
  beyond: ScaledEstimate,
  wanted: readonly number[],
): ReadonlyMap<number, ScaledEstimate> {
  const found = new Map<number, ScaledEstimate>();
  const asked = new Set(wanted);
  let sum = beyond;
  for (let n = law.upTo; n >= 0; n -= 1) {
    if (asked.has(n)) found.set(n, sum);
    const probability = probabilityAt(law, n);
    if (probability !== undefined) sum = added(sum, probability);
  }
  return found;
}

/** Errors rounded up to two digits: a law is kept and sent, and seventeen digits of an error say nothing. */
export function withShortErrors(law: AbsorbedLaw): AbsorbedLaw {
  return { ...law, error: law.error.map(shortError) };
}

/** An error bound rounded up to two digits. */
export function shortError(error: number): number {
  return Number((error * 1.05).toPrecision(2));
}

function added(a: ScaledEstimate, b: ScaledEstimate): ScaledEstimate {
  if (b.mantissa === 0 && b.error === 0) return a;
  const exponent = a.mantissa === 0 ? b.exponent : Math.max(a.exponent, b.exponent);
  const inA = 2 ** (a.exponent - exponent);
  const inB = 2 ** (b.exponent - exponent);
  const mantissa = a.mantissa * inA + b.mantissa * inB;
  const error = a.error * inA + b.error * inB + Math.abs(mantissa) * 2 ** -53;
  // Both mantissas were below 1: halving once keeps the sum so.
  return mantissa < 1
    ? { mantissa, exponent, error }
    : { mantissa: mantissa / 2, exponent: exponent + 1, error: error / 2 };
}

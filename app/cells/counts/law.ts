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

import { expect } from "vitest";
import type { AbsorbedLaw, Answer, Estimate, Refusal, ScaledEstimate } from "../../app/solvers/index.ts";

/** Reading answers in tests. */
export function isRefused<T extends object>(answer: Answer<T>): answer is Refusal {
  return "refused" in answer;
}

/** The answer, which must not be a refusal. */
export function given<T extends object>(answer: Answer<T>): T {
  if (isRefused(answer)) throw new Error(`refused: ${answer.refused}`);
  return answer;
}

/** mantissa·2^exponent − decimal, relative to the decimal, exactly: both are rationals, compared as big integers. */
export function relativeGap(value: { mantissa: number; exponent: number }, decimal: string): number {
  const [digits = "", power = "0"] = decimal.split("e");
  const [whole = "", fraction = ""] = digits.split(".");
  let reference = BigInt(whole + fraction);
  const tens = Number(power) - fraction.length;
  let ours = BigInt(value.mantissa * 2 ** 53);
  const twos = value.exponent - 53;
  if (twos > 0) ours <<= BigInt(twos);
  else reference <<= BigInt(-twos);
  if (tens > 0) reference *= 10n ** BigInt(tens);
  else ours *= 10n ** BigInt(-tens);
  const size = reference < 0n ? -reference : reference;
  return Number(((ours - reference) * SCALE) / size) / Number(SCALE);
}

const SCALE = 10n ** 30n;

/** Digits of the references. */
const REFERENCE_DIGITS = 1e-24;

/** A double as a scaled number. */
export function scaled(value: number): { mantissa: number; exponent: number } {
  if (value === 0) return { mantissa: 0, exponent: 0 };
  const exponent = Math.floor(Math.log2(Math.abs(value))) + 1;
  return { mantissa: value / 2 ** exponent, exponent };
}

/** The estimate is within `relative` of the reference, and within its own error of it. */
export function expectClose(estimate: Estimate, decimal: string, relative: number): void {
  const gap = Math.abs(relativeGap(scaled(estimate.value), decimal));
  expect(gap).toBeLessThan(relative);
  expect(gap).toBeLessThanOrEqual(estimate.error / Math.abs(estimate.value) + REFERENCE_DIGITS);
}

export function expectScaledClose(estimate: ScaledEstimate, decimal: string, relative: number): void {
  const gap = Math.abs(relativeGap(estimate, decimal));
  expect(gap).toBeLessThan(relative);
  expect(gap).toBeLessThanOrEqual(estimate.error / Math.abs(estimate.mantissa) + REFERENCE_DIGITS);
}

/** P(K = n) of a law. */
export function scaledAt(law: AbsorbedLaw, n: number): ScaledEstimate {
  return { mantissa: law.mantissa[n] as number, exponent: law.exponent[n] as number, error: law.error[n] as number };
}

export function toDouble(value: ScaledEstimate): number {
  return value.mantissa * 2 ** value.exponent;
}

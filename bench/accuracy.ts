import { Fixed } from "../scripts/verify/fixed.ts";

/** Digits in which logarithms are compared: far beyond a double's. */
const f = new Fixed(160);

/** ln of a decimal number, as "2.57e-741". */
export function lnOfDecimal(decimal: string): bigint {
  const [digits = "", power = "0"] = decimal.split("e");
  const [whole = "", fraction = ""] = digits.split(".");
  const units = BigInt(whole + fraction);
  const tens = BigInt(Number(power) - fraction.length);
  const sign = units < 0n ? -units : units;
  return f.logarithm(sign << BigInt(f.bits)) + tens * f.logarithm(f.integer(10));
}

/** ln (value·base^exponent). */
export function lnOf(value: number, base: number, exponent: number): bigint {
  return f.logarithm(f.double(Math.abs(value))) + BigInt(exponent) * f.logarithm(f.double(base));
}

/** How far a number is from a reference, relative, from their logarithms. */
export function relativeOf(ours: bigint, reference: bigint): number {
  return Math.abs(Math.expm1(f.toNumber(ours - reference)));
}

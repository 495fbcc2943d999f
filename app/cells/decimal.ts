import type { Quantity } from "../formulas/index.ts";

/** Digits that tell one double from the next. */
const DIGITS = 17;

/**
 * A quantity at full precision as decimal text that any program reads: "5.436877834061", "2.5803124411e-741".
 * Beyond the double's range the digits are exact to 17 places, by whole-number arithmetic.
 */
export function decimalText({ mantissa, exponent }: Quantity): string {
  return scaledDecimal(mantissa, exponent);
}

/** The larger of a quantity's error bound and standard error, as decimal text; "" for exact numbers. */
export function errorText({ error, se, exponent }: Quantity): string {
  const larger = Math.max(error, se);
  return larger === 0 ? "" : scaledDecimal(Number(larger.toPrecision(2)), exponent);
}

function scaledDecimal(mantissa: number, exponent: number): string {
  const plain = mantissa * 2 ** exponent;
  if (exponent === 0 || mantissa === 0) return String(mantissa);
  if (Number.isFinite(plain) && Math.abs(plain) > 1e-290) return String(plain);
  const { whole, shift } = wholeMantissa(Math.abs(mantissa));
  const power = exponent - shift;
  // value = whole·2^power; take `DIGITS` leading digits by dividing whole numbers.
  const guess = Math.floor(Math.log10(Math.abs(mantissa)) + exponent * Math.log10(2));
  const lift = DIGITS - 1 - guess;
  let numerator = whole;
  let denominator = 1n;
  if (power >= 0) numerator <<= BigInt(power);
  else denominator <<= BigInt(-power);
  if (lift >= 0) numerator *= 10n ** BigInt(lift);
  else denominator *= 10n ** BigInt(-lift);
  const digits = ((2n * numerator + denominator) / (2n * denominator)).toString();
  const trimmed = digits.slice(1).replace(/0+$/, "");
  const point = trimmed === "" ? "" : `.${trimmed}`;
  return `${mantissa < 0 ? "-" : ""}${digits.charAt(0)}${point}e${guess + digits.length - DIGITS}`;
}

/** x = whole·2^−shift with whole an integer, exactly. */
function wholeMantissa(x: number): { whole: bigint; shift: number } {
  let scaled = x;
  let shift = 0;
  while (!Number.isInteger(scaled)) {
    scaled *= 2;
    shift += 1;
  }
  return { whole: BigInt(scaled), shift };
}

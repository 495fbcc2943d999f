import { log10Of, toDouble } from "./quantity.ts";
import type { Quantity } from "./types.ts";

/**
 * A number in decimal: ±0.d1d2d3… shifted so that the first digit stands at 10^exponent.
 * Layout: digits "543656" and exponent 0 mean 5.43656. Zero has no digits.
 */
export interface Decimal {
  readonly negative: boolean;
  readonly digits: string;
  readonly exponent: number;
}

/** Binary exponents up to this size are converted exactly, in whole numbers of any length. */
const EXACT_EXPONENT = 20_000;
/** Digits that the logarithm of a number beyond that size still gives. */
const LOGARITHM_DIGITS = 9;

/**
 * The number rounded (half away from zero) to the decimal place 10^place: exact conversion of the binary number.
 * A number below half a unit of the place gives no digits.
 */
export function roundToPlace(q: Quantity, place: number): Decimal {
  const negative = q.mantissa < 0;
  if (q.mantissa === 0) return { negative: false, digits: "", exponent: place };
  if (Math.abs(q.exponent) > EXACT_EXPONENT) return roundHuge(q, place);
  const { numerator, denominator } = asFraction(Math.abs(q.mantissa), q.exponent);
  const up = place < 0 ? 10n ** BigInt(-place) : 1n;
  const down = place > 0 ? 10n ** BigInt(place) : 1n;
  const divisor = denominator * down;
  const rounded = (2n * numerator * up + divisor) / (2n * divisor);
  return rounded === 0n
    ? { negative: false, digits: "", exponent: place }
    : fromUnits(negative, rounded.toString(), place);
}

function fromUnits(negative: boolean, units: string, place: number): Decimal {
  return { negative, digits: units, exponent: place + units.length - 1 };
}

/** |m|·2^e as a quotient of whole numbers. */
function asFraction(m: number, e: number): { numerator: bigint; denominator: bigint } {
  let whole = m;
  let shift = e;
  while (!Number.isInteger(whole)) {
    whole *= 2;
    shift -= 1;
  }
  const n = BigInt(whole);
  return shift >= 0
    ? { numerator: n << BigInt(shift), denominator: 1n }
    : { numerator: n, denominator: 1n << BigInt(-shift) };
}

function roundHuge(q: Quantity, place: number): Decimal {
  const log = log10Of(q);
  const exponent = Math.floor(log);
  const count = Math.min(exponent - place + 1, LOGARITHM_DIGITS);
  if (count <= 0) return { negative: false, digits: "", exponent: place };
  const units = Math.round(10 ** (log - exponent + count - 1));
  return fromUnits(q.mantissa < 0, String(units), exponent - count + 1);
}

/** The place of the first digit: 10^p <= |q| < 10^(p+1). */
export function leadingPlace(q: Quantity): number {
  const guess = Math.floor(log10Of(q));
  if (Math.abs(q.exponent) > EXACT_EXPONENT) return guess;
  // Near a power of ten the logarithm may round across it; the exact digits tell.
  const { numerator, denominator } = asFraction(Math.abs(q.mantissa), q.exponent);
  const power = (p: number): boolean =>
    p >= 0 ? numerator >= denominator * 10n ** BigInt(p) : numerator * 10n ** BigInt(-p) >= denominator;
  if (!power(guess)) return guess - 1;
  return power(guess + 1) ? guess + 1 : guess;
}

/** The shortest decimal that reads back as the same double: the number as it was typed. */
export function shortest(q: Quantity): Decimal {
  const [mantissa, exponent] = Math.abs(toDouble(q)).toExponential().split("e") as [string, string];
  return { negative: q.mantissa < 0, digits: mantissa.replace(".", ""), exponent: Number(exponent) };
}

/** Digits that tell one double from the next. */
const DOUBLE_DIGITS = 17;
/** Doubles below lose digits to underflow soon: they are converted exactly instead. */
const SMALLEST_SAFE = 1e-290;

/**
 * The number as decimal text that any program reads: "5.436877834061", "2.5803124411e-741".
 * @param digits significant digits, 1 to 17; all that tell the double from the next where they are left out
 */
export function decimalText(q: Quantity, digits: number = DOUBLE_DIGITS): string {
  const plain = toDouble(q);
  const isSafe = q.exponent === 0 || q.mantissa === 0 || (Number.isFinite(plain) && Math.abs(plain) > SMALLEST_SAFE);
  if (isSafe) return String(digits === DOUBLE_DIGITS ? plain : Number(plain.toPrecision(digits)));
  const rounded = withoutTrailingZeros(roundToPlace(q, leadingPlace(q) - (digits - 1)));
  const rest = rounded.digits.slice(1);
  return `${rounded.negative ? "-" : ""}${rounded.digits.charAt(0)}${rest === "" ? "" : `.${rest}`}e${rounded.exponent}`;
}

/** The decimal without the zeros at its end; digits are "" where it had no others. */
export function withoutTrailingZeros(d: Decimal): Decimal {
  return { ...d, digits: d.digits.replace(/0+$/, "") };
}

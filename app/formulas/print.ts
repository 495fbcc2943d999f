import { isWhole } from "./arithmetic.ts";
import { type Decimal, leadingPlace, roundToPlace, shortest, withoutTrailingZeros } from "./decimal.ts";
import { exact, scaled } from "./quantity.ts";
import type { PrintedNumber, PrintOptions, Quantity } from "./types.ts";
import { type Layout, layOut } from "./typeset.ts";

/** Significant digits where none are asked for. */
const USUAL_DIGITS = 6;
/** Numbers whose first digit stands outside these places are printed with a power of ten. Common practice. */
const LOWEST_PLAIN = -4;
const HIGHEST_PLAIN = 6;

/**
 * Prints a number with the digits that are asked for and no digit that its error does not support.
 *
 * - A digit is supported when the larger of error and standard error is at most half a unit of it. With `withError`
 *   the standard error stands in brackets, so that the numerical error alone limits the digits.
 * - Without `digits` or `decimals`: up to 6 significant digits; an exact number then drops trailing zeros (1.6).
 * - Exact whole numbers are printed whole, whatever digits are asked.
 * - A power of ten stands where the first digit lies below 10^-4 or above 10^6, and where the last digit that may be
 *   printed lies left of the units (12 300 known to hundreds is 1.23×10^4), unless `as` is "plain".
 * - With `decimals` a number below half a unit of the last place prints as 0.000: that many decimals are known of it.
 * - Where the error supports no digit at all, the text is "no digit known" and `supported` is 0: the caller has to
 *   report it. It is never printed as 0, for it need not be.
 */
export function printNumber(q: Quantity, options: PrintOptions = {}): PrintedNumber {
  const number = options.as === "percent" ? shiftedByTwo(q) : q;
  const isBracketed = options.withError === true && number.se > 0;
  const uncertainty = isBracketed ? number.error : Math.max(number.error, number.se);
  const isExact = uncertainty === 0 && !isBracketed;
  if (isExact) return layOut(exactLayout(number, options));
  const lowest = supportedPlace(uncertainty, number.exponent);
  const first = number.mantissa === 0 ? null : leadingPlace(number);
  const known = Number.isFinite(lowest) ? roundToPlace(number, lowest) : null;
  const asked = askedPlace(number, first, isBracketed, options);
  const place = Math.max(asked, lowest);
  const supported = known === null ? Number.POSITIVE_INFINITY : known.digits.length;
  const rounded = roundToPlace(number, place);
  const isKnown = rounded.digits !== "" || (options.decimals !== undefined && place === asked) || isBracketed;
  if (!isKnown) return nothingKnown(number, asked, options);
  const hasAsked = options.digits !== undefined || options.decimals !== undefined;
  return layOut({
    value: rounded,
    place,
    full: hasAsked && asked < place ? roundToPlace(number, asked) : null,
    fullPlace: asked,
    bracket: isBracketed ? roundToPlace(scaled(number.se, number.exponent, 0), place).digits || "0" : null,
    supported,
    isScientific: isScientific(rounded, place, options),
    isPercent: options.as === "percent",
    unit: options.unit ?? "",
  });
}

/** The place of the lowest digit of which half a unit is at least the uncertainty; -Infinity for none. */
function supportedPlace(uncertainty: number, exponent: number): number {
  if (uncertainty === 0) return Number.NEGATIVE_INFINITY;
  const twice = scaled(uncertainty, exponent + 1, 0);
  // 10^p is large enough where it is 2·uncertainty itself, as an error of 0.05 means; or else the next place is.
  const written = shortest(twice);
  const isPowerOfTen = /^10*$/.test(written.digits) && twice.exponent === 0;
  return isPowerOfTen ? written.exponent : leadingPlace(twice) + 1;
}

function askedPlace(q: Quantity, first: number | null, isBracketed: boolean, options: PrintOptions): number {
  if (options.decimals !== undefined) return -options.decimals;
  const top = first ?? leadingPlace(scaled(Math.max(q.error, q.se), q.exponent, 0));
  if (options.digits !== undefined) return carried(q, top, options.digits);
  if (isBracketed) return bracketPlace(q);
  return carried(q, top, USUAL_DIGITS);
}

/** The place of the last of `digits` significant digits, after rounding may have added one in front (9.996 → 10.00). */
function carried(q: Quantity, top: number, digits: number): number {
  const place = top - digits + 1;
  return roundToPlace(q, place).digits.length > digits ? place + 1 : place;
}

/** The last digit printed before a standard error in brackets: its first digit, or its second where the first is 1. */
function bracketPlace(q: Quantity): number {
  const se = scaled(q.se, q.exponent, 0);
  const top = leadingPlace(se);
  const leading = roundToPlace(se, top - 1);
  return leading.digits.startsWith("1") ? leading.exponent - 1 : leading.exponent;
}

function isScientific(value: Decimal, place: number, options: PrintOptions): boolean {
  if (options.as === "scientific") return true;
  if (options.as === "plain") return false;
  if (value.digits === "") return place > 0;
  if (options.decimals !== undefined && place <= 0) return value.exponent > 15;
  return value.exponent < LOWEST_PLAIN || value.exponent > HIGHEST_PLAIN || place > 0;
}

function exactLayout(q: Quantity, options: PrintOptions): Layout {
  const common = {
    full: null,
    fullPlace: 0,
    bracket: null,
    supported: Number.POSITIVE_INFINITY,
    isPercent: options.as === "percent",
    unit: options.unit ?? "",
  };
  const isPlainWhole = isWhole(q) && options.as !== "scientific" && options.decimals === undefined;
  if (isPlainWhole || q.mantissa === 0) {
    const place = options.decimals === undefined ? 0 : -options.decimals;
    return { ...common, value: roundToPlace(q, place), place, isScientific: false };
  }
  const first = leadingPlace(q);
  const asked = options.decimals !== undefined ? -options.decimals : carried(q, first, options.digits ?? USUAL_DIGITS);
  const rounded = roundToPlace(q, asked);
  const shared = { ...common, isScientific: isScientific(rounded, asked, options) };
  if (options.digits !== undefined || options.decimals !== undefined)
    return { ...shared, value: rounded, place: asked };
  const kept = withoutTrailingZeros(rounded);
  return { ...shared, value: kept, place: rounded.exponent - kept.digits.length + 1 };
}

/** q·100: exactly, where a double can. */
function shiftedByTwo(q: Quantity): Quantity {
  const mantissa = q.mantissa * 100;
  return scaled(mantissa, q.exponent, q.error * 100, q.se * 100);
}

function nothingKnown(q: Quantity, asked: number, options: PrintOptions): PrintedNumber {
  const words = "no digit known";
  const place = q.mantissa === 0 ? 0 : asked;
  const shown = layOut({
    value: roundToPlace(q, place),
    place,
    full: null,
    fullPlace: place,
    bracket: null,
    supported: 0,
    isScientific: isScientific(roundToPlace(q, place), place, options),
    isPercent: options.as === "percent",
    unit: "",
  });
  const tex = `\\text{${words}}`;
  return {
    text: words,
    tex,
    siunitx: tex,
    unsupported: shown.text,
    supported: 0,
    sheet: { known: "", unknown: shown.text, rest: "" },
  };
}

/** An exact number printed the usual way: for row heads, axes and messages. */
export function printExact(x: number): string {
  return printNumber(exact(x)).text;
}

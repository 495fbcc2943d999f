import { exponentOf, ROUNDOFF, scaleByPower } from "./doubles.ts";
import type { Quantity } from "./types.ts";

/** Sources of chance: name → signed standard error contributed. */
export type Sources = Readonly<Record<string, number>>;

/** Quantities whose size lies in [2^-LIMIT, 2^LIMIT) have exponent 0; beyond, the size is brought to [1/2, 1). */
const LIMIT = 1000;

/** log10 of 2 as the sum of two doubles, the first with few bits. Source: OEIS A007524. */
const LOG10_2_HIGH = 0.3010299956640665;
const LOG10_2_LOW = -8.532344317057107e-14;

/** A number without error: a parameter, a whole number, a literal as given. */
export function exact(x: number): Quantity {
  return { mantissa: x, exponent: 0, error: 0, se: 0 };
}

/** A computed double with the half-width of its error bound, and its standard error where chance enters. */
export function approximate(x: number, error: number, se = 0): Quantity {
  return { mantissa: x, exponent: 0, error, se };
}

/**
 * The number mantissa · 2^exponent with an error (and standard error) in the same unit, in normal form:
 * exponent 0 wherever the range of doubles suffices.
 */
export function scaled(mantissa: number, exponent: number, error: number, se = 0, sources?: Sources): Quantity {
  const size = Math.max(Math.abs(mantissa), error, se);
  if (size === 0) return exact(0);
  if (exponent === 0 && size >= 2 ** -LIMIT && size < 2 ** LIMIT) return build(mantissa, 0, error, se, sources);
  const sizeExponent = exponentOf(size) + exponent;
  const target = sizeExponent > -LIMIT && sizeExponent <= LIMIT ? 0 : sizeExponent;
  return inUnit({ mantissa, exponent, error, se, sources }, target);
}

/** The same number with its parts in units of 2^exponent; what underflows is added to the error. */
export function inUnit(q: Quantity, exponent: number): Quantity {
  const shift = q.exponent - exponent;
  if (shift === 0) return q;
  const mantissa = scaleByPower(q.mantissa, shift);
  const isLossy = scaleByPower(mantissa, -shift) !== q.mantissa;
  const error = scaleUp(q.error, shift) + (isLossy ? Number.MIN_VALUE : 0);
  const sources = q.sources && mapSources(q.sources, (s) => scaleByPower(s, shift));
  return build(mantissa, exponent, error, q.se === 0 ? 0 : scaleUp(q.se, shift), sources);
}

/** Below this size doubles are rounded to multiples of the smallest one. */
const SMALLEST_NORMAL = 2 ** -1022;

/** Scales a bound; where it falls among the subnormal numbers it is rounded up, so that none becomes 0. */
function scaleUp(bound: number, shift: number): number {
  if (bound === 0) return 0;
  const result = scaleByPower(bound, shift);
  return result < SMALLEST_NORMAL ? result + Number.MIN_VALUE : result;
}

function build(mantissa: number, exponent: number, error: number, se: number, sources?: Sources): Quantity {
  const plain = { mantissa: mantissa === 0 ? 0 : mantissa, exponent, error, se };
  return sources === undefined || se === 0 ? plain : { ...plain, sources };
}

/** The number with its size (the largest of value, error and standard error) in [1/2, 1). */
export function unitSized(q: Quantity): Quantity {
  const size = Math.max(Math.abs(q.mantissa), q.error, q.se);
  return size === 0 ? q : inUnit(q, exponentOf(size) + q.exponent);
}

export function mapSources(sources: Sources, change: (share: number) => number): Sources {
  return Object.fromEntries(Object.entries(sources).map(([name, share]) => [name, change(share)]));
}

/** The number as a double: 0 below the range of doubles, ±Infinity above it (ask `log10Of` there). */
export function toDouble(q: Quantity): number {
  return q.exponent === 0 ? q.mantissa : scaleByPower(q.mantissa, q.exponent);
}

/** log10 of |q|, to about 1e-16 of itself, for numbers of any size; -Infinity for 0. For axes and for JSON. */
export function log10Of(q: Quantity): number {
  const size = Math.abs(q.mantissa);
  if (q.exponent === 0 || size === 0) return Math.log10(size);
  return q.exponent * LOG10_2_HIGH + (q.exponent * LOG10_2_LOW + Math.log10(size));
}

/** A number as it appears in JSON: beyond 1e±300 its `log10` stands beside it. */
export interface QuantityJson {
  readonly value: number;
  readonly error: number;
  readonly se?: number;
  readonly log10?: number;
}

const LARGEST_PLAIN = 1e300;
const SMALLEST_PLAIN = 1e-300;

/** A number for JSON. Below the range of doubles `value` is 0, above it the largest double; `log10` then tells. */
export function quantityToJson(q: Quantity): QuantityJson {
  const value = Math.min(Math.max(toDouble(q), -Number.MAX_VALUE), Number.MAX_VALUE);
  const bound = (x: number): number => (x === 0 ? 0 : Math.min(scaleUp(x, q.exponent), Number.MAX_VALUE));
  const size = Math.abs(value);
  const isPlain = q.mantissa === 0 || (size >= SMALLEST_PLAIN && size <= LARGEST_PLAIN);
  return {
    value,
    error: bound(q.error),
    ...(q.se === 0 ? {} : { se: bound(q.se) }),
    ...(isPlain ? {} : { log10: log10Of(q) }),
  };
}

/** A bound made a little larger, so that the roundings of its own computation cannot make it too small. */
export function roundedUp(bound: number): number {
  return bound * (1 + 16 * ROUNDOFF);
}

import { exponentOf, productRest, sumRest } from "./doubles.ts";
import { inUnit, mapSources, roundedUp, type Sources, scaled, toDouble, unitSized } from "./quantity.ts";
import type { Quantity } from "./types.ts";

/** The result of an operation, or the reason why there is none. */
export type Computed = Quantity | string;

/** Standard error from the independent sources of chance. */
function standardError(sources: Sources): number {
  return Math.hypot(...Object.values(sources));
}

/** The sources of a quantity; chance whose source nobody named is taken as its own. */
function sourcesOf(q: Quantity): Sources {
  return q.sources ?? (q.se === 0 ? {} : { "": q.se });
}

/**
 * Sources of a result with derivatives da, db by its operands: linear, so that what hangs together stays so.
 * Two unnamed sources are independent and are combined in quadrature.
 */
function combineSources(a: Sources, da: number, b: Sources, db: number): Sources {
  const result: Record<string, number> = { ...mapSources(a, (s) => s * da) };
  for (const [name, share] of Object.entries(b)) {
    const before = result[name] ?? 0;
    result[name] = name === "" ? Math.hypot(before, share * db) : before + share * db;
  }
  return result;
}

/** A result with its error, and with the chance that comes from two operands given in the same unit. */
function combine(
  mantissa: number,
  exponent: number,
  error: number,
  operands: readonly [Quantity, number, Quantity, number],
): Quantity {
  const [a, da, b, db] = operands;
  if (a.se === 0 && b.se === 0) return scaled(mantissa, exponent, error);
  const sources = combineSources(sourcesOf(a), da, sourcesOf(b), db);
  return scaled(mantissa, exponent, error, standardError(sources), sources);
}

/** A result of one operand with derivative `slope` at it, all in plain doubles or in a common unit. */
export function withChance(mantissa: number, exponent: number, error: number, q: Quantity, slope: number): Quantity {
  return combine(mantissa, exponent, error, [q, slope, { mantissa: 0, exponent: 0, error: 0, se: 0 }, 0]);
}

/** -a, exact. */
export function negate(a: Quantity): Quantity {
  const negative = { mantissa: a.mantissa === 0 ? 0 : -a.mantissa, exponent: a.exponent, error: a.error, se: a.se };
  return a.sources ? { ...negative, sources: mapSources(a.sources, (s) => -s) } : negative;
}

/** a + b; the rounding error is known exactly and is added to the bound. */
export function add(a: Quantity, b: Quantity): Quantity {
  const unit = commonUnit(a, b);
  const x = inUnit(a, unit);
  const y = inUnit(b, unit);
  const sum = x.mantissa + y.mantissa;
  const rest = Math.abs(sumRest(x.mantissa, y.mantissa, sum));
  const carried = x.error + y.error;
  const error = carried === 0 ? rest : roundedUp(carried + rest);
  return combine(sum, unit, error, [x, 1, y, 1]);
}

/** The unit in which both can be added: plain where both are, else that of the larger, brought near 1. */
function commonUnit(a: Quantity, b: Quantity): number {
  if (a.exponent === 0 && b.exponent === 0) return 0;
  return Math.max(sizeExponent(a), sizeExponent(b)) + 1;
}

function sizeExponent(q: Quantity): number {
  const size = Math.max(Math.abs(q.mantissa), q.error, q.se);
  return size === 0 ? Number.NEGATIVE_INFINITY : exponentOf(size) + q.exponent;
}

/** a − b. */
export function subtract(a: Quantity, b: Quantity): Quantity {
  return add(a, negate(b));
}

/** Both operands lie where products of doubles and their exact rounding errors neither over- nor underflow. */
function isTame(q: Quantity): boolean {
  const size = Math.abs(q.mantissa);
  return q.exponent === 0 && (size === 0 || (size > 2 ** -400 && size < 2 ** 400)) && q.error < 2 ** 400;
}

/** a·b. Error: |a|·eb + |b|·ea + ea·eb, and the exact rounding error. */
export function multiply(a: Quantity, b: Quantity): Quantity {
  const tame = isTame(a) && isTame(b);
  const x = tame ? a : unitSized(a);
  const y = tame ? b : unitSized(b);
  const product = x.mantissa * y.mantissa;
  const rest = Math.abs(productRest(x.mantissa, y.mantissa, product));
  const carried = Math.abs(x.mantissa) * y.error + Math.abs(y.mantissa) * x.error + x.error * y.error;
  const lost = x.error > 0 || y.error > 0 || !tame ? Number.MIN_VALUE : 0;
  const error = carried === 0 && lost === 0 ? rest : roundedUp(carried + rest) + (carried > 0 ? lost : 0);
  return combine(product, x.exponent + y.exponent, error, [x, y.mantissa, y, x.mantissa]);
}

/** a/b. Error: (ea + |a/b|·eb)/(|b| - eb), and the exact rounding error. */
export function divide(a: Quantity, b: Quantity): Computed {
  if (b.mantissa === 0 && b.error === 0) return "division by zero";
  if (Math.abs(b.mantissa) <= b.error) return "division by a number that cannot be told from zero within its error";
  const tame = isTame(a) && isTame(b);
  const x = tame ? a : unitSized(a);
  const y = tame ? b : unitSized(b);
  const size = Math.abs(y.mantissa);
  const quotient = x.mantissa / y.mantissa;
  const product = quotient * y.mantissa;
  const rest = Math.abs(x.mantissa - product - productRest(quotient, y.mantissa, product)) / size;
  const carried = (x.error + Math.abs(quotient) * y.error) / (size - y.error);
  const lost = x.error > 0 || y.error > 0 ? Number.MIN_VALUE : 0;
  const error = carried + rest === 0 ? 0 : roundedUp(carried + rest) + lost;
  return combine(quotient, x.exponent - y.exponent, error, [x, 1 / y.mantissa, y, -quotient / y.mantissa]);
}

/** |a|. */
export function absolute(a: Quantity): Quantity {
  return a.mantissa < 0 ? negate(a) : a;
}

/** The larger of the two; its bound covers the case that within the errors it is the other. */
export function larger(a: Quantity, b: Quantity): Quantity {
  const difference = subtract(a, b);
  const [chosen, other] = difference.mantissa >= 0 ? [a, b] : [b, a];
  if (Math.abs(difference.mantissa) > difference.error) return chosen;
  const unit = commonUnit(chosen, other);
  const widest = Math.max(inUnit(chosen, unit).error, inUnit(other, unit).error);
  const { mantissa, se, sources } = inUnit(chosen, unit);
  return scaled(mantissa, unit, widest, se, sources);
}

/** min(a, b), with the error of the larger of both where they cannot be told apart. */
export function smaller(a: Quantity, b: Quantity): Quantity {
  return negate(larger(negate(a), negate(b)));
}

/** Whether a < b: null where the difference is within the errors. */
export function isLess(a: Quantity, b: Quantity): boolean | null {
  const { mantissa, error } = subtract(a, b);
  if (mantissa + error < 0) return true;
  return mantissa - error >= 0 ? false : null;
}

/** Whether a <= b: null where the difference is within the errors. */
export function isAtMost(a: Quantity, b: Quantity): boolean | null {
  const { mantissa, error } = subtract(a, b);
  if (mantissa + error <= 0) return true;
  return mantissa - error > 0 ? false : null;
}

/** Whether a and b are the same number, errors left aside. */
export function isEqual(a: Quantity, b: Quantity): boolean {
  return a.mantissa === b.mantissa && a.exponent === b.exponent;
}

/** Whether the number is whole and exact, and every whole number of its size is a double. */
export function isWhole(q: Quantity): boolean {
  return (
    q.exponent === 0 && q.error === 0 && q.se === 0 && Number.isInteger(q.mantissa) && Math.abs(q.mantissa) <= 2 ** 53
  );
}

/** For messages: the number in a few digits. */
export function inWords(q: Quantity): string {
  const plain = toDouble(q);
  if (plain !== 0 && Number.isFinite(plain)) return String(Number(plain.toPrecision(6)));
  return q.mantissa === 0 ? "0" : `a number of size 2^${q.exponent}`;
}

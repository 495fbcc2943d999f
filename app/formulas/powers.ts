import { add, type Computed, divide, inWords, isWhole, multiply, negate, subtract, withChance } from "./arithmetic.ts";
import { exponentOf, productRest, ROUNDOFF, scaleByPower } from "./doubles.ts";
import { approximate, exact, inUnit, roundedUp, scaled, toDouble, unitSized } from "./quantity.ts";
import type { Quantity } from "./types.ts";

/** Math.exp, Math.log and Math.pow are trusted to this relative error (measured below 1 ulp; the tests watch it). */
const LIBRARY = 4 * ROUNDOFF;

/** ln 2 as the sum of two doubles, the first with 32 bits, so that its products with exponents below 2^21 are exact. */
const LN2_HIGH = 0.6931471803691238;
const LN2_LOW = 1.9082149292705877e-10;

/** sqrt(x). The rounding error is known exactly. */
export function squareRoot(x: Quantity): Computed {
  if (x.mantissa === 0 && x.error === 0) return exact(0);
  if (x.mantissa < 0 && -x.mantissa > x.error) return `sqrt of a negative number, ${inWords(x)}`;
  const unit = unitSized(x);
  const isOdd = unit.exponent % 2 !== 0;
  const m = isOdd ? unit.mantissa / 2 : unit.mantissa;
  const e = isOdd ? unit.error / 2 : unit.error;
  const exponent = (unit.exponent + (isOdd ? 1 : 0)) / 2;
  if (m <= e) return scaled(Math.sqrt(Math.max(m, 0)), exponent, roundedUp(Math.sqrt(Math.max(m, 0) + e)));
  const root = Math.sqrt(m);
  const square = root * root;
  const rest = Math.abs(m - square - productRest(root, root, square)) / root;
  const error = e + rest === 0 ? 0 : roundedUp(e / (root + Math.sqrt(m - e)) + rest);
  return withChance(root, exponent, error, unit, (isOdd ? 0.5 : 1) / (2 * root));
}

/** e^x, also far beyond the range of doubles. */
export function exponential(x: Quantity): Computed {
  if (x.exponent > 0 || Math.abs(toDouble(x)) > 2 ** 30) return `exp of ${inWords(x)}, which is too large in size`;
  const plain = inUnit(x, 0);
  const { mantissa: m, error } = plain;
  if (m === 0 && error === 0 && x.se === 0) return exact(1);
  if (error > 500) return "exp of a number whose error is too large";
  const k = Math.round(m / Math.LN2);
  const high = m - k * LN2_HIGH;
  const low = k * LN2_LOW;
  const value = Math.exp(high - low);
  // Rounding of k·LN2_LOW, of the difference, and of LN2_LOW itself; from |k| = 2^21 on also of k·LN2_HIGH.
  const product = Math.abs(k) < 2 ** 21 ? 0 : 2 * ROUNDOFF * Math.abs(m);
  const relative = ROUNDOFF * (Math.abs(low) + 1) + product + Math.abs(k) * 2 ** -86 + LIBRARY;
  const spread = Math.expm1(error);
  const bound = roundedUp(value * (relative + spread + relative * spread));
  return withChance(value, k, bound, plain, value);
}

/** Natural logarithm. */
export function logarithm(x: Quantity, name = "log"): Computed {
  if (x.mantissa <= 0 && -x.mantissa >= x.error) {
    return x.mantissa === 0 ? `${name} of zero` : `${name} of a negative number, ${inWords(x)}`;
  }
  if (x.mantissa <= x.error) return `${name} of a number that cannot be told from zero within its error`;
  if (x.mantissa === 1 && x.exponent === 0 && x.error === 0) return withChance(0, 0, 0, x, 1);
  const { mantissa, exponent } = x;
  const own = Math.log(mantissa);
  const shift = exponent * LN2_HIGH + exponent * LN2_LOW;
  const value = own + shift;
  const rounding = LIBRARY * Math.abs(own) + (exponent === 0 ? 0 : 3 * ROUNDOFF * (Math.abs(shift) + Math.abs(value)));
  const spread = x.error === 0 ? 0 : -Math.log1p(-x.error / mantissa);
  return withChance(value, 0, roundedUp(spread + rounding), x, 1 / mantissa);
}

/** Logarithm to base 10; exact where the number is a power of ten that a double holds. */
export function logarithm10(x: Quantity): Computed {
  const power = Math.round(Math.log10(x.mantissa));
  const isPower = x.exponent === 0 && x.error === 0 && power >= 0 && power <= 22 && Number(`1e${power}`) === x.mantissa;
  if (isPower) return withChance(power, 0, 0, x, 1 / (x.mantissa * Math.LN10));
  const natural = logarithm(x, "log10");
  return typeof natural === "string" ? natural : divide(natural, approximate(Math.LN10, 2.2e-16));
}

/** Whole exponents up to this size are taken by repeated multiplication, which keeps whole numbers exact. */
const SMALL_EXPONENT = 64;
/** No power may need a binary exponent beyond this. */
const LARGEST_EXPONENT = 2 ** 40;

/** a^b. 0^0 = 1; a negative base takes whole exponents only. */
export function power(a: Quantity, b: Quantity): Computed {
  if (b.mantissa === 0 && b.error === 0 && b.se === 0) return exact(1);
  if (isWhole(b) && Math.abs(b.mantissa) <= SMALL_EXPONENT) {
    const raised = repeated(a, Math.abs(b.mantissa));
    if (b.mantissa > 0) return raised;
    const isZero = a.mantissa === 0 && a.error === 0;
    return isZero ? `zero to the negative power ${inWords(b)}` : divide(exact(1), raised);
  }
  if (a.mantissa === 0 && a.error === 0) {
    return b.mantissa - b.error > 0 ? exact(0) : `zero to the power ${inWords(b)}, which is not above 0`;
  }
  if (a.mantissa < 0 && -a.mantissa > a.error) {
    if (!isWhole(b)) return `a negative number, ${inWords(a)}, to a power that is not whole, ${inWords(b)}`;
    const raised = positivePower(negate(a), b);
    return typeof raised === "string" || b.mantissa % 2 === 0 ? raised : negate(raised);
  }
  if (a.mantissa <= a.error)
    return `a power, not a small whole one, of a number that cannot be told from zero within its error`;
  return positivePower(a, b);
}

/** a^n by repeated squaring; each multiplication keeps its own error. */
function repeated(a: Quantity, n: number): Quantity {
  let result: Quantity | null = null;
  let square = a;
  for (let rest = n; rest > 0; rest = Math.floor(rest / 2)) {
    if (rest % 2 === 1) result = result === null ? square : multiply(result, square);
    if (rest > 1) square = multiply(square, square);
  }
  return result ?? exact(1);
}

/**
 * a^b for a > 0 (told from 0 within its error): with a = m·2^e and m near 1, 2^(e·b) goes to the exponent and m^b is
 * taken in pieces that stay in the range of doubles.
 */
function positivePower(a: Quantity, b: Quantity): Computed {
  const exponentValue = toDouble(b);
  if (!Number.isFinite(exponentValue)) return `a power with exponent ${inWords(b)}, which is too large in size`;
  const logSize = exponentOf(a.mantissa) + a.exponent;
  if (Math.abs(logSize * exponentValue) > LARGEST_EXPONENT) return "a power too large in size to be a number here";
  const core = exactPower(a, exponentValue);
  const relativeA = a.error === 0 ? 0 : -Math.log1p(-a.error / a.mantissa);
  const logA = Math.abs(Math.log(a.mantissa) + a.exponent * Math.LN2);
  const errorB = inUnit(b, 0).error;
  const stretch = (Math.abs(exponentValue) + errorB) * relativeA + (logA + LIBRARY * logA) * errorB;
  if (stretch > 500) return "a power whose error is too large";
  const spread = Math.expm1(stretch);
  const size = Math.abs(core.mantissa);
  const error = roundedUp(core.error * (1 + spread) + size * spread);
  const withError = scaled(core.mantissa, core.exponent, error);
  if (a.se === 0 && b.se === 0) return withError;
  return addChance(withError, a, b, exponentValue);
}

/** Adds the chance of both operands: d log(a^b) = b·da/a + log(a)·db. */
function addChance(value: Quantity, a: Quantity, b: Quantity, exponentValue: number): Computed {
  const relative = divide(subtract(a, { ...a, se: 0, sources: undefined }), { ...a, se: 0, sources: undefined });
  if (typeof relative === "string") return relative;
  const logA = logarithm({ ...a, se: 0, sources: undefined });
  if (typeof logA === "string") return logA;
  const change = add(
    multiply(exact(exponentValue), relative),
    multiply({ ...logA, error: 0 }, subtract(b, { ...b, se: 0, sources: undefined })),
  );
  const chance = multiply(value, { ...change, mantissa: 0, error: 0 });
  return add(value, { ...chance, mantissa: 0, error: 0 });
}

/** a^b with the error of the computation alone, for a > 0 and an exact double b. */
function exactPower(a: Quantity, b: number): Quantity {
  const whole = Math.trunc(b);
  const fraction = b - whole;
  let m = a.mantissa;
  let e = a.exponent;
  const direct = e === 0 ? m ** b : 0;
  if (direct > 2 ** -1000 && direct < 2 ** 1000) return approximate(direct, roundedUp(direct * LIBRARY));
  const shift = exponentOf(m);
  m = scaleByPower(m, -shift);
  e += shift;
  // m in [1/2, 1): a^b = 2^(e·whole) · m^whole · (m·2^e)^fraction.
  const wholePart = pieces(m, whole);
  const wholeScaled = scaled(wholePart.mantissa, wholePart.exponent + e * whole, wholePart.error);
  if (fraction === 0) return wholeScaled;
  const log = Math.log(m) + e * Math.LN2;
  const grown = exponential(approximate(fraction * log, roundedUp((Math.abs(log) + Math.abs(e) + 1) * LIBRARY)));
  return typeof grown === "string" ? wholeScaled : multiply(wholeScaled, grown);
}

/** m^n for m in [1/2, 1) and whole n, as a product of pieces each within the range of doubles. */
function pieces(m: number, n: number): Quantity {
  const step = 900;
  const size = Math.abs(n);
  const count = Math.floor(size / step);
  const sign = Math.sign(n);
  const piece = (k: number): Quantity => {
    const value = m ** (sign * k);
    return approximate(value, roundedUp(value * LIBRARY));
  };
  const rest = piece(size - count * step);
  return count === 0 ? rest : multiply(repeated(piece(step), count), rest);
}

import { add, type Computed, inWords, multiply, negate, withChance } from "./arithmetic.ts";
import { productRest, ROUNDOFF } from "./doubles.ts";
import { exponential } from "./powers.ts";
import { approximate, exact, inUnit, roundedUp } from "./quantity.ts";
import type { Quantity } from "./types.ts";

/** Below this size erf is summed as a series, and erfc is 1 - erf; above, erfc comes from the integral. */
const SERIES_UP_TO = 0.5;
const TWO_OVER_ROOT_PI = 2 / Math.sqrt(Math.PI);
/** Step of the trapezoidal rule; its relative error is exp(-pi²/h²) = 7e-18. */
const STEP = 0.5;

/**
 * erf(x) for |x| <= 1/2 to a relative error of a few roundings.
 * Source: DLMF 7.6.2, erf x = 2/sqrt(pi)·exp(-x²)·sum 2^n x^(2n+1)/(1·3···(2n+1)), all terms of one sign.
 */
function series(x: number): number {
  let term = x;
  let sum = x;
  for (let n = 1; Math.abs(term) > Math.abs(sum) * ROUNDOFF * 0.01; n++) {
    term *= (2 * x * x) / (2 * n + 1);
    sum += term;
  }
  return TWO_OVER_ROOT_PI * Math.exp(-x * x) * sum;
}

/**
 * exp(x²)·erfc(x) for x >= 1/2, to a relative error of a few roundings.
 * Source: DLMF 7.7.1, erfc x = (2/pi)·exp(-x²)·int_0^inf exp(-x²t²)/(1+t²) dt, by the trapezoidal rule with the
 * residue of the pole added (Chiarella and Reichel 1968, Math. Comp. 22, 137-143; Trefethen and Weideman 2014,
 * SIAM Review 56, 385-458, section 5).
 */
function scaledTail(x: number): number {
  const square = x * x;
  let sum = 0;
  for (let n = 13; n >= 1; n--) {
    const t = n * n * STEP * STEP;
    sum += Math.exp(-t) / (t + square);
  }
  const rule = ((STEP * x) / Math.PI) * (1 / square + 2 * sum);
  // The pole's term, 2·exp(x²)/(exp(2·pi·x/h) - 1), no longer counts from x = 6 on, where exp(x²) still does.
  const pole = x < 6 ? (2 * Math.exp(square)) / Math.expm1((2 * Math.PI * x) / STEP) : 0;
  return rule - pole;
}

/** Relative error of either formula: about twenty roundings, measured below 8. */
const RELATIVE = 24 * ROUNDOFF;

/** erfc of an exact x >= 1/2, far beyond where a double underflows. */
function tail(x: number): Computed {
  const square = x * x;
  const decay = exponential(exact(-square));
  // exp(-x²) needs the part of x² that the rounding of the square drops.
  const rest = Math.exp(-productRest(x, x, square));
  const factor = scaledTail(x) * rest;
  return typeof decay === "string" ? decay : multiply(decay, approximate(factor, factor * RELATIVE));
}

/** Adds what the error and the chance of the argument bring, for a function whose slope falls away from 0. */
function withArgument(value: Quantity, x: Quantity, sign: number): Quantity {
  const nearest = Math.max(0, Math.abs(x.mantissa) - x.error);
  const slope = (at: number): Computed => {
    const decay = exponential(negate(multiply(exact(at), exact(at))));
    return typeof decay === "string" ? decay : multiply(decay, exact(TWO_OVER_ROOT_PI));
  };
  const steepest = slope(nearest);
  const here = slope(x.mantissa);
  if (typeof steepest === "string" || typeof here === "string") return value;
  const spread = multiply({ ...steepest, error: 0 }, exact(x.error));
  const bound = { ...spread, mantissa: 0, error: roundedUp(roundedUp(spread.mantissa)) };
  const widened = x.error === 0 ? value : add(value, bound);
  if (x.se === 0) return widened;
  const chance = withChance(0, 0, 0, x, sign);
  return add(widened, { ...multiply({ ...here, error: 0 }, chance), mantissa: 0, error: 0 });
}

/** Arguments beyond this square to more than the exponents that are kept. */
const LARGEST = 2 ** 15;

/** The error function. */
export function errorFunction(argument: Quantity): Computed {
  const x = inUnit(argument, 0);
  const size = Math.abs(x.mantissa);
  if (size > LARGEST) return approximate(Math.sign(x.mantissa), Number.MIN_VALUE);
  if (size <= SERIES_UP_TO) {
    if (argument.exponent !== 0) return multiply(argument, approximate(TWO_OVER_ROOT_PI, 4 * ROUNDOFF));
    const value = series(x.mantissa);
    return withArgument(approximate(value, roundedUp(Math.abs(value) * RELATIVE)), x, 1);
  }
  const complement = tail(size);
  if (typeof complement === "string") return complement;
  const value = add(exact(1), negate(complement));
  return withArgument(x.mantissa < 0 ? negate(value) : value, x, 1);
}

/** The complementary error function, to full relative accuracy in its far tail. */
export function complementaryErrorFunction(argument: Quantity): Computed {
  const x = inUnit(argument, 0);
  if (x.mantissa > LARGEST) return `erfc of ${inWords(x)}, which is too large`;
  if (x.mantissa < -LARGEST) return approximate(2, Number.MIN_VALUE);
  if (Math.abs(x.mantissa) <= SERIES_UP_TO) {
    const value = series(x.mantissa);
    const complement = add(exact(1), approximate(-value, roundedUp(Math.abs(value) * RELATIVE)));
    return withArgument(complement, x, -1);
  }
  const value = tail(Math.abs(x.mantissa));
  if (typeof value === "string") return value;
  return withArgument(x.mantissa < 0 ? add(exact(2), negate(value)) : value, x, -1);
}

import { add, type Computed, divide, inWords, isWhole, multiply, negate, subtract } from "./arithmetic.ts";
import { ROUNDOFF } from "./doubles.ts";
import { exponential, logarithm } from "./powers.ts";
import { approximate, exact, inUnit, roundedUp } from "./quantity.ts";
import type { Quantity } from "./types.ts";

/** Euler's constant. Source: DLMF 5.2.3. */
const EULER = 0.5772156649015329;
/** Bernoulli numbers B_2k for Stirling's series. Source: DLMF 24.2 (table 24.2.1). */
const BERNOULLI = [1 / 6, -1 / 30, 1 / 42, -1 / 30, 5 / 66, -691 / 2730, 7 / 6, -3617 / 510];
/** From here on Stirling's series with the terms above is good to less than a rounding. */
const STIRLING_FROM = 14;

/**
 * zeta(k) - 1 for k >= 2, by direct summation and Euler-Maclaurin's remainder.
 * Source: DLMF 25.2.9 with N = 50 and three correction terms.
 */
function zetaMinusOne(k: number): number {
  const n = 50;
  const last = n ** -k;
  let sum = last * (n / (k - 1) - 0.5);
  sum += last * (k / (12 * n) - (k * (k + 1) * (k + 2)) / (720 * n ** 3));
  sum += (last * k * (k + 1) * (k + 2) * (k + 3) * (k + 4)) / (30240 * n ** 5);
  for (let j = n; j >= 2; j--) sum += j ** -k;
  return sum;
}

const ZETA_MINUS_ONE = Array.from({ length: 50 }, (_, i) => (i < 2 ? 0 : zetaMinusOne(i)));

/**
 * log gamma(2 + z) for |z| <= 1/2, to a relative error of a few roundings (it is 0 at z = 0).
 * Source: DLMF 5.7.3, with log gamma(2 + z) = log(1 + z) + log gamma(1 + z).
 */
function logGammaNearTwo(z: number): number {
  let sum = 0;
  for (let k = ZETA_MINUS_ONE.length - 1; k >= 2; k--) sum = -z * sum + (ZETA_MINUS_ONE[k] ?? 0) / k;
  return z * (1 - EULER + z * sum);
}

/** log gamma(x) by Stirling's series for x >= 14. Source: DLMF 5.11.1; error below the first term left out, 5.11(ii). */
function stirling(x: number): { value: number; error: number } {
  let correction = 0;
  for (let k = BERNOULLI.length; k >= 1; k--) {
    correction = correction / (x * x) + (BERNOULLI[k - 1] ?? 0) / (2 * k * (2 * k - 1));
  }
  const main = (x - 0.5) * Math.log(x);
  const value = main - x + (0.5 * Math.log(2 * Math.PI) + correction / x);
  return { value, error: ROUNDOFF * (4 * Math.abs(main) + 2 * x + 4) };
}

/** log gamma(x) of an exact x > 0. */
function logGammaPositive(x: number): Quantity {
  if (x === 1 || x === 2) return exact(0);
  if (x >= STIRLING_FROM) {
    const { value, error } = stirling(x);
    return approximate(value, error);
  }
  if (x > 0.5 && x < 1.5) {
    const z = x - 1;
    const near = logGammaNearTwo(z);
    const shift = Math.log1p(z);
    return approximate(near - shift, roundedUp(ROUNDOFF * 8 * (Math.abs(near) + Math.abs(shift))));
  }
  const steps = Math.round(x) - 2;
  const { product, error } = risingProduct(x, steps);
  const near = logGammaNearTwo(x - (steps + 2));
  const shift = Math.log(product);
  const value = steps >= 0 ? near + shift : near - shift;
  return approximate(value, roundedUp(ROUNDOFF * 8 * (Math.abs(near) + Math.abs(shift)) + error / product));
}

/** (x-1)(x-2)...(x-n), or x(x+1)...(x-n-1) for negative n: what leads from x to [3/2, 5/2). */
function risingProduct(x: number, n: number): { product: number; error: number } {
  let product: Quantity = exact(1);
  for (let i = 1; i <= n; i++) product = multiply(product, subtract(exact(x), exact(i)));
  for (let i = 0; i < -n; i++) product = multiply(product, add(exact(x), exact(i)));
  return { product: product.mantissa, error: product.error };
}

/** gamma(x) of an exact x > 0. */
function gammaPositive(x: number): Computed {
  if (Number.isInteger(x) && x <= 23) return exact(factorial(x - 1));
  if (x >= STIRLING_FROM) return exponential(logGammaPositive(x));
  const steps = Math.round(x) - 2;
  const { product, error } = risingProduct(x, steps);
  const near = logGammaNearTwo(x - (steps + 2));
  const core = exponential(approximate(near, roundedUp(ROUNDOFF * 8 * Math.abs(near))));
  if (typeof core === "string") return core;
  const factor = approximate(product, error);
  return steps >= 0 ? multiply(core, factor) : divide(core, factor);
}

/** n! for n <= 22, where it is a double. */
function factorial(n: number): number {
  let product = 1;
  for (let i = 2; i <= n; i++) product *= i;
  return product;
}

/** Digamma, to about 1e-12: only ever the slope by which errors are carried. Source: DLMF 5.5.2, 5.11.2, 5.5.4. */
function digamma(x: number): number {
  if (x < 0.5) return digamma(1 - x) - Math.PI / Math.tan(Math.PI * x);
  let shift = 0;
  let y = x;
  for (; y < 10; y += 1) shift += 1 / y;
  const r = 1 / (y * y);
  return Math.log(y) - 0.5 / y - r * (1 / 12 - r * (1 / 120 - r * (1 / 252 - r / 240))) - shift;
}

/** Why gamma has no value at x, or null. */
function refusal(x: Quantity, name: string): string | null {
  const nearest = Math.min(0, Math.round(x.mantissa));
  const distance = Math.abs(x.mantissa - nearest);
  if (distance === 0 && x.error === 0) return `${name} has no value at 0, -1, -2, ...; here at ${inWords(x)}`;
  if (x.error > distance / 100) return `${name} of a number whose error is too large, ${inWords(x)}`;
  return null;
}

/**
 * How far log |gamma| can change within the error e of x, where e is at most 1/100 of the distance d to a pole.
 * The slope is digamma; its own slope, trigamma, is a sum of 1/(x+n)² and so below 1.03/d² + 4 in size there
 * (DLMF 5.15.1; the two nearest poles and pi²/3 for the rest), hence |psi|·e + 4·(3 + 1/d²)·e² bounds the change.
 */
function logSpread(x: Quantity): number {
  if (x.error === 0) return 0;
  const distance = x.mantissa > 0 ? x.mantissa : Math.abs(x.mantissa - Math.round(x.mantissa));
  return x.error * (Math.abs(digamma(x.mantissa)) * 1.0001 + 4 * x.error * (3 + 1 / (distance * distance)));
}

function chanceOf(x: Quantity, slope: number): Quantity {
  const chance = multiply({ ...x, error: 0 }, exact(slope));
  return { ...chance, mantissa: 0, error: 0 };
}

/** sin(pi·x) of an exact x, with small relative error near every whole number. */
function sineOfPi(x: number): Quantity {
  const nearest = Math.round(x);
  const value = Math.sin(Math.PI * (x - nearest)) * (nearest % 2 === 0 ? 1 : -1);
  return approximate(value, Math.abs(value) * 6 * ROUNDOFF);
}

const PI = approximate(Math.PI, 1.2247e-16);
/** Largest size of an argument. */
const LARGEST = 1e8;

/** The gamma function; beyond the range of doubles it goes on. Source: reflection, DLMF 5.5.3. */
export function gammaFunction(argument: Quantity): Computed {
  const x = inUnit(argument, 0);
  if (Math.abs(x.mantissa) > LARGEST) return `gamma of ${inWords(argument)}, which is too large in size`;
  const problem = refusal(x, "gamma");
  if (problem) return problem;
  let value: Computed;
  if (x.mantissa > 0) value = gammaPositive(x.mantissa);
  else {
    const mirrored = gammaOfOneMinus(x.mantissa);
    value = typeof mirrored === "string" ? mirrored : divide(PI, multiply(sineOfPi(x.mantissa), mirrored));
  }
  if (typeof value === "string" || (x.error === 0 && x.se === 0)) return value;
  const spread = multiply(absolutely(value), exact(Math.expm1(logSpread(x))));
  const widened = add(value, { ...spread, mantissa: 0, error: roundedUp(spread.mantissa + spread.error) });
  return x.se === 0 ? widened : add(widened, multiply(value, chanceOf(x, digamma(x.mantissa))));
}

/** gamma(1 - x) for x < 0; the rounding of 1 - x is carried by the slope. */
function gammaOfOneMinus(x: number): Computed {
  const argument = subtract(exact(1), exact(x));
  const value = gammaPositive(argument.mantissa);
  if (typeof value === "string" || argument.error === 0) return value;
  const relative = argument.error * (Math.abs(digamma(argument.mantissa)) + 1);
  return multiply(value, approximate(1, relative));
}

const absolutely = (q: Quantity): Quantity => (q.mantissa < 0 ? negate(q) : q);

/** log |gamma(x)|, also accurate near 1 and 2 where it is 0. */
export function logGamma(argument: Quantity): Computed {
  const x = inUnit(argument, 0);
  if (Math.abs(x.mantissa) > 1e300) return `lgamma of ${inWords(argument)}, which is too large in size`;
  const problem = refusal(x, "lgamma");
  if (problem) return problem;
  const value = x.mantissa > 0 ? logGammaPositive(x.mantissa) : logGammaNegative(x.mantissa);
  if (typeof value === "string" || (x.error === 0 && x.se === 0)) return value;
  const widened = x.error === 0 ? value : add(value, approximate(0, roundedUp(logSpread(x))));
  return x.se === 0 ? widened : add(widened, chanceOf(x, digamma(x.mantissa)));
}

function logGammaNegative(x: number): Computed {
  const sine = logarithm(absolutely(sineOfPi(x)));
  const logPi = logarithm(PI);
  if (typeof sine === "string") return sine;
  if (typeof logPi === "string") return logPi;
  const argument = subtract(exact(1), exact(x));
  const mirrored = logGammaPositive(argument.mantissa);
  const carried = approximate(0, argument.error * (Math.abs(digamma(argument.mantissa)) + 1));
  return subtract(subtract(logPi, sine), add(mirrored, carried));
}

/** Largest k of choose(n, k). */
const LARGEST_CHOICE = 100_000;

/** How many operations choose(n, k) takes, for the budget. */
export function chooseCost(n: Quantity, k: Quantity): number {
  if (!isWhole(k) || k.mantissa < 0 || k.mantissa > LARGEST_CHOICE) return 1;
  return 1 + fewest(n, k.mantissa);
}

function fewest(n: Quantity, k: number): number {
  const isSymmetric = isWhole(n) && n.mantissa >= k;
  return isSymmetric ? Math.min(k, n.mantissa - k) : k;
}

/** The binomial coefficient n(n-1)...(n-k+1)/k!; exact where n is whole and the result is below 2^53. */
export function choose(n: Quantity, k: Quantity): Computed {
  if (!isWhole(k) || k.mantissa < 0 || k.mantissa > LARGEST_CHOICE) {
    return `choose(n, k) with k = ${inWords(k)}; k is a whole number from 0 to ${LARGEST_CHOICE}`;
  }
  if (isWhole(n) && n.mantissa >= 0 && n.mantissa < k.mantissa) return exact(0);
  const count = fewest(n, k.mantissa);
  let result: Quantity = exact(1);
  for (let i = 1; i <= count; i++) {
    // For whole n in this order every partial result is itself a binomial coefficient, so that it stays whole.
    const next = isWhole(n)
      ? wholeStep(result, n.mantissa - count + i, i)
      : divide(multiply(result, subtract(n, exact(i - 1))), exact(i));
    if (typeof next === "string") return next;
    result = next;
  }
  return result;
}

/** result·factor/divisor, which is whole; exact as long as it is below 2^53, even where the product is not. */
function wholeStep(result: Quantity, factor: number, divisor: number): Computed {
  if (isWhole(result)) {
    const next = (BigInt(result.mantissa) * BigInt(factor)) / BigInt(divisor);
    if (next <= 2n ** 53n) return exact(Number(next));
  }
  return divide(multiply(result, exact(factor)), exact(divisor));
}

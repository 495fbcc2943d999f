import { absolute, type Computed, inWords, larger, smaller, withChance } from "./arithmetic.ts";
import { ROUNDOFF } from "./doubles.ts";
import { complementaryErrorFunction, errorFunction } from "./error-function.ts";
import { choose, gammaFunction, logGamma } from "./gamma-function.ts";
import { exponential, logarithm, logarithm10, squareRoot } from "./powers.ts";
import { exact, inUnit, roundedUp, scaled } from "./quantity.ts";
import type { Quantity } from "./types.ts";

/** The elementary functions of Math are trusted to this relative error: 2 units in the last place; the tests watch it. */
const LIBRARY = 4 * ROUNDOFF;

/** An elementary function in doubles, and how an error of its argument spreads. */
interface Elementary {
  readonly value: (x: number) => number;
  readonly slope: (x: number) => number;
  /** A bound on |f(x + d) - f(x)| for |d| <= e. */
  readonly spread: (x: number, e: number) => number;
  /** Why there is no value at x within the error e, without the function's name; null where there is one. */
  readonly refuse?: (x: number, e: number) => string | null;
  /** f(x) = x + O(x²), so that arguments below the range of doubles are their own values. */
  readonly isIdentityAtZero?: true;
  /** The limits at -∞ and ∞, where the function tends to them. */
  readonly limits?: readonly [number, number];
}

const tooLarge = (x: number): string | null => (Math.abs(x) > 700 ? "too large in size" : null);
const onlyWithinOne = (x: number, e: number): string | null =>
  Math.abs(x) - e > 1 ? "outside the interval from -1 to 1" : null;
const intoOne = (x: number): number => Math.min(1, Math.max(-1, x));
const cosecantlike = (x: number): number => 1 / Math.sqrt(Math.max(1 - x * x, Number.MIN_VALUE));

/** Largest change of a monotone function towards either end of [x - e, x + e]. */
function endSpread(f: (x: number) => number, x: number, e: number): number {
  const here = f(x);
  return Math.max(Math.abs(f(x + e) - here), Math.abs(f(x - e) - here)) + 2 * LIBRARY * Math.abs(here);
}

const ELEMENTARY: Readonly<Record<string, Elementary>> = {
  expm1: {
    value: Math.expm1,
    slope: Math.exp,
    spread: (x, e) => Math.exp(x) * Math.expm1(e),
    refuse: tooLarge,
    isIdentityAtZero: true,
  },
  log1p: {
    value: Math.log1p,
    slope: (x) => 1 / (1 + x),
    spread: (x, e) => -Math.log1p(-e / (1 + x)),
    refuse: (x, e) => (x <= -1 + e || 1 + x <= e ? "not above -1 within its error" : null),
    isIdentityAtZero: true,
  },
  sin: {
    value: Math.sin,
    slope: Math.cos,
    // Taylor's formula with the remainder e²/2.
    spread: (x, e) => Math.min(2, (Math.abs(Math.cos(x)) + e / 2) * e),
    isIdentityAtZero: true,
  },
  cos: {
    value: Math.cos,
    slope: (x) => -Math.sin(x),
    spread: (x, e) => Math.min(2, (Math.abs(Math.sin(x)) + e / 2) * e),
  },
  tan: {
    value: Math.tan,
    slope: (x) => 1 + Math.tan(x) ** 2,
    // Addition theorem: tan(x + e) - tan(x) = (1 + t²)·T/(1 - t·T), t = tan(x), T = tan(e).
    spread: (x, e) => ((1 + Math.tan(x) ** 2) * Math.tan(e)) / (1 - Math.abs(Math.tan(x)) * Math.tan(e)),
    refuse: (x, e) => (e >= 1 || Math.abs(Math.tan(x)) * Math.tan(e) >= 1 ? "too near a pole for its error" : null),
    isIdentityAtZero: true,
  },
  asin: {
    value: (x) => Math.asin(intoOne(x)),
    slope: cosecantlike,
    spread: (x, e) => endSpread((y) => Math.asin(intoOne(y)), x, e),
    refuse: onlyWithinOne,
    isIdentityAtZero: true,
  },
  acos: {
    value: (x) => Math.acos(intoOne(x)),
    slope: (x) => -cosecantlike(x),
    spread: (x, e) => endSpread((y) => Math.acos(intoOne(y)), x, e),
    refuse: onlyWithinOne,
  },
  atan: {
    value: Math.atan,
    slope: (x) => 1 / (1 + x * x),
    spread: (x, e) => e / (1 + Math.max(0, Math.abs(x) - e) ** 2),
    isIdentityAtZero: true,
    limits: [-Math.PI / 2, Math.PI / 2],
  },
  sinh: {
    value: Math.sinh,
    slope: Math.cosh,
    spread: (x, e) => Math.cosh(Math.abs(x) + e) * e,
    refuse: tooLarge,
    isIdentityAtZero: true,
  },
  cosh: {
    value: Math.cosh,
    slope: Math.sinh,
    spread: (x, e) => Math.sinh(Math.abs(x) + e) * e,
    refuse: tooLarge,
  },
  tanh: {
    value: Math.tanh,
    slope: (x) => 1 / Math.cosh(x) ** 2,
    spread: (x, e) => e / Math.cosh(Math.max(0, Math.abs(x) - e)) ** 2,
    isIdentityAtZero: true,
    limits: [-1, 1],
  },
};

function elementary(name: string, f: Elementary, x: Quantity): Computed {
  if (x.exponent < 0 && f.isIdentityAtZero) {
    const higherTerms = Math.abs(x.mantissa) * ROUNDOFF;
    return scaled(x.mantissa, x.exponent, roundedUp(x.error + higherTerms), x.se, x.sources);
  }
  if (x.exponent > 0) {
    const limit = f.limits?.[x.mantissa < 0 ? 0 : 1];
    if (limit === undefined || x.error >= Math.abs(x.mantissa))
      return `${name} of ${inWords(x)}, which is too large in size`;
    return scaled(limit, 0, LIBRARY);
  }
  const plain = inUnit(x, 0);
  const { mantissa: at, error } = plain;
  const reason = f.refuse?.(at, error) ?? null;
  if (reason !== null) return `${name} of ${inWords(x)}, which is ${reason}`;
  const value = f.value(at);
  const spread = error === 0 ? 0 : f.spread(at, error);
  // All these functions are 0 at 0 or far from it there, and exactly so in doubles.
  const isExact = at === 0 && error === 0 && Number.isInteger(value);
  const bound = isExact ? 0 : roundedUp(spread + LIBRARY * Math.abs(value));
  if (!Number.isFinite(value) || !Number.isFinite(bound)) return `${name} of ${inWords(x)}, whose error is too large`;
  return withChance(value, 0, bound, plain, f.slope(at));
}

/** floor, ceil and round: refused where the error leaves open which whole number it is. */
function toWhole(name: string, rule: (x: number) => number, x: Quantity): Computed {
  if (x.exponent > 0) return `${name} of ${inWords(x)}, which is too large in size`;
  const { mantissa, error } = inUnit(x, 0);
  const value = rule(mantissa);
  // The rounding of mantissa ± error itself is covered by moving the ends out.
  const reach = error + Math.abs(mantissa) * (error === 0 ? 0 : 2 * ROUNDOFF);
  if (rule(mantissa - reach) !== value || rule(mantissa + reach) !== value) {
    return `${name} of ${inWords(x)} cannot be decided within its error`;
  }
  return exact(value);
}

const awayFromZero = (x: number): number => {
  const size = Math.abs(x);
  const whole = Math.floor(size);
  return Math.sign(x) * (size - whole >= 0.5 ? whole + 1 : whole);
};

/** Every built-in function that takes numbers to a number. */
const NUMERIC: ReadonlyMap<string, (args: readonly Quantity[]) => Computed> = new Map([
  ["sqrt", one(squareRoot)],
  ["exp", one(exponential)],
  ["log", one((x) => logarithm(x))],
  ["log10", one(logarithm10)],
  ["abs", one(absolute)],
  ["floor", one((x) => toWhole("floor", Math.floor, x))],
  ["ceil", one((x) => toWhole("ceil", Math.ceil, x))],
  ["round", one((x) => toWhole("round", awayFromZero, x))],
  ["gamma", one(gammaFunction)],
  ["lgamma", one(logGamma)],
  ["erf", one(errorFunction)],
  ["erfc", one(complementaryErrorFunction)],
  ["error", one((x) => scaled(x.error, x.exponent, 0))],
  ["se", one((x) => scaled(x.se, x.exponent, x.se * 4 * ROUNDOFF))],
  ["min", (args: readonly Quantity[]) => args.reduce(smaller)],
  ["max", (args: readonly Quantity[]) => args.reduce(larger)],
  ["choose", (args: readonly Quantity[]) => choose(args[0] as Quantity, args[1] as Quantity)],
  ...Object.entries(ELEMENTARY).map(
    ([name, f]) => [name, one((x) => elementary(name, f, x))] as [string, (args: readonly Quantity[]) => Computed],
  ),
]);

function one(f: (x: Quantity) => Computed): (args: readonly Quantity[]) => Computed {
  return (args) => f(args[0] as Quantity);
}

/** The built-in numeric function of that name; undefined for binders, `if` and operators. */
export function numericFunction(name: string): ((args: readonly Quantity[]) => Computed) | undefined {
  return NUMERIC.get(name);
}

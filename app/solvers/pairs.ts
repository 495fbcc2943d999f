import type { Pair } from "./types.ts";

/** Double-double arithmetic: a number as the unevaluated sum of two doubles, |low| ≤ ulp(high)/2.
 *  Source: T. J. Dekker, Numer. Math. 18 (1971) 224–242, for the exact sum and product of two doubles;
 *  D. E. Knuth, The Art of Computer Programming 2, section 4.2.2, for the sum without a comparison.
 *  Relative error of each operation: a few times 2^−104. Valid while |x| < 2^996. */

/** 2^27 + 1: splits a double into two halves whose products are exact. */
const SPLITTER = 134217729;

/** Relative accuracy claimed for a short chain of operations. */
export const PAIR_EPSILON = 2 ** -100;

export const ZERO: Pair = [0, 0];
export const ONE: Pair = [1, 0];

/** A double as a pair, exactly. */
export function pair(x: number): Pair {
  return [x, 0];
}

/** Normalised sum of high and low, |low| ≤ |high|. */
function quick(high: number, low: number): Pair {
  const sum = high + low;
  return [sum, low - (sum - high)];
}

/** a + b exactly. */
export function exactSum(a: number, b: number): Pair {
  const sum = a + b;
  const shift = sum - a;
  return [sum, a - (sum - shift) + (b - shift)];
}

/** a·b exactly. */
export function exactProduct(a: number, b: number): Pair {
  const product = a * b;
  const ca = SPLITTER * a;
  const a1 = ca - (ca - a);
  const a2 = a - a1;
  const cb = SPLITTER * b;
  const b1 = cb - (cb - b);
  const b2 = b - b1;
  return [product, a1 * b1 - product + a1 * b2 + a2 * b1 + a2 * b2];
}

/** a + b, to 2^−104 or so of |a| + |b|. */
export function add(a: Pair, b: Pair): Pair {
  const [s, e] = exactSum(a[0], b[0]);
  const [t, f] = exactSum(a[1], b[1]);
  const [high, low] = quick(s, e + t);
  return quick(high, low + f);
}

/** −a, exactly. */
export function negate(a: Pair): Pair {
  return [-a[0], -a[1]];
}

/** a − b, to 2^−104 or so of |a| + |b|. */
export function subtract(a: Pair, b: Pair): Pair {
  return add(a, negate(b));
}

/** a·b, to a few times 2^−104 of itself. */
export function multiply(a: Pair, b: Pair): Pair {
  const [p, e] = exactProduct(a[0], b[0]);
  return quick(p, e + (a[0] * b[1] + a[1] * b[0]));
}

/** a·b for a double b. */
export function scale(a: Pair, b: number): Pair {
  const [p, e] = exactProduct(a[0], b);
  return quick(p, e + a[1] * b);
}

/** a/b for b ≠ 0, to a few times 2^−104 of itself: three digits of a long division, each a double. */
export function divide(a: Pair, b: Pair): Pair {
  const first = a[0] / b[0];
  const rest = subtract(a, scale(b, first));
  const second = rest[0] / b[0];
  const remainder = subtract(rest, scale(b, second));
  const [high, low] = quick(first, second);
  return add([high, low], pair(remainder[0] / b[0]));
}

/** √a for a ≥ 0. */
export function squareRoot(a: Pair): Pair {
  if (a[0] <= 0) return ZERO;
  const guess = Math.sqrt(a[0]);
  const rest = subtract(a, exactProduct(guess, guess));
  return add(pair(guess), pair(rest[0] / (2 * guess)));
}

/** ln 2 to 32 digits. */
export const LN2: Pair = [Math.LN2, 2.3190468138462996e-17];

/** Halvings of the argument before the series of e^x. */
const HALVINGS = 8;
/** Terms of that series: (2^−9 ln 2)^12/12! < 2^−120. */
const TERMS = 12;

/** e^a, |a| < 700. */
export function exponential(a: Pair): Pair {
  const power = Math.round(a[0] / LN2[0]);
  const reduced = scaleByPower(subtract(a, scale(LN2, power)), -HALVINGS);
  // e^r − 1 by its series, then doubled by (1 + y)² − 1 = 2y + y², which loses nothing near 0.
  let term = reduced;
  let sum = reduced;
  for (let k = 2; k <= TERMS; k += 1) {
    term = divide(multiply(term, reduced), pair(k));
    sum = add(sum, term);
  }
  for (let k = 0; k < HALVINGS; k += 1) sum = add(scale(sum, 2), multiply(sum, sum));
  return scaleByPower(add(ONE, sum), power);
}

/** ln a, a > 0: two Newton steps on the exponential. */
export function logarithm(a: Pair): Pair {
  const guess = pair(Math.log(a[0]));
  const correction = subtract(multiply(a, exponential(negate(guess))), ONE);
  // ln(1 + c) = c − c²/2 + …, with |c| of the order of 2^−52
  const square = multiply(correction, correction);
  return add(guess, subtract(correction, scale(square, 1 / 2)));
}

function scaleByPower(a: Pair, power: number): Pair {
  const factor = 2 ** power;
  return [a[0] * factor, a[1] * factor];
}

/** The nearest double. */
export function toNumber(a: Pair): number {
  return a[0] + a[1];
}

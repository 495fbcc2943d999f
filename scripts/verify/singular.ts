import { type Fixed, lengthOf, log2Of, type Real } from "./fixed.ts";
import { multiplied } from "./flow.ts";
import { at } from "./generating.ts";

/** An expansion E[s^K] = Σ F_j t^j, t = √(1 − s/s0), of which the odd powers give P(K = n) at large n. */
export interface SingularExpansion {
  readonly s0: bigint;
  readonly shares: readonly bigint[];
  /** images of s0 on its circle */
  readonly period: number;
}

/** Composes series in y, the way from the turning point, with y(t): s0 − w = s0 t².
 *  @param top Taylor coefficients of w about the turning point   @param outer those of E[s^K] in y */
export function inT(f: Fixed, top: readonly bigint[], outer: readonly bigint[], order: number): bigint[] {
  const y = rootSeries(f, top, order);
  let value = [at(outer, order)];
  for (let k = order - 1; k >= 0; k -= 1) {
    value = multiplied(f, value, y, order);
    value[0] = at(value, 0) + at(outer, k);
  }
  return value;
}

/** y(t) with −Σ_{k ≥ 2} c_k y^k = c_0 t², y_1 > 0: order by order. */
function rootSeries(f: Fixed, c: readonly bigint[], order: number): bigint[] {
  const first = f.squareRoot(f.divide(at(c, 0), -at(c, 2)));
  const y = [0n, first];
  // powers[k] = y^k, filled term by term; the coefficient of t^{m + 1} determines y_m
  for (let m = 2; m <= order; m += 1) {
    y[m] = 0n;
    let sum = 0n;
    let power = multiplied(f, y, y, m + 1);
    for (let k = 2; k <= m + 1; k += 1) {
      sum += f.multiply(at(c, k), at(power, m + 1));
      if (k <= m) power = multiplied(f, power, y, m + 1);
    }
    // the term 2 c_2 y_1 y_m is what is missing
    y[m] = -f.divide(sum, 2n * f.multiply(at(c, 2), first));
  }
  return y;
}

/** Bits kept below the fixed point's own: the terms fall as powers of n. */
const EXTRA = 600n;

/** A sum cut at its smallest term, and log2 of that term relative to the sum. */
interface Cut {
  readonly value: Real;
  readonly omitted: number;
}

/** P(K = n) from the expansion.
 *  Source: P. Flajolet, A. Odlyzko, SIAM J. Discrete Math. 3 (1990) 216–240; [t^j]: s0^{−n} Γ(n − j/2)/(Γ(−j/2) n!). */
function cutAt(f: Fixed, { s0, shares, period }: SingularExpansion, n: number): Cut {
  // Γ(n − 1/2)/(Γ(−1/2) n!) = −½ Π_{k = 2}^{n} (2k − 3)/(2k)
  let factor = -(f.one << EXTRA) / 2n;
  for (let k = 2; k <= n; k += 1) factor = (factor * BigInt(2 * k - 3)) / BigInt(2 * k);
  let sum = 0n;
  let smallest = Number.POSITIVE_INFINITY;
  for (let j = 1; j < shares.length && 2 * n > j + 2; j += 2) {
    const term = f.multiply(at(shares, j), factor);
    const size = log2Of({ units: term, exponent: 0 });
    if (size > smallest + 3) break;
    sum += term;
    smallest = Math.min(smallest, size);
    factor = (-factor * BigInt(j + 2)) / BigInt(2 * n - j - 2);
  }
  const value = times(f, { units: BigInt(period) * sum, exponent: -f.bits - Number(EXTRA) }, powerOf(f, s0, -n));
  return { value, omitted: smallest - log2Of({ units: sum, exponent: 0 }) };
}

/** What an expansion may be off by, as a power of 2, to count as exact. */
const EXACT = -75;

/** From which n the expansion is exact, told from what it is off by at one n: its own cut falls, and what other singularities add
 *  falls exponentially. @param exact P(K = n) in fixed point */
export function exactFrom(f: Fixed, expansion: SingularExpansion, n: number, exact: bigint): number {
  const { value } = cutAt(f, expansion, n);
  const shift = value.exponent + f.bits;
  const own = shift >= 0 ? value.units << BigInt(shift) : value.units >> BigInt(-shift);
  const off = log2Of({ units: own - exact, exponent: 0 }) - log2Of({ units: exact, exponent: 0 });
  return off < -1 ? (EXACT / Math.max(off, EXACT)) * n : Number.POSITIVE_INFINITY;
}

/** P(K = n) from the expansion, or null where it is not exact at this n. */
export function singularProbability(f: Fixed, expansion: SingularExpansion, n: number): Real | null {
  const { value, omitted } = cutAt(f, expansion, n);
  return omitted > EXACT ? null : value;
}

/** a^exponent as mantissa and power of two, relative to itself exact to about exponent·2^−bits. */
export function powerOf(f: Fixed, a: bigint, exponent: number): Real {
  let result: Real = { units: f.one, exponent: -f.bits };
  let square: Real = { units: exponent < 0 ? f.divide(f.one, a) : a, exponent: -f.bits };
  for (let rest = Math.abs(exponent); rest > 0; rest = Math.floor(rest / 2)) {
    if (rest % 2 === 1) result = times(f, result, square);
    square = times(f, square, square);
  }
  return result;
}

/** a·b, shortened to the fixed point's number of bits. */
export function times(f: Fixed, a: Real, b: Real): Real {
  const units = a.units * b.units;
  const excess = Math.max(0, lengthOf(units) - f.bits);
  return { units: units >> BigInt(excess), exponent: a.exponent + b.exponent + excess };
}

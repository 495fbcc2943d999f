/** Exact handling of doubles: their parts, exact scaling, and the rounding error of one operation. */

/** Unit roundoff of a double, 2^-53. */
export const ROUNDOFF = 2 ** -53;

const word = new DataView(new ArrayBuffer(8));

/** The e with 2^(e-1) <= |x| < 2^e; x must be finite and not 0. */
export function exponentOf(x: number): number {
  word.setFloat64(0, x);
  const biased = (word.getUint16(0) >> 4) & 0x7ff;
  if (biased !== 0) return biased - 1022;
  return exponentOf(x * 2 ** 54) - 54;
}

/** x · 2^e: exact, except where the result is subnormal or beyond the range of doubles. */
export function scaleByPower(x: number, e: number): number {
  if (e >= -1000 && e <= 1000) return x * 2 ** e;
  if (e > 3000) return x === 0 ? 0 : x * Number.POSITIVE_INFINITY;
  if (e < -3000) return 0;
  const half = Math.trunc(e / 3);
  return x * 2 ** half * 2 ** half * 2 ** (e - 2 * half);
}

/** The exact rounding error of s = fl(a + b): a + b = s + rest. Source: Knuth, TAOCP vol. 2, 4.2.2, Theorem B. */
export function sumRest(a: number, b: number, s: number): number {
  const bRounded = s - a;
  return a - (s - bRounded) + (b - bRounded);
}

/** 2^27 + 1. Source: Dekker (1971), Numer. Math. 18, 224-242. */
const SPLITTER = 134217729;

/**
 * The exact rounding error of p = fl(a·b): a·b = p + rest, where no part over- or underflows
 * (|a|, |b| < 2^990 and |a·b| > 2^-960). Source: Dekker (1971).
 */
export function productRest(a: number, b: number, p: number): number {
  const aBig = SPLITTER * a;
  const aHigh = aBig - (aBig - a);
  const aLow = a - aHigh;
  const bBig = SPLITTER * b;
  const bHigh = bBig - (bBig - b);
  const bLow = b - bHigh;
  return aLow * bLow - (p - aHigh * bHigh - aLow * bHigh - aHigh * bLow);
}

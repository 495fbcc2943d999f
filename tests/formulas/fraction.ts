import type { Quantity } from "../../app/formulas/index.ts";

/** An exact rational number, the judge of every error bound: no rounding of its own. */
export interface Fraction {
  readonly over: bigint;
  readonly under: bigint;
}

const power = (base: bigint, exponent: number): bigint => base ** BigInt(exponent);

/** m·2^e exactly. */
export function binary(m: number, e: number): Fraction {
  let whole = m;
  let shift = e;
  while (!Number.isInteger(whole)) {
    whole *= 2;
    shift -= 1;
  }
  return shift >= 0
    ? { over: BigInt(whole) * power(2n, shift), under: 1n }
    : { over: BigInt(whole), under: power(2n, -shift) };
}

/** A decimal number as written: "-1.25e-7". */
export function decimal(text: string): Fraction {
  const match = /^(-?)(\d+)(?:\.(\d+))?(?:e([+-]?\d+))?$/.exec(text);
  if (match === null) throw new Error(`not a decimal number: ${text}`);
  const [, sign, whole, fraction = "", exponent = "0"] = match;
  const digits = BigInt(`${sign}${whole}${fraction}`);
  const shift = Number(exponent) - fraction.length;
  return shift >= 0 ? { over: digits * power(10n, shift), under: 1n } : { over: digits, under: power(10n, -shift) };
}

export const fractionOf = (q: Quantity): Fraction => binary(q.mantissa, q.exponent);
export const errorOf = (q: Quantity): Fraction => binary(q.error, q.exponent);

export const plus = (a: Fraction, b: Fraction): Fraction => ({
  over: a.over * b.under + b.over * a.under,
  under: a.under * b.under,
});
export const minus = (a: Fraction, b: Fraction): Fraction => plus(a, { over: -b.over, under: b.under });
export const times = (a: Fraction, b: Fraction): Fraction => ({ over: a.over * b.over, under: a.under * b.under });
export const over = (a: Fraction, b: Fraction): Fraction =>
  b.over < 0n ? times(a, { over: -b.under, under: -b.over }) : times(a, { over: b.under, under: b.over });
export const size = (a: Fraction): Fraction => ({ over: a.over < 0n ? -a.over : a.over, under: a.under });
export const atMost = (a: Fraction, b: Fraction): boolean => a.over * b.under <= b.over * a.under;

/** Whether |q - truth| <= error of q, for a truth known exactly or to the digits written (`slack`, relative). */
export function holds(q: Quantity, truth: Fraction, slack: Fraction = { over: 0n, under: 1n }): boolean {
  const miss = size(minus(fractionOf(q), truth));
  return atMost(miss, plus(errorOf(q), times(size(truth), slack)));
}

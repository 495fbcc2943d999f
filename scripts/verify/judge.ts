import type { Estimate, ScaledEstimate } from "../../app/solvers/index.ts";
import { log2Of, type Real, toInteger } from "./fixed.ts";

/** How one answer compares with the reference. */
export interface Verdict {
  readonly holds: boolean;
  /** true error over the bound */
  readonly used: number;
  /** bound over the larger of true error and the double's spacing there */
  readonly width: number;
  /** bound over the value's size */
  readonly relative: number;
}

/** Digits that the reference may lack, relative. */
const REFERENCE = 70n;
/** Exponents further apart than this belong to different numbers. */
const FAR_APART = 4000;

/** An estimate with its own power of two. */
export function asScaled({ value, error }: Estimate): ScaledEstimate {
  return { mantissa: value, exponent: 0, error };
}

/** Judges an estimate against a reference, in integers: no rounding of the comparison itself. */
export function judge(ours: ScaledEstimate, truth: Real): Verdict {
  const broken = { holds: false, used: Number.POSITIVE_INFINITY, width: 0, relative: 0 };
  if (!(Number.isFinite(ours.mantissa) && Number.isFinite(ours.error))) return broken;
  const bits = -truth.exponent;
  const ourLog = Math.log2(Math.abs(ours.mantissa)) + ours.exponent;
  const apart = Math.max(ourLog, Math.log2(ours.error) + ours.exponent) - log2Of(truth);
  if (ours.mantissa !== 0 && truth.units !== 0n && Math.abs(apart) > FAR_APART) return broken;
  const value = toInteger(ours.mantissa, ours.exponent, bits);
  const bound = toInteger(ours.error, ours.exponent, bits);
  const size = truth.units < 0n ? -truth.units : truth.units;
  const signed = value - truth.units;
  const gap = signed < 0n ? -signed : signed;
  const excused = (size >> REFERENCE) + 4n;
  const spacing = ours.mantissa === 0 ? 0n : toInteger(1, Math.floor(ourLog) - 52, bits);
  const ratio = (a: bigint, b: bigint) =>
    b === 0n
      ? a === 0n
        ? 0
        : Number.POSITIVE_INFINITY
      : 2 ** (log2Of({ units: a, exponent: 0 }) - log2Of({ units: b, exponent: 0 }));
  const beyond = gap > excused ? gap - excused : 0n;
  return {
    holds: beyond <= bound,
    used: ratio(beyond, bound),
    width: ratio(bound, gap > spacing ? gap : spacing),
    relative: ratio(bound, size),
  };
}

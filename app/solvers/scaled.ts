import { exactProduct, exactSum } from "./pairs.ts";
import type { Pair, ScaledEstimate } from "./types.ts";

/** (value ± error)·2^−power for a power given as n·log2 with log2 a pair: the mantissa keeps its digits at any n.
 *  @param extra a further power of two, as a double */
export function scaledByPower(value: number, error: number, log2: Pair, n: number, extra = 0): ScaledEstimate {
  const [high, low] = exactProduct(log2[0], -n);
  const [total, rest] = exactSum(high, extra);
  const whole = Math.round(total);
  const fraction = total - whole + (rest + low - n * log2[1]);
  return normalise(value * 2 ** fraction, error * 2 ** fraction, whole);
}

/** Brings |mantissa| into [1/2, 1). */
export function normalise(value: number, error: number, exponent: number): ScaledEstimate {
  if (value === 0 || !Number.isFinite(value)) return { mantissa: value, exponent, error };
  let shift = Math.floor(Math.log2(Math.abs(value))) + 1;
  let mantissa = value / 2 ** shift;
  // log2 rounds; one step puts the mantissa right
  if (Math.abs(mantissa) >= 1) {
    mantissa /= 2;
    shift += 1;
  } else if (Math.abs(mantissa) < 1 / 2) {
    mantissa *= 2;
    shift -= 1;
  }
  return { mantissa, exponent: exponent + shift, error: error / 2 ** shift };
}

import { prepareLaw } from "./prepare.ts";
import { readLaw, zeroOf } from "./prepared.ts";
import { profileComplementAt } from "./profile.ts";
import { ROUNDING } from "./reader.ts";
import { normalise, scaledByPower } from "./scaled.ts";
import type { Pair, ScaledEstimate, Start, Starts, Trajectory } from "./types.ts";

/** A law as values v_n = p_n·2^{n·log2}, all ≥ 0, with one relative error for all of them that are not 0. */
interface Weights {
  readonly values: Float64Array;
  readonly relative: number;
}

/** Law of several particles as a convolution of the laws of one. Sums of products of positive numbers lose no digits.
 *  Each value carries radius^n, so that the powers do not underflow. */
export function convolvedLaw(t: Trajectory, starts: readonly Start[], upTo: number): ScaledEstimate[] {
  let total: Weights | null = null;
  let log2Radius: Pair = [0, 0];
  let radiusSpread = 0;
  for (const { position, particles } of starts) {
    const law = prepareLaw(t, [{ position, particles: 1 }], upTo, "each");
    log2Radius = law.log2Radius;
    radiusSpread = law.radiusSpread;
    const one = singleWeights(t, position, readLaw(law, 1, Math.max(1, upTo)), law.log2Radius, upTo, law.first > 1);
    const powered = power(one, particles);
    total = total === null ? powered : convolve(total, powered);
  }
  const { values, relative } = total as Weights;
  return Array.from(values, (value, n) => scaledByPower(value, value * (relative + n * radiusSpread), log2Radius, n));
}

function singleWeights(
  t: Trajectory,
  position: number,
  read: readonly ScaledEstimate[],
  log2Radius: Pair,
  upTo: number,
  takenOut: boolean,
): Weights {
  const values = new Float64Array(upTo + 1);
  const zero = zeroOf(t, [{ position, particles: 1 }]).zero;
  values[0] = zero.mantissa * 2 ** zero.exponent;
  let relative = zero.mantissa === 0 ? 0 : zero.error / zero.mantissa;
  for (let n = 1; n <= upTo; n += 1) {
    const v = read[n - 1] as ScaledEstimate;
    let back = scaledByPower(v.mantissa, v.error, log2Radius, -n, v.exponent);
    if (n === 1 && takenOut) {
      const radius = 2 ** log2Radius[0];
      back = normalise(radius + back.mantissa * 2 ** back.exponent, (back.error + ROUNDING) * 2 ** back.exponent, 0);
    }
    if (back.mantissa === 0 && back.error === 0) continue;
    values[n] = back.mantissa * 2 ** back.exponent;
    relative = Math.max(relative, back.error / Math.abs(back.mantissa));
  }
  return { values, relative };
}

function power(one: Weights, exponent: number): Weights {
  let result: Weights | null = null;
  let square = one;
  for (let rest = exponent; rest > 0; rest = Math.floor(rest / 2)) {
    if (rest % 2 === 1) result = result === null ? square : convolve(result, square);
    if (rest > 1) square = convolve(square, square);
  }
  return result as Weights;
}

function convolve(a: Weights, b: Weights): Weights {
  const count = a.values.length;
  const values = new Float64Array(count);
  for (let i = 0; i < count; i += 1) {
    const x = a.values[i] as number;
    if (x === 0) continue;
    for (let k = i; k < count; k += 1) values[k] = (values[k] as number) + x * (b.values[k - i] as number);
  }
  return { values, relative: a.relative + b.relative + (count + 1) * ROUNDING };
}

/** Without branching each particle is absorbed, and counted once, with probability e^{−decay x}. */
export function sterileLaw(t: Trajectory, starts: Starts, upTo: number): ScaledEstimate[] {
  if (starts === "far") return Array.from({ length: upTo + 1 }, (_, n) => normalise(n === 1 ? 1 : 0, 0, 0));
  let total: Weights | null = null;
  for (const { position, particles } of starts) {
    const u = profileComplementAt(t, position, 0);
    if ("refused" in u) continue;
    const values = new Float64Array(upTo + 1);
    values[0] = 1 - u.value;
    if (upTo >= 1) values[1] = u.value;
    const relative = u.error / u.value + u.error / (1 - u.value) + ROUNDING;
    const powered = power({ values, relative }, particles);
    total = total === null ? powered : convolve(total, powered);
  }
  const { values, relative } = total as Weights;
  return Array.from(values, (value) => normalise(value, value * relative, 0));
}

import type { Quantity, Value } from "../../formulas/index.ts";
import { approximate, exact, toDouble } from "../../formulas/index.ts";
import type { Trajectory } from "../../solvers/index.ts";
import { profileAt, profileConstants, profileSlopeAt } from "../../solvers/index.ts";
import { numberValue, refusedValue } from "../values.ts";

/** w(x, s), at s = 0 where s is left out; errors of x and s are passed on to first order, beside the solver's own. */
export function profileValue(trajectory: Trajectory, position: Quantity, parameter: Quantity | null): Value {
  const x = toDouble(position);
  const given = parameter ?? exact(0);
  const s = atMostTurning(trajectory, toDouble(given), absoluteError(given));
  const answer = profileAt(trajectory, x, s);
  if ("refused" in answer) return refusedValue(answer.refused);
  const alongX = absoluteError(position) === 0 ? 0 : slopeSize(trajectory, x, s) * absoluteError(position);
  const isExact = absoluteError(given) === 0 || isTurning(trajectory, s, absoluteError(given));
  const alongS = isExact ? 0 : spreadInS(trajectory, x, s, answer.value, absoluteError(given));
  return numberValue(approximate(answer.value, answer.error + alongX + alongS));
}

/** An s that is beyond s0 only by its own error means s0 itself. */
function atMostTurning(trajectory: Trajectory, s: number, error: number): number {
  const { s0 } = profileConstants(trajectory);
  if ("refused" in s0 || s <= s0.value) return s;
  return s - error <= s0.value + s0.error ? s0.value : s;
}

/** s0 as a cell gives it, error and all: no other number, so that what is read there owes nothing to that error. */
function isTurning(trajectory: Trajectory, s: number, error: number): boolean {
  const { s0 } = profileConstants(trajectory);
  return !("refused" in s0) && s === s0.value && error <= s0.error;
}

function slopeSize(trajectory: Trajectory, x: number, s: number): number {
  const slope = profileSlopeAt(trajectory, x, s);
  return "refused" in slope ? Number.POSITIVE_INFINITY : Math.abs(slope.value);
}

/** How far w(x, ·) moves over s ± error; it increases with s. */
function spreadInS(trajectory: Trajectory, x: number, s: number, value: number, error: number): number {
  const ends = [s - error, atMostTurning(trajectory, s + error, 2 * error)].map((end) => profileAt(trajectory, x, end));
  const moves = ends.map((end) => ("refused" in end ? 0 : Math.abs(end.value - value)));
  return Math.max(...moves);
}

function absoluteError(quantity: Quantity): number {
  return quantity.error * 2 ** quantity.exponent;
}

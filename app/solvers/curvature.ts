import { nonlinearity } from "./offspring.ts";
import { ROUNDING, type TrajectoryReader } from "./reader.ts";
import type { Trajectory, Turning } from "./types.ts";

/** Roundings of u at the turning point, and of the terms that make w″ there. */
const PLACE_ROUNDINGS = 2;
const TERM_ROUNDINGS = 4;

/** Relative error of w″ where w turns, which whatever is read off s0's square root shares, in double precision: what a relative change of
 *  s0 − 1 makes of it, and the rounding of the terms whose difference it is. A few roundings where the law is smooth there; much more
 *  where w turns just below the pole of a geometric law or, near the critical drift toward the barrier, just above 1. */
export function curvatureError(t: Trajectory, reader: TrajectoryReader, turning: Turning): number {
  const u = -turning.excess[0];
  const { value, derivative } = nonlinearity(reader.law, u);
  const curvature = 2 * (reader.topExpansion().re[2] as number);
  const condition = Math.abs(((t.strength[0] * derivative - t.ratio[0]) * u) / curvature);
  const cancellation = Math.abs(t.strength[0] * value) + Math.abs(t.ratio[0] * u);
  const rounding = (cancellation / Math.abs(curvature)) * TERM_ROUNDINGS;
  return condition * (PLACE_ROUNDINGS * ROUNDING + turning.excessSpread) + rounding * ROUNDING;
}

import { SolverError } from "./errors.ts";
import type { Answer, Estimate, ProfileConstants, Trajectory } from "./types.ts";

/** w(x, s) */
export function profileAt(_t: Trajectory, _x: number, _s: number): Answer<Estimate> {
  throw new SolverError("not_converged", "profileAt is being written");
}
/** 1 − w(x, s), to full relative accuracy */
export function profileComplementAt(_t: Trajectory, _x: number, _s: number): Answer<Estimate> {
  throw new SolverError("not_converged", "profileComplementAt is being written");
}
/** ∂w/∂x */
export function profileSlopeAt(_t: Trajectory, _x: number, _s: number): Answer<Estimate> {
  throw new SolverError("not_converged", "profileSlopeAt is being written");
}
export function profileConstants(_t: Trajectory): ProfileConstants {
  throw new SolverError("not_converged", "profileConstants is being written");
}

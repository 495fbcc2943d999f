import { SolverError } from "./errors.ts";
import type { AbsorbedMoments, Answer, Estimate, Starts, Trajectory } from "./types.ts";

export function absorbedMoments(_t: Trajectory, _starts: Starts): AbsorbedMoments {
  throw new SolverError("not_converged", "absorbedMoments is being written");
}
/** E[K (K − 1) … (K − j + 1)] */
export function factorialMoment(_t: Trajectory, _starts: Starts, _j: number): Answer<Estimate> {
  throw new SolverError("not_converged", "factorialMoment is being written");
}

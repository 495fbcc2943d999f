import { SolverError } from "./errors.ts";
import type { AbsorbedLaw, Answer, ScaledEstimate, Starts, Trajectory } from "./types.ts";

/** P(K = n) for n = 0, …, upTo */
export function absorbedLaw(_t: Trajectory, _starts: Starts, _upTo: number): Answer<AbsorbedLaw> {
  throw new SolverError("not_converged", "absorbedLaw is being written");
}
/** P(K = n), one n without the others */
export function absorbedProbability(_t: Trajectory, _starts: Starts, _n: number): Answer<ScaledEstimate> {
  throw new SolverError("not_converged", "absorbedProbability is being written");
}
/** P(K > n) */
export function absorbedAbove(_t: Trajectory, _starts: Starts, _n: number): Answer<ScaledEstimate> {
  throw new SolverError("not_converged", "absorbedAbove is being written");
}

import { SolverError } from "./errors.ts";
import type { Answer, ProcessModel, Trajectory } from "./types.ts";

export function solveTrajectory(_model: ProcessModel): Answer<Trajectory> {
  throw new SolverError("not_converged", "solveTrajectory is being written");
}

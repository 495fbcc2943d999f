import { SolverError } from "./errors.ts";
import type { ProcessDescription, ProcessModel } from "./types.ts";

export function describeProcess(_model: ProcessModel): ProcessDescription {
  throw new SolverError("not_converged", "describeProcess is being written");
}

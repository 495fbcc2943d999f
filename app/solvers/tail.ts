import { SolverError } from "./errors.ts";
import type { Answer, Starts, TailLaw, TailProbability, Trajectory } from "./types.ts";

export function tailLaw(_t: Trajectory, _starts: Starts, _terms: number): Answer<TailLaw> {
  throw new SolverError("not_converged", "tailLaw is being written");
}
export function tailProbability(_law: TailLaw, _n: number): TailProbability {
  throw new SolverError("not_converged", "tailProbability is being written");
}

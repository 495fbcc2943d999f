/** The ways in which a solver call dies. A question that has no finite answer is not among them: that is a Refusal. */
export type SolverErrorCode = "bad_parameter" | "not_converged";

/** Thrown for misuse of a solver, and where a computation cannot vouch for its own result. */
export class SolverError extends Error {
  readonly code: SolverErrorCode;

  constructor(code: SolverErrorCode, message: string, options?: ErrorOptions) {
    super(message, options);
    this.name = "SolverError";
    this.code = code;
  }
}

/** Why an evaluation had to stop. Everything else that can go wrong is a refused `Value` with its reason. */
export type FormulaErrorCode = "budget";

/** Thrown by a compiled formula when its budget is used up; carries a sentence fit to be shown. */
export class FormulaError extends Error {
  readonly code: FormulaErrorCode;

  constructor(code: FormulaErrorCode, message: string) {
    super(message);
    this.name = "FormulaError";
    this.code = code;
  }
}

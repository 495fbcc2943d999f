import { FormulaError } from "./errors.ts";
import type { Budget } from "./types.ts";

/** Operations that a formula may take unless the caller says otherwise: about a second of work. */
const USUAL_OPERATIONS = 1e6;

/** A fresh allowance of operations; one may be shared by many formulas of one cell. */
export function newBudget(operations: number = USUAL_OPERATIONS): Budget {
  return { left: operations };
}

/**
 * Takes `operations` from the budget.
 * @throws FormulaError "budget" when there are not that many left.
 */
export function spend(budget: Budget, operations: number): void {
  budget.left -= operations;
  if (budget.left < 0) {
    throw new FormulaError(
      "budget",
      "The formula takes more operations than one formula may; shorten its sums, or its integrals' intervals.",
    );
  }
}

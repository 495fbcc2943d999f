export { newBudget, spend } from "./budget.ts";
export { FormulaError } from "./errors.ts";
export { compileFormula, evaluateFormula } from "./evaluate.ts";
export { parseFormula } from "./parse.ts";
export { printExact, printNumber } from "./print.ts";
export type { QuantityJson } from "./quantity.ts";
export { approximate, exact, log10Of, quantityToJson, scaled, toDouble } from "./quantity.ts";
export { nearestSpelling } from "./spelling.ts";
export type { CanonicalFormula, CellUse, FreeNames } from "./tree.ts";
export { boundNames, freeNames, substitute } from "./tree.ts";
export type {
  Budget,
  Formula,
  FormulaProblem,
  ParsedFormula,
  PrintedNumber,
  PrintOptions,
  Quantity,
  Scope,
  Value,
} from "./types.ts";
export type { FunctionWord } from "./words.ts";
export { BINDERS, FUNCTIONS, RESERVED_NAMES } from "./words.ts";

export { newBudget } from "./budget.ts";
export { decimalText } from "./decimal.ts";
export { FormulaError } from "./errors.ts";
export { compileFormula } from "./evaluate.ts";
export { parseFormula } from "./parse.ts";
export { printExact, printNumber } from "./print.ts";
export type { QuantityJson } from "./quantity.ts";
export { approximate, exact, log10Of, quantityToJson, scaled, toDouble } from "./quantity.ts";
export { freeNames } from "./tree.ts";
export { isTruth } from "./truths.ts";
export type {
  Formula,
  FormulaProblem,
  PrintedNumber,
  PrintOptions,
  Quantity,
  Scope,
  Value,
} from "./types.ts";
export { FUNCTIONS, RESERVED_NAMES } from "./words.ts";

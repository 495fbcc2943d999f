import type { Formula, Value } from "../../formulas/index.ts";
import type { ComputeContext } from "../context.ts";
import { CellFault } from "../context.ts";

type Apply = Extract<Formula, { node: "apply" }>;

/** How comparisons are written. */
export const SIGNS: Readonly<Record<string, string>> = { lt: "<", le: "<=", gt: ">", ge: ">=", eq: "==", ne: "!=" };

/** A formula that is one comparison: its sides and its sign. */
export function comparisonOf(formula: Formula): { left: Formula; right: Formula; sign: string } | null {
  if (formula.node !== "apply") return null;
  const sign = Object.hasOwn(SIGNS, formula.name) ? SIGNS[formula.name] : undefined;
  const [left, right] = formula.args;
  return sign === undefined || left === undefined || right === undefined ? null : { left, right, sign };
}

/**
 * Whether a comparison, or several joined by and, or, not, holds: null where the errors leave it open. Here numbers with
 * errors are equal to nothing that lies within the errors, nor different from it.
 * @throws CellFault where a side has no value.
 */
export function verdictOf(formula: Formula, context: ComputeContext): boolean | null {
  if (formula.node === "apply") {
    const [first, second] = formula.args;
    if (formula.name === "not" && first !== undefined) return negated(verdictOf(first, context));
    if (formula.name === "and" || formula.name === "or") {
      const deciding = formula.name === "or";
      const a = first === undefined ? null : verdictOf(first, context);
      if (a === deciding || second === undefined) return a;
      const b = verdictOf(second, context);
      return b === deciding || a !== null ? b : a;
    }
    if (formula.name === "eq") return isSame(formula, context);
    if (formula.name === "ne") return negated(isSame(formula, context));
  }
  const value = context.value(formula);
  if (value.type === "truth") return value.holds;
  throw new CellFault("that", value.type === "refused" ? `\`that\` has no value: ${value.reason}` : NO_COMPARISON);
}

export const NO_COMPARISON =
  "`that` is no comparison: it takes one such as `K.mean < 0.05`, with <, <=, >, >=, == or !=, or several joined by and, or, not.";

function negated(holds: boolean | null): boolean | null {
  return holds === null ? null : !holds;
}

/** Equal as numbers: exactly where both are exact, open where they differ by less than their errors. */
function isSame(formula: Apply, context: ComputeContext): boolean | null {
  const asWritten = context.value({ ...formula, name: "eq" });
  const difference = context.value({ ...formula, name: "subtract" });
  if (difference.type !== "number") return truthOf(asWritten);
  const { mantissa, error } = difference.quantity;
  if (error === 0) return mantissa === 0;
  return Math.abs(mantissa) > error ? false : null;
}

/** Words are compared letter by letter. */
function truthOf(value: Value): boolean | null {
  if (value.type === "truth") return value.holds;
  throw new CellFault("that", value.type === "refused" ? `\`that\` has no value: ${value.reason}` : NO_COMPARISON);
}

import type { Formula } from "./types.ts";

const TRUTHS: ReadonlySet<string> = new Set(["lt", "le", "gt", "ge", "eq", "ne", "and", "or", "not"]);

/** Whether a formula holds or does not, whatever its names mean. */
export function isTruth(formula: Formula): boolean {
  if (formula.node !== "apply") return false;
  if (formula.name === "if") return formula.args.slice(1).every(isTruth);
  return TRUTHS.has(formula.name);
}

/** Whether a formula chooses between two others. */
export function isIf(formula: Formula): boolean {
  return formula.node === "apply" && formula.name === "if";
}

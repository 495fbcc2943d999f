import { type CellResult, evaluateNumber, type Plan } from "../../cells/index.ts";
import type { ValueNow } from "../model/messages.ts";

/** What a formula is by the results at hand, as a sentence would print it; why it is nothing, where it is. */
export function valueNow(formula: string, plan: Plan, results: ReadonlyMap<string, CellResult>): ValueNow {
  const { printed, problem } = evaluateNumber({ formula, options: {} }, plan, results);
  return {
    formula,
    known: printed?.sheet.known ?? "",
    unknown: printed?.sheet.unknown ?? "",
    rest: printed?.sheet.rest ?? "",
    reason: printed === null ? (problem ?? "There is no value here.") : "",
  };
}

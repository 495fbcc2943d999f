import type { Quantity, Value } from "../../formulas/index.ts";
import { approximate, toDouble } from "../../formulas/index.ts";
import { survivalProbability } from "../../solvers/index.ts";
import { numberValue, refusedValue } from "../values.ts";
import type { ProcessData } from "./model.ts";

/** P_x(the process on the half-line never dies out); an error of x is passed on, beside the solver's own. */
export function survivalValue(data: ProcessData, position: Quantity): Value {
  const x = toDouble(position);
  const answer = survivalProbability(data.model, x);
  if ("refused" in answer) return refusedValue(answer.refused);
  const spread = position.error * 2 ** position.exponent;
  if (spread === 0) return numberValue(approximate(answer.value, answer.error));
  const moves = [Math.max(0, x - spread), x + spread].map((end) => {
    const moved = survivalProbability(data.model, end);
    return "refused" in moved ? 0 : Math.abs(moved.value - answer.value);
  });
  return numberValue(approximate(answer.value, answer.error + Math.max(...moves)));
}

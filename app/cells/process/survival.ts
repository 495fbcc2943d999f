import type { Value } from "../../formulas/index.ts";
import { exactValue, refusedValue } from "../values.ts";
import type { ProcessData } from "./model.ts";

/** P_x(the process on the half-line never dies out), by death or by absorption of all. */
export function survival(data: ProcessData, x: number): Value {
  if (!(x >= 0)) return refusedValue(`The half-line begins at 0; there is no start at ${x}.`);
  if (x === 0) return exactValue(0);
  return refusedValue(`No survival probability was computed at ${data.model.drift}.`);
}

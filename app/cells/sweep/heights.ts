import type { Value } from "../../formulas/index.ts";
import { log10Of, toDouble } from "../../formulas/index.ts";

/** Positive numbers that span more than so many decades are drawn in logarithms. */
const DECADES = 2.5;

/** Whether numbers are drawn on a logarithmic axis: all above 0, over decades. What is no number does not matter. */
export function drawnInLogs(values: readonly Value[]): boolean {
  let [least, most] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
  for (const value of values) {
    if (value.type !== "number") continue;
    if (value.quantity.mantissa <= 0) return false;
    const log = log10Of(value.quantity);
    [least, most] = [Math.min(least, log), Math.max(most, log)];
  }
  return most - least > DECADES;
}

/** A number as it is drawn; null where there is none. */
export function heightOf(value: Value | undefined, inLogs: boolean): number | null {
  if (value?.type !== "number") return null;
  const height = inLogs ? log10Of(value.quantity) : toDouble(value.quantity);
  return Number.isFinite(height) ? height : null;
}

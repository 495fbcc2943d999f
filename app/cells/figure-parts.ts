import type { Axis } from "../figures/index.ts";
import type { AxisLook } from "./presentation.ts";

/**
 * An axis as the kind has it, with what `axes` and `labels` of the body say instead.
 * @param range the kind's own range; null: from the data
 */
export function labelledAxis(
  label: string,
  scale: "linear" | "log",
  look: AxisLook,
  range: Axis["range"] = null,
): Axis {
  const axis: Axis = { label: look.label ?? label, scale: look.scale ?? scale, range: look.range ?? range };
  return look.scale === null && look.range === null ? axis : { ...axis, otherwise: { scale, range } };
}

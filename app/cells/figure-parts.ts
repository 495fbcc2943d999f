import type { Axis } from "../figures/index.ts";
import type { AxisLook } from "./presentation.ts";

/** An axis as the kind has it, with what `axes` and `labels` of the body say instead. */
export function labelledAxis(label: string, scale: "linear" | "log", look: AxisLook): Axis {
  return { label: look.label ?? label, scale: look.scale ?? scale, range: look.range };
}

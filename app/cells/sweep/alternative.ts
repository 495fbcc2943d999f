import { labelText } from "../../figures/index.ts";
import { toDouble } from "../../formulas/index.ts";
import type { Presentation } from "../presentation.ts";
import { shortNumber } from "../values.ts";
import type { Told } from "./finding.ts";
import { movementWords } from "./finding.ts";
import type { SweepCurve, SweepData } from "./model.ts";

const MOST_CURVES = 4;

/** Says what the curves of one quantity find: where they rise, fall, turn and jump. */
export function alternativeOf(data: SweepData, name: string, presentation: Presentation): string {
  const told = labelText(presentation.symbolOf(name));
  const over = labelText(presentation.symbolOf(data.over));
  const curves = data.curves.slice(0, MOST_CURVES).map((curve) => {
    const which =
      curve.at === null ? "" : `at ${labelText(presentation.symbolOf(data.vary ?? ""))} = ${shortNumber(curve.at)} it `;
    return `${which}${curveWords(curve, name)}`;
  });
  const more = data.curves.length - MOST_CURVES;
  const rest = more > 0 ? `; ${more} further ${more === 1 ? "curve" : "curves"}` : "";
  return `${told} against ${over}: ${curves.join("; ")}${rest}.`;
}

function curveWords(curve: SweepCurve, name: string): string {
  const words: string[] = [];
  for (const piece of new Set(curve.piece)) {
    const movement = movementWords(toldOf(curve, name, piece));
    if (movement === "") continue;
    const jump = curve.jumps[piece - 1];
    const isAfter = jump !== undefined && words.length > 0;
    words.push(isAfter ? `jumps at ${shortNumber(jump.above)}, from where on it ${movement}` : movement);
  }
  return words.length === 0 ? "has no value" : words.join("; it ");
}

function toldOf(curve: SweepCurve, name: string, piece: number): Told[] {
  const points = curve.x.flatMap((x, index): Told[] => {
    const value = curve.recorded[index]?.[name];
    if (curve.piece[index] !== piece || value?.type !== "number") return [];
    const { quantity } = value;
    return [{ x, y: toDouble(quantity), error: Math.max(quantity.error, quantity.se) * 2 ** quantity.exponent }];
  });
  return points.sort((a, b) => a.x - b.x);
}

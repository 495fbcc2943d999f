import type { Plan } from "../../cells/index.ts";
import { toDouble } from "../../formulas/index.ts";
import { isPlainNumber, shownValue } from "../model/scale.ts";
import type { ParameterFace, Piece } from "../model/types.ts";
import type { CellTelling } from "./cell-faces.ts";

type Standing = Pick<CellTelling, "shown" | "state">;

/** The parameters as the rule shows them, each with the value from which something out of date still comes. */
export function parameterFaces(plan: Plan, standings: readonly Standing[]): ParameterFace[] {
  return plan.parameters.map((parameter) => {
    const { value } = parameter;
    const number = value.type === "number" ? toDouble(value.quantity) : null;
    const was = formerValue(parameter.name, standings);
    return {
      name: parameter.name,
      symbol: parameter.symbol,
      source: parameter.source,
      value: number,
      shown: number === null ? "no value" : shownValue(number, parameter.source, parameter.step),
      plain: isPlainNumber(parameter.source),
      min: parameter.min,
      max: parameter.max,
      step: parameter.step,
      unit: parameter.unit,
      note: parameter.note,
      was: was?.value ?? null,
      wasShown: was === null ? "" : shownValue(was.value, was.text, parameter.step),
      overridden: parameter.overridden,
    };
  });
}

/** The value of a parameter with which something that is now out of date was set. */
function formerValue(name: string, standings: readonly Standing[]): { value: number; text: string } | null {
  for (const { state, shown } of standings) {
    if (state.state === "stands" || !state.causes.some((cause) => cause.cause === "parameter" && cause.name === name))
      continue;
    const text = shown?.parameterValues[name];
    const value = text === undefined ? Number.NaN : Number(text.replace("−", "-").replace(/[\s\u2009]/g, ""));
    if (text !== undefined && Number.isFinite(value)) return { value, text };
  }
  return null;
}

/** Where the rule edits each parameter. */
export function parameterPieces(plan: Plan): Piece[] {
  return plan.parameters.map(({ name, from, to }) => ({ piece: "parameter", from, to, name }));
}

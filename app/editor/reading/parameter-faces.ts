import type { Plan } from "../../cells/index.ts";
import { toDouble } from "../../formulas/index.ts";
import { isPlainNumber, shownValue } from "../model/scale.ts";
import type { CellFace, NumberFace, ParameterFace, Piece } from "../model/types.ts";
import type { CellTelling } from "./cell-faces.ts";

type Standing = Pick<CellTelling, "shown" | "state">;

/** What may hang from parameters, each by their places in the rule. */
interface Hanging {
  readonly cells: readonly Pick<CellFace, "kind" | "title" | "parts" | "strands" | "from">[];
  readonly numbers: readonly Pick<NumberFace, "strands">[];
}

/** The parameters as the rule shows them, each with the value from which something out of date still comes. */
export function parameterFaces(plan: Plan, standings: readonly Standing[], hanging: Hanging): ParameterFace[] {
  return plan.parameters.map((parameter, place) => {
    const { value } = parameter;
    const number = value.type === "number" ? toDouble(value.quantity) : null;
    const former = formerValue(parameter.name, standings);
    // While it is tried elsewhere than on the rule, what is out of date is so for the trial alone.
    const was = former?.value === number ? null : former;
    return {
      name: parameter.name,
      symbol: parameter.symbol,
      source: parameter.source,
      value: number,
      shown:
        number === null ? "no value" : shownValue(number, parameter.overridden ? "" : parameter.source, parameter.step),
      plain: isPlainNumber(parameter.source),
      min: parameter.min,
      max: parameter.max,
      step: parameter.step,
      unit: parameter.unit,
      note: parameter.note,
      was: was?.value ?? null,
      wasShown: was === null ? "" : shownValue(was.value, was.text, parameter.step),
      overridden: parameter.overridden,
      hangs: hangingWords(hanging, place),
    };
  });
}

/** How many cells are named one by one. */
const MOST_NAMED = 4;

/** "Figure 1, Table 2 and 5 numbers hang from it": cells that print nothing are named where none prints. */
function hangingWords({ cells, numbers }: Hanging, place: number): string {
  const reading = cells.filter(({ kind, strands }) => kind !== "parameters" && strands.includes(place));
  const hung = reading.sort((a, b) => a.from - b.from);
  const printed = hung.filter(({ parts }) => parts.length > 0);
  const named = (printed.length > 0 ? printed : hung).map(({ title }) => title);
  const more = named.length - MOST_NAMED;
  const count = numbers.filter(({ strands }) => strands.includes(place)).length;
  const things = [
    ...(more > 1 ? [...named.slice(0, MOST_NAMED), `${more} more`] : named),
    ...(count === 0 ? [] : [count === 1 ? "1 number" : `${count} numbers`]),
  ];
  if (things.length === 0) return "Nothing hangs from it";
  const list = things.length === 1 ? things[0] : `${things.slice(0, -1).join(", ")} and ${things.at(-1)}`;
  return `${list} ${things.length === 1 && count < 2 ? "hangs" : "hang"} from it`;
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

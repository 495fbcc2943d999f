import type { CellFace, NumberFace, NumberState, ParameterFace, SheetModel } from "../model/types.ts";
import { counted, listed } from "../parts/words.ts";
import type { Reach } from "./reach.ts";
import type { Lit } from "./types.ts";

/** What is said of what is lit, in the margin, in the tail line or on a slip. */
export interface Gloss {
  /** "K.s0 = 5.4368778" */
  readonly lead: readonly { readonly name: string; readonly known: string; readonly unknown: string }[];
  /** "from Figure 1, counts K" */
  readonly where: string;
  readonly parameters: readonly { readonly place: number; readonly tex: string; readonly shown: string }[];
  /** "good to 11 digits", "quoted in 3 places" */
  readonly also: string;
}

type Known = Pick<SheetModel, "cells" | "parameters">;

/** How many numbers of one formula, and how many cells, are named one by one. */
const NAMED = 3;

export function glossOf(lit: Lit, model: Known, reach: Reach): Gloss | null {
  switch (lit.lit) {
    case "number":
      return glossOfNumber(lit.faces, model);
    case "cord": {
      const cell = model.cells.find(({ slot }) => slot === lit.slot);
      return cell === undefined ? null : glossOfCell(cell, model, reach);
    }
    case "strand": {
      const parameter = model.parameters[lit.place];
      return parameter === undefined ? null : glossOfParameter(parameter, lit.place, model);
    }
  }
}

function glossOfNumber(faces: readonly NumberFace[], model: Known): Gloss {
  const slots = new Set(faces.flatMap(({ cells }) => cells));
  const cells = model.cells.filter(({ slot }) => slots.has(slot));
  const places = new Set(faces.flatMap(({ strands }) => strands));
  return {
    lead: faces.slice(0, NAMED).map((face) => ({
      name: face.formula,
      known: face.known === "" && face.unknown === "" ? "no value" : face.known,
      unknown: `${face.unknown}${face.rest}`,
    })),
    where: cells.length === 0 ? "" : `from ${listed(cells.map(nameOf))}`,
    parameters: [...places].sort((a, b) => a - b).flatMap((place) => parameterOf(place, model)),
    also: faces.length === 1 && faces[0] !== undefined ? soundness(faces[0]) : "",
  };
}

/** "Figure 1, counts K"; a cell that prints nothing is called by its kind and name already. */
function nameOf({ title, parts, kind, name }: CellFace): string {
  return parts.length === 0 || name === null ? title : `${title}, ${kind.replace("_", " ")} ${name}`;
}

function soundness({ state, good, cells, known }: NumberFace): string {
  const said = STATES[state];
  if (said !== "") return said;
  if (known === "") return "";
  if (good === null) return cells.length === 0 ? "as set on the rule" : "exact";
  return good === 0 ? "no digit is known" : `good to ${counted(good, "digit")}`;
}

const STATES: Readonly<Record<NumberState, string>> = {
  current: "",
  outOfDate: "† out of date",
  stands: "† stands with an older result",
  computing: "being set",
  waiting: "waits",
  failed: "‡ no value",
  empty: "not computed yet",
  preview: "tried, not kept",
};

function glossOfCell(cell: CellFace, model: Known, reach: Reach): Gloss {
  const quotes = reach.cells.get(cell.slot)?.quotes?.count ?? 0;
  return {
    lead: [{ name: cell.title, known: "", unknown: "" }],
    where: cell.parts.length === 0 || cell.name === null ? "" : `${cell.kind.replace("_", " ")} ${cell.name}`,
    parameters: cell.strands.flatMap((place) => parameterOf(place, model)),
    also: quotes === 0 ? "quoted nowhere" : `quoted in ${counted(quotes, "place")}`,
  };
}

function glossOfParameter(parameter: ParameterFace, place: number, model: Known): Gloss {
  const cells = model.cells.filter(({ strands }) => strands.includes(place));
  const named = cells.slice(0, NAMED).map(({ title }) => title);
  const more = cells.length > NAMED ? [...named.slice(0, 2), `${cells.length - 2} more cells`] : named;
  return {
    lead: [],
    where: parameter.note,
    parameters: parameterOf(place, model),
    also: cells.length === 0 ? "nothing hangs from it" : `from it hang ${listed(more)}`,
  };
}

function parameterOf(place: number, { parameters }: Known): Gloss["parameters"] {
  const parameter = parameters[place];
  return parameter === undefined ? [] : [{ place, tex: parameter.symbol, shown: withUnit(parameter) }];
}

function withUnit({ shown, unit }: ParameterFace): string {
  return unit === "" ? shown : `${shown} ${unit}`;
}

/** What the tail line has room for: "K.s0 = 5.4368778, from Figure 1, good to 11 digits". */
export function glossInLine({ lead, where, also }: Gloss): { readonly lead: string; readonly rest: string } {
  const said = lead.map(({ name, known, unknown }) => (known + unknown === "" ? name : `${name} = ${known}${unknown}`));
  return { lead: said.join("; "), rest: [where, also].filter((part) => part !== "").join(", ") };
}

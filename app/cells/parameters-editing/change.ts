import type { Paper } from "../../paper/index.ts";
import type { TextEdit } from "../text-edits.ts";
import type { PlannedParameter } from "../types.ts";
import {
  fieldsOf,
  PARAMETER_FIELDS,
  type ParameterField,
  type ParameterFields,
  type ParameterPlace,
  placeOf,
} from "./entry.ts";
import { faultOf, type PaperAfter, type ParameterProblem, paperAfter } from "./judge.ts";
import { aroundOf, changedEntries, indentOf, lineEnd } from "./map-edits.ts";
import { endOf, scalarEdit, scalarText } from "./scalar.ts";

/** An edit of a paper's parameters: in rising order, to be made as one. */
export interface ParameterEdit {
  readonly edits: readonly TextEdit[];
  /** The parameter as it will be; null: there will be none of that name. */
  readonly after: PlannedParameter | null;
}

export type FieldChanges = Partial<ParameterFields>;

/**
 * The edits that say something else of a parameter: its value, scale, symbol, unit, note or standard error. What is said
 * elsewhere in the same entry, comments and the author's way of writing it stay. The paper is read and planned again with
 * them: what cannot be read, names nothing, comes to no number or makes a circle is a problem, and nothing is to be changed.
 * @param bibliography the paper's BibTeX, to read the paper again
 * @param changes new texts by field; "" takes the field away
 */
export function changesParameter(
  paper: Paper,
  bibliography: string,
  name: string,
  changes: FieldChanges,
): ParameterEdit | ParameterProblem {
  const place = placeOf(paper, name);
  if (place === null) return { problem: `${name} is not a parameter of this paper any more.`, field: null };
  const asked = askedChanges(place, changes);
  if (asked.get("value") === "")
    return { problem: "A parameter needs a value: a number or a formula.", field: "value" };
  const edits = editsOf(paper.text, place, asked);
  const after = paperAfter(paper, bibliography, edits);
  return (
    faultOf(after, name) ??
    scaleFault(after, name, asked) ??
    notAsAsked(after, name, asked) ?? {
      edits,
      after: after.plan.parameters.find((each) => each.name === name) ?? null,
    }
  );
}

function askedChanges({ entry }: ParameterPlace, changes: FieldChanges): ReadonlyMap<ParameterField, string> {
  const said = fieldsOf(entry);
  return new Map(
    PARAMETER_FIELDS.flatMap((field) => {
      const text = changes[field]?.replace(/\s+/g, " ").trim();
      return text === undefined || text === said[field] ? [] : [[field, text]];
    }),
  );
}

function editsOf(text: string, place: ParameterPlace, asked: ReadonlyMap<ParameterField, string>): TextEdit[] {
  const { entry, body } = place;
  if (asked.size === 0) return [];
  if (entry.value.yaml === "map") return changedEntries(text, entry.value, asked);
  const value = asked.get("value");
  if (asked.size === 1 && value !== undefined) return [scalarEdit(text, entry.value, value, aroundOf(text, body))];
  return asMap(text, place, { ...fieldsOf(entry), ...Object.fromEntries(asked) });
}

/** A parameter that was a value alone, with more said of it: in braces, or in lines where its neighbours are. */
function asMap(text: string, { body, entry }: ParameterPlace, fields: ParameterFields): TextEdit[] {
  const said = PARAMETER_FIELDS.filter((field) => fields[field] !== "");
  const { from } = entry.value;
  const to = endOf(text, entry.value);
  const neighbour = body.entries.find(({ value }) => value.yaml === "map")?.value;
  if (neighbour?.yaml !== "map" || aroundOf(text, neighbour) === "flow" || aroundOf(text, body) === "flow") {
    const details = said.map((field) => `${field}: ${scalarText(fields[field], "flow")}`);
    const gap = text.charAt(from - 1) === ":" ? " " : "";
    return [{ from, to, insert: `${gap}{${details.join(", ")}}` }];
  }
  const indent = neighbour.entries[0] === undefined ? "  " : indentOf(text, neighbour.entries[0]);
  const lines = said.map((field) => `\n${indent}${field}: ${scalarText(fields[field], "block")}`);
  const below = lineEnd(text, to);
  // A comment stays on the line of the name.
  return [
    { from: text.indexOf(":", entry.keyTo) + 1, to, insert: "" },
    { from: below, to: below, insert: lines.join("") },
  ];
}

const SCALE: readonly ParameterField[] = ["min", "max", "step"];

/** A scale that is changed has to be one; an old one that is none does not keep its note from being changed. */
function scaleFault(
  { plan }: PaperAfter,
  name: string,
  asked: ReadonlyMap<ParameterField, string>,
): ParameterProblem | null {
  const planned = plan.parameters.find((each) => each.name === name);
  if (planned === undefined || !SCALE.some((field) => asked.has(field))) return null;
  for (const field of ["min", "max", "step"] as const) {
    if ((asked.get(field) ?? "") !== "" && planned[field] === null)
      return { problem: "This comes to no number.", field };
  }
  const { min, max, step } = planned;
  if (min !== null && max !== null && min >= max) {
    const field = asked.has("max") ? "max" : "min";
    return { problem: "The scale has to go upwards: its left end below its right end.", field };
  }
  return step !== null && step <= 0 ? { problem: "A step has to be above 0.", field: "step" } : null;
}

/** What reads otherwise than it was asked: a text that YAML takes for something else. */
function notAsAsked(
  { paper }: PaperAfter,
  name: string,
  asked: ReadonlyMap<ParameterField, string>,
): ParameterProblem | null {
  const place = placeOf(paper, name);
  if (place === null) return null;
  const read = fieldsOf(place.entry);
  const field = [...asked].find(([field, words]) => read[field].replace(/\s+/g, " ") !== words)?.[0];
  return field === undefined ? null : { problem: "This cannot be written here as it stands.", field };
}

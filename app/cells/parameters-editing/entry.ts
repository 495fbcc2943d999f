import type { Cell, Paper, YamlEntry } from "../../paper/index.ts";
import { KINDS } from "../registry.ts";
import { endOf } from "./scalar.ts";

/** What may be said of a parameter, in the order in which it is written. */
export const PARAMETER_FIELDS = ["value", "min", "max", "step", "symbol", "unit", "note", "se"] as const;

export type ParameterField = (typeof PARAMETER_FIELDS)[number];

/** What is said of a parameter, as it stands in the text; "" where nothing is. */
export type ParameterFields = Readonly<Record<ParameterField, string>>;

/** Where a parameter stands, in the first cell that gives it. */
export interface ParameterPlace {
  readonly cell: Cell;
  readonly body: NonNullable<Cell["body"]>;
  readonly entry: YamlEntry;
}

/** All entries that are parameters, in the order of the rule; of a name given twice the first alone. */
export function parameterPlaces(paper: Paper): readonly ParameterPlace[] {
  const seen = new Set<string>();
  return parametersCells(paper).flatMap(({ cell, body }) =>
    body.entries.flatMap((entry) => {
      if (entry.key === "caption" || entry.key === "show" || seen.has(entry.key)) return [];
      seen.add(entry.key);
      return [{ cell, body, entry }];
    }),
  );
}

export function placeOf(paper: Paper, name: string): ParameterPlace | null {
  return parameterPlaces(paper).find(({ entry }) => entry.key === name) ?? null;
}

/** The cells that give parameters and can be read. */
export function parametersCells(
  paper: Paper,
): readonly { readonly cell: Cell; readonly body: NonNullable<Cell["body"]> }[] {
  return paper.cells.flatMap((cell) =>
    KINDS.get(cell.kind)?.knownAtPlanning === true && cell.body !== null ? [{ cell, body: cell.body }] : [],
  );
}

/** What the text says of a parameter; null when it has none of that name. */
export function parameterFields(paper: Paper, name: string): ParameterFields | null {
  const place = placeOf(paper, name);
  return place === null ? null : fieldsOf(place.entry);
}

export function fieldsOf({ value }: YamlEntry): ParameterFields {
  const said = (field: ParameterField): string => {
    if (value.yaml === "scalar") return field === "value" ? value.text.trim() : "";
    const detail = value.yaml === "map" ? value.entries.find(({ key }) => key === field)?.value : undefined;
    return detail?.yaml === "scalar" ? detail.text.trim() : "";
  };
  return {
    value: said("value"),
    min: said("min"),
    max: said("max"),
    step: said("step"),
    symbol: said("symbol"),
    unit: said("unit"),
    note: said("note"),
    se: said("se"),
  };
}

/** The detail of a parameter in which a place of the text lies. */
export function fieldAt(text: string, { value, keyFrom }: YamlEntry, at: number): ParameterField | "name" {
  if (at < value.from && at >= keyFrom && value.yaml === "scalar") return "name";
  const details = value.yaml === "map" ? value.entries : [];
  const detail = details.find((each) => at >= each.keyFrom && at <= endOf(text, each.value));
  return PARAMETER_FIELDS.find((field) => field === detail?.key) ?? "value";
}

import { decimalText, type Value } from "../../formulas/index.ts";
import type { Yaml } from "../../paper/index.ts";
import type { Presentation } from "../presentation.ts";
import type { TableCellData } from "./model.ts";

/** A place that is longer than so many characters is better told by its row. */
const LONGEST_PLACE = 8;

/**
 * The formula by which a sentence quotes an entry: its column's own with the row's values in it, K(3); where rows vary a
 * parameter, or have no short values, what the table calls it, t.exact(3); "" where the table has no name either.
 */
export function entryQuote(data: TableCellData, column: string, row: number, presentation: Presentation): string {
  const written = formulaOf(presentation.body?.entries.find(({ key }) => key === "columns")?.value, column);
  const places = Object.entries(data.rows).map(([name, values]) => [name, placeText(values[row])] as const);
  if (written !== null && places.every(([name, text]) => text !== null && !presentation.isParameter(name))) {
    return places.reduce(
      (formula, [name, text]) => formula.replace(new RegExp(`(?<![\\w.])${name}(?!\\w)`, "g"), () => text ?? ""),
      written,
    );
  }
  return presentation.name === null ? "" : `${presentation.name}.${column}(${row + 1})`;
}

function formulaOf(columns: Yaml | undefined, column: string): string | null {
  const node = columns?.yaml === "map" ? columns.entries.find(({ key }) => key === column)?.value : undefined;
  const own = node?.yaml === "map" ? node.entries.find(({ key }) => key === "formula")?.value : node;
  return own?.yaml === "scalar" ? own.text.trim() : null;
}

function placeText(value: Value | undefined): string | null {
  if (value?.type !== "number" || value.quantity.error !== 0) return null;
  const text = decimalText(value.quantity);
  if (text.length > LONGEST_PLACE) return null;
  return text.startsWith("-") ? `(${text})` : text;
}

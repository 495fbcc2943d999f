import type { TableColumn, TableData } from "../../figures/index.ts";
import { labelText } from "../../figures/index.ts";
import type { PrintOptions, Value } from "../../formulas/index.ts";
import type { Yaml } from "../../paper/index.ts";
import type { Presentation } from "../presentation.ts";
import { tableEntry } from "../table-parts.ts";
import type { CellView } from "../types.ts";
import type { TableCellData } from "./model.ts";
import { entryQuote } from "./quote.ts";

const MOST_REASONS = 4;

/** Rows' names first, then the columns in the body's order, with the heads and digits it gives them now. */
export function viewTable(data: TableCellData, presentation: Presentation): CellView {
  const looks = columnLooks(presentation.body);
  const inBody = [...looks.keys()].filter((name) => Object.hasOwn(data.columns, name));
  const names = inBody.length === Object.keys(data.columns).length ? inBody : Object.keys(data.columns);
  const rowNames = Object.keys(data.rows);
  const columns = [
    ...rowNames.map((name): TableColumn => ({ name, head: presentation.symbolOf(name), tex: true })),
    ...names.map((name) => headOf(name, looks.get(name)?.head ?? null)),
  ];
  const count = Math.max(0, ...Object.values(data.columns).map((values) => values.length));
  const rows = Array.from({ length: count }, (_, row) => [
    ...rowNames.map((name) => tableEntry(data.rows[name]?.[row] ?? GAP)),
    ...names.map((name) =>
      tableEntry(
        data.columns[name]?.[row] ?? GAP,
        looks.get(name)?.options ?? {},
        entryQuote(data, name, row, presentation),
      ),
    ),
  ]);
  const table: TableData = { columns, rows, remarks: reasonsForGaps(data, names, rowNames, presentation) };
  return { figure: null, table, points: null };
}

const GAP: Value = { type: "none" };

interface ColumnLook {
  readonly head: string | null;
  readonly options: PrintOptions;
}

function columnLooks(body: Presentation["body"]): ReadonlyMap<string, ColumnLook> {
  const columns = body?.entries.find((entry) => entry.key === "columns")?.value;
  if (columns?.yaml !== "map") return new Map();
  return new Map(columns.entries.map((entry) => [entry.key, lookOf(entry.value)]));
}

function lookOf(node: Yaml): ColumnLook {
  if (node.yaml !== "map") return { head: null, options: {} };
  const text = (key: string): string | null => {
    const value = node.entries.find((entry) => entry.key === key)?.value;
    return value?.yaml === "scalar" ? value.text : null;
  };
  const digits = Number(text("digits") ?? Number.NaN);
  const as = text("as");
  return {
    head: text("head"),
    options: {
      ...(Number.isInteger(digits) && digits >= 1 ? { digits } : {}),
      ...(as === "plain" || as === "scientific" || as === "percent" ? { as } : {}),
    },
  };
}

/** A head in dollars is TeX, words are words, words with dollars among them are TeX with the words set upright. */
function headOf(name: string, head: string | null): TableColumn {
  if (head === null)
    return name.length === 1 ? { name, head: name, tex: true } : { name, head: name.replaceAll("_", " "), tex: false };
  const parts = head.split(/\$([^$]+)\$/);
  if (parts.length === 1) return { name, head, tex: false };
  const tex = parts.map((part, index) => (index % 2 === 1 ? part : part === "" ? "" : `\\text{${part}}`)).join("");
  return { name, head: tex, tex: true };
}

function reasonsForGaps(
  data: TableCellData,
  names: readonly string[],
  rowNames: readonly string[],
  presentation: Presentation,
): string[] {
  const reasons = names.flatMap((name) =>
    (data.columns[name] ?? []).flatMap((value, row) => {
      if (value.type !== "refused") return [];
      const where = rowNames
        .map(
          (rowName) =>
            `${labelText(presentation.symbolOf(rowName))} = ${tableEntry(data.rows[rowName]?.[row] ?? GAP).text}`,
        )
        .join(", ");
      return [`No ${name} at ${where}: ${value.reason}`];
    }),
  );
  const more = reasons.length - MOST_REASONS;
  return more > 0 ? [...reasons.slice(0, MOST_REASONS), `And ${more} more gaps.`] : reasons;
}

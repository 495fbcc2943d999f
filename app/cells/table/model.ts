import type { Formula, Quantity, Value } from "../../formulas/index.ts";
import { exact, toDouble } from "../../formulas/index.ts";
import type { YamlEntry } from "../../paper/index.ts";
import type { Body } from "../body.ts";
import type { ComputeContext } from "../context.ts";
import { CellFault } from "../context.ts";
import type { KindOf } from "../kind.ts";
import { listOfNames } from "../names.ts";
import { exactValue, refusedValue } from "../values.ts";
import { TABLE_DOCUMENTATION } from "./documentation.ts";
import { viewTable } from "./view.ts";

/** Values of one name: listed, or from one number to another in steps of 1. */
export type RowValues = { readonly list: readonly Formula[] } | { readonly from: Formula; readonly to: Formula };

export interface TableCell {
  readonly rows: Readonly<Record<string, RowValues>>;
  readonly columns: Readonly<Record<string, Formula>>;
}

export interface TableCellData {
  readonly rows: Readonly<Record<string, readonly Value[]>>;
  readonly columns: Readonly<Record<string, readonly Value[]>>;
}

const MOST_ROWS = 1_000;
/** Rows times cells computed again in each: keeps a varied table to seconds. */
const MOST_RECOMPUTED = 2_000;
const QUICK_RECOMPUTED = 20;
/** Heads and print attributes of a column; they do not enter the key. */
const COLUMN_KEYS = ["formula", "head", "digits", "as"];

export const TABLE: KindOf<TableCell, TableCellData> = {
  documentation: TABLE_DOCUMENTATION,
  solver: "table 1",
  knownAtPlanning: false,

  read(body: Body): TableCell {
    const rows = readRows(body);
    return { rows, columns: readColumns(body, Object.keys(rows)) };
  },

  members: ({ rows, columns }) => ({
    values: [],
    callables: [...Object.keys(rows), ...Object.keys(columns)].map((member) => ({ member, least: 1, most: 1 })),
  }),

  inspect(model, context) {
    return rowCount(rowValues(model, context)) * context.recomputedCells <= QUICK_RECOMPUTED;
  },

  compute(model, context) {
    const rows = rowValues(model, context);
    const count = rowCount(rows);
    const columns: Record<string, Value[]> = Object.fromEntries(Object.keys(model.columns).map((name) => [name, []]));
    for (let row = 0; row < count; row += 1) {
      context.progress(row, count);
      const here = Object.fromEntries(
        Object.entries(rows).map(([name, values]) => [name, values[row] ?? refusedValue("")]),
      );
      const inRow = context.varied.length === 0 ? context : context.with(variedQuantities(context.varied, here));
      for (const [name, formula] of Object.entries(model.columns)) columns[name]?.push(inRow.value(formula, here));
    }
    const many = context.varied.length === 0 ? "" : `; ${context.recomputedCells} cells computed for each row`;
    return { values: {}, data: { rows, columns }, method: `Evaluated with error bounds${many}` };
  },

  call(data, member, args) {
    const column = Object.hasOwn(data.columns, member) ? data.columns[member] : data.rows[member];
    const [index] = args;
    if (column === undefined || index === undefined || args.length !== 1) return undefined;
    const row = toDouble(index);
    return column[row - 1] ?? refusedValue(`There is no row ${row}: they are counted from 1 to ${column.length}.`);
  },

  view: viewTable,
};

function readRows(body: Body): Record<string, RowValues> {
  const node = body.node("rows");
  const entries = node === null ? null : body.mapAt(node, "a name and its values such as {n: 1 to 4}");
  const rows: Record<string, RowValues> = {};
  for (const entry of entries ?? []) {
    body.introduce(entry, `rows.${entry.key}`, true);
    const path = `rows.${entry.key}`;
    rows[entry.key] = body.intervalAt(entry.value, path) ?? { list: body.listAt(entry.value, path) };
  }
  if (entries?.length === 0)
    body.problem(body.opening, "`rows` is empty; it takes a name and its values: {n: 1 to 4}.");
  return rows;
}

function readColumns(body: Body, locals: readonly string[]): Record<string, Formula> {
  const node = body.node("columns");
  const entries = node === null ? null : body.mapAt(node, "a map of names to formulas");
  const columns: Record<string, Formula> = {};
  for (const entry of entries ?? []) {
    body.introduce(entry, `columns.${entry.key}`, false);
    columns[entry.key] = readColumn(body, entry, locals);
  }
  if (entries?.length === 0) body.problem(body.opening, "`columns` is empty; it takes names and their formulas.");
  return columns;
}

function readColumn(body: Body, entry: YamlEntry, locals: readonly string[]): Formula {
  const path = `columns.${entry.key}`;
  if (entry.value.yaml !== "map") return body.formulaAt(entry.value, path, locals);
  const details = entry.value.entries;
  body.onlyKeys(details, COLUMN_KEYS, "a column");
  for (const detail of details) {
    const text = detail.value.yaml === "scalar" ? detail.value.text : "";
    if (detail.key === "digits" && !/^([1-9]|1[0-7])$/.test(text))
      body.problem(detail.value, "`digits` is a whole number from 1 to 17.");
    const ways = ["plain", "scientific", "percent"];
    if (detail.key === "as" && !ways.includes(text))
      body.problem(detail.value, `\`as\` is ${listOfNames(ways, "or")}.`);
    if (detail.key === "head") body.scalar(detail.value, "the words of a head");
  }
  const formula = details.find((detail) => detail.key === "formula");
  if (formula !== undefined) return body.formulaAt(formula.value, path, locals);
  body.problem(
    entry.value,
    `Column \`${entry.key}\` has no \`formula\`: write {formula: K(n), head: exact}, or the formula alone.`,
  );
  return { node: "none" };
}

/** The rows' values, name by name. @throws CellFault when they are too many or of unequal lengths. */
function rowValues(model: TableCell, context: ComputeContext): Record<string, Value[]> {
  const rows: Record<string, Value[]> = {};
  for (const [name, values] of Object.entries(model.rows)) {
    const path = `rows.${name}`;
    rows[name] = "list" in values ? values.list.map((formula) => context.value(formula)) : steps(values, path, context);
  }
  const lengths = Object.entries(rows).map(([name, values]) => ({ name, length: values.length }));
  const [first] = lengths;
  const other = lengths.find(({ length }) => length !== first?.length);
  if (first !== undefined && other !== undefined) {
    throw new CellFault(
      "rows",
      `\`${first.name}\` has ${first.length} values and \`${other.name}\` has ${other.length}; lists of rows must be equally long.`,
    );
  }
  const count = rowCount(rows);
  if (count > MOST_ROWS) throw new CellFault("rows", `The table has ${count} rows; there may be at most ${MOST_ROWS}.`);
  const recomputed = count * context.recomputedCells;
  if (recomputed > MOST_RECOMPUTED) {
    throw new CellFault(
      "rows",
      `${count} rows that compute ${context.recomputedCells} cells again each are ${recomputed} computations; there may be at most ${MOST_RECOMPUTED}. Fewer rows would do.`,
    );
  }
  return rows;
}

/** from, from + 1, … up to `to`. */
function steps(values: { from: Formula; to: Formula }, path: string, context: ComputeContext): Value[] {
  const from = context.number(values.from, path, {});
  const to = context.number(values.to, path, {});
  if (to < from)
    throw new CellFault(path, `\`${path}\` goes from ${from} to ${to}; the second end must be the larger one.`);
  if (to - from >= MOST_ROWS)
    throw new CellFault(
      path,
      `From ${from} to ${to} in steps of 1 are more than ${MOST_ROWS} rows; a list [a, b, c] may leave some out.`,
    );
  return Array.from({ length: Math.floor(to - from) + 1 }, (_, index) => exactValue(from + index));
}

function rowCount(rows: Readonly<Record<string, readonly Value[]>>): number {
  return Math.max(0, ...Object.values(rows).map((values) => values.length));
}

/** Parameters' values in one row; their errors are left behind, as those of any input. */
function variedQuantities(varied: readonly string[], here: Readonly<Record<string, Value>>): Record<string, Quantity> {
  const quantities: Record<string, Quantity> = {};
  for (const name of varied) {
    const value = here[name];
    if (value?.type !== "number")
      throw new CellFault(
        `rows.${name}`,
        `A value of \`${name}\` is not a number${value?.type === "refused" ? `: ${value.reason}` : "."}`,
      );
    quantities[name] = exact(toDouble(value.quantity));
  }
  return quantities;
}

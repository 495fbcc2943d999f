import type { Formula, Value } from "../../formulas/index.ts";
import { toDouble } from "../../formulas/index.ts";
import type { YamlEntry } from "../../paper/index.ts";
import type { Body } from "../body.ts";
import type { ComputeContext } from "../context.ts";
import { CellFault } from "../context.ts";
import type { KindOf } from "../kind.ts";
import { listOfNames } from "../names.ts";
import { refusedValue } from "../values.ts";
import type { VariedValues, VaryingLimits } from "../varying.ts";
import { checkCost, contextAt, costOf, isQuick, readVarying, recomputedWords, valuesInSteps } from "../varying.ts";
import { TABLE_DOCUMENTATION } from "./documentation.ts";
import { viewTable } from "./view.ts";

export interface TableCell {
  readonly rows: Readonly<Record<string, VariedValues>>;
  readonly columns: Readonly<Record<string, Formula>>;
}

export interface TableCellData {
  readonly rows: Readonly<Record<string, readonly Value[]>>;
  readonly columns: Readonly<Record<string, readonly Value[]>>;
}

const LIMITS: VaryingLimits = { noun: "row", most: 1_000, mostRecomputed: 2_000 };
/** Heads and print attributes of a column; they do not enter the key. */
const COLUMN_KEYS = ["formula", "head", "digits", "as"];

export const TABLE: KindOf<TableCell, TableCellData> = {
  documentation: TABLE_DOCUMENTATION,
  solver: "table 1",
  knownAtPlanning: false,

  read(body: Body): TableCell {
    const rows = readVarying(body, "rows", "{n: 1 to 4}");
    return { rows, columns: readColumns(body, Object.keys(rows)) };
  },

  members: ({ rows, columns }) => ({
    values: [],
    callables: [...Object.keys(rows), ...Object.keys(columns)].map((member) => ({ member, least: 1, most: 1 })),
  }),

  inspect(model, context) {
    return isQuick(rowCount(rowValues(model, context)), context);
  },

  cost: (model, context) => costOf(rowCount(rowValues(model, context)), context, LIMITS),

  compute(model, context) {
    const rows = rowValues(model, context);
    const count = rowCount(rows);
    const columns: Record<string, Value[]> = Object.fromEntries(Object.keys(model.columns).map((name) => [name, []]));
    for (let row = 0; row < count; row += 1) {
      context.progress(row, count);
      const here = Object.fromEntries(
        Object.entries(rows).map(([name, values]) => [name, values[row] ?? refusedValue("")]),
      );
      const inRow = contextAt(here, "rows", context);
      for (const [name, formula] of Object.entries(model.columns)) columns[name]?.push(inRow.value(formula, here));
    }
    const method = `Evaluated with error bounds${recomputedWords("row", context)}`;
    return { values: {}, data: { rows, columns }, method };
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
function rowValues(model: TableCell, context: ComputeContext): Record<string, readonly Value[]> {
  const rows: Record<string, readonly Value[]> = {};
  for (const [name, values] of Object.entries(model.rows))
    rows[name] = valuesInSteps(values, `rows.${name}`, context, LIMITS);
  const lengths = Object.entries(rows).map(([name, values]) => ({ name, length: values.length }));
  const [first] = lengths;
  const other = lengths.find(({ length }) => length !== first?.length);
  if (first !== undefined && other !== undefined) {
    throw new CellFault(
      "rows",
      `\`${first.name}\` has ${first.length} values and \`${other.name}\` has ${other.length}; lists of rows must be equally long.`,
    );
  }
  checkCost(rowCount(rows), "rows", context, LIMITS);
  return rows;
}

function rowCount(rows: Readonly<Record<string, readonly Value[]>>): number {
  return Math.max(0, ...Object.values(rows).map((values) => values.length));
}

import type { Figure, PointGroup, Series, TableColumn, TableData, TableEntry } from "../figures/index.ts";
import { pointGroups, quoteOf } from "../figures/index.ts";
import type { PrintOptions, Quantity, Value } from "../formulas/index.ts";
import { approximate, decimalText, exact, printNumber, scaled } from "../formulas/index.ts";

/**
 * A value as a table prints it. Refused and missing values are gaps; why is said in the remarks.
 * @param quote the formula by which a sentence quotes it, "" where it has none
 */
export function tableEntry(value: Value, options: PrintOptions = {}, quote = ""): TableEntry {
  const entry = printedEntry(value, options);
  return quote === "" || entry.text === "" ? entry : { ...entry, quote };
}

function printedEntry(value: Value, options: PrintOptions): TableEntry {
  if (value.type === "number") {
    const printed = printNumber(value.quantity, options);
    const full = decimalText(value.quantity);
    return {
      text: printed.text,
      tex: printed.tex,
      unsupported: printed.unsupported,
      full,
      error: errorText(value.quantity),
    };
  }
  if (value.type === "text") return wordEntry(value.text);
  if (value.type === "truth") return wordEntry(value.holds === null ? "undecided" : value.holds ? "holds" : "fails");
  return wordEntry("");
}

/**
 * The table of a figure's plotted points: the variable, then one column a series, over all positions of all series. A curve
 * in the plane, each panel and an inset stand beside one another with positions of their own.
 */
export function pointsTable(variable: string, figure: Figure): TableData {
  const parts = pointGroups(figure).map((group, i) => groupTable(group, variable, i === 0 && group.prefix === ""));
  const length = parts.reduce((most, { rows }) => Math.max(most, rows.length), 0);
  return {
    columns: parts.flatMap(({ columns }) => columns),
    rows: Array.from({ length }, (_, row) => parts.flatMap(({ columns, rows }) => rows[row] ?? columns.map(() => GAP))),
    remarks: figure.remarks,
  };
}

function groupTable(
  { prefix, xName, x, columns }: PointGroup,
  variable: string,
  isMain: boolean,
): { readonly columns: readonly TableColumn[]; readonly rows: readonly TableEntry[][] } {
  const own = `${prefix}${xName}`;
  const head: TableColumn = isMain
    ? { name: variable, head: variable, tex: true }
    : { name: own, head: own, tex: false };
  const named = columns.flatMap(({ series: { name, mark } }) =>
    mark === "band" ? [`${prefix}${name} low`, `${prefix}${name} high`] : [`${prefix}${name}`],
  );
  const rows = x.map((position, row) => [
    tableEntry({ type: "number", quantity: exact(position) }),
    ...columns.flatMap(({ series, at }) => pointEntries(series, at[row] ?? null)),
  ]);
  return { columns: [head, ...named.map((name) => ({ name, head: name, tex: false }))], rows };
}

/** A point's value with its error; both ends of a band. */
function pointEntries(series: Series, i: number | null): TableEntry[] {
  const { y, log10y, low, log10low, high, log10high } = series;
  if (series.mark === "band") {
    if (i === null) return [GAP, GAP];
    return [numberEntry(low?.[i], log10low?.[i], 0), numberEntry(high?.[i], log10high?.[i], 0)];
  }
  if (i === null) return [GAP];
  const end = high?.[i];
  const value = y[i];
  const error = typeof end === "number" && typeof value === "number" ? Math.abs(end - value) : 0;
  const entry = numberEntry(value, log10y?.[i], error);
  const quote = quoteOf(series, i);
  return [quote === "" || entry.text === "" ? entry : { ...entry, quote }];
}

/** A plotted number; one below the double's range comes as its log10, whose own rounding is its error. */
function numberEntry(y: number | null | undefined, log10: number | null | undefined, error: number): TableEntry {
  if (typeof log10 === "number" && Number.isFinite(log10) && Math.abs(y ?? 0) < SMALLEST) {
    const exponent = Math.floor(log10 * LOG2_10);
    const mantissa = 2 ** (log10 * LOG2_10 - exponent);
    const quantity = scaled(mantissa, exponent, mantissa * Math.abs(log10) * LOG10_ROUNDING);
    return tableEntry({ type: "number", quantity });
  }
  if (y === null || y === undefined) return GAP;
  return tableEntry({ type: "number", quantity: error === 0 ? exact(y) : approximate(y, error) });
}

const LOG2_10 = Math.log2(10);
/** Relative error of 10^log10, for log10 = 1: log10 is rounded, and so are its products. */
const LOG10_ROUNDING = 2 ** -51 * Math.LN10 * 2;
const SMALLEST = 1e-300;

/** The larger of a quantity's error bound and standard error, to two digits; "" for exact numbers. */
function errorText({ error, se, exponent }: Quantity): string {
  const larger = Math.max(error, se);
  return larger === 0 ? "" : decimalText(scaled(larger, exponent, 0), 2);
}

/** Nothing stands here. */
const GAP: TableEntry = { text: "", tex: "", unsupported: "", full: "", error: "" };

function wordEntry(text: string): TableEntry {
  return { text, tex: text === "" ? "" : `\\text{${text}}`, unsupported: "", full: text, error: "" };
}

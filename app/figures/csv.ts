import { type PointColumn, pointGroups } from "./point-groups.ts";
import type { Figure, TableData } from "./types.ts";

/**
 * The points of a figure as CSV (RFC 4180): one row an abscissa, one column a series, `NAME low` and `NAME high` beside it
 * where the series has a band. Numbers at full precision; below the double's range as mantissa and power of ten. A curve in
 * the plane, a panel and an inset have a column of abscissas of their own.
 */
export function figureToCsv(figure: Figure): string {
  const columns = pointGroups(figure).flatMap(({ prefix, xName, x, columns: inGroup }) => [
    [`${prefix}${xName}`, ...x.map(String)],
    ...inGroup.flatMap((column) => columnTexts(column).map(([name, ...texts]) => [`${prefix}${name}`, ...texts])),
  ]);
  const length = columns.reduce((most, column) => Math.max(most, column.length), 0);
  return csvText(Array.from({ length }, (_, row) => columns.map((column) => column[row] ?? "")));
}

/** A series' columns, each led by its head: its values where it has any, and the ends of its intervals. */
function columnTexts({ series, at }: PointColumn): string[][] {
  const column = (head: string, text: (i: number) => string) => [head, ...at.map((i) => (i === null ? "" : text(i)))];
  const { name, y, low, high } = series;
  return [
    ...(series.mark === "band" ? [] : [column(name, (i) => decimalText(y[i] ?? null, series.log10y?.[i] ?? null))]),
    ...(low ? [column(`${name} low`, (i) => decimalText(low[i] ?? null, series.log10low?.[i] ?? null))] : []),
    ...(high ? [column(`${name} high`, (i) => decimalText(high[i] ?? null, series.log10high?.[i] ?? null))] : []),
  ];
}

/** A table as CSV: values at full precision, and `NAME error` beside each column that has errors. */
export function tableToCsv(table: TableData): string {
  const withError = table.columns.map((_, k) => table.rows.some((row) => (row[k]?.error ?? "") !== ""));
  const head = table.columns.flatMap((column, k) =>
    withError[k] ? [column.name, `${column.name} error`] : [column.name],
  );
  const rows = table.rows.map((row) =>
    row.flatMap((entry, k) => (withError[k] ? [entry.full, entry.error] : [entry.full])),
  );
  return csvText([head, ...rows]);
}

/**
 * A number as decimal text at full precision.
 * @param log10 its log10, used where the double has lost digits to underflow
 */
export function decimalText(value: number | null, log10: number | null): string {
  const underflowed = log10 !== null && Number.isFinite(log10) && (value === null || Math.abs(value) < 1e-300);
  if (!underflowed) return value === null || !Number.isFinite(value) ? "" : String(value);
  const exponent = Math.floor(log10);
  return `${Number((10 ** (log10 - exponent)).toPrecision(13))}e${exponent}`;
}

function csvText(rows: readonly (readonly string[])[]): string {
  return rows.map((row) => `${row.map(csvField).join(",")}\r\n`).join("");
}

/** Quoted where needed; a text that a spreadsheet would take for a formula is led by an apostrophe. */
function csvField(text: string): string {
  const guarded = /^[=+@\t\r-]/.test(text) && !Number.isFinite(Number(text)) ? `'${text}` : text;
  return /[",\r\n]/.test(guarded) ? `"${guarded.replaceAll('"', '""')}"` : guarded;
}

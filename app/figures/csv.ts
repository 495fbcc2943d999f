import type { Figure, TableData } from "./types.ts";

/**
 * The points of a figure as CSV (RFC 4180): one row an abscissa, one column a series, `NAME low` and `NAME high` beside it
 * where the series has a band. Numbers at full precision; below the double's range as mantissa and power of ten.
 */
export function figureToCsv(figure: Figure): string {
  const abscissas = [...new Set(figure.series.flatMap((series) => series.x))].sort((a, b) => a - b);
  const head = [plainHead(figure.x.label, "x")];
  const columns: ReadonlyMap<number, string>[] = [];
  const column = (name: string, x: readonly number[], text: (i: number) => string) => {
    head.push(name);
    columns.push(new Map(x.map((value, i) => [value, text(i)])));
  };
  for (const series of figure.series) {
    column(series.name, series.x, (i) => decimalText(series.y[i] ?? null, series.log10y?.[i] ?? null));
    if (series.low) column(`${series.name} low`, series.x, (i) => decimalText(series.low?.[i] ?? null, null));
    if (series.high) column(`${series.name} high`, series.x, (i) => decimalText(series.high?.[i] ?? null, null));
  }
  const rows = abscissas.map((x) => [String(x), ...columns.map((texts) => texts.get(x) ?? "")]);
  return csvText([head, ...rows]);
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

const plainHead = (label: string, otherwise: string) => label.replace(/^\\/, "").replace(/[{}$]/g, "") || otherwise;

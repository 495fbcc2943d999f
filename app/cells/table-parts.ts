import type { Figure, Series, TableColumn, TableData, TableEntry } from "../figures/index.ts";
import type { PrintOptions, Quantity, Value } from "../formulas/index.ts";
import { approximate, decimalText, exact, printNumber, scaled } from "../formulas/index.ts";

/** A value as a table prints it. Refused and missing values are gaps; why is said in the remarks. */
export function tableEntry(value: Value, options: PrintOptions = {}): TableEntry {
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

/** The table of a figure's plotted points: the variable, then one column a series, over all positions of all series. */
export function pointsTable(variable: string, figure: Figure): TableData {
  const positions = [...new Set(figure.series.flatMap((series) => series.x))].sort((a, b) => a - b);
  const columns: TableColumn[] = [
    { name: variable, head: variable, tex: true },
    ...figure.series.map((series) => ({ name: series.name, head: series.name, tex: false })),
  ];
  const indices = figure.series.map((series) => new Map(series.x.map((x, index) => [x, index])));
  const rows = positions.map((x) => [
    tableEntry({ type: "number", quantity: exact(x) }),
    ...figure.series.map((series, column) => pointEntry(series, indices[column]?.get(x))),
  ]);
  return { columns, rows, remarks: figure.remarks };
}

function pointEntry(series: Series, index: number | undefined): TableEntry {
  const y = index === undefined ? null : series.y[index];
  if (index === undefined || y === null || y === undefined) return wordEntry("");
  const high = series.high?.[index];
  const error = high === null || high === undefined ? 0 : Math.abs(high - y);
  return tableEntry({ type: "number", quantity: error === 0 ? exact(y) : approximate(y, error) });
}

/** The larger of a quantity's error bound and standard error, to two digits; "" for exact numbers. */
function errorText({ error, se, exponent }: Quantity): string {
  const larger = Math.max(error, se);
  return larger === 0 ? "" : decimalText(scaled(larger, exponent, 0), 2);
}

function wordEntry(text: string): TableEntry {
  return { text, tex: text === "" ? "" : `\\text{${text}}`, unsupported: "", full: text, error: "" };
}

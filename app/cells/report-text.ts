import type { Report, ReportedCell, ReportedNumber, ReportedValue } from "./report.ts";

/** The report as a table for a terminal, ended by a line that counts. */
export function reportAsText(report: Report): string {
  const cells = Object.entries(report.cells).flatMap(([name, cell]) => cellRows(name, cell));
  const numbers = report.numbers.map(numberRow);
  const problems = report.problems.map(({ line, message }) => [`line ${line}`, message]);
  const parts = [
    section("Cells", ["line", "cell", "kind", "value", "", "error"], cells),
    section("Numbers in the prose", ["line", "formula", "printed", "value", "error"], numbers),
    section("Problems", ["", ""], problems),
  ];
  return `${parts.filter((part) => part !== "").join("\n\n")}\n\n${summary(report)}\n`;
}

function cellRows(name: string, cell: ReportedCell): string[][] {
  const head = [String(cell.line), name, cell.kind];
  if (cell.status === "failed") return [[...head, "failed", "", ""]];
  if (cell.status === "waiting") return [[...head, `waiting for ${cell.needs.join(", ")}`, "", ""]];
  const values = Object.entries(cell.values);
  const time = `${(cell.seconds * 1000).toPrecision(3)} ms`;
  const rows = values.map(([key, value]) => ["", "", "", key, ...valueColumns(value)]);
  return [[...head, "computed", time, ""], ...rows];
}

function numberRow(number: ReportedNumber): string[] {
  return [String(number.line), number.formula, number.text ?? "", ...valueColumns(number)];
}

function valueColumns(value: ReportedValue): string[] {
  if ("value" in value) {
    const shown = value.log10 === undefined ? String(value.value) : `10^${value.log10}`;
    const isBounded = value.error > 0 && value.log10 === undefined;
    return [shown, isBounded ? value.error.toExponential(1) : ""];
  }
  if ("refused" in value) return [`refused: ${value.refused}`, ""];
  if ("truth" in value) return [value.truth === null ? "undecided" : value.truth ? "holds" : "fails", ""];
  return "none" in value ? ["", ""] : [value.text ?? "", ""];
}

function summary({ cells, numbers, problems }: Report): string {
  const all = Object.values(cells);
  const computed = all.filter(({ status }) => status === "computed").length;
  const trouble = problems.length === 0 ? "no problems" : counted(problems.length, "problem");
  return `${computed} of ${counted(all.length, "cell")} computed, ${counted(numbers.length, "number")} in the prose, ${trouble}.`;
}

function counted(n: number, noun: string): string {
  return `${n} ${noun}${n === 1 ? "" : "s"}`;
}

/** Columns are as wide as what they hold; the last is not padded. */
function section(title: string, heads: readonly string[], rows: readonly (readonly string[])[]): string {
  if (rows.length === 0) return "";
  const lines = heads.some((head) => head !== "") ? [heads, ...rows] : rows;
  const widths = heads.map((_, i) => Math.min(40, Math.max(...lines.map((row) => (row[i] ?? "").length))));
  const text = lines.map((row) =>
    row
      .map((entry, i) => entry.padEnd(widths[i] ?? 0))
      .join("  ")
      .trimEnd(),
  );
  return [title, ...text.map((line) => `  ${line}`)].join("\n");
}

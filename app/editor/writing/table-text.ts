/** A table as rows of cells; the first row is its head. All rows are equally long. */
export type Grid = readonly (readonly string[])[];

/** The table that a text of tabs and lines is, as spreadsheets give it; null where it surely is none. */
export function gridOfTabs(text: string): Grid | null {
  const lines = text.replace(/\r\n?/g, "\n").replace(/\n+$/, "").split("\n");
  // A cell in quotes may hold lines and tabs of its own: such are left as they are.
  if (lines.some((line) => /(?:^|\t)"[^"\t]*$/.test(line))) return null;
  return wholeGrid(lines.map((line) => line.split("\t")));
}

/** The one table that a piece of a page consists of; null where there is more, or where its cells span others. */
export function gridOfPage(html: string): Grid | null {
  const { body } = new DOMParser().parseFromString(html, "text/html");
  for (const unseen of body.querySelectorAll("style, script, colgroup")) unseen.remove();
  const tables = body.querySelectorAll("table");
  const [table] = tables;
  if (table === undefined || tables.length > 1 || inLine(body.textContent) !== inLine(table.textContent)) return null;
  if (table.querySelector("[colspan]:not([colspan='1']), [rowspan]:not([rowspan='1']), caption, img") !== null)
    return null;
  return wholeGrid([...table.rows].map((row) => [...row.cells].map((cell) => cell.textContent)));
}

/** Two rows and two columns at least, each row as long as the others. */
function wholeGrid(rows: readonly (readonly string[])[]): Grid | null {
  const columns = rows[0]?.length ?? 0;
  if (rows.length < 2 || columns < 2 || rows.some((row) => row.length !== columns)) return null;
  return rows.map((row) => row.map(inLine));
}

function inLine(words: string): string {
  return words.replace(/\s+/g, " ").trim();
}

/** A table of a paper: what would mean something there is written so that it does not; columns of numbers are set right. */
export function tableText(grid: Grid): string {
  const [head = [], ...rows] = grid;
  const line = (cells: readonly string[]) => `| ${cells.join(" | ")} |`;
  const rule = head.map((_, column) => (rows.every((row) => isNumber(row[column] ?? "")) ? "---:" : "---"));
  return [line(head.map(escaped)), line(rule), ...rows.map((row) => line(row.map(escaped)))].join("\n");
}

function isNumber(cell: string): boolean {
  return /^[+\-−]?\d[\d.,\s]*(?:[eE][+-]?\d+)?\s*%?$/.test(cell);
}

function escaped(cell: string): string {
  return cell.replace(/[\\|$*_`<[]/g, "\\$&").replace(/:(?=[a-z]+\\\[)/g, "\\:");
}

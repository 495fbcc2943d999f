/** Lines of a table that only draw rules, and what may stand at the start of a row besides. */
const RULES = /\\(?:hline|toprule|midrule|bottomrule|c(?:mid)?line\s*(?:\([^)]*\))?\s*\{[^}]*\})/g;

/**
 * The rows and cells of a `tabular`, as sources; null where it is not surely a table of a paper: cells that span others,
 * rows of different lengths, or a norm's double bar, which a table would read as the end of a cell.
 */
export function cellsOf(body: string): readonly (readonly string[])[] | null {
  if (/\\multi(?:column|row)|\\begin\b|\\\|/.test(body)) return null;
  const rows = body
    .replace(RULES, "")
    .split(/\\\\(?:\s*\[[^\]]*\])?/)
    .map((row) => row.trim())
    .filter((row) => row !== "")
    .map((row) => row.split(/(?<!\\)&/).map((cell) => cell.trim()));
  const columns = rows[0]?.length ?? 0;
  return columns < 1 || rows.length < 2 || rows.some((row) => row.length !== columns) ? null : rows;
}

/** How columns are set: `l|rc` as `---`, `---:`, `:---:`; null where a column is neither. */
export function alignmentOf(columns: string): readonly string[] | null {
  const letters = columns.replace(/[|\s]|@\{[^}]*\}/g, "");
  if (!/^[lrc]+$/.test(letters)) return null;
  return [...letters].map((letter) => ({ l: "---", r: "---:", c: ":---:" })[letter] ?? "---");
}

/** A table of a paper. Bars within cells are written so that they end none: in words escaped, in formulas by name. */
export function gridText(rows: readonly (readonly string[])[], alignment: readonly string[]): string {
  const line = (cells: readonly string[]) => `| ${cells.map(cellText).join(" | ")} |`;
  const [head = [], ...others] = rows;
  return [line(head), `| ${alignment.join(" | ")} |`, ...others.map(line)].join("\n");
}

function cellText(cell: string): string {
  return cell
    .replace(/\s*\n\s*/g, " ")
    .replace(/\$[^$]*\$/g, (formula) => formula.replace(/\|/g, "\\vert "))
    .replace(/(?<!\\)\|/g, "\\|");
}

import { figureToPgfplots, type TableData, type TableEntry } from "../figures/index.ts";
import type { CellNode, PrintedPart } from "../paper/index.ts";
import { cellTitle, provenanceLine, type SetCell } from "../print/index.ts";
import { wordsTex, writeInline } from "./inline.ts";
import type { Printing } from "./printing.ts";
import type { LatexWriter } from "./writer.ts";

const FIGURE_WIDTH_MM = 120;
/** A longer table is broken over pages. */
const MOST_ROWS_ON_A_PAGE = 36;

/** What a cell prints: figures with their points in files of their own, tables with their captions. */
export function writeCell(node: CellNode, printing: Printing, out: LatexWriter): void {
  const line = node.cell.span.line;
  const set = printing.paper.cell(node.cell);
  node.parts.forEach((part, i) => {
    if (!set.view) {
      printing.problem(line, `${part.noun} ${part.number} has no result: ${set.reason}`);
      return;
    }
    out.from(line);
    out.paragraph();
    if (part.part === "figure") writeFigure(node, part, set, i === 0, printing, out);
    else writeTable(node, part, set, i === 0, printing, out);
    out.paragraph();
  });
  if (set.finding?.isGrave === true) writeFinding(set, set.finding.words, line, printing, out);
}

/** A check that fails, say: marked where it stands. */
function writeFinding(set: SetCell, words: string, line: number, printing: Printing, out: LatexWriter): void {
  out.from(line);
  out.paragraph();
  out.write(`\\noindent$\\ddagger$~\\emph{${printing.text(`${cellTitle(set)}: ${words}`, line)}}`);
  out.paragraph();
}

function writeFigure(
  node: CellNode,
  part: PrintedPart,
  set: SetCell,
  first: boolean,
  printing: Printing,
  out: LatexWriter,
): void {
  const figure = set.view?.figure;
  const line = node.cell.span.line;
  if (!figure) {
    printing.problem(line, `${part.noun} ${part.number} has no figure.`);
    return;
  }
  const dataFile = `figure-${part.number}.dat`;
  const { tex, data } = figureToPgfplots(figure, {
    dataFile,
    widthMm: FIGURE_WIDTH_MM,
    setMath: (label) => printing.math(label, line),
    setText: (label) => printing.text(label, line),
  });
  printing.files.push({ name: dataFile, text: data });
  out.line("\\begin{figure}[htbp]\\centering");
  out.line(tex);
  writeCaption(node, part, set, first, printing, out);
  out.line("\\end{figure}");
}

/** Caption, what the figure cannot show, and where a result stands that is out of date. */
function writeCaption(
  node: CellNode,
  part: PrintedPart,
  set: SetCell,
  first: boolean,
  printing: Printing,
  out: LatexWriter,
): void {
  const line = node.cell.span.line;
  out.startLine();
  out.write("\\caption{");
  printing.moving = true;
  if (set.note && node.caption.length > 0 && first) out.write(`\\textsuperscript{${set.note.mark}}~`);
  if (first) writeInline(node.caption, printing, out, line);
  const remarks = part.part === "figure" ? (set.view?.figure?.remarks ?? []) : (tableOf(part, set)?.remarks ?? []);
  for (const remark of remarks) out.write(` ${wordsTex(remark, printing, line)}`);
  if (set.note) out.write(` \\textsuperscript{${set.note.mark}}~${wordsTex(set.note.words, printing, line)}`);
  const made = printing.provenance && first ? provenanceLine(set) : "";
  if (made !== "") out.write(` {\\footnotesize ${printing.text(made, line)}}`);
  printing.moving = false;
  out.from(line);
  out.write("}");
  if (node.cell.name !== null && ownsLabel(node, part))
    out.write(`\\label{${printing.names.part(node.cell.name, part.noun)}}`);
  out.startLine();
}

/** A reference to a cell means its first part. */
const ownsLabel = (node: CellNode, part: PrintedPart) => node.parts.find((other) => other.noun === part.noun) === part;

function tableOf(part: PrintedPart, set: SetCell): TableData | null {
  return part.part === "points" ? (set.view?.points ?? null) : (set.view?.table ?? null);
}

function writeTable(
  node: CellNode,
  part: PrintedPart,
  set: SetCell,
  first: boolean,
  printing: Printing,
  out: LatexWriter,
): void {
  const table = tableOf(part, set);
  const line = node.cell.span.line;
  if (!table) {
    printing.problem(line, `${part.noun} ${part.number} has no table.`);
    return;
  }
  const columns = "r".repeat(table.columns.length);
  const head = table.columns
    .map((column) => (column.tex ? `$${printing.math(column.head, line)}$` : printing.text(column.head, line)))
    .join(" & ");
  const rows = table.rows.map((row) => `${row.map((entry) => entryTex(entry, printing, line)).join(" & ")} \\\\`);
  if (rows.length <= MOST_ROWS_ON_A_PAGE) {
    out.line("\\begin{table}[htbp]\\centering");
    writeCaption(node, part, set, first, printing, out);
    out.line(
      `\\begin{tabular}{${columns}}\\toprule\n${head} \\\\\\midrule\n${rows.join("\n")}\n\\bottomrule\\end{tabular}`,
    );
    out.line("\\end{table}");
    return;
  }
  out.line(`\\begin{longtable}{${columns}}`);
  writeCaption(node, part, set, first, printing, out);
  out.line(
    `\\\\\\toprule\n${head} \\\\\\midrule\\endfirsthead\n\\toprule\n${head} \\\\\\midrule\\endhead\n\\bottomrule\\endfoot\n${rows.join("\n")}\n\\end{longtable}`,
  );
}

/** Numbers come as TeX of our own making; words are set as words. */
function entryTex(entry: TableEntry, printing: Printing, line: number): string {
  if (entry.text === "") return "";
  const words = entry.tex === `\\text{${entry.text}}` || (entry.tex === entry.text && /\p{L}/u.test(entry.text));
  return words ? printing.text(entry.text, line) : `$${printing.math(entry.tex, line)}$`;
}

import type { Heading, List, RootContent, Table } from "mdast";
import type { EnvironmentNode } from "../paper/index.ts";
import { mathTex as readMathTex } from "../paper/index.ts";
import type { Note } from "../print/index.ts";
import { writeCell } from "./cells.ts";
import { noteText, numberInMath, writeInline } from "./inline.ts";
import type { Printing } from "./printing.ts";
import type { LatexWriter } from "./writer.ts";

const SECTIONS = ["section", "subsection", "subsubsection", "paragraph"] as const;

/** Blocks of the paper as LaTeX, one after the other. */
export function writeBlocks(nodes: readonly RootContent[], printing: Printing, out: LatexWriter): void {
  for (const node of nodes) writeBlock(node, printing, out);
}

function writeBlock(node: RootContent, printing: Printing, out: LatexWriter): void {
  const line = node.position?.start.line ?? 0;
  out.from(line);
  switch (node.type) {
    case "paragraph":
      if (node.data?.continues) out.startLine();
      else out.paragraph();
      writeInline(node.children, printing, out, line);
      out.startLine();
      break;
    case "heading":
      writeHeading(node, printing, out, line);
      break;
    case "math":
      writeDisplay(node, printing, out, line);
      break;
    case "environment":
      writeEnvironment(node, printing, out, line);
      break;
    case "cell":
      writeCell(node, printing, out);
      break;
    case "list":
      writeList(node, printing, out, line);
      break;
    case "blockquote":
      surrounded("quote", "", node.children, printing, out);
      break;
    case "code":
      writeCode(node.value, printing, out, line);
      break;
    case "html":
      out.paragraph();
      out.line(printing.text(node.value, line));
      break;
    case "table":
      writeTable(node, printing, out, line);
      break;
    case "thematicBreak":
      out.paragraph();
      out.line("\\begin{center}\\rule{0.3\\linewidth}{0.4pt}\\end{center}");
      break;
    default:
      // Definitions and the front matter print nothing where they stand; footnotes are printed at their first mark.
      return;
  }
}

function surrounded(
  name: string,
  option: string,
  children: readonly RootContent[],
  printing: Printing,
  out: LatexWriter,
): void {
  out.paragraph();
  out.line(`\\begin{${name}}${option}`);
  writeBlocks(children, printing, out);
  out.line(`\\end{${name}}`);
  out.paragraph();
}

function writeHeading(node: Heading, printing: Printing, out: LatexWriter, line: number): void {
  const number = node.data?.number ?? null;
  const level = number === null ? Math.min(node.depth - 1, 3) : number.split(".").length - 1;
  const command = SECTIONS[Math.max(0, Math.min(level, 3))] ?? "section";
  out.paragraph();
  out.write(`\\${command}${number === null ? "*" : ""}{`);
  printing.moving = true;
  writeInline(node.children, printing, out, line);
  printing.moving = false;
  out.write("}");
  if (node.data?.label) out.write(`\\label{${printing.names.label(node.data.label)}}`);
  out.startLine();
}

type DisplayMath = Extract<RootContent, { type: "math" }>;

/** @param ending `\qedhere` in the last display of a proof: its box stands there and not on a line of its own */
function writeDisplay(node: DisplayMath, printing: Printing, out: LatexWriter, line: number, ending = ""): void {
  const notes: Note[] = [];
  const tex = printing.math(
    readMathTex(node, (number) => numberInMath(number, printing, notes)),
    line,
  );
  const label = node.data?.number !== undefined ? node.data.label : undefined;
  out.line(label === undefined ? "\\[" : `\\begin{equation}\\label{${printing.names.label(label)}}`);
  tex.split("\n").forEach((part, i) => {
    out.from(line + i + 1);
    out.line(part);
  });
  // Beside an equation's number there is no room for the box.
  if (ending !== "" && label === undefined) out.line(ending);
  out.line(label === undefined ? "\\]" : "\\end{equation}");
  for (const note of notes) out.write(noteText(note, printing, line));
}

function writeEnvironment(node: EnvironmentNode, printing: Printing, out: LatexWriter, line: number): void {
  out.paragraph();
  out.write(`\\begin{${node.environment}}`);
  if (node.title.length > 0) {
    out.write("[{");
    printing.moving = true;
    // A proof's title is "of Theorem 2.1": amsthm sets it in place of "Proof".
    if (node.environment === "proof") out.write("Proof ");
    writeInline(node.title, printing, out, line);
    printing.moving = false;
    out.write("}]");
  }
  if (node.label !== null) out.write(`\\label{${printing.names.label(node.label)}}`);
  out.startLine();
  writeEnvironmentBody(node, printing, out);
  out.line(`\\end{${node.environment}}`);
  out.paragraph();
}

function writeEnvironmentBody(node: EnvironmentNode, printing: Printing, out: LatexWriter): void {
  const [first] = node.children;
  const last = node.children.at(-1);
  const opening = first?.type === "paragraph" ? first : null;
  const closing = node.environment === "proof" && last?.type === "math" ? last : null;
  if (opening) {
    const line = opening.position?.start.line ?? 0;
    out.from(line);
    writeInline(opening.children, printing, out, line);
    out.startLine();
  } else if (first) out.line("\\leavevmode");
  writeBlocks(node.children.slice(opening ? 1 : 0, closing ? -1 : undefined), printing, out);
  if (closing) writeDisplay(closing, printing, out, closing.position?.start.line ?? 0, "\\qedhere");
}

function writeList(node: List, printing: Printing, out: LatexWriter, line: number): void {
  const name = node.ordered ? "enumerate" : "itemize";
  out.paragraph();
  out.line(`\\begin{${name}}`);
  if (node.ordered && (node.start ?? 1) !== 1) out.line(`\\setcounter{enumi}{${(node.start ?? 1) - 1}}`);
  for (const item of node.children) {
    out.from(item.position?.start.line ?? line);
    out.startLine();
    out.write(
      item.checked === null || item.checked === undefined
        ? "\\item "
        : `\\item[$${item.checked ? "\\checkmark" : "\\square"}$] `,
    );
    const [first, ...rest] = item.children;
    if (first?.type === "paragraph") writeInline(first.children, printing, out, line);
    else if (first) writeBlocks([first], printing, out);
    out.startLine();
    writeBlocks(rest, printing, out);
  }
  out.line(`\\end{${name}}`);
}

function writeCode(code: string, printing: Printing, out: LatexWriter, line: number): void {
  out.paragraph();
  out.line("\\begin{flushleft}\\small");
  code.split("\n").forEach((row, i) => {
    out.from(line + 1 + i);
    const indented = printing.code(row.replaceAll("\t", "    "), line + 1 + i).replace(/ /g, "~");
    out.line(`${row === "" ? "~" : indented}\\\\`);
  });
  out.line("\\end{flushleft}");
}

const COLUMNS = { left: "l", right: "r", center: "c" } as const;

function writeTable(node: Table, printing: Printing, out: LatexWriter, line: number): void {
  const columns = (node.align ?? []).map((align) => COLUMNS[align ?? "left"]).join("");
  out.paragraph();
  out.line(`\\begin{center}\\small\\begin{tabular}{${columns}}\\toprule`);
  node.children.forEach((row, i) => {
    out.startLine();
    row.children.forEach((entry, k) => {
      if (k > 0) out.write(" & ");
      printing.moving = true;
      writeInline(entry.children, printing, out, row.position?.start.line ?? line);
      printing.moving = false;
    });
    out.write(i === 0 ? " \\\\\\midrule\n" : " \\\\\n");
  });
  out.line("\\bottomrule\\end{tabular}\\end{center}");
}

import type { PhrasingContent } from "mdast";
import type { PrintedNumber } from "../formulas/index.ts";
import type { BoundNumber, BoundNumberNode, CitationNode, ReferenceNode } from "../paper/index.ts";
import { citationText, readInline, mathTex as readMathTex, referenceText } from "../paper/index.ts";
import type { Note } from "../print/index.ts";
import type { Printing } from "./printing.ts";
import { addressTex } from "./text.ts";
import type { LatexWriter } from "./writer.ts";

/** Running text as LaTeX. */
export function writeInline(
  nodes: readonly PhrasingContent[],
  printing: Printing,
  out: LatexWriter,
  line: number,
): void {
  for (const node of nodes) writeNode(node, printing, out, node.position?.start.line ?? line);
}

function writeNode(node: PhrasingContent, printing: Printing, out: LatexWriter, line: number): void {
  out.from(line);
  const wrapped = (command: string, children: readonly PhrasingContent[]) => {
    out.write(`\\${command}{`);
    writeInline(children, printing, out, line);
    out.write("}");
  };
  switch (node.type) {
    case "text":
      writeText(node.value, printing, out, line);
      break;
    case "html":
      out.write(printing.text(node.value, line));
      break;
    case "emphasis":
      wrapped("emph", node.children);
      break;
    case "strong":
      wrapped("textbf", node.children);
      break;
    case "inlineCode":
      out.write(printing.code(node.value, line));
      break;
    case "break":
      out.write("\\newline\n");
      break;
    case "link":
      wrapped(`href{${addressTex(node.url)}}`, node.children);
      break;
    case "inlineMath":
      writeInlineMath(node, printing, out, line);
      break;
    case "image":
    case "imageReference":
      printing.problem(line, `The picture “${node.alt ?? ""}” is not among what this paper can print.`);
      break;
    case "linkReference":
    case "delete":
      // The language has neither; what a reader of Markdown may still find in them is their words.
      writeInline(node.children, printing, out, line);
      break;
    case "footnoteReference":
      writeFootnote(node.identifier, printing, out, line);
      break;
    case "reference":
      out.write(referenceTex(node, printing, line));
      break;
    case "citation":
      out.write(citationTex(node, printing, line));
      break;
    case "boundNumber":
      out.write(numberTex(node, printing, line));
      break;
  }
}

/** A line of the paper is a line of the source, so that a mistake can be found again. */
function writeText(text: string, printing: Printing, out: LatexWriter, line: number): void {
  text.split("\n").forEach((part, i) => {
    if (i > 0) out.write("\n");
    out.from(line + i);
    // A line of one's own that begins with a space is no different from one that does not.
    out.write(printing.text(part, line + i));
  });
}

type MathNode = Extract<PhrasingContent, { type: "inlineMath" }>;

function writeInlineMath(node: MathNode, printing: Printing, out: LatexWriter, line: number): void {
  const notes: Note[] = [];
  const tex = readMathTex(node, (number) => numberInMath(number, printing, notes));
  const set = printing.math(tex, line);
  if (set !== "") out.write(`$${set}$`);
  for (const note of notes) out.write(noteText(note, printing, line));
}

/** A number within a formula, raised dagger and all; its note follows the formula. */
export function numberInMath(number: BoundNumber, printing: Printing, notes: Note[]): string {
  const set = printing.paper.number(number);
  if (!set.printed) {
    printing.problem(number.span.line, `\`${number.formula.trim()}\` has no value: ${set.reason}`);
    return "?";
  }
  if (!set.note) return set.printed.tex;
  notes.push(set.note);
  return `{${set.printed.tex}}^{\\text{${set.note.mark}}}`;
}

function numberTex(node: BoundNumberNode, printing: Printing, line: number): string {
  const set = printing.paper.number(node.number);
  if (!set.printed) {
    printing.problem(line, `\`${node.number.formula.trim()}\` has no value: ${set.reason}`);
    return "?";
  }
  const tex = printedTex(set.printed, printing, line);
  if (!set.note) return tex;
  return `${tex}\\textsuperscript{${set.note.mark}}${noteText(set.note, printing, line)}`;
}

/** siunitx sets the number; a unit or per cent sign after it is TeX of a formula; words such as "away" are set as words. */
function printedTex({ siunitx, text }: PrintedNumber, printing: Printing, line: number): string {
  const parts = /^(\\num\{[^{}\\]*\})([\s\S]*)$/.exec(siunitx);
  if (!parts) return printing.text(text, line);
  const [, number = "", after = ""] = parts;
  return after === "" ? number : `${number}$${printing.math(after, line)}$`;
}

/** The note itself, once in the paper; where it cannot stand, the dagger alone, and the note at its next use. */
export function noteText(note: Note, printing: Printing, line: number): string {
  if (printing.moving || printing.usedNotes.has(note.mark)) return "";
  printing.usedNotes.add(note.mark);
  return `\\outofdate{${note.mark}}{${wordsTex(note.words, printing, line)}}`;
}

/** Words of ours, with math between dollars, as LaTeX. */
export function wordsTex(words: string, printing: Printing, line: number): string {
  return readInline(words, 0)
    .map((node) => {
      if (node.type === "inlineMath") return `$${printing.math(node.value, line)}$`;
      if (node.type === "inlineCode") return printing.code(node.value, line);
      return "value" in node ? printing.text(node.value, line) : "";
    })
    .join("");
}

function referenceTex(node: ReferenceNode, printing: Printing, line: number): string {
  const { target } = node;
  if (!target) {
    printing.problem(line, `\`${node.label}\` names nothing in this paper that is printed.`);
    return "?";
  }
  const name = printing.names.target(target);
  if (target.noun === "equation") return `equation~\\eqref{${name}}`;
  return `${printing.text(referenceText(target).replace(/ \S+$/, ""), line)}~\\ref{${name}}`;
}

function citationTex(node: CitationNode, printing: Printing, line: number): string {
  if (node.entries.length < node.keys.length || node.entries.length === 0) {
    const missing = node.keys.filter((key) => !node.entries.some((entry) => entry.key === key));
    printing.problem(line, `The bibliography has no ${missing.map((key) => `\`${key}\``).join(", ")}.`);
    return "?";
  }
  if (node.as === "text") return printing.text(citationText(node.entries, { as: "text", at: node.at }), line);
  const keys = node.entries.map((entry) => printing.names.citation(entry.key)).join(",");
  return node.at === null ? `\\cite{${keys}}` : `\\cite[{${printing.text(node.at, line)}}]{${keys}}`;
}

function writeFootnote(identifier: string, printing: Printing, out: LatexWriter, line: number): void {
  const definition = printing.footnotes.get(identifier);
  if (!definition) return;
  const label = printing.names.label(`footnote-${identifier}`);
  if (printing.usedFootnotes.has(identifier)) {
    out.write(`\\textsuperscript{\\ref{${label}}}`);
    return;
  }
  printing.usedFootnotes.add(identifier);
  out.write(printing.moving ? " (" : `\\footnote{\\label{${label}}`);
  definition.children.forEach((child, i) => {
    if (i > 0) out.write(" \\par ");
    if (child.type === "paragraph") writeInline(child.children, printing, out, child.position?.start.line ?? line);
    else printing.problem(child.position?.start.line ?? line, "A footnote can hold paragraphs only.");
  });
  out.write(printing.moving ? ")" : "}");
  out.from(line);
}

import type { CellResult, Plan, ShownPaper } from "../cells/index.ts";
import { type Author, type FrontMatter, type Paper, plainText, readInline, UNTITLED } from "../paper/index.ts";
import { setPaper } from "../print/index.ts";
import { bibliographyTex } from "./bibliography.ts";
import { writeBlocks } from "./blocks.ts";
import { writeInline } from "./inline.ts";
import { paperMacros } from "./macros.ts";
import { preamble } from "./preamble.ts";
import { type LatexFile, Printing } from "./printing.ts";
import { textTex } from "./text.ts";
import { LatexWriter, type PrintProblem } from "./writer.ts";

/** A paper as LaTeX source. */
export interface LatexPaper {
  /** main.tex first, then the points of the figures and the bibliography. */
  readonly files: readonly LatexFile[];
  /** Line of the paper for a line of main.tex (both from 1), or null. */
  lineMap(texLine: number): number | null;
  /** What keeps the paper from print: numbers without a value, TeX that may not be used, characters no font has. In order of lines. */
  readonly problems: readonly PrintProblem[];
}

export interface LatexOptions {
  /** The paper's BibTeX, given along as it is. */
  readonly bibliography?: string;
  /** Under each figure and table: how its result was computed, when and for whom. */
  readonly provenance?: boolean;
  /** Numbers every fifth line. */
  readonly lineNumbers?: boolean;
  /** Leaves out the authors, for referees. */
  readonly anonymous?: boolean;
}

/**
 * The LaTeX source of a paper with its results. Numbers are printed to the digits that their errors support; what is out of
 * date bears a dagger and a footnote. Everything in the source is generated from the paper's tree: the paper's own TeX
 * stands only within formulas, and only what the list of commands allows. Pure.
 */
export function paperToLatex(
  paper: Paper,
  plan: Plan,
  results: ReadonlyMap<string, CellResult>,
  shown: ShownPaper,
  options: LatexOptions = {},
): LatexPaper {
  const macros = paperMacros(paper.front.macros);
  const printing = new Printing(setPaper(paper, plan, results, shown), macros.known, options.provenance ?? false);
  for (const problem of macros.problems) printing.problem(paper.front.span?.line ?? 1, problem);
  const body = new LatexWriter();
  body.line("\\begin{document}");
  body.line(`\\hypersetup{pdftitle={${documentText(paper.front.title)}}}`);
  if (options.lineNumbers) body.line("\\linenumbers");
  writeFront(options.anonymous ? withoutNames(paper.front) : paper.front, printing, body);
  writeBlocks(paper.root.children, printing, body);
  const bibliography = bibliographyTex(paper.bibliography, printing);
  body.from(0);
  body.paragraph();
  if (bibliography !== "") {
    body.line(
      "% The list as BibTeX is in bibliography.bib; to let BibTeX set it, put here:\n% \\bibliographystyle{amsplain}\\bibliography{bibliography}",
    );
    body.line("\\input{bibliography.bbl}");
  }
  body.line("\\end{document}");

  const text = body.text();
  const all = text + bibliography;
  const head = preamble({
    lineNumbers: options.lineNumbers ?? false,
    greek: /[\u0370-\u03ff\u1f00-\u1fff]/.test(all),
    cyrillic: all.includes("\\cyr{"),
    macros: macros.definitions,
  });
  const files: LatexFile[] = [{ name: "main.tex", text: `${head.join("\n")}\n${text}` }, ...printing.files];
  if (bibliography !== "") files.push({ name: "bibliography.bbl", text: bibliography });
  if (options.bibliography?.trim()) files.push({ name: "bibliography.bib", text: options.bibliography });
  const macroLines = macros.definitions.length;
  return {
    files,
    lineMap: (texLine) => {
      if (texLine > head.length) return body.originOf(texLine - head.length);
      return texLine > head.length - macroLines ? (paper.front.span?.line ?? null) : null;
    },
    problems: [...printing.problems].sort((a, b) => a.line - b.line),
  };
}

/** The title as the PDF itself bears it: words alone, in the letters that every reader of PDF has. */
function documentText(title: string): string {
  const words = plainText(readInline(title, 0)).replace(/[^\p{Script=Latin}\p{N} .,:;?!'()-]+/gu, " ");
  return textTex(words.replace(/\s+/g, " ").trim()).tex;
}

const withoutNames = (front: FrontMatter): FrontMatter => ({ ...front, authors: [] });

function writeFront(front: FrontMatter, printing: Printing, out: LatexWriter): void {
  const line = front.span?.line ?? 1;
  out.from(line);
  const inline = (command: string, text: string) => {
    out.write(`\\${command}{`);
    printing.moving = true;
    writeInline(readInline(text, 0, printing.paper.paper), printing, out, line);
    printing.moving = false;
    out.from(line);
    out.write("}");
    out.startLine();
  };
  inline("title", front.title.trim() === "" ? UNTITLED : front.title);
  for (const author of front.authors) writeAuthor(author, printing, out, line);
  if (front.keywords.length > 0) inline("keywords", front.keywords.join(", "));
  if (front.msc.length > 0) out.line(`\\subjclass[2020]{${printing.text(front.msc.join(", "), line)}}`);
  if (front.abstract.trim() !== "") {
    out.line("\\begin{abstract}");
    writeInline(readInline(front.abstract, 0, printing.paper.paper), printing, out, line);
    out.line("\\end{abstract}");
  }
  out.line("\\maketitle");
  out.paragraph();
}

function writeAuthor(author: Author, printing: Printing, out: LatexWriter, line: number): void {
  out.line(`\\author{${printing.text(author.name, line)}}`);
  if (author.affiliation) out.line(`\\address{${printing.text(author.affiliation, line)}}`);
  if (author.email) out.line(`\\email{${printing.text(author.email, line)}}`);
  if (author.orcid) out.line(`\\thanks{${printing.text(`${author.name}: ORCID ${author.orcid}`, line)}}`);
}

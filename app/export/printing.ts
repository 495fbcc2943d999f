import type { FootnoteDefinition, Root } from "mdast";
import type { SetPaper } from "../print/index.ts";
import { LatexNames } from "./labels.ts";
import { type KnownMacros, mathTex } from "./math.ts";
import { codeTex, type TextTex, textTex } from "./text.ts";
import type { PrintProblem } from "./writer.ts";

/** A file beside main.tex. */
export interface LatexFile {
  readonly name: string;
  readonly text: string;
}

/** What the parts of one export share: the paper as set, names, macros, notes already printed, problems found. */
export class Printing {
  readonly paper: SetPaper;
  readonly macros: KnownMacros;
  /** Whether how a result was computed is said under it. */
  readonly provenance: boolean;
  readonly names = new LatexNames();
  readonly problems: PrintProblem[] = [];
  readonly files: LatexFile[] = [];
  readonly footnotes: ReadonlyMap<string, FootnoteDefinition>;
  readonly usedFootnotes = new Set<string>();
  readonly usedNotes = new Set<string>();
  /** Within a heading or caption, where LaTeX cannot put a footnote. */
  moving = false;

  constructor(paper: SetPaper, macros: KnownMacros, provenance: boolean) {
    this.provenance = provenance;
    this.paper = paper;
    this.macros = macros;
    this.footnotes = footnoteDefinitions(paper.paper.root);
  }

  problem(line: number, message: string): void {
    if (!this.problems.some((known) => known.line === line && known.message === message))
      this.problems.push({ line, message });
  }

  text(text: string, line: number): string {
    return this.checked(textTex(text), line);
  }

  code(text: string, line: number): string {
    return this.checked(codeTex(text), line);
  }

  math(tex: string, line: number): string {
    const set = mathTex(tex, this.macros);
    for (const problem of set.problems) this.problem(line, problem);
    return set.problems.length > 0 ? "?" : set.tex;
  }

  private checked(set: TextTex, line: number): string {
    const missing = [...new Set(set.missing)];
    if (missing.length > 0) {
      const named = missing.map(
        (char) => `“${char}” (U+${(char.codePointAt(0) ?? 0).toString(16).toUpperCase().padStart(4, "0")})`,
      );
      this.problem(line, `The fonts of print have no ${named.join(", ")}. Write it in other letters, or leave it out.`);
    }
    return set.tex;
  }
}

function footnoteDefinitions(root: Root): ReadonlyMap<string, FootnoteDefinition> {
  return new Map(
    root.children.flatMap((node) => (node.type === "footnoteDefinition" ? [[node.identifier, node] as const] : [])),
  );
}

import type { LatexNode } from "./nodes.ts";
import { proseOf } from "./words.ts";

/** Writes nodes, which end at a place of the source, as text of a paper. */
type Write = (nodes: readonly LatexNode[], end: number, gathered: Gathered) => string;

/** What was converted, counted; each in the words in which it is told. */
export type Converted =
  | "section"
  | "environment"
  | "display"
  | "table"
  | "list"
  | "citation"
  | "reference"
  | "footnote"
  | "emphasis"
  | "formula";

/** What a conversion gathers besides the text. */
export class Gathered {
  readonly counts = new Map<Converted, number>();
  /** Names of macros and surroundings that stayed as they were. */
  readonly left = new Set<string>();
  /** TeX of all formulas. */
  readonly formulas: string[] = [];
  readonly footnotes: string[] = [];
  readonly source: string;
  /** The text into which it is pasted: its footnotes keep their names. */
  private readonly around: string;

  private readonly writes: Write;

  constructor(source: string, around: string, writes: Write) {
    this.source = source;
    this.around = around;
    this.writes = writes;
  }

  /** What nodes within become; `end` is where in the source they end. */
  write(nodes: readonly LatexNode[], end: number): string {
    return this.writes(nodes, end, this);
  }

  /** What a part of the source becomes that is read by itself. */
  part(source: string): Gathered {
    return new Gathered(source, this.around, this.writes);
  }

  count(what: Converted): void {
    this.counts.set(what, (this.counts.get(what) ?? 0) + 1);
  }

  /** Adds what a part gathered that was read by itself. */
  takeIn(part: Gathered): void {
    for (const [what, count] of part.counts) this.counts.set(what, (this.counts.get(what) ?? 0) + count);
    for (const name of part.left) this.left.add(name);
    this.formulas.push(...part.formulas);
    this.footnotes.push(...part.footnotes);
  }

  /** A name that no footnote has yet. */
  footnoteName(): string {
    let number = this.footnotes.length + 1;
    while (this.around.includes(`[^${number}]`) || this.footnotes.some((note) => note.startsWith(`[^${number}]:`)))
      number += 1;
    return String(number);
  }
}

/** A stretch of the text as it comes to be. Words wait until something else follows, since quotes and dashes span nodes. */
export class Stretch {
  private text = "";
  private words = "";

  /** Words as they stand in LaTeX. */
  addWords(words: string): void {
    this.words += words;
  }

  /** Text of the paper, within its line. */
  add(text: string): void {
    this.flush();
    this.text += text;
  }

  /** Text of the paper on lines of its own, with blank lines around it. */
  addBlock(block: string): void {
    this.flush();
    this.text = `${this.text.trimEnd()}\n\n${block}\n\n`;
  }

  /** Takes the end of the words away where it matches. @returns whether it did */
  dropEnd(pattern: RegExp): boolean {
    const kept = this.words.replace(pattern, "");
    const dropped = kept !== this.words;
    this.words = kept;
    return dropped;
  }

  /** All of it, without white space at its ends and with at most one blank line at a place. */
  finished(): string {
    this.flush();
    return this.text
      .replace(/[ \t]+\n/g, "\n")
      .replace(/\n{3,}/g, "\n\n")
      .trim();
  }

  private flush(): void {
    if (this.words === "") return;
    const atLineStart = this.text === "" || this.text.endsWith("\n");
    this.text += proseOf(atLineStart ? this.words.trimStart() : this.words, atLineStart);
    this.words = "";
  }
}

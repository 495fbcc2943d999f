import type { Node } from "mdast";
import type { CellCount } from "./cells.ts";
import { newCellCount } from "./cells.ts";
import type { Lines } from "./lines.ts";
import { sourceMap } from "./lines.ts";
import type { BoundNumber, Cell, Problem, Span } from "./types.ts";

/** Labels of headings, surroundings and displays: letters and digits, with - _ : . between. */
const labelForm = /^[A-Za-z0-9][\w:.-]*$/;

/** What is gathered while a paper's tree is made. */
export class Reading {
  readonly problems: Problem[] = [];
  readonly numbers: BoundNumber[] = [];
  readonly cells: Cell[] = [];
  readonly cellCount: CellCount = newCellCount();
  /** Link definitions `[name]: url`, by their folded names. */
  readonly definitions = new Map<string, { url: string; title: string | null }>();

  readonly footnotes = new Set<string>();

  constructor(
    readonly text: string,
    readonly lines: Lines,
  ) {}

  report(
    from: number,
    to: number,
    message: string,
    more: Partial<Pick<Problem, "severity" | "fix" | "cell">> = {},
  ): void {
    this.problems.push({ from, to, line: this.lines.lineAt(from), severity: "error", message, ...more });
  }

  from(node: Node): number {
    return node.position?.start.offset ?? 0;
  }

  to(node: Node): number {
    return node.position?.end.offset ?? this.text.length;
  }

  span(node: Node): Span {
    return this.lines.span(this.from(node), this.to(node));
  }

  /** Where the indices of what a node says stand in the text. */
  placeIn(node: Node, value: string): (index: number) => number {
    const from = this.from(node);
    const map = sourceMap(value, this.text.slice(from, this.to(node)));
    return (index) => from + map(index);
  }

  /** Reports a label that is not of the allowed form; gives it back otherwise. */
  checkedLabel(label: string, from: number): string | null {
    if (labelForm.test(label)) return label;
    const message = `“${label}” cannot be a label: a label is letters and digits, with - _ : . between them.`;
    this.report(from, from + label.length, message);
    return null;
  }
}

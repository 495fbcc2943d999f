import { plainText, referenceText } from "./plain-text.ts";
import type { Paper, Span } from "./types.ts";
import { walk } from "./walk.ts";

/** A place one may go to in a paper. */
export interface OutlineEntry {
  readonly kind: "section" | "environment" | "figure" | "table";
  /** Depth among sections, from 0; other places stand one below their section. */
  readonly level: number;
  /** "2.1"; "" where there is none. */
  readonly number: string;
  /** "Section 2.1", "Theorem 2.1", "Figure 3". */
  readonly name: string;
  /** The words of a heading, the title of surroundings, or the caption; may be "". */
  readonly text: string;
  readonly span: Span;
}

/** Sections, numbered surroundings, figures and tables in the order of the text. */
export function outline(paper: Paper): OutlineEntry[] {
  const entries: OutlineEntry[] = [];
  let level = -1;
  walk(paper.root.children, (node) => {
    const span = spanOf(node);
    if (node.type === "heading" && node.data?.number) {
      const { number } = node.data;
      level = number.split(".").length - 1;
      entries.push({ kind: "section", level, number, name: `Section ${number}`, text: plainText(node.children), span });
    }
    if (node.type === "environment" && node.number !== null) {
      const noun = node.environment.charAt(0).toUpperCase() + node.environment.slice(1);
      const name = `${noun} ${node.number}`;
      entries.push({
        kind: "environment",
        level: level + 1,
        number: node.number,
        name,
        text: plainText(node.title),
        span,
      });
    }
    if (node.type === "cell") {
      for (const { noun, number } of node.parts) {
        const kind = noun === "Figure" ? "figure" : "table";
        const name = referenceText({ label: "", noun, number, span });
        entries.push({ kind, level: level + 1, number, name, text: plainText(node.caption), span });
      }
    }
  });
  return entries;
}

function spanOf(node: {
  position?: { start: { offset?: number; line: number }; end: { offset?: number; line: number } };
}): Span {
  const { start, end } = node.position ?? { start: { offset: 0, line: 1 }, end: { offset: 0, line: 1 } };
  return { from: start.offset ?? 0, to: end.offset ?? 0, line: start.line, lastLine: end.line };
}

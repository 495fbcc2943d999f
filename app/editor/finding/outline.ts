import { mathTex, type Paper, type PaperNode, plainText } from "../../paper/index.ts";
import type { Run } from "../model/types.ts";

/** One place of the outline: a section, a theorem or the like, a figure or a table. */
export interface OutlineEntry {
  readonly from: number;
  readonly line: number;
  /** 1 for sections at the top; what stands in a section is one deeper than it. */
  readonly level: number;
  /** "2.1", "Theorem 2.1", "Figure 2"; "" where it has no number. */
  readonly number: string;
  readonly runs: readonly Run[];
}

/** What a paper consists of, in the order of the text. */
export function outlineOf(paper: Paper): OutlineEntry[] {
  const entries: OutlineEntry[] = [];
  let depth = 0;
  const at = (node: PaperNode) => ({
    from: node.position?.start.offset ?? 0,
    line: node.position?.start.line ?? 1,
  });
  const visit = (nodes: readonly PaperNode[]): void => {
    for (const node of nodes) {
      if (node.type === "heading") {
        depth = node.depth;
        entries.push({ ...at(node), level: depth, number: node.data?.number ?? "", runs: runsOf(node.children) });
      } else if (node.type === "environment") {
        if (node.number !== null) {
          const noun = node.environment.charAt(0).toUpperCase() + node.environment.slice(1);
          entries.push({ ...at(node), level: depth + 1, number: `${noun} ${node.number}`, runs: runsOf(node.title) });
        }
        visit(node.children);
      } else if (node.type === "cell") {
        for (const { noun, number } of node.parts) {
          entries.push({ ...at(node), level: depth + 1, number: `${noun} ${number}`, runs: runsOf(node.caption) });
        }
      } else if ("children" in node) visit(node.children);
    }
  };
  visit(paper.root.children);
  const top = Math.min(...entries.map(({ level }) => level));
  return entries.map((entry) => ({ ...entry, level: entry.level - top + 1 }));
}

/** How many words of prose a paper has: its text, headings and captions, without formulas and sources. */
export function proseWords(paper: Paper): number {
  let count = 0;
  const visit = (nodes: readonly PaperNode[]): void => {
    for (const node of nodes) {
      if (node.type === "text") count += countWords(node.value);
      else if (node.type === "cell") visit(node.caption);
      else {
        if (node.type === "environment") visit(node.title);
        if ("children" in node) visit(node.children);
      }
    }
  };
  visit([...paper.front.titleNodes, ...paper.front.abstractNodes, ...paper.root.children]);
  return count;
}

function countWords(text: string): number {
  return text.match(/[\p{L}\p{N}]+(?:[-'’][\p{L}\p{N}]+)*/gu)?.length ?? 0;
}

/** The beginning is enough to know a place by. */
function runsOf(nodes: readonly PaperNode[]): readonly Run[] {
  const runs: Run[] = [];
  let left = LONGEST;
  const add = (run: Run, length: number): void => {
    if (left > 0) runs.push(run);
    left -= length;
  };
  const visit = (node: PaperNode): void => {
    if (node.type === "inlineMath") {
      const tex = mathTex(node, () => "\\ldots");
      add({ run: "math", tex }, node.value.length);
    } else if ("children" in node) for (const child of node.children) visit(child);
    else {
      const words = plainText(node, () => "…");
      add(
        { run: "text", text: words.length <= left ? words : `${words.slice(0, left).replace(/\s+\S*$/, "")} …` },
        words.length,
      );
    }
  };
  for (const node of nodes) visit(node);
  return runs;
}

/** In characters. */
const LONGEST = 90;

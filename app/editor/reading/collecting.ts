import type { Nodes, Parent } from "mdast";
import type { Content, Piece, Run } from "../model/types.ts";
import type { NumberFaces } from "./number-faces.ts";

/** What the drawers of nodes need: the source, the numbers, and where pieces go. */
export interface Collecting {
  readonly pieces: Piece[];
  readonly text: string;
  readonly numbers: NumberFaces;
  /** How deep in lists. */
  readonly depth: number;
  /** Draws a node's children. */
  descend(node: Parent): void;
  /** The same, one list deeper. */
  deeper(): Collecting;
}

/** Where a node stands in the text. One that reading made without a place is nowhere (-1) and draws nothing. */
export function placeOf(node: Nodes): { from: number; to: number } {
  return { from: node.position?.start.offset ?? -1, to: node.position?.end.offset ?? -1 };
}

export function lineStart(source: string, at: number): number {
  return source.lastIndexOf("\n", at - 1) + 1;
}

export function lineEnd(source: string, at: number): number {
  const end = source.indexOf("\n", at);
  return end < 0 ? source.length : end;
}

export function words(runs: readonly Run[], dress: string): Content {
  return { content: "words", runs, dress };
}

export function text(value: string): Run {
  return { run: "text", text: value };
}

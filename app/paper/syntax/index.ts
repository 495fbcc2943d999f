import type { Nodes, Root } from "mdast";
import { Lines } from "../lines.ts";
import { remembered } from "../memory.ts";
import { cutIntoPieces, nestsTooDeeply } from "./pieces.ts";
import type { RawPiece } from "./tree.ts";
import { parseFrontMatter, parseParagraphs, parseTree, pushRaw } from "./tree.ts";

export type { RawDirective, RawFence, RawPiece } from "./tree.ts";

/** Lengths of text, in characters, whose trees are kept: a few long papers. A tree takes some fifty times the memory. */
const keptOfPieces = 600_000;
const keptOfWords = 60_000;

const frontMatter = remembered(parseFrontMatter, keptOfWords);
const blocks = remembered(parseTree, keptOfPieces);
const words = remembered(parseParagraphs, keptOfWords);

/**
 * A whole text as an mdast tree, with `rawDirective` and `rawFence` nodes for the paper's own marks. The tree is the
 * caller's to change.
 */
export function parseBlocks(text: string): Root {
  const lines = new Lines(text);
  const names = definedNames(text);
  const bom = text.startsWith("\uFEFF") ? 1 : 0;
  const root: Root = { type: "root", children: [] };
  for (const piece of cutIntoPieces(text)) {
    if (nestsTooDeeply(piece.text)) {
      pushRaw(root, asWritten(piece.text, piece.from, lines));
      continue;
    }
    const before = piece.frontMatter ? "" : definitionsFor(piece.text, names);
    const tree = piece.frontMatter ? frontMatter(piece.text) : blocks(before + piece.text);
    const offset = piece.from - before.length + (piece.from === 0 && before === "" ? bom : 0);
    const line = lines.lineAt(piece.from) - before.split("\n").length;
    for (const child of tree.children) {
      if ((child.position?.start.offset ?? 0) >= before.length) root.children.push(copyAt(child, offset, line));
    }
  }
  return root;
}

/** A short text (a caption, a title) as paragraphs: marks of headings, lists and the like are plain characters. */
export function parseInline(text: string): Root {
  return copyAt(words(text), 0, 0);
}

/** Names that a text seems to define, `[name]: …` and `[^name]: …`, by their folded form. */
function definedNames(text: string): Map<string, string> {
  const names = new Map<string, string>();
  for (const match of text.matchAll(/^[ \t>]{0,8}\[([^[\]]{1,200})\]:/gm)) {
    const name = (match[1] ?? "").replace(/\s+/g, " ");
    if (name.trim() !== "" && !name.endsWith("\\")) names.set(fold(name), name);
  }
  return names;
}

/**
 * Definitions to stand before a piece while it is parsed, because words in brackets are references only where
 * something defines them. They say no more than the names; the last ends the footnotes before it and defines nothing.
 */
function definitionsFor(piece: string, names: ReadonlyMap<string, string>): string {
  if (names.size === 0) return "";
  const used = new Set<string>();
  for (const match of piece.matchAll(/\[([^[\]]{1,200})\]/g)) {
    const name = names.get(fold(match[1] ?? ""));
    if (name !== undefined) used.add(name);
  }
  if (used.size === 0) return "";
  return `${[...used].map((name) => `[${name}]: -\n\n`).join("")}[\uE000]: -\n\n`;
}

function fold(name: string): string {
  return name.trim().replace(/\s+/g, " ").toLowerCase();
}

/** A piece that is not parsed, as one node. */
function asWritten(text: string, from: number, lines: Lines): RawPiece {
  const value = text.trimEnd();
  const end = from + value.length;
  const place = (offset: number) => {
    const line = lines.lineAt(offset);
    return { line, column: offset - lines.startOf(line) + 1, offset };
  };
  return { type: "rawPiece", value, position: { start: place(from), end: place(end) } };
}

/** Deeper than this, children are left out of a copy: what is so deep is set as it is written. */
const deepest = 200;

/** A copy of a node moved by so many characters and lines. */
function copyAt<Node extends Nodes>(node: Node, offset: number, line: number, depth = 0): Node {
  const copy: Node = { ...node };
  const position = node.position;
  if (position !== undefined) {
    const { start, end } = position;
    copy.position = {
      start: { line: start.line + line, column: start.column, offset: (start.offset ?? 0) + offset },
      end: { line: end.line + line, column: end.column, offset: (end.offset ?? 0) + offset },
    };
  }
  if ("children" in copy) {
    const children: readonly Nodes[] = depth < deepest ? copy.children : [];
    Object.assign(copy, { children: children.map((child) => copyAt(child, offset, line, depth + 1)) });
  }
  return copy;
}

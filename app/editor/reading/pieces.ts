import type { Nodes, Parent } from "mdast";
import { citationText, type Paper } from "../../paper/index.ts";
import type { Content, Piece } from "../model/types.ts";
import { type Collecting, lineEnd, lineStart, placeOf, text, words } from "./collecting.ts";
import { environmentPieces } from "./environment-pieces.ts";
import type { NumberFaces } from "./number-faces.ts";
import { boundIn, boundTex, referenceText, runsOf } from "./runs.ts";

type NodeOf<Name extends Nodes["type"]> = Extract<Nodes, { type: Name }>;
type Drawers = { readonly [Name in Nodes["type"]]?: (node: NodeOf<Name>, into: Collecting) => void };

/** Draws up the pieces of a paper from its tree. Front matter and parameters are added by the caller. */
export function collectPieces(paper: Paper, numbers: NumberFaces): Piece[] {
  const into = collecting(paper.text, numbers, [], 0);
  collect(paper.root, into);
  comments(paper, into);
  blankLines(paper, into);
  return into.pieces;
}

function collecting(source: string, numbers: NumberFaces, pieces: Piece[], depth: number): Collecting {
  const into: Collecting = {
    pieces,
    text: source,
    numbers,
    depth,
    descend(node) {
      for (const child of node.children) collect(child, into);
    },
    deeper: () => collecting(source, numbers, pieces, depth + 1),
  };
  return into;
}

function collect(node: Nodes, into: Collecting): void {
  const draw = DRAWERS[node.type] as ((node: Nodes, into: Collecting) => void) | undefined;
  if (draw !== undefined) draw(node, into);
  else if ("children" in node) into.descend(node);
}

const DRAWERS: Drawers = {
  heading(node, into) {
    const { from, to } = placeOf(node);
    if (from < 0) return;
    const source = into.text.slice(from, to);
    const mark = /^#{1,6}[ \t]*/.exec(source)?.[0].length ?? 0;
    const tail = /[ \t]*(\{#[^}]*\})?[ \t]*#*[ \t]*$/.exec(source)?.[0].length ?? 0;
    const number = node.data?.number ?? null;
    const before = number === null ? undefined : words([text(number)], "hl-section-number");
    into.pieces.push({ piece: "lines", from, to, dress: `hl-heading hl-heading-${node.depth}` });
    const inTo = Math.max(from + mark, to - tail);
    into.pieces.push({ piece: "dressed", from, to, inFrom: from + mark, inTo, dress: "", before });
    into.descend(node);
  },
  text(node, into) {
    const { from, to } = placeOf(node);
    if (from < 0) return;
    const source = into.text.slice(from, to);
    for (const found of source.matchAll(/[ \t]*\n[ \t>]*/g)) {
      const at = from + found.index;
      into.pieces.push({ piece: "join", from: at, to: at + found[0].length });
    }
  },
  inlineMath(node, into) {
    set(node, into, { content: "math", tex: boundTex(node, into.numbers), ...boundIn(node, into.numbers) });
  },
  math(node, into) {
    const content = {
      content: "display",
      tex: boundTex(node, into.numbers),
      number: node.data?.number ?? "",
      ...boundIn(node, into.numbers),
    } as const;
    set(node, into, content, true);
  },
  boundNumber(node, into) {
    set(node, into, { content: "number", number: into.numbers.face(node.number) });
  },
  reference(node, into) {
    const { target, label } = node;
    set(node, into, { content: "pointer", text: referenceText(target, label), amiss: target === null });
  },
  citation(node, into) {
    const told = citationText(node.entries, { at: node.at, as: node.as });
    const amiss = node.entries.length < node.keys.length;
    set(node, into, { content: "pointer", text: amiss ? node.keys.join(", ") : told, amiss });
  },
  emphasis: (node, into) => dressed(node, into, "hl-emphasis"),
  strong: (node, into) => dressed(node, into, "hl-strong"),
  delete: (node, into) => dressed(node, into, "hl-deleted"),
  link: (node, into) => dressed(node, into, "hl-link", node.url),
  inlineCode(node, into) {
    const { from, to } = placeOf(node);
    const ticks = /^`+/.exec(into.text.slice(from, to))?.[0].length ?? 0;
    const [inFrom, inTo] = [from + ticks, to - ticks];
    if (from >= 0 && inFrom < inTo) into.pieces.push({ piece: "dressed", from, to, inFrom, inTo, dress: "hl-code" });
  },
  image(node, into) {
    set(node, into, { content: "image", name: node.url, caption: node.alt ?? "" });
  },
  footnoteReference(node, into) {
    set(node, into, words([text(node.label ?? node.identifier)], "hl-footnote-mark"));
  },
  footnoteDefinition(node, into) {
    lines(node, into, "hl-footnote");
    const { from } = placeOf(node);
    const to = from + (/^\[\^[^\]]*\]:[ \t]*/.exec(into.text.slice(from, from + 200))?.[0].length ?? 0);
    if (from >= 0 && to > from) {
      const content = words([text(node.label ?? node.identifier)], "hl-footnote-mark");
      into.pieces.push({ piece: "set", from, to, block: false, content });
    }
    into.descend(node);
  },
  definition: (node, into) => lines(node, into, "hl-footnote"),
  code: (node, into) => lines(node, into, "hl-code-lines"),
  html: (node, into) => lines(node, into, "hl-verbatim"),
  thematicBreak: (node, into) => set(node, into, words([], "hl-break"), true),
  blockquote(node, into) {
    lines(node, into, "hl-quote");
    for (const child of node.children) {
      const { from } = placeOf(child);
      const begin = lineStart(into.text, from);
      const to = begin + (/^[ \t]*>[ \t]?/.exec(into.text.slice(begin, from))?.[0].length ?? 0);
      if (to > begin) into.pieces.push({ piece: "dressed", from: begin, to, inFrom: to, inTo: to, dress: "" });
      collect(child, into);
    }
  },
  list(node, into) {
    const deeper = into.deeper();
    for (const item of node.children) {
      const { from, to } = placeOf(item);
      if (from < 0) continue;
      const begin = lineStart(into.text, from);
      const mark = /^([-*+]|\d+[.)])[ \t]+/.exec(into.text.slice(from, to));
      const inFrom = from + (mark?.[0].length ?? 0);
      const shown = mark === null || !/\d/.test(mark[1] ?? "") ? "•" : (mark[1] ?? "");
      const before = words([text(shown)], "hl-item-mark");
      into.pieces.push({ piece: "lines", from, to, dress: `hl-item hl-item-${Math.min(4, deeper.depth)}` });
      // An item opens at its mark alone; its words are typeset as any.
      into.pieces.push({ piece: "dressed", from: begin, to: inFrom, inFrom, inTo: inFrom, dress: "", before });
      deeper.descend(item);
    }
  },
  table(node, into) {
    const [head, ...rows] = node.children.map((row) => row.children.map((cell) => runsOf(cell.children, into.numbers)));
    set(node, into, { content: "grid", head: head ?? [], rows, align: node.align ?? [] }, true);
  },
  environment: environmentPieces,
  cell(node, into) {
    const { from, to } = node.cell.span;
    into.pieces.push({ piece: "cell", from, to, slot: node.cell.slot });
  },
};

function set(node: Nodes, into: Collecting, content: Content, block = false): void {
  const { from, to } = placeOf(node);
  if (from >= 0 && from < to)
    into.pieces.push({ piece: "set", from, to, block: block && alone(into.text, from, to), content });
}

/** Whether nothing else stands on the lines from..to: only whole lines can be a block. */
function alone(source: string, from: number, to: number): boolean {
  const before = source.slice(lineStart(source, from), from);
  return /^[ \t>]*$/.test(before) && source.slice(to, lineEnd(source, to)).trim() === "";
}

function dressed(node: Parent & Nodes, into: Collecting, dress: string, url?: string): void {
  const { from, to } = placeOf(node);
  const inFrom = node.children[0] === undefined ? -1 : placeOf(node.children[0] as Nodes).from;
  const last = node.children.at(-1);
  const inTo = last === undefined ? -1 : placeOf(last as Nodes).to;
  if (from >= 0 && inFrom >= from && inTo <= to && inFrom < inTo) {
    into.pieces.push({ piece: "dressed", from, to, inFrom, inTo, dress, ...(url === undefined ? {} : { url }) });
  }
  into.descend(node);
}

function lines(node: Nodes, into: Collecting, dress: string): void {
  const { from, to } = placeOf(node);
  if (from >= 0) into.pieces.push({ piece: "lines", from, to, dress });
}

/** Comments stay as they are written, and small. The tree has none of them; what looks like one in a working is none. */
function comments(paper: Paper, into: Collecting): void {
  if (!paper.text.includes("<!--")) return;
  const opaque = placesOfSource(paper, into);
  for (const found of paper.text.matchAll(/<!--[\s\S]*?-->/g)) {
    const [from, to] = [found.index, found.index + found[0].length];
    if (opaque.some((place) => from < place.to && to > place.from)) continue;
    into.pieces.push({ piece: "dressed", from, to, inFrom: from, inTo: to, dress: "hl-comment" });
  }
}

/** Where the text is not prose: workings, front matter, code, and what is set as a block. */
function placesOfSource(paper: Paper, into: Collecting): { readonly from: number; readonly to: number }[] {
  return [
    ...paper.cells.map(({ span }) => span),
    ...(paper.front.span === null ? [] : [paper.front.span]),
    ...into.pieces.flatMap((piece) =>
      (piece.piece === "lines" && piece.dress === "hl-code-lines") || (piece.piece === "set" && piece.block)
        ? [piece]
        : [],
    ),
  ].sort((a, b) => a.from - b.from);
}

/**
 * The blank line that parts two blocks is set low. Further ones keep their height, since that is where somebody writes;
 * so do those within workings and code.
 */
function blankLines(paper: Paper, into: Collecting): void {
  const inside = placesOfSource(paper, into);
  let next = 0;
  for (const found of paper.text.matchAll(/^[ \t]*$/gm)) {
    const at = found.index;
    while (next < inside.length && (inside[next]?.to ?? 0) < at) next += 1;
    const block = inside[next];
    const parts = at < paper.text.length && at > 0 && !blankBefore(paper.text, at);
    if (parts && (block === undefined || at < block.from)) into.pieces.push({ piece: "blank", from: at, to: at });
  }
}

/** Whether the line before the one that begins at `at` is blank too. */
function blankBefore(source: string, at: number): boolean {
  return source.slice(lineStart(source, at - 1), at - 1).trim() === "";
}

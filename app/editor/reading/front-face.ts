import { type Paper, readInline, UNTITLED } from "../../paper/index.ts";
import type { FrontFace, Piece } from "../model/types.ts";
import type { NumberFaces } from "./number-faces.ts";
import { runsOf } from "./runs.ts";

/** The title block: what the front matter says of the paper. */
export function frontFace(paper: Paper, numbers: NumberFaces): FrontFace {
  const { front } = paper;
  const from = front.span?.from ?? null;
  const inline = (text: string) => runsOf(readInline(text, front.span?.from ?? 0, paper), numbers);
  return {
    from,
    to: front.span?.to ?? 0,
    title: inline(front.title.trim() === "" ? UNTITLED : front.title),
    authors: front.authors.map(({ name, affiliation }) => ({ name, affiliation: affiliation ?? "" })),
    abstract: inline(front.abstract),
    keywords: front.keywords,
  };
}

/** The title block's place in the text. */
export function frontPieces(front: FrontFace): Piece[] {
  if (front.from === null || front.to <= front.from) return [];
  // Where it stands does not change what it looks like: equal blocks are equal signs.
  const face = { ...front, from: 0, to: 0 };
  return [{ piece: "set", from: front.from, to: front.to, block: true, content: { content: "title", front: face } }];
}

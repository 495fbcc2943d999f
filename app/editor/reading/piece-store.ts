import type { Piece, PieceDelta } from "../model/types.ts";

/** Outer pieces before those that they hold. */
export function byPlace(a: Piece, b: Piece): number {
  return a.from - b.from || b.to - a.to;
}

interface Sent {
  readonly number: number;
  readonly signs: readonly string[];
  readonly starts: Int32Array;
}

/**
 * Remembers the pieces of the last answer, so that the next one tells only what is new: a keystroke in a long paper then
 * costs the page as much as one in a short one.
 */
export class PieceStore {
  private sent: Sent = { number: 0, signs: [], starts: new Int32Array() };

  /** The pieces, as a change of those of the answer `have` where that is the last one, else whole. */
  since(have: number, pieces: readonly Piece[]): PieceDelta {
    const signs = pieces.map(signOf);
    const starts = Int32Array.from(pieces, ({ from }) => from);
    const before: Sent = have === this.sent.number ? this.sent : { number: 0, signs: [], starts: new Int32Array() };
    const head = sameHead(before, signs, starts);
    const tail = sameTail(before, signs, starts, head);
    const number = this.sent.number + 1;
    this.sent = { number, signs, starts };
    return { number, base: before.number, head, tail, middle: pieces.slice(head, pieces.length - tail), starts };
  }
}

/** What a piece is, wherever it stands. */
function signOf(piece: Piece): string {
  const moved = "inFrom" in piece ? { inFrom: piece.inFrom - piece.from, inTo: piece.inTo - piece.from } : {};
  return JSON.stringify({ ...piece, ...moved, from: 0, to: piece.to - piece.from });
}

function sameHead(before: Sent, signs: readonly string[], starts: Int32Array): number {
  let head = 0;
  const most = Math.min(before.signs.length, signs.length);
  while (head < most && before.starts[head] === starts[head] && before.signs[head] === signs[head]) head += 1;
  return head;
}

/** Pieces after the change have all moved by the same way. */
function sameTail(before: Sent, signs: readonly string[], starts: Int32Array, head: number): number {
  const most = Math.min(before.signs.length, signs.length) - head;
  const [lastBefore, last] = [before.signs.length - 1, signs.length - 1];
  const way = (starts[last] ?? 0) - (before.starts[lastBefore] ?? 0);
  let tail = 0;
  while (
    tail < most &&
    (starts[last - tail] ?? 0) - (before.starts[lastBefore - tail] ?? 0) === way &&
    before.signs[lastBefore - tail] === signs[last - tail]
  ) {
    tail += 1;
  }
  return tail;
}

import type { TextEdit } from "../model/messages.ts";
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
 * costs the page as much as one in a short one, also while others write elsewhere in it.
 */
export class PieceStore {
  private sent: Sent = { number: 0, signs: [], starts: new Int32Array() };

  /** The text has changed: a piece that only moves with it stays the same. */
  move(edits: readonly TextEdit[]): void {
    this.sent = { ...this.sent, starts: moved(this.sent.starts, edits) };
  }

  /** The pieces, as a change of those of the answer `have` where that is the last one, else whole. */
  since(have: number, pieces: readonly Piece[]): PieceDelta {
    const signs = pieces.map(signOf);
    const starts = Int32Array.from(pieces, ({ from }) => from);
    const before: Sent = have === this.sent.number ? this.sent : { number: 0, signs: [], starts: new Int32Array() };
    const most = Math.min(before.signs.length, signs.length);
    const same = (was: number, is: number) => before.starts[was] === starts[is] && before.signs[was] === signs[is];
    let head = 0;
    while (head < most && same(head, head)) head += 1;
    let tail = 0;
    while (tail < most - head && same(before.signs.length - 1 - tail, signs.length - 1 - tail)) tail += 1;
    const number = this.sent.number + 1;
    this.sent = { number, signs, starts };
    return { number, base: before.number, head, tail, middle: pieces.slice(head, pieces.length - tail), starts };
  }
}

/** What a piece is, wherever it stands. */
function signOf(piece: Piece): string {
  const within = "inFrom" in piece ? { inFrom: piece.inFrom - piece.from, inTo: piece.inTo - piece.from } : {};
  return JSON.stringify({ ...piece, ...within, from: 0, to: piece.to - piece.from });
}

/** Of a piece whose first letter was taken away. */
const GONE = -1;

/**
 * Where places of a text are after edits: what is put in at a place comes before it. Places and edits in the text's
 * order; edits do not overlap and are told by the text before all of them.
 */
export function moved(places: Int32Array, edits: readonly TextEdit[]): Int32Array {
  let next = 0;
  let by = 0;
  return places.map((place) => {
    if (place === GONE) return GONE;
    for (let edit = edits[next]; edit !== undefined && edit.to <= place; edit = edits[next]) {
      by += edit.insert.length - (edit.to - edit.from);
      next += 1;
    }
    const over = edits[next];
    return over !== undefined && over.from <= place ? GONE : place + by;
  });
}

/** One edit that makes a text of another: what is between their common beginning and end. */
export function editBetween(before: string, after: string): TextEdit {
  const most = Math.min(before.length, after.length);
  let from = 0;
  while (from < most && before.charCodeAt(from) === after.charCodeAt(from)) from += 1;
  let rest = 0;
  while (
    rest < most - from &&
    before.charCodeAt(before.length - 1 - rest) === after.charCodeAt(after.length - 1 - rest)
  ) {
    rest += 1;
  }
  return { from, to: before.length - rest, insert: after.slice(from, after.length - rest) };
}

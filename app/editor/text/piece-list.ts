import type { Piece, PieceDelta } from "../model/types.ts";

/** The pieces after an answer, and what has to be drawn for it. */
export interface PieceList {
  readonly number: number;
  readonly pieces: readonly Piece[];
  /** No longer among the pieces. */
  readonly gone: ReadonlySet<unknown>;
  /** To be drawn, at their places in the text that the answer is about. */
  readonly fresh: readonly Piece[];
}

/**
 * Takes in an answer's change of the pieces.
 * @param redrawn pieces of before that have to be drawn again even where they stay
 */
export function afterDelta(before: readonly Piece[], delta: PieceDelta, redrawn: ReadonlySet<Piece>): PieceList {
  const kept = delta.base === 0 ? [] : before;
  const tailFrom = kept.length - delta.tail;
  const gone = new Set<Piece>(
    before.slice(delta.base === 0 ? 0 : delta.head, delta.base === 0 ? before.length : tailFrom),
  );
  const fresh: Piece[] = [];
  const stay = (piece: Piece, at: number): Piece => {
    if (!redrawn.has(piece)) return piece;
    gone.add(piece);
    const moved = movedTo(piece, delta.starts[at] ?? piece.from);
    fresh.push(moved);
    return moved;
  };
  const head = kept.slice(0, delta.head).map(stay);
  const middle = delta.middle;
  fresh.push(...middle);
  const tailAt = delta.head + middle.length;
  const tail = kept.slice(tailFrom).map((piece, k) => stay(piece, tailAt + k));
  return { number: delta.number, pieces: [...head, ...middle, ...tail], gone, fresh };
}

function movedTo(piece: Piece, from: number): Piece {
  const by = from - piece.from;
  const moved = { ...piece, from, to: piece.to + by };
  return "inFrom" in moved ? { ...moved, inFrom: moved.inFrom + by, inTo: moved.inTo + by } : moved;
}

import { type EditorState, type Range, type RangeSet, RangeValue, type Text } from "@codemirror/state";
import type { Piece } from "../model/types.ts";

/** A piece of the sheet where it stands now: moved through every change until the worker's next answer. */
export class Place extends RangeValue {
  readonly piece: Piece;
  constructor(piece: Piece) {
    super();
    this.piece = piece;
  }
}

export function placesOf(pieces: readonly Piece[], length: number): Range<Place>[] {
  return pieces
    .filter((piece) => piece.from >= 0 && piece.to <= length && piece.from <= piece.to)
    .map((piece) => new Place(piece).range(piece.from, piece.to));
}

/** Where a piece is that answers `wanted`; null when the text has none any more. */
export function findPlace(
  places: RangeSet<Place>,
  wanted: (piece: Piece) => boolean,
): { from: number; to: number; piece: Piece } | null {
  for (const cursor = places.iter(); cursor.value !== null; cursor.next()) {
    if (wanted(cursor.value.piece)) return { from: cursor.from, to: cursor.to, piece: cursor.value.piece };
  }
  return null;
}

/**
 * The pieces which the selection opens: those that its head touches or whose edge it crosses. A piece that lies
 * wholly inside a selection stays typeset, so that selecting everything does not turn the sheet into source.
 */
export function touched(places: RangeSet<Place>, state: EditorState): Set<Piece> {
  const opened = new Set<Piece>();
  for (const range of state.selection.ranges) {
    places.between(range.from, range.to, (from, to, place) => {
      const headTouches = range.head >= from && range.head <= to;
      const crosses = (range.from > from && range.from < to) || (range.to > from && range.to < to);
      if (OPENABLE.has(place.piece.piece) && (headTouches || crosses)) opened.add(place.piece);
    });
  }
  return opened;
}

/** The pieces that hide a stretch of the source while they are closed, or some of it. */
export function hiding(places: RangeSet<Place>, stretch: { readonly from: number; readonly to: number }): Set<Piece> {
  const hidden = new Set<Piece>();
  places.between(stretch.from, stretch.to, (from, to, { piece }) => {
    if (OPENABLE.has(piece.piece) && from < stretch.to && to > stretch.from) hidden.add(piece);
  });
  return hidden;
}

const OPENABLE: ReadonlySet<Piece["piece"]> = new Set<Piece["piece"]>(["set", "dressed", "cell"]);

/** Widens from..to to whole lines, as blocks need. */
export function wholeLines(doc: Text, from: number, to: number): { from: number; to: number } {
  return { from: doc.lineAt(from).from, to: doc.lineAt(to).to };
}

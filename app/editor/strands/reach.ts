import type { CellFace, Content, NumberFace, Piece, Run } from "../model/types.ts";

/** Where in the whole text cells and what quotes them stand: what tells whether a strand goes on beyond the page drawn. */
export interface Reach {
  /** By slot. */
  readonly cells: ReadonlyMap<string, CellReach>;
  /** Last place in the text at which something hangs from each parameter, by its place; -1: nothing does. */
  readonly strands: readonly number[];
}

export interface CellReach {
  readonly at: number;
  /** First and last place that quotes it; null: none does. */
  readonly quotes: { readonly first: number; readonly last: number; readonly count: number } | null;
}

/**
 * @param pieces in the order of the text
 * @param parameters how many parameters there are
 */
export function reachOf(pieces: readonly Piece[], cells: readonly CellFace[], parameters: number): Reach {
  const quotes = new Map<string, { first: number; last: number; count: number }>();
  const strands: number[] = Array.from({ length: parameters }, () => -1);
  const lower = (place: number, at: number) => {
    strands[place] = Math.max(strands[place] ?? -1, at);
  };
  const quote = (number: NumberFace, at: number) => {
    for (const slot of number.cells) {
      const known = quotes.get(slot);
      if (known === undefined) quotes.set(slot, { first: at, last: at, count: 1 });
      else {
        known.first = Math.min(known.first, at);
        known.last = Math.max(known.last, at);
        known.count += 1;
      }
    }
    for (const place of number.reads) lower(place, at);
  };
  for (const piece of pieces) {
    if (piece.piece === "set") for (const number of numbersIn(piece.content)) quote(number, piece.from);
  }
  for (const cell of cells) {
    for (const number of numbersOf(cell.caption)) quote(number, cell.from);
    for (const place of cell.strands) lower(place, cell.from);
  }
  return {
    cells: new Map(cells.map(({ slot, from }) => [slot, { at: from, quotes: quotes.get(slot) ?? null }])),
    strands,
  };
}

/** The bound numbers of a content. */
function numbersIn(content: Content): readonly NumberFace[] {
  switch (content.content) {
    case "number":
      return [content.number];
    case "math":
    case "display":
      return content.numbers ?? [];
    case "words":
      return numbersOf(content.runs);
    case "grid":
      return [content.head, ...content.rows].flat().flatMap(numbersOf);
    case "title":
      return [...numbersOf(content.front.title), ...numbersOf(content.front.abstract)];
    default:
      return [];
  }
}

function numbersOf(runs: readonly Run[]): readonly NumberFace[] {
  return runs.flatMap((run) => {
    if (run.run === "number") return [run.number];
    if (run.run === "math") return run.numbers ?? [];
    return "runs" in run ? numbersOf(run.runs) : [];
  });
}

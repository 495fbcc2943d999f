import type { CellFace, CellStateName, Erratum, NumberState, Piece, ProblemFace } from "../model/types.ts";

const CELL_MARKS: Readonly<Partial<Record<CellStateName, Erratum["mark"]>>> = {
  outOfDate: "†",
  cancelled: "†",
  failed: "‡",
};
const NUMBER_MARKS: Readonly<Partial<Record<NumberState, Erratum["mark"]>>> = { outOfDate: "†", failed: "‡" };

/** All that is out of date or has failed, in the order of the text. What stands on purpose is no erratum. */
export function errataOf(
  cells: readonly CellFace[],
  pieces: readonly Piece[],
  problems: readonly ProblemFace[],
  text: string,
): Erratum[] {
  const found: Erratum[] = [];
  for (const { state, finding, from, line, title } of cells) {
    const mark = finding?.isGrave === true ? "‡" : CELL_MARKS[state];
    if (mark !== undefined) found.push({ from, line, mark, what: "cell", title });
  }
  const lineOf = lineCounter(text);
  for (const piece of pieces) {
    if (piece.piece !== "set" || piece.content.content !== "number") continue;
    const mark = NUMBER_MARKS[piece.content.number.state];
    if (mark !== undefined)
      found.push({ from: piece.from, line: lineOf(piece.from), mark, what: "number", title: "a number" });
  }
  const failed = new Set(cells.flatMap(({ state, slot }) => (state === "failed" ? [slot] : [])));
  for (const { severity, slot, from, line } of problems) {
    if (severity !== "error" || (slot !== null && failed.has(slot))) continue;
    found.push({ from, line, mark: "‡", what: "problem", title: `line ${line}` });
  }
  return found.sort((a, b) => a.from - b.from);
}

/** Line numbers of positions that are asked in rising order. */
function lineCounter(text: string): (at: number) => number {
  let [counted, line] = [0, 1];
  return (at) => {
    for (; counted < at; counted += 1) if (text.charCodeAt(counted) === 10) line += 1;
    return line;
  };
}

import { causesOf } from "./causes.ts";
import { KINDS } from "./registry.ts";
import type { CellState, CellWork, Plan, PlannedCell, ShownCell, ShownPaper } from "./types.ts";

/**
 * The state of a cell, from the plan of the text as it stands and what the server says is shown and worked on.
 *
 * Judged in this order: a body at fault is *failed*; work on the present key is *computing*, *waiting*, *failed* or
 * *cancelled* as it says; a cell that reads a faulty one is *waiting*; a result shown under the present key is *current*;
 * an older one *stands* where somebody let it, else is *out of date*; with no result the cell is *empty*. Work on an older
 * key says nothing about the cell as it is now. Cells whose values planning itself gives are never out of date.
 */
export function cellState(
  planned: PlannedCell,
  shown: ShownCell | undefined,
  work: CellWork | undefined,
  plan: Plan,
  shownPaper: ShownPaper,
): CellState {
  const state: CellState = {
    state: "current",
    causes: [],
    failure: null,
    waitsFor: [],
    hasResult: shown !== undefined,
  };
  if (planned.failure !== null) return { ...state, state: "failed", failure: planned.failure };
  if (planned.key === null) return { ...state, state: "waiting", waitsFor: faultyNeeds(planned, plan) };
  if (KINDS.get(planned.kind)?.knownAtPlanning === true) return state;
  const ofWork = work?.key === planned.key ? stateOfWork(work) : null;
  const isCurrent = shown?.key === planned.key;
  // A result that came after the failing or cancelled attempt ends the matter.
  const isOver = isCurrent && (ofWork?.state === "failed" || ofWork?.state === "cancelled");
  if (ofWork !== null && !isOver) return { ...state, ...ofWork, causes: causesOf(planned, shown, plan, shownPaper) };
  if (isCurrent) return state;
  if (shown === undefined) return { ...state, state: "empty" };
  const causes = causesOf(planned, shown, plan, shownPaper);
  return { ...state, state: shown.stands === undefined ? "outOfDate" : "stands", causes };
}

function stateOfWork(work: CellWork): Pick<CellState, "state"> & Partial<CellState> {
  switch (work.state) {
    case "waiting":
      return { state: "waiting", waitsFor: work.needs };
    case "computing":
      return { state: "computing" };
    case "failed":
      return { state: "failed", failure: { line: work.line, message: work.message } };
    case "cancelled":
      return { state: "cancelled" };
  }
}

/** Cells read directly that are at fault or wait themselves. */
function faultyNeeds(planned: PlannedCell, plan: Plan): readonly string[] {
  return planned.needs.filter((id) => plan.byId.get(id)?.key == null);
}

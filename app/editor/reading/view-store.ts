import { type CellResult, type CellView, type Plan, viewCell } from "../../cells/index.ts";
import type { CellFace, ShownView } from "../model/types.ts";

/** Remembers which view of each cell was sent, so that a figure crosses to the page only when it has changed. */
export class ViewStore {
  private sent = new Map<string, string>();

  /** The views that changed since the last call, by slot; null where there is nothing to show any more. */
  changed(
    plan: Plan,
    results: ReadonlyMap<string, CellResult>,
    cells: readonly CellFace[],
  ): Record<string, ShownView | null> {
    const views: Record<string, ShownView | null> = {};
    const now = new Map<string, string>();
    for (const face of cells) {
      now.set(face.slot, face.viewSign);
      if (this.sent.get(face.slot) === face.viewSign) continue;
      const planned = plan.byId.get(face.id);
      const result = results.get(face.id);
      const drawn = planned !== undefined && result !== undefined && face.parts.length > 0;
      views[face.slot] = drawn
        ? viewOf(face.viewSign, () => printedOf(viewCell(planned, result, plan, results), face.parts))
        : null;
    }
    for (const slot of this.sent.keys()) if (!now.has(slot)) views[slot] = null;
    this.sent = now;
    return views;
  }
}

/** Rows that the sheet does not print, most often a figure's points as a table, are many: they are not even made. */
function printedOf(view: CellView, parts: CellFace["parts"]): CellView {
  const prints = (name: "table" | "points") => parts.some(({ part }) => part === name);
  const { figure, table } = view;
  return {
    figure,
    // What a table remarks stands beneath the plate of its figure, too.
    table: table === null || prints("table") ? table : { ...table, rows: [] },
    points: prints("points") ? view.points : null,
  };
}

/** One cell that cannot be drawn must not keep the others, and the text, from the page. */
function viewOf(sign: string, make: () => CellView): ShownView {
  try {
    return { sign, view: make() };
  } catch (error) {
    const fault = error instanceof Error ? error.message : String(error);
    return { sign, view: { figure: null, table: null, points: null }, fault };
  }
}

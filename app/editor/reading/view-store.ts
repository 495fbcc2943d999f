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
      views[face.slot] = drawn ? viewOf(face.viewSign, () => viewCell(planned, result, plan, results)) : null;
    }
    for (const slot of this.sent.keys()) if (!now.has(slot)) views[slot] = null;
    this.sent = now;
    return views;
  }
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

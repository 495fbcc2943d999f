import { type CellResult, type Plan, viewCell } from "../../cells/index.ts";
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
      views[face.slot] = drawn ? { sign: face.viewSign, view: viewCell(planned, result, plan, results) } : null;
    }
    for (const slot of this.sent.keys()) if (!now.has(slot)) views[slot] = null;
    this.sent = now;
    return views;
  }
}

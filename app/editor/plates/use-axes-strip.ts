import { useEffect } from "react";
import type { SheetAtHand } from "../keys/types.ts";
import { sheetHost } from "../text/host.ts";

/** Opens the strip of the axes when they are to be set, and brings the figure into view with it. */
export function useAxesStrip({ desk, view, strips }: SheetAtHand): void {
  useEffect(() => {
    const plates = view.state.facet(sheetHost)?.plates;
    let shown: string | null = null;
    return plates?.watch(() => {
      const { axesOf } = plates.get();
      if (axesOf === shown) return;
      shown = axesOf;
      if (axesOf === null) return;
      strips.set({ open: "axes" });
      const cell = desk.store.get().model?.cells.find(({ slot }) => slot === axesOf);
      if (cell !== undefined) desk.show(cell.from);
    });
  }, [desk, view, strips]);
}

import type { EditorView } from "@codemirror/view";
import { useEffect, useState } from "react";
import type { SheetModel } from "../model/types.ts";
import { sheetHost } from "../text/host.ts";
import { type QuotePlace, quotePlaces } from "./places.ts";

/** The column that the text stands in; null where there is none, as outside of a page. */
export function columnOf(view: EditorView): HTMLElement | null {
  return view.dom.closest<HTMLElement>(".hl-column");
}

/** The places that can be pointed at, as they lie on the page: looked for anew when it scrolls, is drawn or has another size. */
export function useQuotePlaces(view: EditorView, model: SheetModel | null): readonly QuotePlace[] {
  const [places, setPlaces] = useState<readonly QuotePlace[]>([]);
  useEffect(() => {
    const column = columnOf(view);
    const views = view.state.facet(sheetHost)?.views;
    if (column === null || views === undefined || model === null) return;
    let frame = 0;
    const look = () => {
      frame = 0;
      const found = quotePlaces(column, model.cells, views);
      setPlaces((before) => (JSON.stringify(before) === JSON.stringify(found) ? before : found));
    };
    const soon = () => {
      if (frame === 0) frame = requestAnimationFrame(look);
    };
    look();
    // Plates are drawn as they come near: the text's height, or what it holds, is then another.
    const sizes = new ResizeObserver(soon);
    sizes.observe(view.contentDOM);
    const drawn = new MutationObserver(soon);
    drawn.observe(view.contentDOM, { childList: true });
    window.addEventListener("scroll", soon, { passive: true });
    window.addEventListener("resize", soon);
    return () => {
      cancelAnimationFrame(frame);
      sizes.disconnect();
      drawn.disconnect();
      window.removeEventListener("scroll", soon);
      window.removeEventListener("resize", soon);
    };
  }, [view, model]);
  return places;
}

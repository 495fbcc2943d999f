import type { CellFace } from "../model/types.ts";
import { findPlace } from "../text/places.ts";
import { sheetField } from "../text/sheet-field.ts";
import type { SheetAtHand } from "./types.ts";

/** The cell whose plate has the focus, or else the one in whose working the caret is; null: neither. */
export function cellAtHand({ desk, view }: Pick<SheetAtHand, "desk" | "view">): CellFace | null {
  const cells = desk.store.get().model?.cells ?? [];
  const focused = document.activeElement?.closest<HTMLElement>(".hl-cell[data-slot]")?.dataset.slot;
  const slot = focused ?? slotAt(view);
  return cells.find((cell) => cell.slot === slot) ?? null;
}

function slotAt({ state }: SheetAtHand["view"]): string | undefined {
  const { head } = state.selection.main;
  let slot: string | undefined;
  state.field(sheetField).places.between(head, head, (_from, _to, { piece }) => {
    if (piece.piece === "cell") slot = piece.slot;
  });
  return slot;
}

/** Whether a cell's working shows. */
export function isWorkingOpen({ view }: Pick<SheetAtHand, "view">, slot: string): boolean {
  const { opened, places } = view.state.field(sheetField);
  const place = findPlace(places, (piece) => piece.piece === "cell" && piece.slot === slot);
  return place !== null && opened.has(place.piece);
}

import { EditorView } from "@codemirror/view";
import { findPlace } from "./places.ts";
import { sheetField, showWorking } from "./sheet-field.ts";

/** Brings a place of the text into view and leaves the caret where it is. */
export function showPlace(view: EditorView, position: number): void {
  view.dispatch({ effects: EditorView.scrollIntoView(Math.min(position, view.state.doc.length), { y: "center" }) });
}

/** Puts the caret at a place of the text, with the keys. */
export function goToPlace(view: EditorView, position: number): void {
  view.dispatch({ selection: { anchor: Math.min(position, view.state.doc.length) }, scrollIntoView: true });
  view.focus();
}

/** Puts the caret at the end of a line; past the last one, of the last. */
export function goToLine(view: EditorView, line: number): void {
  goToPlace(view, view.state.doc.line(Math.min(Math.max(1, line), view.state.doc.lines)).to);
}

/** A line named in the page's address, as `#line-37`, is where one wants to be. */
export function goToAddress(view: EditorView): void {
  const named = /^#line-(\d+)$/.exec(window.location.hash)?.[1];
  if (named !== undefined) requestAnimationFrame(() => goToLine(view, Number(named)));
}

/** Opens a working with the caret in it, for one who writes; or puts it away with the caret after it. */
export function turnWorking(view: EditorView, slot: string, open: boolean, writes: boolean): void {
  const place = findPlace(
    view.state.field(sheetField).places,
    (piece) => piece.piece === "cell" && piece.slot === slot,
  );
  if (place === null) return;
  view.dispatch({ effects: showWorking.of({ slot, open: open && !writes }) });
  if (!writes) return;
  const { doc } = view.state;
  const anchor = open ? doc.lineAt(place.from).to + 1 : placeBeyond(view, place);
  view.dispatch({ selection: { anchor: anchor ?? 0 } });
  if (open) view.focus();
  else if (anchor === null) view.contentDOM.blur();
}

/**
 * Where the text goes on after a cell: the paragraph after it, or the blank line before the next cell; after the last
 * one, the line before it. null: the cell is the whole text.
 */
function placeBeyond({ state }: EditorView, cell: { readonly from: number; readonly to: number }): number | null {
  const { doc } = state;
  if (cell.to >= doc.length) return cell.from > 0 ? cell.from - 1 : null;
  const next = doc.lineAt(cell.to + 1);
  if (next.length > 0 || next.number === doc.lines) return next.from;
  const paragraph = next.to + 1;
  let cellFollows = false;
  state.field(sheetField).places.between(paragraph, paragraph, (_from, _to, { piece }) => {
    if (piece.piece === "cell") cellFollows = true;
  });
  return cellFollows ? next.from : paragraph;
}

/** The page may scroll and draw a plate anew before it can be gone to: so many frames are waited for it. */
const PATIENCE = 30;

/** Gives the keys to a plate's own command once it is drawn: they go on from there, and a reader says which plate it is. */
export function focusPlate(view: EditorView, slot: string, patience = PATIENCE): void {
  const cells = [...view.contentDOM.querySelectorAll<HTMLElement>(".hl-cell[data-slot]")];
  const plate = cells.find(({ dataset }) => dataset.slot === slot);
  const command = plate?.querySelector<HTMLElement>(".hl-offers button");
  if (command != null) command.focus({ preventScroll: true });
  else if (patience > 0) requestAnimationFrame(() => focusPlate(view, slot, patience - 1));
}

import { type EditorState, type Extension, type Range, RangeSet } from "@codemirror/state";
import { BlockWrapper, EditorView, type KeyBinding } from "@codemirror/view";
import { turnWorking } from "./moving.ts";
import { sheetField } from "./sheet-field.ts";

/**
 * An open cell: its plate and its working, within one element of the page. The working's lines stay lines of the text,
 * so that its caret, choice, marks, suggestions and undo are the text's own; the style sheet alone says whether they
 * stand in the right margin beside the plate or beneath its caption (sheet-working.css).
 */
const OPEN_CELL = BlockWrapper.create({ tagName: "div", attributes: { class: "hl-open-cell" } });

const CHOSEN_WITHIN = { class: "hl-chosen-in-working" };
const CHOSEN_ELSEWHERE = {};

/** The editor hides the browser's own marks of what is chosen, with more weight than a style sheet has. */
const marksOfBrowser = EditorView.theme({
  "@media (min-width: 1280px)": {
    ".hl-open-cell > .cm-line.hl-working::selection, .hl-open-cell > .cm-line.hl-working ::selection": {
      backgroundColor: "var(--sel) !important",
    },
  },
});

/** The elements of the cells that are open; and whether all that is chosen lies in one working. */
export const workingPlaces: Extension = [
  EditorView.blockWrappers.compute([sheetField], openCells),
  EditorView.editorAttributes.compute(["selection", sheetField], (state) =>
    choosesWithin(state) ? CHOSEN_WITHIN : CHOSEN_ELSEWHERE,
  ),
  marksOfBrowser,
];

function choosesWithin(state: EditorState): boolean {
  const { from, to, empty } = state.selection.main;
  if (empty || state.field(sheetField).opened.size === 0) return false;
  const slot = openSlotAt(state, from);
  return slot !== null && slot === openSlotAt(state, to);
}

function openCells(state: EditorState): RangeSet<BlockWrapper> {
  const { opened, places } = state.field(sheetField);
  let left = 0;
  for (const piece of opened) if (piece.piece === "cell") left += 1;
  if (left === 0) return RangeSet.empty;
  const cells: Range<BlockWrapper>[] = [];
  for (const cursor = places.iter(); cursor.value !== null && left > 0; cursor.next()) {
    const { piece } = cursor.value;
    if (piece.piece !== "cell" || !opened.has(piece)) continue;
    left -= 1;
    const { from } = state.doc.lineAt(cursor.from);
    // What begins at the very start of an element stands in one of its own, so it begins at the line break before the
    // plate. A cell with nothing before it is left as it is: beneath its caption.
    if (from > 0) cells.push(OPEN_CELL.range(from - 1, state.doc.lineAt(cursor.to).to));
  }
  return RangeSet.of(cells, true);
}

/** Esc within a working puts it away; the caret stands after its cell then. */
export const leaveWorking: KeyBinding = {
  key: "Escape",
  run(view) {
    const { main } = view.state.selection;
    if (view.state.readOnly || !main.empty) return false;
    const slot = openSlotAt(view.state, main.head);
    if (slot === null) return false;
    turnWorking(view, slot, false, true);
    return true;
  },
};

/** The cell in whose open working a place of the text is; null: in none. */
export function openSlotAt(state: EditorState, at: number): string | null {
  const { places, opened } = state.field(sheetField);
  let slot: string | null = null;
  places.between(at, at, (_from, _to, { piece }) => {
    if (piece.piece === "cell" && opened.has(piece)) slot = piece.slot;
  });
  return slot;
}

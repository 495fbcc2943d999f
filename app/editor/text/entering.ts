import { EditorSelection } from "@codemirror/state";
import type { EditorView, KeyBinding } from "@codemirror/view";
import { isFolded } from "../folding/fold-field.ts";
import { sheetField } from "./sheet-field.ts";

/**
 * The arrows up and down lead into what is typeset in place of whole lines, a cell or a display: its source opens with
 * the caret in it. The editor's own moves go past whatever is no line of text.
 */
export const arrowsEnter: readonly KeyBinding[] = [
  { key: "ArrowDown", run: (view) => enter(view, true) },
  { key: "ArrowUp", run: (view) => enter(view, false) },
];

function enter(view: EditorView, down: boolean): boolean {
  const { state } = view;
  const { main, ranges } = state.selection;
  if (state.readOnly || ranges.length > 1 || !main.empty) return false;
  const next = view.moveVertically(main, down);
  const line = enteredLine(view, main.head, next.head, down);
  if (line === null) return false;
  view.dispatch({
    selection: EditorSelection.create([EditorSelection.cursor(line, 1, undefined, next.goalColumn)]),
    scrollIntoView: true,
    userEvent: "select",
  });
  return true;
}

/** Where the line begins at which one comes first on the way into what is closed; null: nothing closed is passed. */
function enteredLine({ state }: EditorView, head: number, next: number, down: boolean): number | null {
  const { places, opened } = state.field(sheetField);
  const [from, to] = down ? [head, next] : [next, head];
  let found: number | null = null;
  places.between(from, to, (pieceFrom, pieceTo, { piece }) => {
    const isBlock = piece.piece === "cell" || (piece.piece === "set" && piece.block);
    if (!isBlock || opened.has(piece) || pieceFrom < from || pieceTo > to || isFolded(state, pieceFrom)) return;
    if (found === null || !down) found = state.doc.lineAt(down ? pieceFrom : pieceTo).from;
  });
  return found;
}

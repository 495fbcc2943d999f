import { type EditorState, StateEffect, type TransactionSpec } from "@codemirror/state";

/** Folds the section of the heading on a line, or unfolds it. */
export const setFold = StateEffect.define<{ readonly at: number; readonly folded: boolean }>({
  map: ({ at, folded }, changes) => ({ at: changes.mapPos(at, 1), folded }),
});
/** While the browser prints nothing is folded. */
export const setPrinting = StateEffect.define<boolean>();

/** Folds or unfolds the section of the heading at `at`; the caret goes to the heading's end, and not out of sight. */
export function turnFold({ doc }: EditorState, at: number, folded: boolean): TransactionSpec {
  const line = doc.lineAt(at);
  return { effects: setFold.of({ at: line.from, folded }), selection: { anchor: line.to } };
}

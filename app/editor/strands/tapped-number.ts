import type { EditorView } from "@codemirror/view";
import { sheetField } from "../text/sheet-field.ts";
import { digitsOf, withDigits } from "./digits.ts";
import { QUOTES } from "./quoted.ts";

/** A number of the text by where it stands there. */
export interface TappedNumber {
  readonly from: number;
  readonly to: number;
  /** How many it asks for; null where it is told otherwise. */
  readonly digits: number | null;
}

/** The number that an element of the text sets; null where it is part of a plate or a formula. */
export function numberAt(view: EditorView, element: Element): TappedNumber | null {
  if (!view.contentDOM.contains(element)) return null;
  const at = view.posAtDOM(element);
  let found: TappedNumber | null = null;
  view.state.field(sheetField).places.between(at, at, (from, to, { piece }) => {
    if (from !== at || piece.piece !== "set" || piece.content.content !== "number") return;
    found = { from, to, digits: digitsOf(view.state.sliceDoc(from, to)) };
  });
  return found;
}

/** The element in which the number at a place of the text is set; null where none is drawn. */
export function elementAt(view: EditorView, at: number): Element | null {
  const drawn = [...view.contentDOM.querySelectorAll(`[${QUOTES}]`)];
  return drawn.find((element) => numberAt(view, element)?.from === at) ?? null;
}

/** Has a number ask for as many digits: one edit of its source. */
export function showDigits(view: EditorView, { from, to }: TappedNumber, digits: number): void {
  const insert = withDigits(view.state.sliceDoc(from, to), digits);
  if (insert !== null) view.dispatch({ changes: { from, to, insert }, userEvent: "input" });
}

import type { EditorView } from "@codemirror/view";
import type { Desk } from "../live/desk.ts";
import { sheetField } from "../text/sheet-field.ts";

type Place = "prose" | "math" | "working";

/** Why no value can be quoted at the caret; "" when one can. */
export function quoteRefused(view: EditorView): string {
  return placeOf(view) === "working"
    ? "A value is quoted in a sentence or a formula; in a working its name is written as it is."
    : "";
}

/** Begins a quoted value at the caret, in place of what is chosen, with the caret where its formula goes. */
export function quoteValue(desk: Desk, view: EditorView): void {
  const { from, to } = view.state.selection.main;
  const [before, after] = placeOf(view) === "math" ? ["\\value{", "}"] : [":value[", "]"];
  const formula = view.state.sliceDoc(from, to);
  desk.edit({
    changes: { from, to, insert: `${before}${formula}${after}` },
    selection: { anchor: from + before.length + formula.length },
    scrollIntoView: true,
  });
  view.focus();
}

function placeOf({ state }: EditorView): Place {
  const { head } = state.selection.main;
  let place: Place = "prose";
  state.field(sheetField).places.between(head, head, (from, to, { piece }) => {
    if (piece.piece === "cell") place = "working";
    // At its very edge one is still in the sentence.
    else if (piece.piece === "set" && head > from && head < to && MATH.has(piece.content.content)) place = "math";
  });
  return place;
}

const MATH: ReadonlySet<string> = new Set(["math", "display"]);

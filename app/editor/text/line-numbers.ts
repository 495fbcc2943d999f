import type { BlockInfo, EditorView } from "@codemirror/view";
import { GutterMarker, gutter } from "@codemirror/view";
import { glossField } from "./glosses.ts";
import { sheetField } from "./sheet-field.ts";
import { openSlotAt } from "./working-place.ts";

/** Every how many source lines one is numbered in the margin. */
const EVERY = 5;

class LineNumber extends GutterMarker {
  readonly text: string;
  readonly mark: string;
  constructor(text: string, mark: string) {
    super();
    this.text = text;
    this.mark = mark;
  }
  override eq(other: LineNumber): boolean {
    return this.text === other.text && this.mark === other.mark;
  }
  override toDOM(): Node {
    const made = document.createElement("span");
    made.textContent = this.text;
    if (this.mark !== "") {
      const mark = document.createElement("b");
      mark.textContent = this.mark;
      made.prepend(mark);
    }
    return made;
  }
}

/**
 * Source line numbers at the right of the text. A paragraph of several source lines is one block on the sheet: it
 * bears the number of its first line when a fifth line falls within it, so that the numbers stay sparse and true.
 */
export const lineNumbers = gutter({
  class: "hl-line-numbers",
  side: "after",
  lineMarker: (view, block) => markerOf(view, block),
  widgetMarker: (view, _widget, block) => (block.to > block.from ? markerOf(view, block) : null),
  lineMarkerChange: (update) =>
    update.docChanged || update.startState.field(sheetField).shown !== update.state.field(sheetField).shown,
});

function markerOf(view: EditorView, block: BlockInfo): GutterMarker | null {
  const { doc } = view.state;
  const first = doc.lineAt(block.from).number;
  const last = doc.lineAt(Math.min(block.to, doc.length)).number;
  if (doc.lineAt(block.from).text.trim() === "") return null;
  // Blank lines bear no number: theirs falls to the block after them.
  let begin = first;
  while (begin > 1 && doc.line(begin - 1).text.trim() === "") begin -= 1;
  const mark = view.state.field(glossField).marks.get(first) ?? "";
  // The lines of an open working are numbered by themselves, from its first.
  const numbered =
    Math.floor(last / EVERY) > Math.floor((begin - 1) / EVERY) && openSlotAt(view.state, block.from) === null;
  return numbered || mark !== "" ? new LineNumber(numbered ? String(first) : "", mark) : null;
}

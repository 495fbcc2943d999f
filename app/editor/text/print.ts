import { type EditorView, ViewPlugin } from "@codemirror/view";
import { setAttention, sheetField } from "./sheet-field.ts";

/** While the browser prints, nothing is open: the paper is printed as it reads, not the source under the caret. */
export const closedInPrint = ViewPlugin.fromClass(
  class {
    private readonly view: EditorView;
    private wasAttended = false;

    constructor(view: EditorView) {
      this.view = view;
      window.addEventListener("beforeprint", this.before);
      window.addEventListener("afterprint", this.after);
    }

    destroy(): void {
      window.removeEventListener("beforeprint", this.before);
      window.removeEventListener("afterprint", this.after);
    }

    private readonly before = () => {
      this.wasAttended = this.view.state.field(sheetField).attention;
      if (this.wasAttended) this.view.dispatch({ effects: setAttention.of(false) });
    };

    private readonly after = () => {
      if (this.wasAttended) this.view.dispatch({ effects: setAttention.of(true) });
    };
  },
);

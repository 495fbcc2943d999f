import type { Extension } from "@codemirror/state";
import { type EditorView, ViewPlugin } from "@codemirror/view";
import { setPrinting } from "./fold-effects.ts";
import { foldField } from "./fold-field.ts";

/** Sections that fold, and are whole in print. */
export const folding: Extension = [
  foldField,
  ViewPlugin.define((view: EditorView) => {
    const before = () => view.dispatch({ effects: setPrinting.of(true) });
    const after = () => view.dispatch({ effects: setPrinting.of(false) });
    window.addEventListener("beforeprint", before);
    window.addEventListener("afterprint", after);
    return {
      destroy() {
        window.removeEventListener("beforeprint", before);
        window.removeEventListener("afterprint", after);
      },
    };
  }),
];

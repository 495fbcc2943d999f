import { defaultKeymap, history, historyKeymap } from "@codemirror/commands";
import { markdown } from "@codemirror/lang-markdown";
import { EditorView, keymap } from "@codemirror/view";

declare global {
  interface Window {
    openBareEditor(text: string): void;
  }
}

/** The editing component as it comes, with what an editor of Markdown needs: undo, the language, wrapped lines. */
window.openBareEditor = (text) => {
  new EditorView({
    parent: document.body,
    doc: text,
    extensions: [history(), keymap.of([...defaultKeymap, ...historyKeymap]), markdown(), EditorView.lineWrapping],
  });
};

import { StateEffect } from "@codemirror/state";
import { EditorView } from "@codemirror/view";
import { setFold } from "./fold-effects.ts";
import { foldField } from "./fold-field.ts";

/**
 * Keeps what a person has folded in a paper on this machine, and folds it again when the paper is opened. Headings are
 * known by their words, so that a fold outlasts what others write meanwhile.
 * @returns nothing is kept from now on
 */
export function keepFolds(view: EditorView, paperId: string, personId: string | null): () => void {
  const key = `halfline folds ${paperId} ${personId ?? "of a visitor"}`;
  let ended = false;
  let restored = false;
  const restore = (): void => {
    if (ended || restored) return;
    restored = true;
    const wanted = new Set(readKept(key));
    const { doc, selection } = view.state;
    const { headings } = view.state.field(foldField);
    // Where the caret has been led to already stays in sight.
    const here = headings.findLast(({ at }) => at <= selection.main.head && selection.main.head > 0);
    const found = headings.filter((heading) => heading !== here && wanted.has(doc.lineAt(heading.at).text));
    if (found.length > 0) view.dispatch({ effects: found.map(({ at }) => setFold.of({ at, folded: true })) });
  };
  const keep = (): void => {
    const { folded } = view.state.field(foldField);
    const { doc } = view.state;
    writeKept(
      key,
      [...folded].filter((at) => at <= doc.length).map((at) => doc.lineAt(at).text),
    );
  };
  const watch = EditorView.updateListener.of(({ state, startState }) => {
    if (ended) return;
    const now = state.field(foldField);
    if (!restored && now.headings.length > 0) queueMicrotask(restore);
    else if (restored && now.folded !== startState.field(foldField).folded) keep();
  });
  // React may come here from within a change of the view, which takes no other meanwhile.
  queueMicrotask(() => {
    if (ended) return;
    view.dispatch({ effects: StateEffect.appendConfig.of(watch) });
    if (view.state.field(foldField).headings.length > 0) restore();
  });
  return () => {
    ended = true;
  };
}

function readKept(key: string): readonly string[] {
  try {
    const kept: unknown = JSON.parse(localStorage.getItem(key) ?? "[]");
    return Array.isArray(kept) ? kept.filter((each): each is string => typeof each === "string") : [];
  } catch {
    return [];
  }
}

function writeKept(key: string, headings: readonly string[]): void {
  try {
    if (headings.length === 0) localStorage.removeItem(key);
    else localStorage.setItem(key, JSON.stringify(headings));
  } catch {
    // A browser that keeps nothing: the folds hold while the page is open.
  }
}

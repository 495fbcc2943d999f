import type { EditorView } from "@codemirror/view";
import { turnFold } from "./fold-effects.ts";
import { foldField } from "./fold-field.ts";
import { type Heading, headingAbove, linesBeneath } from "./sections.ts";

/** Why no section can be folded or unfolded at the caret; "" where one can. */
export function foldRefused(view: EditorView): string {
  const heading = headingAtCaret(view);
  if (heading === null) return "There is no section at the caret: a line that begins with ## is a heading.";
  const { headings } = view.state.field(foldField);
  return linesBeneath(heading, headings, view.state.doc) === null ? "There is nothing beneath this heading yet." : "";
}

/** Why nothing can be folded; "" where something can. */
export function noSections(view: EditorView): string {
  return view.state.field(foldField).headings.length === 0 ? "There are no sections yet." : "";
}

/** Folds the section in which the caret is, or unfolds the one at whose heading it is. */
export function turnSectionAtCaret(view: EditorView): void {
  const heading = headingAtCaret(view);
  if (heading === null) return;
  const { folded } = view.state.field(foldField);
  view.dispatch({ ...turnFold(view.state, heading.at, !folded.has(heading.at)), scrollIntoView: true });
  view.focus();
}

/** Folds every section of the highest level, or unfolds all there is where any is folded. */
export function turnEverySection(view: EditorView): void {
  const { headings, folded } = view.state.field(foldField);
  const top = Math.min(...headings.map(({ level }) => level));
  const fold = folded.size === 0;
  const which = fold ? headings.filter(({ level }) => level === top).map(({ at }) => at) : [...folded];
  const effects = which.flatMap((at) => turnFold(view.state, at, fold).effects ?? []);
  const heading = fold ? headingAtCaret(view) : null;
  const atTop = headings.findLast(({ at, level }) => level === top && at <= (heading?.at ?? -1));
  view.dispatch({
    effects: effects.flat(),
    ...(atTop === undefined ? {} : { selection: { anchor: view.state.doc.lineAt(atTop.at).to } }),
    scrollIntoView: true,
  });
}

function headingAtCaret({ state }: EditorView): Heading | null {
  return headingAbove(state.field(foldField).headings, state.selection.main.head, state.doc);
}

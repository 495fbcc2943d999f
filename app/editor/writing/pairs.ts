import { closeBrackets, closeBracketsKeymap } from "@codemirror/autocomplete";
import { EditorState, type Extension, Prec, StateEffect, StateField } from "@codemirror/state";
import { Decoration, type DecorationSet, EditorView, keymap, ViewPlugin, type ViewUpdate } from "@codemirror/view";
import { closingLine } from "./closing.ts";
import { matesAt } from "./mates.ts";
import { inMath } from "./place.ts";

/** How long the caret rests before mates are looked for, in ms: not within a keystroke's own frame. */
const REST_MS = 80;

const setMates = StateEffect.define<DecorationSet>();

const matesField = StateField.define<DecorationSet>({
  create: () => Decoration.none,
  update(before, transaction) {
    for (const effect of transaction.effects) if (effect.is(setMates)) return effect.value;
    return transaction.docChanged || transaction.selection !== undefined ? Decoration.none : before;
  },
  provide: (field) => EditorView.decorations.from(field),
});

const MATED = Decoration.mark({ class: "hl-mate" });

const mates = ViewPlugin.fromClass(
  class {
    private readonly view: EditorView;
    private timer: ReturnType<typeof setTimeout> | undefined;
    constructor(view: EditorView) {
      this.view = view;
    }
    update(update: ViewUpdate) {
      if (!update.docChanged && !update.selectionSet) return;
      clearTimeout(this.timer);
      this.timer = setTimeout(() => this.mark(), REST_MS);
    }
    destroy() {
      clearTimeout(this.timer);
    }
    private mark() {
      const { state } = this.view;
      const { main } = state.selection;
      if (!main.empty || !MARKS.test(state.sliceDoc(Math.max(0, main.head - 12), main.head + 12))) return;
      const found = matesAt(state.doc.toString(), main.head);
      if (found === null || found.mate === null) return;
      const marks = [found.own, found.mate].map(({ from, to }) => MATED.range(from, to));
      this.view.dispatch({ effects: setMates.of(Decoration.set(marks, true)) });
    }
  },
);

const MARKS = /[()[\]{}$`:]/;

/** Enter after what opens a block: its closing line is written too, unless it is there. */
export function enterWithin(view: EditorView): boolean {
  const { state } = view;
  const { main } = state.selection;
  const line = state.doc.lineAt(main.head);
  if (state.readOnly || !main.empty || !OPENING.test(state.sliceDoc(line.from, main.head))) return false;
  const closing = closingLine(state.doc.toString(), main.head);
  if (closing === null) return false;
  view.dispatch({
    changes: { from: main.head, to: line.to, insert: `\n\n${closing}` },
    selection: { anchor: main.head + 1 },
    userEvent: "input",
    scrollIntoView: true,
  });
  return true;
}

const OPENING = /^ {0,3}`{3}|^:::|^\s*\$\$\s*$|\\begin\{/;

/** A dollar: over the one that closes, or with its mate where it opens and nothing stands against it. */
function dollar(view: EditorView, from: number, to: number, typed: string): boolean {
  const { state } = view;
  if (typed !== "$" || from !== to || state.readOnly) return false;
  const line = state.doc.lineAt(from);
  const next = state.sliceDoc(from, from + 1);
  const open = inMath(blockBefore(state, line.number) + state.sliceDoc(line.from, from));
  const before = state.sliceDoc(Math.max(line.from, from - 1), from);
  if (open && next === "$") view.dispatch({ selection: { anchor: from + 1 }, scrollIntoView: true });
  else {
    const opens = !open && !/[\w\\$]/.test(before) && (next === "" || /[\s.,;:)\]}]/.test(next));
    view.dispatch({
      changes: { from, insert: opens ? "$$" : "$" },
      selection: { anchor: from + 1 },
      userEvent: "input.type",
      scrollIntoView: true,
    });
  }
  return true;
}

/** The lines above one, up to the nearest blank one. */
function blockBefore({ doc }: EditorState, number: number): string {
  let first = number;
  while (first > 1 && doc.line(first - 1).text.trim() !== "") first -= 1;
  return doc.sliceString(doc.line(first).from, doc.line(number).from);
}

/** Brackets and dollars close themselves where what is typed opens one; their mates are marked. */
export const pairs: Extension = [
  EditorState.languageData.of(() => [{ closeBrackets: { brackets: ["(", "[", "{", "$"], before: ")]}$.,;: \n" } }]),
  Prec.high(EditorView.inputHandler.of(dollar)),
  closeBrackets(),
  keymap.of(closeBracketsKeymap),
  Prec.high(keymap.of([{ key: "Enter", run: enterWithin }])),
  matesField,
  mates,
];

import {
  acceptCompletion,
  autocompletion,
  type Completion,
  type CompletionContext,
  type CompletionResult,
  completionKeymap,
  pickedCompletion,
  startCompletion,
} from "@codemirror/autocomplete";
import { EditorState, type Extension, Prec } from "@codemirror/state";
import { EditorView, keymap, showTooltip } from "@codemirror/view";
import { sheetField } from "../text/sheet-field.ts";
import { openSlotAt } from "../text/working-place.ts";
import { wordsWithMath } from "./set-words.ts";
import { type Suggestion, suggestionsAt } from "./suggest.ts";

/** How long the writing rests before suggestions are looked for, in ms: never within a keystroke's own frame. */
const REST_MS = 120;
/** In plain prose it is settled that nothing is suggested when the writing has rested so much longer, in ms. */
const SETTLED_MS = 200;
/** Shown at once; the arrows lead on to the next so many. So nothing scrolls that the keyboard could not reach. */
const MOST_SHOWN = 8;

interface Listed extends Completion {
  readonly suggestion: Suggestion;
}

/**
 * The editor hides what floats beside a place within the scroll margins of its own top and end. Here these margins are
 * those of the window, for the rule and the tail line, and the text's first and last lines are in full sight.
 */
const inFullSight = EditorView.updateListener.of(({ state }) => {
  for (const floating of state.facet(showTooltip)) if (floating !== null) Object.assign(floating, { clip: false });
});

/**
 * Suggestions beneath the line: arrows choose, Enter or Tab accepts, Esc leaves, Ctrl-Space asks for them. While none
 * are shown all of these keep their meaning.
 */
export const suggestionList: Extension = [
  inFullSight,
  EditorState.phrases.of({ Completions: "Suggestions" }),
  autocompletion({
    override: [(context) => suggest(context) ?? nothing(context)],
    icons: false,
    defaultKeymap: false,
    activateOnTypingDelay: REST_MS,
    maxRenderedOptions: MOST_SHOWN,
    tooltipClass: (state) =>
      openSlotAt(state, state.selection.main.head) === null ? "hl-suggestions" : "hl-suggestions hl-suggestions-aside",
    addToOptions: [{ render: meaningOf, position: 80 }],
  }),
  Prec.highest(keymap.of([...completionKeymap, { key: "Tab", run: acceptCompletion }])),
];

function suggest({ state, pos, explicit }: CompletionContext): CompletionResult | null {
  const { model } = state.field(sheetField);
  if (state.readOnly || model === null) return null;
  const found = suggestionsAt(state.doc.toString(), pos, model);
  if (found === null) return null;
  const { from, list } = found;
  const wanted = (word: string) => explicit || ((word !== "" || found.eager) && !isWritten(word, list));
  if (!wanted(state.sliceDoc(from, pos))) return null;
  return {
    from,
    options: list.map((suggestion, place): Listed => {
      // In the list's own order where several match equally well.
      return { label: suggestion.label, boost: -place / list.length, apply: accept, suggestion };
    }),
    validFor: (word) => WORD.test(word) && wanted(word),
  };
}

/**
 * That nothing is suggested is an answer as well, and each answer costs as much as a key: while one goes on writing
 * there is none.
 */
function nothing(context: CompletionContext): Promise<null> | null {
  if (context.explicit) return null;
  return new Promise((resolve) => {
    const timer = setTimeout(() => resolve(null), SETTLED_MS);
    const end = () => {
      clearTimeout(timer);
      resolve(null);
    };
    context.addEventListener("abort", end, { onDocChange: true });
  });
}

const WORD = /^\\?[\w:.-]*$/;

/** The word stands there in full and could not become another: Enter is a new line again. */
function isWritten(word: string, list: readonly Suggestion[]): boolean {
  const possible = list.filter(({ label }) => label.startsWith(word));
  return possible.length === 1 && possible[0]?.insert === word;
}

/** After these, what belongs there is suggested at once. */
const LEADS_ON = /^(?:(?:value|ref|cite)\[\]|(?:of|show|offspring|scale): )$/;

function accept(view: EditorView, completion: Completion, from: number, to: number): void {
  const { insert, back } = (completion as Listed).suggestion;
  // Brackets that stand there already are not written again.
  const ends = insert.slice(insert.length - back - 1);
  const written = back > 0 && view.state.sliceDoc(to, to + 1) === ends[0];
  const text = written ? insert.slice(0, -back - 1) : insert;
  const anchor = from + (written ? text.length + 1 : insert.length - back);
  view.dispatch({
    changes: { from, to, insert: text },
    selection: { anchor },
    annotations: pickedCompletion.of(completion),
    userEvent: "input.complete",
    scrollIntoView: true,
  });
  if (LEADS_ON.test(insert)) startCompletion(view);
}

function meaningOf(completion: Completion, state: EditorState): Node {
  const made = document.createElement("span");
  made.className = "hl-suggestion-meaning";
  made.append(wordsWithMath((completion as Listed).suggestion.meaning, state.field(sheetField).model?.macros ?? {}));
  return made;
}

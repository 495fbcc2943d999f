import { StateEffect, StateField } from "@codemirror/state";
import { Decoration, type DecorationSet, EditorView } from "@codemirror/view";
import { findMatches, type Match, type Matches, NO_MATCHES, type Sought } from "./sought.ts";

/** Looks for something in the text, from now on through every change; null ends it. */
export const setSought = StateEffect.define<Sought | null>();
/** Which of the matches one is at, by its place in their order; null: at none. */
export const setHere = StateEffect.define<number | null>();

export interface Found extends Matches {
  readonly sought: Sought | null;
  /** The match one is at; what hides it is open. */
  readonly here: Match | null;
  readonly marks: DecorationSet;
}

const NOTHING: Found = { ...NO_MATCHES, sought: null, here: null, marks: Decoration.none };

/** What is found in the text, marked where it shows. */
export const foundField = StateField.define<Found>({
  create: () => NOTHING,
  update(before, transaction) {
    let { sought, here } = before;
    let listed: Matches = before;
    let anew = transaction.docChanged && sought !== null;
    for (const effect of transaction.effects) {
      if (!effect.is(setSought)) continue;
      sought = effect.value;
      here = null;
      anew = true;
    }
    if (sought === null) return before.sought === null ? before : NOTHING;
    if (anew) listed = findMatches(transaction.newDoc, sought);
    if (anew && here !== null) {
      const [from, to] = [transaction.changes.mapPos(here.from, 1), transaction.changes.mapPos(here.to, -1)];
      here = listed.matches.find((match) => match.from === from && match.to === to) ?? null;
    }
    for (const effect of transaction.effects) {
      if (effect.is(setHere)) here = effect.value === null ? null : (listed.matches[effect.value] ?? null);
    }
    if (!anew && here === before.here) return before;
    const { matches, more, fault } = listed;
    return { matches, more, fault, sought, here, marks: marksOf(matches, here) };
  },
  provide: (field) => EditorView.decorations.from(field, (found) => found.marks),
});

function marksOf(matches: readonly Match[], here: Match | null): DecorationSet {
  return Decoration.set(matches.map((match) => (match === here ? HERE : ELSEWHERE).range(match.from, match.to)));
}

const HERE = Decoration.mark({ class: "hl-found hl-found-here" });
const ELSEWHERE = Decoration.mark({ class: "hl-found" });

const watchers = new WeakMap<EditorView, Set<() => void>>();

/** Tells those who watch what is found. */
export const foundNews = EditorView.updateListener.of(({ view, startState, state }) => {
  if (startState.field(foundField) === state.field(foundField)) return;
  for (const watcher of watchers.get(view) ?? []) watcher();
});

/** @returns ends the watch */
export function watchFound(view: EditorView, onChange: () => void): () => void {
  const watching = watchers.get(view) ?? new Set();
  watchers.set(view, watching.add(onChange));
  return () => watching.delete(onChange);
}

import type { StateEffect } from "@codemirror/state";
import { EditorView } from "@codemirror/view";
import type { Desk } from "../live/desk.ts";
import { foundField, setHere, setSought } from "../text/found.ts";
import { type Match, replacementOf, type Sought } from "../text/sought.ts";

type Direction = 1 | -1;

/** Looks for something, and goes to the first place at or after `from` where it stands; past the end, from the start. */
export function seek(view: EditorView, sought: Sought, from: number): void {
  view.dispatch({ effects: setSought.of(sought) });
  const { matches } = view.state.field(foundField);
  const first = matches.findIndex((match) => match.from >= from);
  if (matches.length > 0) goTo(view, Math.max(0, first));
}

/** Goes to the next or the previous match; around the end of the paper. @returns false when there is none */
export function goToMatch(view: EditorView, direction: Direction): boolean {
  const { matches, here } = view.state.field(foundField);
  if (matches.length === 0) return false;
  const { from, to } = here ?? view.state.selection.main;
  const next =
    direction === 1
      ? matches.findIndex((match) => match.from >= to && match !== here)
      : matches.findLastIndex((match) => match.to <= from && match !== here);
  goTo(view, next >= 0 ? next : direction === 1 ? 0 : matches.length - 1);
  return true;
}

/** Writes something in the place of the match one is at, and goes to the next. @returns false when one is at none */
export function replaceHere(desk: Pick<Desk, "edit">, view: EditorView, replacement: string): boolean {
  const { sought, here } = view.state.field(foundField);
  if (sought === null || here === null) return false;
  const insert = replacementOf(here, replacement, sought);
  desk.edit({
    changes: { from: here.from, to: here.to, insert },
    selection: { anchor: here.from + insert.length },
    userEvent: "input.replace",
  });
  goToMatch(view, 1);
  return true;
}

/** Writes something in the place of all matches, as one edit. @returns how many there were */
export function replaceAll(desk: Pick<Desk, "edit">, view: EditorView, replacement: string): number {
  const { sought, matches } = view.state.field(foundField);
  if (sought === null || matches.length === 0) return 0;
  desk.edit({
    changes: matches.map((match: Match) => ({
      from: match.from,
      to: match.to,
      insert: replacementOf(match, replacement, sought),
    })),
    userEvent: "input.replace.all",
  });
  return matches.length;
}

/** Ends the search; the marks go, and what was opened for it closes. */
export function endSearch(view: EditorView): void {
  view.dispatch({ effects: setSought.of(null) });
}

function goTo(view: EditorView, index: number): void {
  const match = view.state.field(foundField).matches[index];
  if (match === undefined) return;
  const effects: StateEffect<unknown>[] = [setHere.of(index), EditorView.scrollIntoView(match.from, { y: "center" })];
  view.dispatch({ selection: { anchor: match.from, head: match.to }, effects });
}

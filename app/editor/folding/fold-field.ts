import { type EditorState, Prec, type RangeSet, StateField, type Transaction } from "@codemirror/state";
import { Decoration, type DecorationSet, EditorView } from "@codemirror/view";
import type { SheetModel } from "../model/types.ts";
import type { Place } from "../text/places.ts";
import { sheetField } from "../text/sheet-field.ts";
import { setFold, setPrinting } from "./fold-effects.ts";
import { FoldLine, FoldWord } from "./fold-widgets.ts";
import { type Heading, headingsOf, heldIn, heldWords, linesBeneath } from "./sections.ts";

/** A folded section: its heading's line, and the lines that are not shown. */
interface Fold {
  readonly heading: Heading;
  readonly from: number;
  readonly to: number;
}

interface Folding {
  /** Of the sheet that was looked at last. */
  readonly places: RangeSet<Place> | null;
  readonly model: SheetModel | null;
  readonly headings: readonly Heading[];
  /** Starts of the lines of headings that are folded. */
  readonly folded: ReadonlySet<number>;
  readonly folds: readonly Fold[];
  readonly printing: boolean;
  /** The fold's own lines. */
  readonly lines: DecorationSet;
  /** The words "Fold" and "Unfold" at the headings. */
  readonly words: DecorationSet;
}

/**
 * The sections that are folded. What is folded stays in the text and is changed by others as before; the caret never
 * stands in it: where it is put there, by whatever leads there, the section unfolds.
 */
export const foldField = StateField.define<Folding>({
  create: () => ({
    places: null,
    model: null,
    headings: [],
    folded: new Set(),
    folds: [],
    printing: false,
    lines: Decoration.none,
    words: Decoration.none,
  }),
  update(before, transaction) {
    const { state, docChanged, changes } = transaction;
    const { places, model } = state.field(sheetField);
    let { headings, folded, printing } = before;
    if (docChanged && headings.length > 0) {
      headings = movedHeadings(headings, transaction);
      if (folded.size > 0) folded = new Set([...folded].map((at) => changes.mapPos(at, 1)));
    }
    if (model !== before.model) headings = sameHeadings(headingsOf(places, state.doc), headings);
    for (const effect of transaction.effects) {
      if (effect.is(setFold)) folded = turned(folded, effect.value.at, effect.value.folded);
      else if (effect.is(setPrinting)) printing = effect.value;
    }
    // Not only where the caret was moved: a heading that is no more may leave it beneath another, folded one.
    folded = openedAt(folded, headings, state);
    const same = headings === before.headings && folded === before.folded && printing === before.printing;
    if (same && places === before.places && model === before.model) return before;
    const next = { places, model, headings, folded, printing };
    if (same && folded.size === 0) return { ...before, ...next };
    const folds = printing ? [] : foldsOf(folded, headings, state);
    const wordsStay = headings === before.headings && folded === before.folded;
    return {
      ...next,
      folds,
      lines: linesOf(folds, state),
      words: wordsStay ? before.words : wordsAt(headings, folded, state),
    };
  },
  provide: (field) => [
    Prec.high(EditorView.decorations.from(field, ({ lines }) => lines)),
    EditorView.decorations.from(field, ({ words }) => words),
  ],
});

/** Whether a place of the text is folded away. */
export function isFolded(state: EditorState, at: number): boolean {
  return state.field(foldField, false)?.folds.some(({ from, to }) => at >= from && at <= to) ?? false;
}

function movedHeadings(headings: readonly Heading[], { changes, newDoc }: Transaction): readonly Heading[] {
  return headings.map((heading) => ({ ...heading, at: newDoc.lineAt(changes.mapPos(heading.at, 1)).from }));
}

/** The very list of before where nothing is other. */
function sameHeadings(now: readonly Heading[], before: readonly Heading[]): readonly Heading[] {
  const isSame = now.length === before.length && now.every((heading, k) => isSameHeading(heading, before[k]));
  return isSame ? before : now;
}

function isSameHeading(a: Heading, b: Heading | undefined): boolean {
  return a.at === b?.at && a.level === b.level && a.number === b.number;
}

function turned(folded: ReadonlySet<number>, at: number, fold: boolean): ReadonlySet<number> {
  if (folded.has(at) === fold) return folded;
  const next = new Set(folded);
  if (fold) next.add(at);
  else next.delete(at);
  return next;
}

/** Without the folds in which the caret has been put. */
function openedAt(folded: ReadonlySet<number>, headings: readonly Heading[], state: EditorState): ReadonlySet<number> {
  const { head } = state.selection.main;
  let left = folded;
  for (const { heading, from, to } of foldsOf(folded, headings, state, true)) {
    if (head >= from && head <= to) left = turned(left, heading.at, false);
  }
  return left;
}

/** @param within those too that lie in another */
function foldsOf(
  folded: ReadonlySet<number>,
  headings: readonly Heading[],
  { doc }: EditorState,
  within = false,
): readonly Fold[] {
  if (folded.size === 0) return [];
  const folds: Fold[] = [];
  for (const heading of headings) {
    const lines = folded.has(heading.at) ? linesBeneath(heading, headings, doc) : null;
    if (lines !== null && (within || lines.from > (folds.at(-1)?.to ?? -1))) folds.push({ heading, ...lines });
  }
  return folds;
}

function linesOf(folds: readonly Fold[], state: EditorState): DecorationSet {
  if (folds.length === 0) return Decoration.none;
  const { places, model } = state.field(sheetField);
  return Decoration.set(
    folds.map(({ heading, from, to }) => {
      const held = heldIn(places, from, to);
      const faces = model?.cells.filter(({ slot }) => held.slots.includes(slot)) ?? [];
      const lines = state.doc.lineAt(to).number - state.doc.lineAt(from).number + 1;
      const widget = new FoldLine(heldWords(heading.number, faces, lines), held);
      return Decoration.replace({ widget, block: true }).range(from, to);
    }),
  );
}

function wordsAt(headings: readonly Heading[], folded: ReadonlySet<number>, { doc }: EditorState): DecorationSet {
  return Decoration.set(
    headings.map(({ at, number }) =>
      Decoration.widget({ widget: new FoldWord(number, folded.has(at)), side: 2 }).range(doc.lineAt(at).to),
    ),
  );
}

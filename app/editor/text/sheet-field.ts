import {
  type ChangeDesc,
  type EditorState,
  type Range,
  RangeSet,
  type RangeValue,
  StateEffect,
  StateField,
  type Text,
} from "@codemirror/state";
import { type Decoration, type DecorationSet, EditorView } from "@codemirror/view";
import type { CellFace, Piece, SheetModel } from "../model/types.ts";
import { sameLook } from "./cell-widget.tsx";
import { BLANK, closedDecorations, openedDecorations, type Workshop } from "./decorate.ts";
import { foundField } from "./found.ts";
import { eachLayer, inLayers, inView, type Layers, NO_LAYERS } from "./layers.ts";
import { afterDelta } from "./piece-list.ts";
import { hiding, type Place, placesOf, touched } from "./places.ts";
import { WidgetStore } from "./widgets.ts";

/** An answer of the worker, with the text that it is about and what has changed since that was asked. */
export const applyModel = StateEffect.define<{ model: SheetModel; doc: Text; since: ChangeDesc }>();
/** Opens or puts away a cell's working, whether or not the caret is in it. */
export const showWorking = StateEffect.define<{ slot: string; open: boolean }>();
/** The text gained or lost the focus; without it nothing is open by the caret. */
export const setAttention = StateEffect.define<boolean>();
/** While the pointer is pressed nothing opens or closes, so that what is pointed at stays under it. */
export const setPressed = StateEffect.define<boolean>();

interface Sheet {
  readonly model: SheetModel | null;
  /** Of the answer whose pieces these are; 0: none yet. */
  readonly number: number;
  readonly pieces: readonly Piece[];
  /** Pieces that changes of the text have met since that answer: what is drawn of them is not to be relied on. */
  readonly met: ReadonlySet<Piece>;
  readonly workshop: Workshop;
  readonly places: RangeSet<Place>;
  /** Drawn while nothing is open. */
  readonly closed: Layers;
  readonly opened: ReadonlySet<Piece>;
  /** Drawn now. */
  readonly shown: Layers;
  readonly workings: ReadonlySet<string>;
  readonly attention: boolean;
  readonly pressed: boolean;
}

const NOTHING: ReadonlySet<Piece> = new Set();

/**
 * The typeset sheet over the text:
 *
 *     answer ──▶ closed ──(pieces under the caret taken out, their source dressed)──▶ shown
 *     change ──▶ places and closed are moved through it, pieces that it meets are noted
 *     next answer ──▶ of its pieces those that are new, or were met, are drawn; the others stay as they are
 */
export const sheetField = StateField.define<Sheet>({
  create: () => ({
    model: null,
    number: 0,
    pieces: [],
    met: NOTHING,
    workshop: { store: new WidgetStore(), faces: new Map() },
    places: RangeSet.empty,
    closed: NO_LAYERS,
    opened: NOTHING,
    shown: NO_LAYERS,
    workings: new Set(),
    attention: false,
    pressed: false,
  }),
  update(before, transaction) {
    let { model, number, pieces, met, workshop, places, closed, workings, attention, pressed } = before;
    if (transaction.docChanged) {
      met = withMet(met, places, transaction.changes);
      places = places.map(transaction.changes);
      closed = eachLayer(closed, (set) => withoutEmptied(set.map(transaction.changes), transaction.changes));
      const marks = withoutFilledBlanks(closed.marks, transaction.changes, transaction.newDoc);
      if (marks !== closed.marks) closed = { ...closed, marks };
    }
    for (const effect of transaction.effects) {
      if (effect.is(applyModel)) {
        const { doc, since } = effect.value;
        const faces = facesOf(effect.value.model.cells);
        const whole = !workshop.store.begin(effect.value.model.macros);
        const delta = effect.value.model.pieces;
        if (delta.base !== 0 && delta.base !== number) continue;
        const cellsChanged = pieces.filter(
          (piece) => piece.piece === "cell" && changedLook(piece.slot, workshop.faces, faces),
        );
        const list = afterDelta(pieces, delta, whole ? new Set(pieces) : new Set([...met, ...cellsChanged]));
        model = effect.value.model;
        workshop = { store: workshop.store, faces };
        ({ number, pieces } = list);
        const made = inLayers(closedDecorations(list.fresh, doc, workshop), doc);
        const layers = eachLayer(made, (set) => withoutEmptied(set.map(since), since));
        const drawn = RangeSet.of(placesOf(list.fresh, doc.length), true);
        // What is drawn late has been met already by what changed since it was asked for.
        met = withMet(NOTHING, drawn, since);
        const fresh = drawn.map(since);
        const bounds = boundsOf(places, list.gone);
        const isGone = (mark: Decoration) => list.gone.has(mark.spec.of);
        closed = eachLayer(closed, (set, name) => merged(set, isGone, layers[name], bounds, transaction.newDoc));
        places = merged(places, (place) => list.gone.has(place.piece), fresh, bounds, transaction.newDoc);
      } else if (effect.is(showWorking)) {
        const next = new Set(workings);
        if (effect.value.open) next.add(effect.value.slot);
        else next.delete(effect.value.slot);
        workings = next;
      } else if (effect.is(setAttention)) attention = effect.value;
      else if (effect.is(setPressed)) pressed = effect.value;
    }
    const next = { model, number, pieces, met, workshop, places, closed, workings, attention, pressed };
    if (pressed && before.pressed && closed === before.closed)
      return { ...next, opened: before.opened, shown: before.shown };
    const opened = openPieces(next, transaction.state, before);
    if (closed === before.closed && same(opened, before.opened)) return { ...next, opened, shown: before.shown };
    return { ...next, opened, shown: withOpened(next, opened, transaction.state.doc) };
  },
  // What replaces comes first, so that the dress of words goes around it.
  provide: (field) => [
    inView(({ state }) => state.field(field).shown.inline),
    EditorView.decorations.from(field, ({ shown }) => shown.blocks),
    EditorView.decorations.from(field, ({ shown }) => shown.marks),
  ],
});

/** Without the marks whose words a change has taken away. Only where it took some can there be such. */
function withoutEmptied(marks: DecorationSet, changes: ChangeDesc): DecorationSet {
  let left = marks;
  changes.iterChangedRanges((fromA, toA, fromB, toB) => {
    if (toA === fromA) return;
    const stays = (from: number, to: number, mark: Decoration) => mark.point || from < to;
    left = without(left, fromB, toB, stays);
  });
  return left;
}

/** Without the marks from..to that do not stay. The very set where all do: then nothing of it need be compared. */
function without(
  marks: DecorationSet,
  filterFrom: number,
  filterTo: number,
  filter: (from: number, to: number, mark: Decoration) => boolean,
): DecorationSet {
  let all = true;
  marks.between(filterFrom, filterTo, (from, to, mark) => {
    all = filter(from, to, mark);
    return all ? undefined : false;
  });
  return all ? marks : marks.update({ filter, filterFrom, filterTo });
}

interface Bounds {
  readonly from: number;
  readonly to: number;
}

/** Between which places some pieces stand; null: there are none. All of the text, where a place is not known any more. */
function boundsOf(places: RangeSet<Place>, pieces: ReadonlySet<unknown>): Bounds | null {
  if (pieces.size === 0) return null;
  let [from, to, left] = [Number.POSITIVE_INFINITY, -1, pieces.size];
  for (const cursor = places.iter(); cursor.value !== null && left > 0; cursor.next()) {
    if (!pieces.has(cursor.value.piece)) continue;
    left -= 1;
    from = Math.min(from, cursor.from);
    to = Math.max(to, cursor.to);
  }
  return left > 0 ? { from: 0, to: Number.POSITIVE_INFINITY } : { from, to };
}

/**
 * Takes out what is gone, puts in what is new. `bounds` are where the pieces stand that are gone: what is drawn of a
 * piece lies on its lines or touches them, and all other marks are left as they are.
 */
function merged<T extends RangeValue>(
  set: RangeSet<T>,
  gone: (value: T) => boolean,
  fresh: RangeSet<T>,
  bounds: Bounds | null,
  doc: Text,
): RangeSet<T> {
  const add: Range<T>[] = [];
  for (const cursor = fresh.iter(); cursor.value !== null; cursor.next()) {
    add.push(cursor.value.range(cursor.from, cursor.to) as Range<T>);
  }
  if (bounds === null) return add.length === 0 ? set : set.update({ add, sort: true });
  return set.update({
    filter: (_from, _to, value) => !gone(value),
    filterFrom: doc.lineAt(Math.max(0, bounds.from - 1)).from,
    filterTo: doc.lineAt(Math.min(doc.length, bounds.to + 1)).to,
    add,
    sort: true,
  });
}

/** The pieces that a change meets, besides those met before. */
function withMet(met: ReadonlySet<Piece>, places: RangeSet<Place>, changes: ChangeDesc): ReadonlySet<Piece> {
  const now = new Set(met);
  changes.iterChangedRanges((from, to) => {
    places.between(from, to, (_from, _to, { piece }) => {
      now.add(piece);
    });
  });
  return now;
}

function changedLook(slot: string, before: Workshop["faces"], after: Workshop["faces"]): boolean {
  const [was, is] = [before.get(slot), after.get(slot)];
  return was === undefined || is === undefined || !sameLook(was, is);
}

/** A blank line on which something is written is no longer set low, without waiting for the next answer. */
function withoutFilledBlanks(closed: DecorationSet, changes: ChangeDesc, doc: Text): DecorationSet {
  let left = closed;
  changes.iterChangedRanges((_fromA, _toA, fromB, toB) => {
    const stays = (from: number, _to: number, mark: Decoration) =>
      mark.spec.class !== BLANK || doc.lineAt(from).length === 0;
    left = without(left, doc.lineAt(fromB).from, doc.lineAt(toB).to, stays);
  });
  return left;
}

function facesOf(cells: readonly CellFace[]): Map<string, CellFace> {
  return new Map(cells.map((face) => [face.slot, face]));
}

function openPieces(sheet: Omit<Sheet, "opened" | "shown">, state: EditorState, before: Sheet): ReadonlySet<Piece> {
  // An answer that comes while the pointer is pressed has new pieces: those at the old places stay as they were.
  const byCaret = sheet.attention && !state.readOnly && !(sheet.pressed && before.opened.size === 0);
  const opened = byCaret ? touched(sheet.places, state) : new Set<Piece>();
  const found = state.field(foundField, false)?.here ?? null;
  if (found !== null) for (const piece of hiding(sheet.places, found)) opened.add(piece);
  if (sheet.workings.size > 0) {
    for (const cursor = sheet.places.iter(); cursor.value !== null; cursor.next()) {
      const { piece } = cursor.value;
      if (piece.piece === "cell" && sheet.workings.has(piece.slot)) opened.add(piece);
    }
  }
  return opened.size === 0 ? NOTHING : opened;
}

function same(a: ReadonlySet<Piece>, b: ReadonlySet<Piece>): boolean {
  if (a === b) return true;
  if (a.size !== b.size) return false;
  for (const piece of a) if (!b.has(piece)) return false;
  return true;
}

function withOpened(sheet: Omit<Sheet, "opened" | "shown">, opened: ReadonlySet<Piece>, doc: Text): Layers {
  if (opened.size === 0) return sheet.closed;
  let [filterFrom, filterTo, left] = [doc.length, 0, opened.size];
  const made: ReturnType<typeof openedDecorations> = [];
  for (const cursor = sheet.places.iter(); cursor.value !== null && left > 0; cursor.next()) {
    const { piece } = cursor.value;
    if (!opened.has(piece)) continue;
    left -= 1;
    filterFrom = Math.min(filterFrom, doc.lineAt(cursor.from).from);
    filterTo = Math.max(filterTo, doc.lineAt(cursor.to).to);
    made.push(...openedDecorations(piece, cursor.from, cursor.to, doc, sheet.workshop));
  }
  const layers = inLayers(made, doc);
  return eachLayer(sheet.closed, (set, name) => {
    const stays = (_from: number, _to: number, mark: Decoration) => !opened.has(mark.spec.piece);
    return merged(without(set, filterFrom, filterTo, stays), () => false, layers[name], null, doc);
  });
}

import type { EditorView } from "@codemirror/view";
import type { CellFace, NumberFace, NumberState, SheetModel } from "../model/types.ts";
import { sheetField } from "../text/sheet-field.ts";
import { BAND, type Index } from "./lay-heads.ts";
import { QUOTES, quotedIn } from "./quoted.ts";
import type { Reach } from "./reach.ts";
import type { Scene, SceneCell, SceneQuote } from "./types.ts";

/** The elements among which strands run. */
export interface Grounds {
  readonly view: EditorView;
  /** Holds the text; places are told from its corner. */
  readonly column: HTMLElement;
  readonly rule: HTMLElement | null;
}

/** Places on the page, as read in one go. */
export interface Places {
  readonly margin: number;
  readonly top: number;
  readonly bottom: number;
  /** Where the view begins, below the rule and the strands' heads; and the same in whole steps. */
  readonly viewTop: number;
  readonly stepTop: number;
  readonly cells: ReadonlyMap<string, NonNullable<SceneCell["box"]>>;
  readonly quotes: readonly (SceneQuote & {
    readonly faces: readonly NumberFace[];
    readonly element: Element | null;
  })[];
  readonly indices: readonly Index[];
  /** Of the rule, beneath which the heads stay [px]. */
  readonly ruleHeight: number;
  /** From where to where the section in view goes. */
  readonly section: { readonly from: number; readonly to: number };
}

/** So much above and below what is in view is drawn too, so that scrolling finds it there [px]. */
const ROOM = 240;
/** What is drawn changes in steps of so much scrolling: in between the page moves as it is [px]. */
export const STEP = 120;
/** Height of the tail line [px]. */
const TAIL = 40;

/** Reads all places. It asks the page for boxes and changes nothing, so it belongs in the reading part of a measuring. */
export function readPlaces({ view, column, rule }: Grounds): Places {
  const origin = column.getBoundingClientRect();
  const ruleBox = rule?.getBoundingClientRect() ?? null;
  const viewTop = Math.max(0, (ruleBox?.bottom ?? 0) + (rule === null ? 0 : BAND)) - origin.top;
  const viewBottom = window.innerHeight - TAIL - origin.top;
  return {
    margin: origin.left,
    top: Math.max(0, inSteps(viewTop) - ROOM),
    bottom: Math.min(origin.height, inSteps(viewBottom) + STEP + ROOM),
    viewTop,
    stepTop: inSteps(viewTop),
    cells: readCells(view.contentDOM, origin),
    quotes: [...readQuotes(column, origin), ...readOpened(view, origin)],
    indices: rule === null || ruleBox === null ? [] : readIndices(rule, ruleBox, origin),
    ruleHeight: rule?.offsetHeight ?? 0,
    section: readSection(view.contentDOM, origin, viewTop + (viewBottom - viewTop) / 3),
  };
}

/** The last whole step of scrolling at or before y. */
export function inSteps(y: number): number {
  return Math.floor(y / STEP) * STEP;
}

function readCells(content: HTMLElement, origin: DOMRect): Places["cells"] {
  const cells = new Map<string, NonNullable<SceneCell["box"]>>();
  for (const cell of content.querySelectorAll<HTMLElement>(".hl-cell[data-slot]")) {
    const box = (cell.firstElementChild ?? cell).getBoundingClientRect();
    const caption = (cell.querySelector(".hl-caption") ?? cell).getBoundingClientRect();
    const [top, bottom] = [box.top - origin.top, box.bottom - origin.top];
    cells.set(cell.dataset.slot ?? "", { top, bottom, caption: caption.top - origin.top + 11 });
  }
  // What hangs in a folded section hangs at its line.
  for (const fold of content.querySelectorAll<HTMLElement>(".hl-fold[data-slots]")) {
    const box = fold.getBoundingClientRect();
    const [top, bottom] = [box.top - origin.top, box.bottom - origin.top];
    const shared = { top, bottom, caption: (top + bottom) / 2 };
    for (const slot of (fold.dataset.slots ?? "").split(" ")) if (slot !== "") cells.set(slot, shared);
  }
  return cells;
}

const ids = new WeakMap<Element, string>();
let given = 0;

/** The same for an element as long as it is on the page. */
export function idOf(element: Element): string {
  const known = ids.get(element);
  if (known !== undefined) return known;
  given += 1;
  ids.set(element, `n${given}`);
  return `n${given}`;
}

function readQuotes(column: HTMLElement, origin: DOMRect): Places["quotes"] {
  return [...column.querySelectorAll(`[${QUOTES}]`)].flatMap((element) => {
    const faces = quotedIn(element);
    const box = element.getBoundingClientRect();
    if (faces.length === 0 || box.width === 0) return [];
    const at = { y: box.bottom - origin.top + 1, left: box.left - origin.left };
    return [{ id: idOf(element), ...at, ...joined(faces), faces, element }];
  });
}

/** Numbers whose source is open: they are no elements of their own. */
function readOpened(view: EditorView, origin: DOMRect): Places["quotes"] {
  const { places, opened } = view.state.field(sheetField);
  if (opened.size === 0) return [];
  const found: Places["quotes"][number][] = [];
  for (const range of view.state.selection.ranges) {
    places.between(range.from, range.to, (from, _to, { piece }) => {
      if (!opened.has(piece) || piece.piece !== "set" || piece.content.content !== "number") return;
      const box = view.coordsAtPos(from, 1);
      if (box === null) return;
      const faces = [piece.content.number];
      const at = { y: box.bottom - origin.top + 3, left: box.left - origin.left };
      found.push({ id: "open", ...at, ...joined(faces), faces, element: null });
    });
  }
  return found.slice(0, 1);
}

function joined(faces: readonly NumberFace[]): Pick<SceneQuote, "cells" | "reads" | "state"> {
  const states = faces.map(({ state }) => state);
  return {
    cells: [...new Set(faces.flatMap(({ cells }) => cells))],
    reads: [...new Set(faces.flatMap(({ reads }) => reads))],
    state: GRAVEST.find((state) => states.includes(state)) ?? "current",
  };
}

const GRAVEST: readonly NumberState[] = ["failed", "outOfDate", "stands", "empty", "waiting", "computing", "preview"];

/** Where the index of each parameter stands on the rule. */
function readIndices(rule: HTMLElement, ruleBox: DOMRect, origin: DOMRect): Index[] {
  return [...rule.querySelectorAll(".hl-par")].map((parameter, place) => {
    const index = parameter.querySelector(".hl-par-scale > svg > svg:last-of-type > path:last-of-type");
    const box = (index ?? parameter.querySelector(".hl-par-value") ?? parameter).getBoundingClientRect();
    const x = index === null ? box.left + 8 : box.left + box.width / 2;
    const [left, right] = [ruleBox.left, Math.min(ruleBox.right, window.innerWidth)];
    const within = Math.min(Math.max(x, left), right);
    return { place, x: within - origin.left, seen: Math.abs(within - x) < 1 };
  });
}

function readSection(content: HTMLElement, origin: DOMRect, at: number): Places["section"] {
  let [from, to] = [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY];
  for (const heading of content.querySelectorAll(".hl-heading")) {
    const top = heading.getBoundingClientRect().top - origin.top;
    if (top <= at) from = Math.max(from, top);
    else to = Math.min(to, top);
  }
  return { from, to };
}

/** What a scene is made of besides the places. */
export interface Hung {
  readonly model: SheetModel;
  readonly reach: Reach;
  /** What of the text is on the page. */
  readonly drawn: { readonly from: number; readonly to: number };
}

/** The cells of a scene: those on the page, and those that something on the page quotes. */
export function sceneCells(places: Places, { model, reach, drawn }: Hung): SceneCell[] {
  const quoted = new Set(places.quotes.flatMap(({ cells }) => cells));
  const strandsAt = strandsByBox(places, model);
  return model.cells.flatMap((face) => {
    const box = places.cells.get(face.slot) ?? null;
    if (box === null && !quoted.has(face.slot)) return [];
    const known = reach.cells.get(face.slot);
    const quotes = known?.quotes ?? null;
    const ringAbove = box === null && (known?.at ?? 0) < drawn.from;
    return [
      {
        slot: face.slot,
        state: face.state,
        strands: face.strands,
        ...strandsAt(face.slot, box),
        changed: face.changed,
        done: doneOf(face),
        box,
        above: ringAbove || (quotes !== null && quotes.first < drawn.from),
        below: (box === null && !ringAbove) || (quotes !== null && quotes.last > drawn.to),
        quoted: quotes !== null,
      },
    ];
  });
}

/** Cells of one folded section have one box: what enters any of them enters at the first. */
function strandsByBox(places: Places, model: SheetModel) {
  const sharing = new Map<unknown, CellFace[]>();
  for (const face of model.cells) {
    const box = places.cells.get(face.slot);
    if (box !== undefined) sharing.set(box, [...(sharing.get(box) ?? []), face]);
  }
  return (slot: string, box: SceneCell["box"]): Pick<SceneCell, "enters"> => {
    const faces = sharing.get(box) ?? [];
    if (faces.length < 2) return {};
    const all = [...new Set(faces.flatMap(({ strands }) => strands))].sort((a, b) => a - b);
    return { enters: faces[0]?.slot === slot ? all : [] };
  };
}

function doneOf({ state, progress }: CellFace): number | null {
  if (state !== "computing") return null;
  return progress === null || progress.total <= 0 ? 0 : Math.min(1, progress.done / progress.total);
}

/** On a narrow page, of a section alone what hangs in it. */
export function withinSection<S extends Pick<Scene, "top" | "bottom">>(scene: S, section: Places["section"]): S {
  return { ...scene, top: Math.max(scene.top, section.from), bottom: Math.min(scene.bottom, section.to) };
}

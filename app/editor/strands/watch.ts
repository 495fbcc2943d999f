import { StateEffect } from "@codemirror/state";
import { EditorView, type ViewUpdate } from "@codemirror/view";
import { createStore, type Store } from "../live/store.ts";
import type { Piece, SheetModel } from "../model/types.ts";
import { findPlace } from "../text/places.ts";
import { sheetField } from "../text/sheet-field.ts";
import { layTrail } from "./follow.ts";
import { frameOf } from "./frame.ts";
import { type Gloss, glossOf } from "./gloss.ts";
import { BAND, type HeadDrawing, layHeads } from "./lay-heads.ts";
import { layOut } from "./layout.ts";
import { Lights } from "./lights.ts";
import { type Grounds, idOf, inSteps, type Places, readPlaces, sceneCells, withinSection } from "./measure.ts";
import { keepMode, modeAfter, readMode } from "./mode.ts";
import { type Reach, reachOf } from "./reach.ts";
import type { Lit, Picture, Scene, StrandsMode } from "./types.ts";

/** What is drawn of the strands, and said of what is lit. */
export interface StrandsView {
  readonly picture: Picture | null;
  readonly heads: readonly HeadDrawing[];
  readonly gloss: Gloss | null;
  readonly mode: StrandsMode;
  /** What is lit, and stays so while the pointer goes to a command, leads to something that can be gone to. */
  readonly leads: boolean;
  /** The line one comes back to from what was followed; null: nothing was. */
  readonly backTo: number | null;
  /** Height of the rule, beneath which the heads stay [px]. */
  readonly ruleHeight: number;
}

/** Strands follow the letters of a line when the keys have rested so long, and after so long at the latest [ms]. */
const REST_MS = 160;
const LONGEST_REST_MS = 1000;

/**
 * Watches the text, the page and the hand, and keeps the strands right:
 *
 *     change of the text, of the sheet, of the window, of what is lit ──▶ asks for one measuring
 *     measuring, with the editor's own, before the next paint: places read ──▶ scene ──▶ picture ──▶ store
 *
 * A keystroke therefore costs a request; a burst of them, one measuring a frame. What scrolls with the text is not
 * measured again until the page has moved a good way.
 */
export class StrandWatch {
  readonly store: Store<StrandsView>;
  readonly lights: Lights;
  private readonly grounds: () => Grounds;
  private readonly view: EditorView;
  private readonly column: HTMLElement;
  private readonly model: () => SheetModel | null;
  private readonly personId: string | null;
  private readonly ends: (() => void)[] = [];
  private reach: { of: readonly unknown[]; found: Reach } | null = null;
  private sign = "";
  private ticking = false;
  private soon: ReturnType<typeof setTimeout> | undefined;
  private next: ReturnType<typeof setTimeout> | undefined;
  private firstAsked: number | null = null;
  /** Of the text when it was last measured [px]. */
  private height = 0;
  private ended = false;
  private places: Places | null = null;

  constructor(
    view: EditorView,
    column: HTMLElement,
    sheet: HTMLElement,
    model: () => SheetModel | null,
    personId: string | null,
  ) {
    this.view = view;
    this.column = column;
    this.model = model;
    this.personId = personId;
    this.grounds = () => ({ view, column, rule: sheet.querySelector<HTMLElement>(".hl-rule") });
    this.store = createStore<StrandsView>({
      picture: null,
      heads: [],
      gloss: null,
      mode: readMode(personId),
      leads: false,
      backTo: null,
      ruleHeight: 0,
    });
    this.lights = new Lights(sheet, () => this.ask());
    layTrail(view, {
      lit: () => (this.places === null ? null : this.litAmong(this.places)),
      lights: this.lights,
      sheet,
      placeOf: (slot) => findPlace(view.state.field(sheetField).places, isCell(slot))?.from ?? null,
      strandsOf: (slot) => model()?.cells.find((cell) => cell.slot === slot)?.strands ?? [],
      onBack: (backTo) => this.store.set({ backTo }),
    });
    view.dispatch({
      effects: StateEffect.appendConfig.of(EditorView.updateListener.of((update) => this.onUpdate(update))),
    });
    this.watchPage(sheet);
    this.ask();
  }

  /** Asks for one measuring before the next paint. */
  ask(): void {
    if (this.ended) return;
    clearTimeout(this.soon);
    this.firstAsked = null;
    this.view.requestMeasure({
      key: this,
      read: () => readPlaces(this.grounds()),
      write: (places: Places) => this.draw(places),
    });
  }

  /** Asks when what is being done is done. */
  private askNext(): void {
    this.next ??= setTimeout(() => {
      this.next = undefined;
      this.ask();
    });
  }

  /** Asks when nothing has changed for a moment, or after a few moments of changes. */
  askSoon(): void {
    const now = Date.now();
    this.firstAsked ??= now;
    clearTimeout(this.soon);
    const wait = Math.min(REST_MS, Math.max(0, this.firstAsked + LONGEST_REST_MS - now));
    this.soon = setTimeout(() => this.ask(), wait);
  }

  cycleMode(): void {
    const mode = modeAfter(this.store.get().mode);
    keepMode(this.personId, mode);
    this.store.set({ mode });
    this.ask();
  }

  end(): void {
    this.ended = true;
    clearTimeout(this.soon);
    clearTimeout(this.next);
    this.lights.end();
    for (const end of this.ends) end();
  }

  /**
   * Letters move at most the numbers after them on their line: strands follow when the keys rest. What is lower or
   * higher than before (a new line, a plate that grew), or under another caret, is measured at once.
   */
  private onUpdate(update: ViewUpdate): void {
    const sheetChanged = update.startState.field(sheetField) !== update.state.field(sheetField);
    // The editor's own guess of heights, which moves nothing on the page, does not count: it has not measured yet.
    const height = update.docChanged ? this.height : this.view.contentHeight;
    const grown = Math.abs(height - this.height) > 1;
    this.height = height;
    if (grown || (update.selectionSet && !update.docChanged)) this.ask();
    // Lines far above or below were drawn, which takes its time: strands are drawn wider than the view, and follow then.
    else if (update.viewportChanged) this.askNext();
    else if (update.docChanged || sheetChanged || update.geometryChanged) this.askSoon();
  }

  private watchPage(sheet: HTMLElement): void {
    const ask = () => this.ask();
    const onScroll = () => {
      if (this.ticking) return;
      this.ticking = true;
      requestAnimationFrame(() => {
        this.ticking = false;
        if (!this.ended) this.afterScroll();
      });
    };
    window.addEventListener("scroll", onScroll, { passive: true });
    window.addEventListener("resize", ask);
    this.ends.push(() => window.removeEventListener("scroll", onScroll));
    this.ends.push(() => window.removeEventListener("resize", ask));
    const sizes = new ResizeObserver(ask);
    sizes.observe(this.column);
    this.ends.push(() => sizes.disconnect());
    // The rule is drawn by others: its indices move while a parameter is dragged, and it scrolls sideways.
    const rule = new MutationObserver((records) => {
      if (records.some(({ target }) => target instanceof Element && target.closest(".hl-rule") !== null)) ask();
    });
    rule.observe(sheet, { subtree: true, childList: true, attributes: true, attributeFilter: ["x"] });
    this.ends.push(() => rule.disconnect());
    sheet.addEventListener("scroll", ask, { capture: true, passive: true });
    this.ends.push(() => sheet.removeEventListener("scroll", ask, { capture: true }));
  }

  /** The rule moves over the text: what no longer hangs below it loses its head. */
  private afterScroll(): void {
    const { places } = this;
    const { rule } = this.grounds();
    if (places === null || rule === null) return;
    const viewTop = rule.getBoundingClientRect().bottom + BAND - this.column.getBoundingClientRect().top;
    if (inSteps(viewTop) !== places.stepTop) this.ask();
    else this.drawHeads(places, viewTop);
  }

  private draw(places: Places): void {
    const model = this.model();
    if (model === null || this.ended) return;
    this.places = places;
    const { scene, reach } = this.sceneOf(places, model);
    const sign = JSON.stringify({ ...scene, lanes: [] });
    if (sign !== this.sign) {
      this.sign = sign;
      const gloss = scene.lit === null ? null : glossOf(scene.lit, model, reach);
      this.store.set({ picture: layOut(scene), gloss });
    }
    const leads = scene.lit !== null && scene.lit.lit !== "strand" && !this.lights.underPointer;
    this.store.set({ leads });
    this.drawHeads(places, places.viewTop);
  }

  private drawHeads(places: Places, viewTop: number): void {
    const { picture, mode, heads } = this.store.get();
    const { ruleHeight } = places;
    if (picture === null || mode === "hidden") {
      this.store.set({ heads: heads.length === 0 ? heads : [], ruleHeight });
      return;
    }
    const shown = new Set(picture.strands.map(({ place }) => place));
    for (const place of picture.strandBundle === null ? [] : picture.frame.bundled) shown.add(place);
    const below = picture.reach.map((y, place) => (shown.has(place) ? y - viewTop + BAND : Number.NEGATIVE_INFINITY));
    const next = layHeads(places.indices, picture.frame, below);
    const same = JSON.stringify(next) === JSON.stringify(heads);
    this.store.set({ heads: same ? heads : next, ruleHeight });
  }

  private sceneOf(places: Places, model: SheetModel): { scene: Scene; reach: Reach } {
    const { pieces } = this.view.state.field(sheetField);
    if (this.reach === null || this.reach.of[0] !== pieces || this.reach.of[1] !== model) {
      const found = reachOf(pieces, model.cells, model.parameters.length);
      this.reach = { of: [pieces, model], found };
    }
    const reach = this.reach.found;
    const drawn = this.view.viewport;
    const cells = sceneCells(places, { model, reach, drawn });
    const scene = {
      top: places.top,
      bottom: places.bottom,
      stepTop: places.stepTop,
      strands: model.parameters.map((_parameter, place) => ({
        place,
        below: (reach.strands[place] ?? -1) > drawn.to,
      })),
      cells,
      quotes: places.quotes.map(({ faces: _faces, element: _element, ...quote }) => quote),
      lit: this.litAmong(places),
      mode: this.store.get().mode,
      lanes: this.store.get().picture?.lanes ?? new Map<string, number>(),
      still: matchMedia("(prefers-reduced-motion: reduce)").matches,
    };
    const all = model.parameters.map((_parameter, place) => place);
    const frame = frameOf(places.margin, all);
    if (frame.size !== "narrow") return { scene: { ...scene, frame }, reach };
    const section = withinSection(scene, places.section);
    const hung = all.filter((place) => hangsWithin(section, place));
    return { scene: { ...section, frame: frameOf(places.margin, hung) }, reach };
  }

  private litAmong(places: Places): Lit | null {
    return this.lights.litAmong(
      places.quotes.map(({ id, faces }) => ({ id, faces })),
      idOf,
    );
  }
}

/** Whether anything in what is drawn hangs from a parameter. */
function hangsWithin(scene: Pick<Scene, "top" | "bottom" | "cells" | "quotes">, place: number): boolean {
  const within = (y: number) => y >= scene.top && y <= scene.bottom;
  return (
    scene.cells.some(({ box, strands }) => box !== null && within(box.caption) && strands.includes(place)) ||
    scene.quotes.some(({ y, reads }) => within(y) && reads.includes(place))
  );
}

function isCell(slot: string): (piece: Piece) => boolean {
  return (piece) => piece.piece === "cell" && piece.slot === slot;
}

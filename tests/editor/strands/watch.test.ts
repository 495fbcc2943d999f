// @vitest-environment jsdom
import { EditorState } from "@codemirror/state";
import { EditorView } from "@codemirror/view";
import { afterEach, beforeAll, beforeEach, describe, expect, test, vi } from "vitest";
import type { SheetModel } from "../../../app/editor/model/types.ts";
import { SheetReader } from "../../../app/editor/reading/sheet-reader.ts";
import { followBack, followStrand } from "../../../app/editor/strands/follow.ts";
import { StrandWatch } from "../../../app/editor/strands/watch.ts";
import { glossField } from "../../../app/editor/text/glosses.ts";
import { sheetHost } from "../../../app/editor/text/host.ts";
import { applyModel, setAttention, sheetField } from "../../../app/editor/text/sheet-field.ts";
import { likeABrowser } from "../dom.ts";
import { computed, SAMPLE, tellText } from "../sample.ts";
import { silentHost } from "../silent-host.ts";

const WIDTH = 660;
const MARGIN = 400;
/** After so long the keys have rested, and strands have followed what was written. */
const RESTED_MS = 600;

beforeAll(() => {
  likeABrowser();
  // jsdom has no layout: boxes are given, the column's with its margin, all else with some width.
  Element.prototype.getBoundingClientRect = function (this: Element) {
    return this.matches(".hl-column") ? new DOMRect(MARGIN, 0, WIDTH, 4000) : new DOMRect(MARGIN + 100, 200, 80, 24);
  };
  vi.stubGlobal("matchMedia", () => Object.assign(new EventTarget(), { matches: false, addListener() {} }));
  vi.stubGlobal("scrollTo", () => {});
});

let model: SheetModel;
let view: EditorView;
let watch: StrandWatch;
let sheet: HTMLElement;
let column: HTMLElement;

beforeEach(async () => {
  const reader = new SheetReader();
  reader.hear(tellText(SAMPLE));
  const { shown, results } = computed(SAMPLE);
  reader.hear(shown);
  reader.hear({ tell: "results", results });
  model = reader.sheet();
  sheet = document.body.appendChild(document.createElement("div"));
  column = sheet.appendChild(document.createElement("main"));
  column.className = "hl-column";
  const text = column.appendChild(document.createElement("div"));
  text.className = "hl-text";
  const host = silentHost();
  host.macros = model.macros;
  view = new EditorView({
    parent: text,
    state: EditorState.create({ doc: SAMPLE, extensions: [sheetHost.of(host), sheetField, glossField] }),
  });
  const { doc } = view.state;
  view.dispatch({ effects: applyModel.of({ model, doc, since: view.state.changes().desc }) });
  watch = new StrandWatch(view, column, sheet, () => model, null);
  await frames();
});

afterEach(() => {
  watch.end();
  view.destroy();
  sheet.remove();
});

/** Some frames: the editor measures in the next one, and may once more. */
async function frames(): Promise<void> {
  for (let k = 0; k < 4; k += 1) await new Promise((done) => requestAnimationFrame(done));
}

describe("measuring", () => {
  test("a keystroke measures nothing by itself, and many of them are measured together, once a frame", async () => {
    const measured = vi.spyOn(column, "getBoundingClientRect");
    for (let k = 0; k < 20; k += 1) view.dispatch({ changes: { from: SAMPLE.length, insert: "a" } });
    expect(measured).not.toHaveBeenCalled();
    let before = 0;
    // Long enough for the keys to have rested.
    for (const end = Date.now() + RESTED_MS; Date.now() < end; ) {
      await new Promise((done) => requestAnimationFrame(done));
      expect(measured.mock.calls.length - before).toBeLessThanOrEqual(1);
      before = measured.mock.calls.length;
    }
    expect(before).toBeGreaterThanOrEqual(1);
    // What is measured may move the view, which is measured again; the letters are not.
    expect(before).toBeLessThanOrEqual(3);
  });

  test("where nothing has moved nothing is drawn anew", async () => {
    const before = watch.store.get().picture;
    expect(before).not.toBeNull();
    const measured = vi.spyOn(column, "getBoundingClientRect");
    view.dispatch({ changes: { from: SAMPLE.length, insert: "a" } });
    await vi.waitFor(() => expect(measured).toHaveBeenCalled(), { timeout: 5000 });
    await frames();
    expect(watch.store.get().picture).toBe(before);
  });

  test("after its end it asks for nothing", async () => {
    watch.end();
    const measured = vi.spyOn(column, "getBoundingClientRect");
    view.dispatch({ changes: { from: 0, insert: "\n" } });
    await new Promise((done) => setTimeout(done, RESTED_MS));
    expect(measured).not.toHaveBeenCalled();
  });

  test("the drawing knows the sheet's cells and numbers", () => {
    const { picture } = watch.store.get();
    expect(picture?.strands.map(({ place }) => place)).toEqual([1, 0]);
    expect(picture?.strands.flatMap(({ ties }) => ties)).toHaveLength(1);
  });
});

describe("what is lit, and followed", () => {
  const inNumber = SAMPLE.indexOf(":value[larvae.decay]") + 3;

  async function openNumber() {
    view.coordsAtPos = () => ({ left: 500, right: 500, top: 200, bottom: 224 });
    view.dispatch({ effects: setAttention.of(true), selection: { anchor: inNumber } });
    await frames();
  }

  test("the number under the caret, with its gloss", async () => {
    await openNumber();
    expect(watch.store.get().gloss?.lead[0]?.name).toBe("larvae.decay");
    expect(watch.store.get().leads).toBe(true);
    expect(watch.store.get().picture?.dim).toBe(false);
  });

  test("the number under the pointer, before all else", async () => {
    await openNumber();
    const other = view.contentDOM.querySelector(".hl-math[data-quotes]");
    other?.dispatchEvent(new MouseEvent("pointerover", { bubbles: true }));
    await frames();
    expect(watch.store.get().gloss?.lead[0]?.name).toBe("mu");
    expect(watch.store.get().picture?.dim).toBe(true);
    sheet.dispatchEvent(new MouseEvent("pointerleave"));
    await frames();
    expect(watch.store.get().gloss?.lead[0]?.name).toBe("larvae.decay");
  });

  test("from the number to its cell, and back to where one was", async () => {
    await openNumber();
    expect(followStrand(view)).toBe(true);
    await frames();
    expect(watch.store.get().gloss?.lead[0]?.name).toBe("process larvae");
    expect(watch.store.get().backTo).toBe(view.state.doc.lineAt(inNumber).number);
    const slot = model.cells.find(({ name }) => name === "larvae")?.slot;
    expect(document.activeElement?.closest<HTMLElement>(".hl-cell")?.dataset.slot).toBe(slot);
    view.dispatch({ selection: { anchor: 0 } });
    expect(followBack(view)).toBe(true);
    expect(view.state.selection.main.head).toBe(inNumber);
    expect(watch.store.get().backTo).toBeNull();
    expect(followBack(view)).toBe(false);
  });

  test("where nothing is lit there is nothing to follow", () => {
    expect(followStrand(view)).toBe(false);
  });
});

test("how much is shown is kept on this machine, for each person", async () => {
  watch.cycleMode();
  expect(watch.store.get().mode).toBe("lit");
  await frames();
  expect(watch.store.get().picture?.strands).toEqual([]);
  const again = new StrandWatch(view, column, sheet, () => model, null);
  const other = new StrandWatch(view, column, sheet, () => model, "somebody");
  expect([again.store.get().mode, other.store.get().mode]).toEqual(["lit", "shown"]);
  again.end();
  other.end();
  localStorage.clear();
});

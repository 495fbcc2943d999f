// @vitest-environment jsdom
import { type ChangeSet, EditorSelection, EditorState, type Text } from "@codemirror/state";
import { type DecorationSet, EditorView } from "@codemirror/view";
import fc from "fast-check";
import { afterEach, beforeAll, describe, expect, test, vi } from "vitest";
import { KINDS } from "../../app/cells/index.ts";
import type { SheetModel } from "../../app/editor/model/types.ts";
import { SheetReader } from "../../app/editor/reading/sheet-reader.ts";
import { glossField, setProblems } from "../../app/editor/text/glosses.ts";
import { type SheetHost, sheetHost } from "../../app/editor/text/host.ts";
import { applyModel, setAttention, setPressed, sheetField, showWorking } from "../../app/editor/text/sheet-field.ts";
import { likeABrowser } from "./dom.ts";
import { computed, SAMPLE, tellText } from "./sample.ts";
import { silentHost } from "./silent-host.ts";

beforeAll(likeABrowser);

const open: EditorView[] = [];
afterEach(() => {
  for (const view of open.splice(0)) view.destroy();
});

function sheetOf(text: string, extensions: readonly ReturnType<typeof EditorState.readOnly.of>[] = []) {
  const host = silentHost();
  const parent = document.body.appendChild(document.createElement("div"));
  const view = new EditorView({
    parent,
    state: EditorState.create({ doc: text, extensions: [sheetHost.of(host), sheetField, glossField, ...extensions] }),
  });
  open.push(view);
  return { view, host };
}

function read(text: string): SheetModel {
  const reader = new SheetReader();
  reader.hear(tellText(text));
  const { shown, results } = computed(text);
  reader.hear(shown);
  reader.hear({ tell: "results", results });
  return reader.sheet();
}

function apply(
  view: EditorView,
  model: SheetModel,
  host: SheetHost,
  doc = view.state.doc,
  since = view.state.changes(),
) {
  host.macros = model.macros;
  for (const [slot, shown] of Object.entries(model.views)) if (shown !== null) host.views.set(slot, shown);
  view.dispatch({ effects: applyModel.of({ model, doc, since: since.desc }) });
}

/** What is drawn, by place and what it is; in any order, since layers of marks at one place are in none. */
function drawn(view: EditorView): string[] {
  const found: string[] = [];
  for (const layer of Object.values(view.state.field(sheetField).shown) as DecorationSet[])
    layer.between(0, view.state.doc.length, (from, to, { spec }) => {
      found.push(
        `${from}-${to} ${spec.class ?? spec.widget?.constructor.name ?? "hidden"}${spec.block ? " block" : ""}`,
      );
    });
  return found.sort();
}

describe("source shows under the caret alone", () => {
  test("a number opens where the caret touches it, and closes when it leaves", () => {
    const { view, host } = sheetOf(SAMPLE);
    apply(view, read(SAMPLE), host);
    const source = ":value[larvae.decay]{digits=8}";
    expect(view.contentDOM.textContent).not.toContain(source);
    expect(view.contentDOM.querySelector(".hl-number")?.textContent).toBe("2.3483315");
    view.dispatch({ effects: setAttention.of(true), selection: { anchor: SAMPLE.indexOf(source) + 3 } });
    expect(view.contentDOM.querySelector(".hl-source")?.textContent).toBe(source);
    view.dispatch({ selection: { anchor: SAMPLE.indexOf("The mean") } });
    expect(view.contentDOM.querySelector(".hl-source")).toBeNull();
  });

  test("nothing opens without attention, nor for one who only reads, nor while the pointer is pressed", () => {
    const inside = SAMPLE.indexOf(":value[") + 3;
    const without = sheetOf(SAMPLE);
    apply(without.view, read(SAMPLE), without.host);
    without.view.dispatch({ selection: { anchor: inside } });
    expect(without.view.state.field(sheetField).opened.size).toBe(0);
    const reads = sheetOf(SAMPLE, [EditorState.readOnly.of(true)]);
    apply(reads.view, read(SAMPLE), reads.host);
    reads.view.dispatch({ effects: setAttention.of(true), selection: { anchor: inside } });
    expect(reads.view.state.field(sheetField).opened.size).toBe(0);
    without.view.dispatch({ effects: [setAttention.of(true), setPressed.of(true)], selection: { anchor: 0 } });
    const before = drawn(without.view);
    without.view.dispatch({ selection: { anchor: inside } });
    expect(drawn(without.view)).toEqual(before);
    without.view.dispatch({ effects: setPressed.of(false) });
    expect(without.view.contentDOM.querySelector(".hl-source")).not.toBeNull();
  });

  test("selecting everything does not turn the sheet into source", () => {
    const { view, host } = sheetOf(SAMPLE);
    apply(view, read(SAMPLE), host);
    view.dispatch({ effects: setAttention.of(true), selection: EditorSelection.range(0, SAMPLE.length) });
    const opened = [...view.state.field(sheetField).opened].map(({ piece }) => piece);
    expect(opened).not.toContain("cell");
    expect(opened.length).toBeLessThan(3);
  });

  test("a working opens beneath its plate, and the plate stays", () => {
    const { view, host } = sheetOf(SAMPLE);
    apply(view, read(SAMPLE), host);
    expect(view.contentDOM.textContent).not.toContain("up_to: 6");
    view.dispatch({ effects: showWorking.of({ slot: "K", open: true }) });
    expect(view.contentDOM.textContent).toContain("up_to: 6");
    const first = view.contentDOM.querySelector(".hl-working-first");
    expect(first?.getAttribute("data-working-line")).toBe("1");
    const plate = [...view.contentDOM.querySelectorAll(".hl-plate")].at(-1);
    expect(plate?.getAttribute("aria-label")).toBe("Figure 1, current");
    expect(plate && first ? plate.compareDocumentPosition(first) & Node.DOCUMENT_POSITION_FOLLOWING : 0).toBeTruthy();
    view.dispatch({ effects: showWorking.of({ slot: "K", open: false }) });
    expect(view.contentDOM.textContent).not.toContain("up_to: 6");
  });
});

describe("changes between two answers", () => {
  test("an answer that comes late is moved through what was typed since", () => {
    const { view, host } = sheetOf(SAMPLE);
    const doc = view.state.doc;
    const model = read(SAMPLE);
    const typed = view.state.update({ changes: { from: SAMPLE.indexOf("The mean"), insert: "Now then. " } });
    view.dispatch(typed);
    apply(view, model, host, doc, typed.changes);
    const now = sheetOf(view.state.doc.toString());
    apply(now.view, read(view.state.doc.toString()), now.host);
    expect(drawn(view)).toEqual(drawn(now.view));
  });

  test("a blank line on which one writes is whole at once", () => {
    const { view, host } = sheetOf("One.\n\nTwo.");
    apply(view, read("One.\n\nTwo."), host);
    expect(drawn(view)).toContain("5-5 hl-blank");
    view.dispatch({ changes: { from: 5, insert: "x" } });
    expect(drawn(view).join()).not.toContain("hl-blank");
  });

  test("of the next answer only what is new is drawn", () => {
    const { view, host } = sheetOf(SAMPLE);
    const reader = new SheetReader();
    reader.hear(tellText(SAMPLE));
    apply(view, reader.sheet(), host);
    const before = view.state.field(sheetField).pieces;
    view.dispatch({ changes: { from: SAMPLE.indexOf("The mean"), insert: "$y$ " } });
    reader.hear(tellText(view.state.doc.toString(), 2), view.state.field(sheetField).number);
    const model = reader.sheet();
    expect(model.pieces.base).toBe(1);
    expect(model.pieces.middle.length).toBeLessThan(4);
    apply(view, model, host);
    const after = view.state.field(sheetField).pieces;
    expect(after).toHaveLength(before.length + 1);
    expect(after.filter((piece) => before.includes(piece)).length).toBeGreaterThan(before.length - 4);
    const now = sheetOf(view.state.doc.toString());
    apply(now.view, read(view.state.doc.toString()), now.host);
    expect(drawn(view)).toEqual(drawn(now.view));
  });

  test("answers that build on each other make the same sheet as one answer", () => {
    const put = fc.constantFrom("", "x", "\n", "\n\n", "$", "```", "**", ":::", "a b\nc", "$z$", ":value[mu]");
    const change = fc.record({ at: fc.nat(10_000), gone: fc.nat(60), put, answered: fc.boolean() });
    fc.assert(
      fc.property(fc.array(change, { minLength: 1, maxLength: 10 }), (changes) => {
        const { view, host } = sheetOf(SAMPLE);
        const reader = new SheetReader();
        let version = 0;
        const answer = (doc: Text, since: ChangeSet) => {
          version += 1;
          reader.hear(tellText(doc.toString(), version), view.state.field(sheetField).number);
          apply(view, reader.sheet(), host, doc, since);
        };
        answer(view.state.doc, view.state.changes());
        for (const { at, gone, put: insert, answered } of changes) {
          const asked = view.state.doc;
          const from = at % (asked.length + 1);
          const transaction = view.state.update({ changes: { from, to: Math.min(asked.length, from + gone), insert } });
          view.dispatch(transaction);
          // An answer to the text before this change, which is late by it.
          if (answered) answer(asked, transaction.changes);
        }
        answer(view.state.doc, view.state.changes());
        const whole = sheetOf(view.state.doc.toString());
        const fresh = new SheetReader();
        fresh.hear(tellText(view.state.doc.toString()));
        apply(whole.view, fresh.sheet(), whole.host);
        expect(drawn(view)).toEqual(drawn(whole.view));
      }),
      { numRuns: 20 },
    );
  }, 60_000);

  test("any changes whatever keep the sheet standing, and the next answer makes it as if nothing had been", () => {
    const change = fc.record({
      at: fc.nat(10_000),
      gone: fc.nat(60),
      put: fc.constantFrom("", "x", "\n", "\n\n", "$", "```", "**", ":::", "a b\nc"),
    });
    const model = read(SAMPLE);
    fc.assert(
      fc.property(fc.array(change, { minLength: 1, maxLength: 8 }), (changes) => {
        const { view, host } = sheetOf(SAMPLE);
        apply(view, model, host);
        view.dispatch({ effects: setAttention.of(true) });
        for (const { at, gone, put } of changes) {
          const from = at % (view.state.doc.length + 1);
          const to = Math.min(view.state.doc.length, from + gone);
          view.dispatch({ changes: { from, to, insert: put }, selection: { anchor: from + put.length } });
        }
        view.dispatch({ effects: setAttention.of(false) });
        const text = view.state.doc.toString();
        apply(view, read(text), host);
        const fresh = sheetOf(text);
        apply(fresh.view, read(text), fresh.host);
        expect(drawn(view)).toEqual(drawn(fresh.view));
      }),
      { numRuns: 10 },
    );
  }, 60_000);
});

test("a plate that cannot be drawn says so, and the rest of the sheet stands", () => {
  const { view, host } = sheetOf(SAMPLE);
  const model = read(SAMPLE);
  const shown = model.views.K;
  if (shown?.view.figure == null) throw new Error("The sample has no figure.");
  const broken = {
    ...shown.view,
    figure: {
      ...shown.view.figure,
      get x(): never {
        throw new Error("no axis");
      },
    },
  };
  // React reports what it caught, besides handing it to the boundary.
  const reported = vi.spyOn(console, "error").mockImplementation(() => {});
  apply(view, { ...model, views: { K: { ...shown, view: broken } } }, host);
  expect(view.contentDOM.textContent).toContain("Figure 1 cannot be drawn: no axis");
  expect(view.contentDOM.textContent).toContain("Theorem 1.1");
  expect(reported).toHaveBeenCalled();
  reported.mockClear();
});

test("a view that cannot be made leaves the other cells, the numbers and the text on the sheet", () => {
  const counts = KINDS.get("counts");
  if (counts === undefined) throw new Error("There are no counts.");
  const drawing = vi.spyOn(counts, "view").mockImplementation(() => {
    throw new Error("the axis has no end.");
  });
  const { view, host } = sheetOf(SAMPLE);
  apply(view, read(SAMPLE), host);
  expect(view.contentDOM.textContent).toContain("‡ Figure 1 cannot be drawn: the axis has no end. Its result is kept");
  expect(view.contentDOM.querySelector(".hl-number")?.textContent).toBe("2.3483315");
  drawing.mockRestore();
  apply(view, read(SAMPLE), host);
  expect(view.contentDOM.textContent).not.toContain("cannot be drawn");
});

test("a fault is said under its line, or at the plate while its working is put away", () => {
  const text = SAMPLE.replace("start: 1", "begin: 1");
  const { view, host } = sheetOf(text);
  const model = read(text);
  apply(view, model, host);
  view.dispatch({ effects: setProblems.of(model.problems) });
  expect(view.contentDOM.querySelector(".hl-gloss-error")).toBeNull();
  expect(view.contentDOM.querySelector(".hl-state-failed")?.textContent).toContain("is missing");
  view.dispatch({ effects: showWorking.of({ slot: "K", open: true }) });
  const gloss = view.contentDOM.querySelector(".hl-gloss-error");
  expect(gloss?.textContent).toMatch(/^‡ Line \d: /);
  expect(view.contentDOM.querySelector(".hl-state-failed")?.textContent).not.toContain("is missing");
});

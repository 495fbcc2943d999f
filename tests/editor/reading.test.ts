// @vitest-environment jsdom
import { EditorState } from "@codemirror/state";
import { EditorView } from "@codemirror/view";
import { afterEach, beforeAll, beforeEach, expect, test, vi } from "vitest";
import { type Reader, Reading } from "../../app/editor/live/reading.ts";
import type { FromWorker, TextEdit, Told, ToWorker } from "../../app/editor/model/messages.ts";
import { SheetPacker } from "../../app/editor/model/packing.ts";
import type { SheetModel } from "../../app/editor/model/types.ts";
import { SheetReader } from "../../app/editor/reading/sheet-reader.ts";
import { glossField } from "../../app/editor/text/glosses.ts";
import { sheetField } from "../../app/editor/text/sheet-field.ts";
import { likeABrowser } from "./dom.ts";

/** A worker that answers when the test says so. */
class SlowReader implements Reader {
  onmessage: Reader["onmessage"] = null;
  readonly heard: ToWorker[] = [];
  private readonly reader = new SheetReader();
  private waiting = 0;
  /** The texts that it was given, whole or as edits of the one before. */
  private readonly given: string[] = [];
  private readonly packer = new SheetPacker();
  private have = 0;
  ended = false;

  postMessage({ message, have }: Told): void {
    this.heard.push(message);
    if (message.tell === "text") this.given.push(message.text);
    if (message.tell === "edits") {
      const edits = [...message.edits].reverse();
      const apply = (text: string, { from, to, insert }: TextEdit) => text.slice(0, from) + insert + text.slice(to);
      this.given.push(edits.reduce(apply, this.given.at(-1) ?? ""));
    }
    this.have = have;
    this.reader.hear(message, have);
    this.waiting += 1;
  }

  answer(change: Partial<SheetModel> = {}): void {
    const data: FromWorker = {
      tell: "sheet",
      answers: this.waiting,
      model: { ...this.packer.pack(this.reader.sheet(), this.have), ...change },
      seconds: 0,
    };
    this.waiting = 0;
    this.onmessage?.(new MessageEvent("message", { data }));
    // What is asked next is gathered for a moment.
    vi.advanceTimersByTime(100);
  }

  terminate(): void {
    this.ended = true;
  }

  texts(): string[] {
    return this.given;
  }
}

beforeAll(likeABrowser);
beforeEach(() => vi.useFakeTimers());

const ends: (() => void)[] = [];
afterEach(() => {
  for (const end of ends.splice(0)) end();
  vi.useRealTimers();
});

function begin(text: string) {
  const reader = new SlowReader();
  const models: SheetModel[] = [];
  let reading: Reading | null = null;
  const view = new EditorView({
    parent: document.body,
    state: EditorState.create({
      doc: text,
      extensions: [sheetField, glossField, EditorView.updateListener.of((update) => reading?.onUpdate(update))],
    }),
  });
  reading = new Reading(
    view,
    reader,
    () => "",
    (model) => models.push(model),
  );
  ends.push(() => {
    reading?.end();
    view.destroy();
  });
  const type = (insert: string) => {
    view.dispatch({ changes: { from: view.state.doc.length, insert } });
    vi.advanceTimersByTime(50);
  };
  return { reader, reading, view, models, type };
}

/** Where the first piece of math stands on the sheet. */
function mathAt(view: EditorView): string | null {
  for (const cursor = view.state.field(sheetField).places.iter(); cursor.value !== null; cursor.next()) {
    if (cursor.value.piece.piece === "set") return view.state.sliceDoc(cursor.from, cursor.to);
  }
  return null;
}

test("one text at a time is with the worker, and then the newest", () => {
  const { reader, type } = begin("a");
  type("b");
  type("c");
  expect(reader.texts()).toEqual(["a"]);
  reader.answer();
  expect(reader.texts()).toEqual(["a", "abc"]);
  reader.answer();
  expect(reader.texts()).toEqual(["a", "abc"]);
});

test("a late answer is set where its text has gone in the meantime", () => {
  const { reader, view } = begin("So $x$ it is.");
  view.dispatch({ changes: { from: 0, insert: "Well. " } });
  reader.answer();
  expect(mathAt(view)).toBe("$x$");
});

test("an answer that brings nothing changes nothing in the view, and the next one builds on it", () => {
  const { reader, view, models, type } = begin("So $x$ it is.");
  reader.answer();
  const before = view.state.field(sheetField);
  type(" And so on");
  reader.answer();
  expect(models).toHaveLength(2);
  expect(view.state.field(sheetField).number).toBe(before.number);
  expect(view.state.field(sheetField).pieces).toBe(before.pieces);
  type(" to $y$.");
  reader.answer();
  const { number, pieces } = view.state.field(sheetField);
  expect(number).toBe(3);
  // Only what is new was told, on top of the answer that was not drawn.
  expect(models.at(-1)?.pieces).toMatchObject({ base: 2, head: before.pieces.length });
  expect(pieces.slice(0, before.pieces.length)).toEqual(before.pieces);
  expect(pieces.at(-1)).toMatchObject({ piece: "set", content: { tex: "y" } });
  expect(view.contentDOM.querySelectorAll(".hl-math")).toHaveLength(2);
});

test("what was met by a change is drawn again, though its answer brings nothing new", () => {
  const { reader, view } = begin("So $x$ it is.");
  reader.answer();
  view.dispatch({ changes: { from: 4, insert: "x" } });
  view.dispatch({ changes: { from: 4, to: 5 } });
  vi.advanceTimersByTime(50);
  expect(view.state.field(sheetField).met.size).toBe(1);
  reader.answer();
  expect(view.state.field(sheetField).met.size).toBe(0);
  expect(mathAt(view)).toBe("$x$");
});

test("an answer to an older text than was asked last is dropped", () => {
  const { reader, models, view } = begin("So $x$ it is.");
  reader.answer({ version: 0 });
  expect(models).toEqual([]);
  expect(mathAt(view)).toBeNull();
});

test("of the values passed through in a drag only the newest is tried", () => {
  const { reader, reading } = begin("a");
  for (const mu of ["1", "2", "3"]) reading.tellPreview({}, { mu });
  expect(reader.heard.filter(({ tell }) => tell === "preview")).toEqual([]);
  reader.answer();
  expect(reader.heard.filter(({ tell }) => tell === "preview")).toEqual([
    { tell: "preview", settled: {}, trial: { mu: "3" } },
  ]);
});

test("faults wait until the writing rests", () => {
  const { reader, view, type } = begin("x ");
  reader.answer();
  type(":ref[nowhere]");
  reader.answer();
  expect(view.state.field(glossField).problems).toEqual([]);
  vi.advanceTimersByTime(1000);
  expect(view.state.field(glossField).problems).toHaveLength(1);
  expect(view.contentDOM.querySelector(".hl-gloss-error")?.textContent).toContain("nowhere");
});

test("a text that cannot be read keeps the sheet as it was", () => {
  const { reader, view } = begin("So $x$ it is.");
  reader.answer();
  const said = vi.spyOn(console, "error").mockImplementation(() => {});
  reader.postMessage({ message: { tell: "results", results: [] }, have: 0 });
  reader.onmessage?.(
    new MessageEvent("message", { data: { tell: "fault", answers: 0, message: "out of memory" } as const }),
  );
  expect(mathAt(view)).toBe("$x$");
  expect(said).toHaveBeenCalledWith(expect.stringContaining("out of memory"));
  said.mockClear();
});

test("a question for values is answered by itself, while a text is with the worker", async () => {
  const { reader, reading, models } = begin("a");
  const asked = reading.values(["K.mean"]);
  const later = reading.values(["mu"]);
  const [value] = [{ formula: "K.mean", known: "0.2", unknown: "", rest: "", reason: "" }];
  reader.onmessage?.(
    new MessageEvent("message", { data: { tell: "values", answers: 0, question: 1, values: [value] } as const }),
  );
  expect(await asked).toEqual([value]);
  expect(models).toEqual([]);
  reading.end();
  expect(await later).toEqual([]);
});

test("its end ends the worker", () => {
  const { reader, reading } = begin("a");
  reading.end();
  expect(reader.ended).toBe(true);
});

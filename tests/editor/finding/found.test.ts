// @vitest-environment jsdom
import { EditorState, Text } from "@codemirror/state";
import { EditorView } from "@codemirror/view";
import fc from "fast-check";
import { afterEach, beforeAll, describe, expect, test } from "vitest";
import { foundWords } from "../../../app/editor/finding/find-strip.tsx";
import { endSearch, goToMatch, replaceAll, replaceHere, seek } from "../../../app/editor/finding/walk-found.ts";
import { SheetReader } from "../../../app/editor/reading/sheet-reader.ts";
import { foundField, foundNews } from "../../../app/editor/text/found.ts";
import { sheetHost } from "../../../app/editor/text/host.ts";
import { applyModel, sheetField } from "../../../app/editor/text/sheet-field.ts";
import { findMatches, replacementOf, type Sought } from "../../../app/editor/text/sought.ts";
import { likeABrowser } from "../dom.ts";
import { SAMPLE, tellText } from "../sample.ts";
import { silentHost } from "../silent-host.ts";

beforeAll(likeABrowser);

const open: EditorView[] = [];
afterEach(() => {
  for (const view of open.splice(0)) view.destroy();
});

const PLAIN: Sought = { words: "", matchCase: false, wholeWords: false, isPattern: false };
const sought = (words: string, more: Partial<Sought> = {}): Sought => ({ ...PLAIN, words, ...more });

function sheetOf(text: string, writes = true) {
  const host = { ...silentHost(), writes };
  const view = new EditorView({
    parent: document.body.appendChild(document.createElement("div")),
    state: EditorState.create({
      doc: text,
      extensions: [sheetHost.of(host), foundField, foundNews, sheetField, EditorState.readOnly.of(!writes)],
    }),
  });
  open.push(view);
  const reader = new SheetReader();
  reader.hear(tellText(text));
  const model = reader.sheet();
  view.dispatch({ effects: applyModel.of({ model, doc: view.state.doc, since: view.state.changes().desc }) });
  const edits: Parameters<EditorView["dispatch"]>[0][] = [];
  const desk = {
    edit: (change: Parameters<EditorView["dispatch"]>[0]) => {
      edits.push(change);
      view.dispatch(change);
    },
  };
  return { view, desk, edits };
}

const here = (view: EditorView) => {
  const at = view.state.field(foundField).here;
  return at === null ? null : view.state.sliceDoc(at.from, at.to);
};

describe("what stands in a text", () => {
  const found = (text: string, query: Sought) =>
    findMatches(Text.of(text.split("\n")), query).matches.map(({ from, to }) => text.slice(from, to));

  test("case, whole words and patterns", () => {
    const text = "Front fronts FRONT front.\nA front\nends";
    expect(found(text, sought("front"))).toHaveLength(5);
    expect(found(text, sought("front", { matchCase: true }))).toHaveLength(3);
    expect(found(text, sought("front", { wholeWords: true }))).toHaveLength(4);
    expect(found(text, sought("f\\w+s\\b", { isPattern: true }))).toEqual(["fronts"]);
    expect(found(text, sought("front\\nends", { isPattern: true }))).toEqual(["front\nends"]);
    expect(found(text, sought("a*", { isPattern: true }))).toEqual(["A"]);
    expect(found("a.b a+b", sought("a.b"))).toEqual(["a.b"]);
  });

  test("a pattern that cannot be read is a fault with its reason, and nothing is found", () => {
    const { matches, fault } = findMatches(Text.of(["(("]), sought("((", { isPattern: true }));
    expect(matches).toEqual([]);
    expect(fault).toMatch(/^The pattern cannot be read: .+\.$/);
  });

  test("as many as by splitting the text, whatever is looked for", () => {
    const letters = fc.string({ unit: fc.constantFrom("a", "b", "$", "\\", "\n", "("), maxLength: 40 });
    const few = fc.string({ unit: fc.constantFrom("a", "b", "$", "\\", "("), minLength: 1, maxLength: 3 });
    fc.assert(
      fc.property(letters, few, (text, words) => {
        expect(found(text, sought(words, { matchCase: true }))).toHaveLength(text.split(words).length - 1);
      }),
    );
  });

  test("a replacement names the pattern's groups, and in plain words a dollar is a dollar", () => {
    const match = { from: 0, to: 5, groups: ["mu_12", "mu", "12"] };
    expect(replacementOf(match, "$2-$1 $& $$ $7", { isPattern: true })).toBe("12-mu mu_12 $ $7");
    expect(replacementOf(match, "$1", { isPattern: false })).toBe("$1");
  });
});

describe("on the sheet", () => {
  test("a source that is typeset opens where it is found, for a reader too, and closes behind one", () => {
    for (const writes of [true, false]) {
      const { view } = sheetOf(SAMPLE, writes);
      expect(view.contentDOM.textContent).not.toContain("digits=8");
      seek(view, sought("digits"), 0);
      expect(view.contentDOM.querySelector(".hl-found-here")?.textContent).toBe("digits");
      seek(view, sought("An item"), 0);
      expect(view.contentDOM.textContent).not.toContain("digits=8");
      seek(view, sought("up_to"), 0);
      expect(view.contentDOM.querySelector(".hl-working .hl-found-here")?.textContent).toBe("up_to");
      endSearch(view);
      expect(view.contentDOM.querySelector(".hl-found, .hl-working")).toBeNull();
    }
  });

  test("next and previous go around the paper, from where one was", () => {
    const { view } = sheetOf("one two one two one");
    seek(view, sought("one"), 5);
    expect(foundWords(view.state.field(foundField))).toBe("2 of 3");
    goToMatch(view, 1);
    goToMatch(view, 1);
    expect(foundWords(view.state.field(foundField))).toBe("1 of 3");
    goToMatch(view, -1);
    expect(foundWords(view.state.field(foundField))).toBe("3 of 3");
    seek(view, sought("three"), 0);
    expect(foundWords(view.state.field(foundField))).toBe("not found");
    expect(goToMatch(view, 1)).toBe(false);
  });

  test("others may write meanwhile: the match one is at stays the same", () => {
    const { view } = sheetOf("one two one two");
    seek(view, sought("two"), 8);
    view.dispatch({ changes: { from: 0, insert: "two and " } });
    expect(foundWords(view.state.field(foundField))).toBe("3 of 3");
    expect(view.state.field(foundField).here?.from).toBe(20);
    view.dispatch({ changes: { from: 21, to: 22 } });
    expect(foundWords(view.state.field(foundField))).toBe("2 found");
  });

  test("one is replaced and the next gone to, which is never what was just written", () => {
    const { view, desk } = sheetOf("a b a b a");
    seek(view, sought("a"), 0);
    replaceHere(desk, view, "aa");
    expect(view.state.doc.toString()).toBe("aa b a b a");
    expect(view.state.field(foundField).here?.from).toBe(5);
    expect(here(view)).toBe("a");
  });

  test("all are replaced as one edit", () => {
    const { view, desk, edits } = sheetOf("mu_1 and mu_2");
    seek(view, sought("mu_(\\d)", { isPattern: true }), 0);
    expect(replaceAll(desk, view, "nu$1")).toBe(2);
    expect(view.state.doc.toString()).toBe("nu1 and nu2");
    expect(edits).toHaveLength(1);
    expect(replaceAll(desk, view, "x")).toBe(0);
  });
});

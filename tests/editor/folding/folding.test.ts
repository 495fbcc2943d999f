// @vitest-environment jsdom
import { EditorState } from "@codemirror/state";
import { EditorView } from "@codemirror/view";
import fc from "fast-check";
import { afterEach, beforeAll, beforeEach, describe, expect, test } from "vitest";
import { seek } from "../../../app/editor/finding/walk-found.ts";
import { foldRefused, turnEverySection, turnSectionAtCaret } from "../../../app/editor/folding/fold-acts.ts";
import { foldField, isFolded } from "../../../app/editor/folding/fold-field.ts";
import { folding } from "../../../app/editor/folding/folding.ts";
import { keepFolds } from "../../../app/editor/folding/kept-folds.ts";
import { SheetReader } from "../../../app/editor/reading/sheet-reader.ts";
import { foundField } from "../../../app/editor/text/found.ts";
import { sheetHost } from "../../../app/editor/text/host.ts";
import { goToLine } from "../../../app/editor/text/moving.ts";
import { applyModel, sheetField } from "../../../app/editor/text/sheet-field.ts";
import { likeABrowser } from "../dom.ts";
import { tellText } from "../sample.ts";
import { silentHost } from "../silent-host.ts";

const PAPER = `## One

Words of one.

\`\`\`process larvae
drift: 2
rate: 1
\`\`\`

\`\`\`counts K
of: larvae
start: 1
\`\`\`

### Within

More, at :value[K.mean].

## Two

Words of two.
`;

beforeAll(likeABrowser);
beforeEach(() => localStorage.clear());
const open: EditorView[] = [];
afterEach(() => {
  for (const view of open.splice(0)) view.destroy();
});

function sheetOf(text = PAPER): EditorView {
  const view = new EditorView({
    parent: document.body.appendChild(document.createElement("div")),
    state: EditorState.create({
      doc: text,
      extensions: [sheetHost.of(silentHost()), sheetField, foundField, folding],
    }),
  });
  open.push(view);
  read(view);
  return view;
}

/** The worker's answer to the text at hand. */
function read(view: EditorView): void {
  const reader = new SheetReader();
  reader.hear(tellText(view.state.doc.toString()));
  const since = view.state.changes();
  view.dispatch({ effects: applyModel.of({ model: reader.sheet(), doc: view.state.doc, since: since.desc }) });
}

function caretAt(view: EditorView, words: string): void {
  view.dispatch({ selection: { anchor: view.state.doc.toString().indexOf(words) + 1 } });
}

const foldedLines = (view: EditorView) =>
  [...view.contentDOM.querySelectorAll(".hl-fold-words")].map((e) => e.textContent);

describe("A section", () => {
  test("folds to a line that says what it holds, and unfolds to what it was", () => {
    const view = sheetOf();
    caretAt(view, "Words of one");
    turnSectionAtCaret(view);
    expect(foldedLines(view)).toEqual(["Section 1, 1 figure, 16 lines"]);
    expect(view.contentDOM.textContent).not.toContain("Words of one");
    expect(view.contentDOM.textContent).toContain("Words of two");
    // At the heading, which is in sight.
    expect(view.state.selection.main.head).toBe("## One".length);
    turnSectionAtCaret(view);
    expect(foldedLines(view)).toEqual([]);
    expect(view.contentDOM.textContent).toContain("Words of one");
    expect(view.state.doc.toString()).toBe(PAPER);
  });

  test("within another folds alone, and with it", () => {
    const view = sheetOf();
    caretAt(view, "More, at");
    turnSectionAtCaret(view);
    expect(foldedLines(view)).toEqual(["Section 1.1, 2 lines"]);
    caretAt(view, "Words of one");
    turnSectionAtCaret(view);
    expect(foldedLines(view)).toEqual(["Section 1, 1 figure, 16 lines"]);
  });

  test("has what hangs in it at its line, for the strands", () => {
    const view = sheetOf();
    caretAt(view, "Words of one");
    turnSectionAtCaret(view);
    const line = view.contentDOM.querySelector<HTMLElement>(".hl-fold");
    expect(line?.dataset.slots?.split(" ")).toHaveLength(2);
    expect(line?.hasAttribute("data-quotes")).toBe(true);
  });

  test("cannot be folded where there is none", () => {
    const view = sheetOf("Words.\n\n## Empty\n");
    caretAt(view, "Words");
    expect(foldRefused(view)).toMatch(/no section/);
    caretAt(view, "Empty");
    expect(foldRefused(view)).toMatch(/nothing beneath/);
  });
});

describe("What is folded", () => {
  test.each([
    [
      "what is looked for",
      (view: EditorView) => seek(view, { words: "of one", matchCase: false, wholeWords: false, isPattern: false }, 0),
    ],
    ["the line of an address", (view: EditorView) => goToLine(view, 3)],
  ])("opens for %s", (_what, lead) => {
    const view = sheetOf();
    caretAt(view, "Words of one");
    turnSectionAtCaret(view);
    lead(view);
    expect(foldedLines(view)).toEqual([]);
  });

  test("stays folded while others write in it and before it, and keeps what they wrote", () => {
    const view = sheetOf();
    caretAt(view, "Words of one");
    turnSectionAtCaret(view);
    view.dispatch({ changes: { from: 0, insert: "Before.\n\n" } });
    const at = view.state.doc.toString().indexOf("Words of one");
    view.dispatch({ changes: { from: at, insert: "Others' words.\n\n" } });
    expect(foldedLines(view)).toEqual(["Section 1, 1 figure, 18 lines"]);
    read(view);
    expect(foldedLines(view)).toEqual(["Section 1, 1 figure, 18 lines"]);
    expect(isFolded(view.state, at)).toBe(true);
    expect(view.state.doc.toString()).toContain("Others' words.");
  });

  test("is whole in print", () => {
    const view = sheetOf();
    turnEverySection(view);
    expect(foldedLines(view)).toHaveLength(2);
    window.dispatchEvent(new Event("beforeprint"));
    expect(foldedLines(view)).toEqual([]);
    window.dispatchEvent(new Event("afterprint"));
    expect(foldedLines(view)).toHaveLength(2);
  });

  test("is folded again when the paper is opened on this machine, though lines have come before it", async () => {
    const first = sheetOf();
    keepFolds(first, "p", "ines");
    await Promise.resolve();
    read(first);
    await Promise.resolve();
    caretAt(first, "Words of two");
    turnSectionAtCaret(first);
    const second = sheetOf(`Before.\n\n${PAPER}`);
    keepFolds(second, "p", "ines");
    read(second);
    await Promise.resolve();
    expect(foldedLines(second)).toEqual(["Section 2, 2 lines"]);
    const others = sheetOf();
    keepFolds(others, "p", "tormod");
    read(others);
    await Promise.resolve();
    expect(foldedLines(others)).toEqual([]);
  });
});

test("whatever is written and folded, in any order, the text is what was written, and the caret is in sight", () => {
  const step = fc.oneof(
    fc.record({ at: fc.nat(200), insert: fc.constantFrom("a", "\n\n", "## New\n\n", "") }),
    fc.record({ fold: fc.nat(200) }),
  );
  fc.assert(
    fc.property(fc.array(step, { maxLength: 8 }), (steps) => {
      const view = sheetOf();
      let written = PAPER;
      for (const each of steps) {
        if ("fold" in each) {
          view.dispatch({ selection: { anchor: Math.min(each.fold, written.length) } });
          if (foldRefused(view) === "") turnSectionAtCaret(view);
        } else {
          const from = Math.min(each.at, written.length);
          const to = Math.min(written.length, from + (each.insert === "" ? 9 : 0));
          view.dispatch({
            changes: { from, to, insert: each.insert },
            selection: { anchor: from + each.insert.length },
          });
          written = written.slice(0, from) + each.insert + written.slice(to);
          read(view);
        }
        expect(view.state.doc.toString()).toBe(written);
        expect(isFolded(view.state, view.state.selection.main.head)).toBe(false);
      }
      for (const { from, to } of view.state.field(foldField).folds) expect(from).toBeLessThanOrEqual(to);
    }),
    { numRuns: 10 },
  );
});

// @vitest-environment jsdom
import { EditorState } from "@codemirror/state";
import { EditorView, runScopeHandlers } from "@codemirror/view";
import { afterEach, beforeAll, describe, expect, test, vi } from "vitest";
import { closingLine } from "../../../app/editor/writing/closing.ts";
import { pairs } from "../../../app/editor/writing/index.ts";
import { matesAt } from "../../../app/editor/writing/mates.ts";
import { likeABrowser } from "../dom.ts";

beforeAll(likeABrowser);
const open: EditorView[] = [];
afterEach(() => {
  for (const view of open.splice(0)) view.destroy();
});

/** A text with its caret where `|` stands. */
function parted(marked: string) {
  const offset = marked.indexOf("|");
  return { text: marked.slice(0, offset) + marked.slice(offset + 1), offset };
}

function sheet(marked: string): EditorView {
  const { text, offset } = parted(marked);
  const state = EditorState.create({ doc: text, selection: { anchor: offset }, extensions: [pairs] });
  const view = new EditorView({ parent: document.body.appendChild(document.createElement("div")), state });
  open.push(view);
  return view;
}

function shown(view: EditorView): string {
  const { head } = view.state.selection.main;
  return `${view.state.sliceDoc(0, head)}|${view.state.sliceDoc(head)}`;
}

/** As the browser's input reaches the editor. */
function typed(marked: string, ...keys: string[]): string {
  const view = sheet(marked);
  for (const key of keys) {
    const { from, to } = view.state.selection.main;
    const insert = () => view.state.update({ changes: { from, to, insert: key }, selection: { anchor: from + 1 } });
    const taken = view.state.facet(EditorView.inputHandler).some((handler) => handler(view, from, to, key, insert));
    if (!taken) view.dispatch(insert());
  }
  return shown(view);
}

function entered(marked: string): string | null {
  const view = sheet(marked);
  return runScopeHandlers(view, new KeyboardEvent("keydown", { key: "Enter" }), "editor") ? shown(view) : null;
}

describe("What is opened is closed", () => {
  test("a dollar with its mate, and over it at the end", () => {
    expect(typed("Let |.", "$")).toBe("Let $|$.");
    expect(typed("Let |.", "$", "x", "$")).toBe("Let $x$|.");
    expect(typed("Let $w''| be", "$")).toBe("Let $w''$| be");
    expect(typed("Let |x", "$")).toBe("Let $|x");
    expect(typed("\\|", "$")).toBe("\\$|");
    expect(typed("US|", "$")).toBe("US$|");
    expect(typed("|", "$", "$")).toBe("$$|");
  });

  test("brackets", () => {
    expect(typed(":value|", "[", "K", "(", "3", ")", "]")).toBe(":value[K(3)]|");
    expect(typed("|x", "(")).toBe("(|x");
  });

  test("a cell, surroundings, a display and rows, at Enter", () => {
    expect(entered("```counts K|")).toBe("```counts K\n|\n```");
    expect(entered("Words.\n\n```counts K|\n\n```tail T\nof: p\n```")).toBe(
      "Words.\n\n```counts K\n|\n```\n\n```tail T\nof: p\n```",
    );
    expect(entered(":::theorem[Shift]{#shift}|\n")).toBe(":::theorem[Shift]{#shift}\n|\n:::\n");
    expect(entered("$$|")).toBe("$$\n|\n$$");
    expect(entered("$$\n\\begin{aligned}|\n$$")).toBe("$$\n\\begin{aligned}\n|\n\\end{aligned}\n$$");
  });

  test("only what nothing closes yet, and never within a working", () => {
    for (const marked of [
      "```counts K|\nof: p\n```",
      "```counts K\nof: p\n```|",
      ":::theorem|\nWords.\n:::",
      ":::theorem\nWords.\n:::|",
      "$$|\nx\n$$",
      "$$\nx\n$$|",
      "$$\n\\begin{aligned}|\nx\n\\end{aligned}\n$$",
      "```check c\n$$|\n```",
      "Plain words|",
      "\\begin{proof}|",
    ]) {
      expect(entered(marked), marked).toBeNull();
    }
    const { text, offset } = parted(":::theorem\n:::remark|\nWords.\n:::\n");
    expect(closingLine(text, offset)).toBe(":::");
  });
});

describe("Mates", () => {
  const mates = (marked: string) => {
    const { text, offset } = parted(marked);
    const found = matesAt(text, offset);
    return found && [found.own, found.mate].map((each) => each && [each.from, each.to]);
  };

  test("of brackets and dollars, within a block", () => {
    expect(mates("a |(b (c) d)")).toEqual([
      [2, 3],
      [10, 11],
    ]);
    expect(mates("a (b (c) d)|")).toEqual([
      [10, 11],
      [2, 3],
    ]);
    expect(mates("|$x$ and $y$")).toEqual([
      [0, 1],
      [2, 3],
    ]);
    expect(mates("$$\nx = 1$$|")).toEqual([
      [8, 10],
      [0, 2],
    ]);
    expect(mates("(|\n\n)")).toEqual([[0, 1], null]);
    expect(mates("costs \\$|5")).toBeNull();
    expect(mates("pl|ain")).toBeNull();
  });

  test("of fences and surroundings, which nest", () => {
    expect(mates("|```check c\nthat: 1 < 2\n```\n")).toEqual([
      [0, 3],
      [23, 26],
    ]);
    expect(mates("```check c\n```|\n```check d\n```")).toEqual([
      [11, 14],
      [0, 3],
    ]);
    expect(mates("|:::theorem\n:::proof\n:::\n:::")).toEqual([
      [0, 3],
      [24, 27],
    ]);
  });

  test("are marked once the caret rests", async () => {
    const view = sheet("So |(x).");
    view.dispatch({ selection: { anchor: 6 } });
    await vi.waitFor(() => expect(view.dom.querySelectorAll(".hl-mate")).toHaveLength(2), { timeout: 20_000 });
    view.dispatch({ selection: { anchor: 0 } });
    expect(view.dom.querySelectorAll(".hl-mate")).toHaveLength(0);
  }, 60_000);
});

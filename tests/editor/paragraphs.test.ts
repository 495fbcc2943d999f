import { EditorState } from "@codemirror/state";
import { expect, test } from "vitest";
import { beginsParagraph, enter } from "../../app/editor/text/paragraphs.ts";

/** A text with its caret at `|`. */
function at(marked: string): EditorState {
  const caret = marked.lastIndexOf("|");
  return EditorState.create({ doc: marked.slice(0, caret) + marked.slice(caret + 1), selection: { anchor: caret } });
}

test.each([
  ["Words.|"],
  ["Words| and more."],
  ["# Heading|\n"],
  ["First.\n\nSecond $x$ and :value[a].|"],
  ["$$\nx\n$$\n\nWords.|"],
  ["---\ntitle: T\n---\n\nWords.|"],
  ["---\nNo front matter, since nothing closes it.|"],
  ["```counts K\nof: P\n```\n\nWords.|"],
  ["<!-- a\n\nb -->\n\nWords.|"],
  ["- item\n\nWords.|"],
  ["$$ left open\n\nWords.|"],
])("prose: %j begins a paragraph", (text) => {
  const state = at(text);
  expect(beginsParagraph(state, state.selection.main.head)).toBe(true);
});

test.each([
  ["|"],
  ["Words.\n|"],
  ["```counts K\nof: P|\n```"],
  ["```counts K|"],
  ["$$\nx = 1|\n$$"],
  ["$$ x|"],
  [":::theorem[A]|"],
  ["- item|"],
  ["1. item|"],
  ["> quoted|"],
  ["---\ntitle: T|\n---\n"],
  ["<!-- comment|"],
  ["[^1]: note|"],
  ["<!-- a\n\nb|\n-->"],
  ["- item\ngoes on|"],
  ["- item\n\n  and on|"],
  ["a | b\n--- | ---\n1 | 2|"],
  ["````\n```\nstill code|\n````"],
  ["~~~\ncode|"],
])("elsewhere: %j does not", (text) => {
  const state = at(text);
  expect(beginsParagraph(state, state.selection.main.head)).toBe(false);
});

test.each([
  ["Words.|", "Words.\n\n|"],
  ["Words.|\n\nMore.", "Words.\n|\n\nMore."],
  ["One|two.", "One\n\n|two."],
  ["- item|", "- item\n- |"],
  ["- one\n- |", "- one\n|"],
  ["9. nine|", "9. nine\n10. |"],
  ["  * deep|", "  * deep\n  * |"],
  ["> quoted|", "> quoted\n> |"],
  ["> |", "|"],
  ["|- item", "\n|- item"],
  ["```sweep S\nover:|\n```", "```sweep S\nover:\n  |\n```"],
  ["```sweep S\n  deep: 1|\n```", "```sweep S\n  deep: 1\n  |\n```"],
  ["```counts K\n- of|\n```", "```counts K\n- of\n|\n```"],
  ["```counts K\nof: P|\n```", "```counts K\nof: P\n|\n```"],
])("Enter in %j gives %j", (before, after) => {
  let state = at(before);
  const done = enter({
    state,
    dispatch: (transaction) => {
      state = transaction.state;
    },
  });
  expect(done).toBe(true);
  const text = state.doc.toString();
  const head = state.selection.main.head;
  expect(`${text.slice(0, head)}|${text.slice(head)}`).toBe(after);
});

test("one who only reads enters nothing", () => {
  const state = EditorState.create({ doc: "a", extensions: EditorState.readOnly.of(true) });
  expect(enter({ state, dispatch: () => expect.unreachable() })).toBe(false);
});

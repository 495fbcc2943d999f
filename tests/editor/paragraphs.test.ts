import { markdown, markdownLanguage } from "@codemirror/lang-markdown";
import { yaml, yamlFrontmatter } from "@codemirror/lang-yaml";
import { ensureSyntaxTree } from "@codemirror/language";
import { EditorState } from "@codemirror/state";
import { expect, test } from "vitest";
import { beginsParagraph, enter } from "../../app/editor/text/paragraphs.ts";

/** A text with its caret at `|`. */
function at(marked: string): EditorState {
  const caret = marked.indexOf("|");
  const state = EditorState.create({
    doc: marked.replace("|", ""),
    selection: { anchor: caret },
    extensions: yamlFrontmatter({
      content: markdown({
        base: markdownLanguage,
        codeLanguages: (info) => (info === "counts" ? yaml().language : null),
      }),
    }),
  });
  ensureSyntaxTree(state, state.doc.length, 5000);
  return state;
}

test.each([
  ["Words.|"],
  ["Words| and more."],
  ["# Heading|\n"],
  ["First.\n\nSecond $x$ and :value[a].|"],
  ["$$\nx\n$$\n\nWords.|"],
  ["---\ntitle: T\n---\n\nWords.|"],
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
])("elsewhere: %j does not", (text) => {
  const state = at(text);
  expect(beginsParagraph(state, state.selection.main.head)).toBe(false);
});

test.each([
  ["Words.|", "Words.\n\n|"],
  ["Words.|\n\nMore.", "Words.\n|\n\nMore."],
  ["One|two.", "One\n\n|two."],
  ["- item|", "- item\n- |"],
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

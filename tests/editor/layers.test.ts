// @vitest-environment jsdom
import { EditorState, type Range, Text } from "@codemirror/state";
import { Decoration, type DecorationSet, EditorView } from "@codemirror/view";
import { beforeAll, expect, test } from "vitest";
import { eachLayer, inLayers, inView, NO_LAYERS } from "../../app/editor/text/layers.ts";
import { likeABrowser } from "./dom.ts";

beforeAll(likeABrowser);

const doc = Text.of(["one two three", "four", "", "five six"]);
const hidden = Decoration.replace({});

function places(set: DecorationSet): string[] {
  const found: string[] = [];
  set.between(0, 1e6, (from, to) => {
    found.push(`${from}-${to}`);
  });
  return found.sort();
}

test("what replaces within a line, what makes heights, and dress each have a layer", () => {
  const layers = inLayers(
    [
      Decoration.line({ class: "c" }).range(19),
      hidden.range(4, 7),
      Decoration.mark({ class: "m" }).range(0, 7),
      // A line break that is set as a space.
      hidden.range(13, 14),
      Decoration.replace({ block: true }).range(20, 28),
    ],
    doc,
  );
  expect(places(layers.inline)).toEqual(["4-7"]);
  expect(places(layers.blocks)).toEqual(["13-14", "20-28"]);
  expect(places(layers.marks)).toEqual(["0-7", "19-19"]);
});

test("layers that stay as they are stay the same object", () => {
  const layers = inLayers([hidden.range(4, 7)], doc);
  expect(eachLayer(layers, (set) => set)).toBe(layers);
  const without = eachLayer(layers, (set, name) => (name === "inline" ? Decoration.none : set));
  expect(without).toEqual(NO_LAYERS);
  expect(without.marks).toBe(layers.marks);
});

function viewOf(ranges: readonly Range<Decoration>[]): EditorView {
  let set = Decoration.set([...ranges]);
  return new EditorView({
    parent: document.body,
    state: EditorState.create({
      doc,
      extensions: [
        EditorState.transactionExtender.of(({ changes }) => {
          set = set.map(changes);
          return null;
        }),
        inView(() => set),
      ],
    }),
  });
}

test("what is in view is replaced, and shows its source while a line break stands in it", () => {
  const view = viewOf([hidden.range(4, 7)]);
  expect(view.contentDOM.textContent).not.toContain("two");
  view.dispatch({ changes: { from: 5, insert: "\n" } });
  expect([...view.contentDOM.children].map(({ textContent }) => textContent).slice(0, 2)).toEqual([
    "one t",
    "wo three",
  ]);
  view.dispatch({ changes: { from: 5, to: 6 } });
  expect(view.contentDOM.textContent).not.toContain("two");
  view.destroy();
});

test("dress goes around what is replaced within it", () => {
  const dressed = Decoration.mark({ class: "dress", inclusive: true }).range(4, 8);
  const view = new EditorView({
    parent: document.body,
    state: EditorState.create({
      doc,
      extensions: [
        inView(() => Decoration.set(Decoration.replace({ widget: undefined }).range(4, 7))),
        EditorView.decorations.of(Decoration.set(dressed)),
      ],
    }),
  });
  expect(view.contentDOM.querySelectorAll(".dress")).toHaveLength(1);
  expect(view.contentDOM.querySelector(".dress")?.textContent).toBe(" ");
  view.destroy();
});

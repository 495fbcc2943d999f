import fc from "fast-check";
import { describe, expect, test } from "vitest";
import type { Piece } from "../../app/editor/model/types.ts";
import { editBetween, moved, PieceStore } from "../../app/editor/reading/piece-store.ts";

const math = (from: number, tex: string): Piece => ({
  piece: "set",
  from,
  to: from + tex.length + 2,
  block: false,
  content: { content: "math", tex },
});

describe("an answer tells only what is new", () => {
  const pieces = [math(10, "a"), math(40, "b"), math(80, "c"), math(120, "d")];

  test("nothing, when letters are typed in several places", () => {
    const store = new PieceStore();
    const { number } = store.since(0, pieces);
    store.move([
      { from: 0, to: 0, insert: "x" },
      { from: 50, to: 50, insert: "yy" },
      { from: 100, to: 110, insert: "" },
    ]);
    const next = store.since(number, [math(11, "a"), math(41, "b"), math(83, "c"), math(113, "d")]);
    expect(next).toMatchObject({ base: number, middle: [] });
    expect(next.head + next.tail).toBe(4);
  });

  test("a piece that was put in before one that is like it, and which of them is gone", () => {
    const store = new PieceStore();
    const first = store.since(0, [math(10, "x"), math(20, "x")]);
    store.move([{ from: 10, to: 20, insert: "" }]);
    const next = store.since(first.number, [math(10, "x")]);
    expect(next).toMatchObject({ head: 0, tail: 1, middle: [] });
    store.move([{ from: 10, to: 10, insert: "$x$ " }]);
    const again = store.since(next.number, [math(10, "x"), math(14, "x")]);
    expect(again).toMatchObject({ head: 0, tail: 1, middle: [math(10, "x")] });
  });

  test("all, to a page that has another answer", () => {
    const store = new PieceStore();
    store.since(0, pieces);
    store.since(1, pieces);
    expect(store.since(1, pieces)).toMatchObject({ base: 0, head: 0, tail: 0, middle: pieces });
  });
});

describe("places after edits", () => {
  test("what is put in at a place comes before it; a place that was taken away is none", () => {
    const edits = [
      { from: 2, to: 2, insert: "ab" },
      { from: 5, to: 8, insert: "c" },
    ];
    expect([...moved(Int32Array.of(0, 2, 3, 5, 6, 8, 9), edits)]).toEqual([0, 4, 5, -1, -1, 8, 9]);
    expect([...moved(Int32Array.of(-1, 3), edits)]).toEqual([-1, 5]);
  });

  test("one edit between two texts makes one of the other", () => {
    const text = fc.string({ unit: fc.constantFrom("a", "b", "\n"), maxLength: 12 });
    fc.assert(
      fc.property(text, text, (before, after) => {
        const { from, to, insert } = editBetween(before, after);
        expect(before.slice(0, from) + insert + before.slice(to)).toBe(after);
      }),
    );
  });
});

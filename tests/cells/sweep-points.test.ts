import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { findBorders, mergedBorders } from "../../app/cells/borders.ts";
import { adaptedPoints } from "../../app/cells/sweep/adapt.ts";
import { movementWords } from "../../app/cells/sweep/finding.ts";

/** Largest distance of a function from the polygon through points of it, over a fine grid, as a share of its span. */
function polygonError(f: (x: number) => number, x: readonly number[]): number {
  const [from = 0, to = 1] = [x[0], x.at(-1)];
  const span = Math.abs(f(to) - f(from));
  let most = 0;
  for (let step = 0; step <= 20_000; step += 1) {
    const at = from + ((to - from) * step) / 20_000;
    const right = Math.max(
      1,
      x.findIndex((place) => place >= at),
    );
    const [a = from, b = to] = [x[right - 1], x[right]];
    const chord = f(a) + ((f(b) - f(a)) * (at - a)) / (b - a);
    most = Math.max(most, Math.abs(f(at) - chord));
  }
  return most / span;
}

const evenly = (from: number, to: number, count: number) =>
  Array.from({ length: count }, (_, index) => from + ((to - from) * index) / (count - 1));

describe("adapted points", () => {
  test("resolve a square root at an end far better than as many even ones", () => {
    fc.assert(
      fc.property(fc.double({ min: -3, max: 3, noNaN: true }), fc.integer({ min: 16, max: 60 }), (from, count) => {
        const root = (x: number) => Math.sqrt(Math.max(0, x - from));
        const points = adaptedPoints([{ from, to: from + 2, rootAt: "from" }], count, root, () => (y) => [y]);
        const x = points.map((point) => point.x);
        expect(x).toHaveLength(count);
        expect([x[0], x.at(-1)]).toEqual([from, from + 2]);
        expect(x.every((place, index) => index === 0 || place > (x[index - 1] ?? 0))).toBe(true);
        // A square root's chord over a first interval h is off by √h/4 (computed by hand): O(count^(−1/2)) where points lie
        // evenly, O(1/count) where their distances to the root grow as squares.
        expect(polygonError(root, evenly(from, from + 2, count))).toBeGreaterThan(0.2 / Math.sqrt(count));
        expect(polygonError(root, x)).toBeLessThan(0.6 / count);
      }),
      { numRuns: 25 },
    );
  });

  test("gather where a curve bends, whatever its size", () => {
    for (const size of [1e-9, 1, 1e9]) {
      const step = (x: number) => size * Math.atan(40 * (x - 0.3));
      const points = adaptedPoints([{ from: 0, to: 1, rootAt: "neither" }], 40, step, () => (y) => [y]);
      const near = points.filter(({ x }) => Math.abs(x - 0.3) < 0.1).length;
      expect(near).toBeGreaterThan(20);
      expect(
        polygonError(
          step,
          points.map(({ x }) => x),
        ),
      ).toBeLessThan(polygonError(step, evenly(0, 1, 40)) / 4);
    }
  });

  test("belong to their stretch, and both ends of each are among them", () => {
    const stretches = [
      { from: 0, to: 1, rootAt: "to" as const },
      { from: 1, to: 3, rootAt: "both" as const },
      { from: 3, to: 4, rootAt: "from" as const },
    ];
    const points = adaptedPoints(
      stretches,
      31,
      (x) => x,
      () => (x) => [x > 1 ? x : null],
    );
    expect(points).toHaveLength(31);
    stretches.forEach(({ from, to }, index) => {
      const x = points.filter(({ stretch }) => stretch === index).map((point) => point.x);
      expect([x[0], x.at(-1)]).toEqual([from, to]);
    });
  });

  test("go on where nothing can be drawn, or nothing moves", () => {
    for (const height of [null, 5]) {
      const points = adaptedPoints(
        [{ from: 0, to: 1, rootAt: "neither" }],
        33,
        () => 0,
        () => () => [height],
      );
      const gaps = points.slice(1).map(({ x }, index) => x - (points[index]?.x ?? 0));
      expect(points).toHaveLength(33);
      expect(Math.max(...gaps)).toBeLessThan(0.15);
    }
  });
});

describe("borders", () => {
  test("lie between neighbouring doubles, several between two places too", () => {
    fc.assert(
      fc.property(
        fc.uniqueArray(fc.double({ min: 0.01, max: 9.9, noNaN: true }), { minLength: 0, maxLength: 4 }),
        (cuts) => {
          const sorted = [...cuts].sort((a, b) => a - b);
          const pieceAt = (x: number) => sorted.filter((cut) => cut <= x).length;
          const borders = findBorders([0, 10], pieceAt, (a, b) => a === b);
          expect(borders.map(({ above }) => above)).toEqual(sorted);
          for (const { below, above, lower, upper } of borders) {
            expect((above - below) / above).toBeLessThanOrEqual(2 ** -52);
            expect([pieceAt(below), pieceAt(above)]).toEqual([lower, upper]);
          }
        },
      ),
    );
  });

  test("those that only rounding parts are one", () => {
    const [a, b] = [Math.SQRT2, Math.SQRT2 * (1 + 4 * Number.EPSILON)];
    const pieceAt = (x: number) => [a, b, 2].filter((cut) => cut <= x).length;
    const found = findBorders([1, 3], pieceAt, (x, y) => x === y);
    expect(found).toHaveLength(3);
    const merged = mergedBorders(found);
    expect(merged.map(({ lower, upper }) => [lower, upper])).toEqual([
      [0, 2],
      [2, 3],
    ]);
    expect(merged[0]?.below).toBeLessThan(a);
    expect(merged[0]?.above).toBe(b);
  });

  test("there are none where nothing changes, or no place is given", () => {
    expect(
      findBorders(
        [1, 2, 3],
        () => "a",
        (a, b) => a === b,
      ),
    ).toEqual([]);
    expect(
      findBorders(
        [],
        () => "a",
        (a, b) => a === b,
      ),
    ).toEqual([]);
  });
});

describe("a curve in words", () => {
  const told = (heights: readonly number[], error = 0) => heights.map((y, x) => ({ x, y, error }));

  test("rises, falls, turns, stays", () => {
    expect(movementWords(told([1, 2, 3]))).toBe("rises from 1 at 0 to 3 at 2");
    expect(movementWords(told([3, 2, 1]))).toBe("falls from 3 at 0 to 1 at 2");
    expect(movementWords(told([1, 5, 2]))).toBe("rises from 1 at 0 to 5 at 1 and falls to 2 at 2");
    expect(movementWords(told([4, 4, 4]))).toBe("stays at 4 from 0 to 2");
    expect(movementWords(told([1]))).toBe("is 1 at 0");
    expect(movementWords([])).toBe("");
    expect(movementWords(told([0, 1, 0, 1, 0, 1]))).toBe("moves between 0 at 0 and 1 at 5, turning 4 times");
  });

  test("what the errors allow is no movement", () => {
    expect(movementWords(told([4, 4.1, 3.9, 4], 0.2))).toBe("stays at 4 from 0 to 3");
    expect(movementWords(told([1, 2, 1.95, 3], 0.05))).toBe("rises from 1 at 0 to 3 at 3");
  });
});

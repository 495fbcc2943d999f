import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { courseOf } from "../../../app/editor/strands/course.ts";
import { drawPlies, pliesOf } from "../../../app/editor/strands/plies.ts";
import { numbersOf } from "./scenes.ts";

const LANE = -76;
const EDGE = -20;

/** The points at which the pieces of a path begin and end. */
function points(path: string): [number, number][] {
  return [...path.matchAll(/M(\S+) (\S+?)(?=C)|C\S+ \S+ \S+ \S+ (\S+) ([-\d.]+)/g)].map(([, mx, my, cx, cy]) => [
    Number(mx ?? cx),
    Number(my ?? cy),
  ]);
}

describe("the course of a cord", () => {
  test("begins and ends at the edge, keeps to its lane between, and its normal stays of length 1", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 900, noNaN: true }),
        fc.double({ min: 0.5, max: 900, noNaN: true }),
        (y, length) => {
          const course = courseOf(LANE, EDGE, { y, bends: true }, { y: y + length, bends: true });
          expect(course.at(course.from).x).toBeCloseTo(EDGE, 6);
          expect(course.at(course.from).y).toBeCloseTo(y, 6);
          expect(course.at(course.to).x).toBeCloseTo(EDGE, 6);
          expect(course.at(course.to).y).toBeCloseTo(y + length, 6);
          for (let k = 0; k <= 200; k += 1) {
            const at = course.at(course.from + ((course.to - course.from) * k) / 200);
            expect(Math.hypot(at.nx, at.ny)).toBeCloseTo(1, 9);
            expect(at.x).toBeGreaterThan(LANE - 0.01);
            expect(at.x).toBeLessThan(EDGE + 0.01);
          }
        },
      ),
    );
  });

  test("is measured by its own length: equal steps of s are equal steps along it", () => {
    const course = courseOf(LANE, EDGE, { y: 100, bends: true }, { y: 300, bends: true });
    const step = 0.25;
    for (let s = course.from; s + step < course.to; s += step) {
      const [a, b] = [course.at(s), course.at(s + step)];
      // A chord of a bend of radius 12 is shorter than its arc by a share of step² / (24 · 12²).
      expect(Math.hypot(b.x - a.x, b.y - a.y)).toBeCloseTo(step, 4);
    }
  });

  test("where it leaves the page it is straight, and within the lane s is y", () => {
    const course = courseOf(LANE, EDGE, { y: 0, bends: false }, { y: 500, bends: false });
    expect([course.from, course.to]).toEqual([0, 500]);
    expect(course.at(123)).toEqual({ x: LANE, y: 123, nx: 1, ny: 0 });
  });
});

describe("twisted strands", () => {
  const course = courseOf(LANE, EDGE, { y: 0, bends: false }, { y: 440, bends: false });
  const twisted = drawPlies([0, 1], [course], [{ from: 0, to: 440 }], false);

  test("swing 2.7 px to either side and come round every 22 px", () => {
    // Source: design.md, section 5: cord amplitude 2.7, pitch 22.
    const [first] = twisted;
    const over = points(first?.over ?? "").filter(([, y]) => y > 20 && y < 420);
    expect(Math.min(...over.map(([x]) => x))).toBeCloseTo(LANE - 2.7, 1);
    expect(Math.max(...over.map(([x]) => x))).toBeCloseTo(LANE + 2.7, 1);
    const left = over.filter(([x]) => x < LANE).map(([, y]) => y);
    for (let k = 1; k < left.length; k += 1) expect((left[k] ?? 0) - (left[k - 1] ?? 0)).toBeCloseTo(22, 1);
  });

  test("where one is above, the other is beneath", () => {
    const [first, second] = twisted;
    const stretches = (path = "") => {
      const ys = points(path).map(([, y]) => y);
      return ys.flatMap((y, k) => (k % 2 === 0 ? [[y, ys[k + 1] ?? y] as const] : []));
    };
    for (const [from, to] of stretches(first?.over)) {
      if (from < 12 || to > 428) continue;
      const middle = (from + to) / 2;
      expect(stretches(second?.under).some(([a, b]) => a < middle && middle < b)).toBe(true);
      expect(stretches(second?.over).some(([a, b]) => a < middle && middle < b)).toBe(false);
    }
  });

  test("over and under together are the whole of each strand, and nothing is loose", () => {
    for (const { under, over, loose } of twisted) {
      const ys = points(under + over).map(([, y]) => y);
      expect([Math.min(...ys), Math.max(...ys)]).toEqual([0, 440]);
      expect(loose).toBe("");
    }
  });

  test("a twist stays where it is while an end of the cord moves", () => {
    const longer = courseOf(LANE, EDGE, { y: -100, bends: false }, { y: 440, bends: false });
    const [before] = twisted;
    const [after] = drawPlies([0, 1], [longer], [{ from: -100, to: 440 }], false);
    const inner = (path = "") => points(path).filter(([, y]) => y > 40 && y < 420);
    expect(inner(after?.over)).toEqual(inner(before?.over));
  });

  test("untwisted, they lie side by side, at most 12 px apart", () => {
    for (const strands of [
      [0, 1],
      [0, 1, 2],
      [0, 1, 2, 3],
    ]) {
      const loose = drawPlies(strands, [course], [null], true);
      const xs = loose.map(({ loose: path }) => numbersOf(path)[0] ?? Number.NaN);
      expect(new Set(xs).size).toBe(strands.length);
      expect(Math.max(...xs) - Math.min(...xs)).toBeLessThanOrEqual(12.2);
      expect(loose.every(({ under, over }) => under + over === "")).toBe(true);
    }
  });

  test("one strand by itself, or none, is twisted with itself", () => {
    expect(pliesOf([3])).toEqual([3, 3]);
    expect(pliesOf([])).toEqual([null, null]);
    expect(pliesOf([0, 1, 2, 3, 4, 5])).toHaveLength(4);
  });
});

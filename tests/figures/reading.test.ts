import { describe, expect, it } from "vitest";
import type { Figure } from "../../app/figures/index.ts";
import { placePoints } from "../../app/figures/index.ts";
import { nearestPoint, readableCurves } from "../../app/figures/readable-curves.ts";

const AXIS = { scale: "linear", range: null } as const;
const series = { label: "", labelAt: "end", mark: "line", role: "ordinary" } as const;

/** Two straight lines over 0..10 with a gap in one, and words of our own for their points. */
const FIGURE: Figure = {
  alternative: "",
  x: { ...AXIS, label: "x" },
  y: { ...AXIS, label: "y" },
  series: [
    { ...series, name: "low", x: [0, 5, 10], y: [1, 1, 1] },
    { ...series, name: "high", x: [0, 5, 10], y: [9, null, 9] },
  ],
  levels: [],
  remarks: [],
};
const READINGS = [
  { name: "low", texts: ["l0", "l5", "l10"] },
  { name: "high", texts: ["h0", "", "h10"] },
];

const placed = placePoints(FIGURE, { width: 500 });
const curves = readableCurves(placed.curves, READINGS);
const pointOf = (curve: number, at: number) => {
  const point = curves[curve]?.points[at];
  if (point === undefined) throw new Error(`No point ${at} on curve ${curve}`);
  return point;
};
const textAt = (x: number, y: number) => {
  const asked = nearestPoint(curves, x, y);
  return asked === null ? null : pointOf(asked.curve, asked.at).text;
};

describe("reading a plate", () => {
  it("leaves out what has nothing to say", () => {
    expect(curves.map(({ points }) => points.map(({ text }) => text))).toEqual([
      ["l0", "l5", "l10"],
      ["h0", "h10"],
    ]);
  });

  it("asks the curves at the upright through a place, however far above or below it they run", () => {
    const [low, high] = [pointOf(0, 0), pointOf(1, 0)];
    expect(textAt(low.x + 3, low.y - (low.y - high.y) * 0.4)).toBe("l0");
    expect(textAt(low.x + 3, low.y - (low.y - high.y) * 0.6)).toBe("h0");
    // In the gap of the one, the other answers.
    expect(textAt(pointOf(0, 1).x, high.y)).toBe("l5");
  });

  it("says nothing beyond the axes, and nothing far from every point", () => {
    const { frame } = placed.curves[0] ?? {};
    expect(frame).toBeDefined();
    expect(textAt(pointOf(0, 0).x, (frame?.bottom ?? 0) + 30)).toBeNull();
    expect(textAt((pointOf(0, 0).x + pointOf(0, 1).x) / 2, pointOf(0, 0).y)).toBeNull();
  });

  it("asks a curve in the plane for its nearest point", () => {
    const loop: Figure = {
      ...FIGURE,
      series: [{ ...series, name: "loop", parametric: true, x: [0, 10, 10, 0, 0], y: [0, 0, 10, 10, 0] }],
    };
    const own = placePoints(loop, { width: 500 });
    const read = readableCurves(own.curves, [{ name: "loop", texts: ["a", "b", "c", "d", "a"] }]);
    const corner = read[0]?.points[3];
    if (corner === undefined) throw new Error("The loop has no fourth corner.");
    expect(nearestPoint(read, corner.x + 5, corner.y + 5)).toMatchObject({ curve: 0, at: 3 });
    expect(nearestPoint(read, corner.x + 5, corner.y + 60)).toBeNull();
  });

  it("asks the inset, where one stands on the axes of its figure", () => {
    const inner: Figure = { ...FIGURE, series: [{ ...series, name: "inner", x: [0, 1, 2, 3], y: [0, 1, 2, 3] }] };
    const outer: Figure = {
      ...FIGURE,
      series: [{ ...series, name: "flat", x: Array.from({ length: 101 }, (_, i) => i / 10), y: Array(101).fill(0) }],
      y: { ...AXIS, label: "y", range: [0, 1] },
      inset: { figure: inner, corner: "top right" },
    };
    const own = placePoints(outer, { width: 660, height: 420 });
    const read = readableCurves(own.curves, [
      { name: "flat", texts: Array(101).fill("flat") },
      { name: "inset inner", texts: ["i0", "i1", "i2", "i3"] },
    ]);
    const point = read[1]?.points[1];
    if (point === undefined) throw new Error("The inset has no second point.");
    expect(nearestPoint(read, point.x, point.y - 8)).toMatchObject({ curve: 1, at: 1 });
  });
});

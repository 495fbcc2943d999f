import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { layoutFigure } from "../../app/figures/index.ts";
import { outside, overlapping, textBoxes } from "./boxes.ts";
import { GALLERY } from "./gallery.ts";
import { figure, series } from "./sample.ts";

/** Widths of the sheet, the galley, a window of 390 and the plate view; 120 and 76 mm in print, in points. */
const SIZES = [
  { width: 660, fontSize: 12.5 },
  { width: 500, fontSize: 12.5 },
  { width: 334, fontSize: 12.5 },
  { width: 940, fontSize: 14 },
  { width: 341.4, fontSize: 8 },
  { width: 216.2, fontSize: 8 },
];

describe.each(SIZES)("at width $width", (size) => {
  it.each(Object.entries(GALLERY))("%s: no text overlaps another or leaves the plate", (_, figure) => {
    const layout = layoutFigure(figure, size);
    const boxes = textBoxes(layout);
    expect(boxes.length).toBeGreaterThan(3);
    expect(overlapping(boxes)).toEqual([]);
    expect(outside(boxes, layout)).toEqual([]);
  });
});

const label = fc.constantFrom(
  "",
  "s_0=5.437",
  "exact law",
  "1/2",
  "\\mathbb{P}(K>n)",
  "simulated, 95 %",
  "w",
  "C n^{-3/2}",
);
const height = fc.oneof(fc.double({ min: -3, max: 40, noNaN: true }), fc.constant(null));

const anySeries = fc
  .record({
    label,
    labelAt: fc.constantFrom("start" as const, "end" as const),
    mark: fc.constantFrom("line" as const, "points" as const, "stems" as const, "band" as const),
    role: fc.constantFrom("ordinary" as const, "principal" as const, "reference" as const, "thin" as const),
    parametric: fc.boolean(),
    arrow: fc.boolean(),
    points: fc.array(
      fc.record({ x: fc.double({ min: 0, max: 9, noNaN: true }), y: height, low: height, high: height }),
      {
        maxLength: 12,
      },
    ),
    dots: fc.array(fc.record({ at: fc.nat(11), label, hollow: fc.boolean() }), { maxLength: 3 }),
  })
  .map(({ points, ...rest }) => {
    const order = rest.parametric ? points : [...points].sort((a, b) => a.x - b.x);
    const column = (of: "y" | "low" | "high") => order.map((point) => point[of]);
    return { ...rest, x: order.map(({ x }) => x), y: column("y"), low: column("low"), high: column("high") };
  });

const anyFigure = fc
  .record({
    series: fc.array(anySeries, { maxLength: 6 }),
    levels: fc.array(fc.record({ label, y: fc.double({ min: -3, max: 40, noNaN: true }) }), { maxLength: 3 }),
    verticals: fc.array(fc.record({ label, x: fc.double({ min: 0, max: 9, noNaN: true }) }), { maxLength: 4 }),
    scales: fc.tuple(
      fc.constantFrom("linear" as const, "log" as const),
      fc.constantFrom("linear" as const, "log" as const),
    ),
  })
  .map(({ series: all, levels, verticals, scales: [x, y] }) =>
    figure({
      x: { label: "x", scale: x, range: null },
      y: { label: "w_s(x)", scale: y, range: null },
      series: all.map((one, i) => series({ name: `c${i}`, ...one })),
      levels,
      verticals,
    }),
  );

describe("whatever is drawn", () => {
  it("texts keep clear of one another and within the plate, and every length is a number", () => {
    fc.assert(
      fc.property(anyFigure, fc.constantFrom(...SIZES), (drawn, size) => {
        const layout = layoutFigure(drawn, size);
        const boxes = textBoxes(layout);
        expect(overlapping(boxes)).toEqual([]);
        expect(outside(boxes, layout)).toEqual([]);
        expect(JSON.stringify(layout)).not.toMatch(/NaN/);
      }),
      { numRuns: 300 },
    );
  });

  it("with an inset and in panels too", () => {
    fc.assert(
      fc.property(anyFigure, anyFigure, fc.boolean(), fc.constantFrom(...SIZES), (main, other, isInset, size) => {
        const drawn = isInset
          ? { ...main, inset: { figure: other, corner: null } }
          : figure({ series: [], panels: [main, other].map((one) => ({ title: "exact law", figure: one })) });
        const layout = layoutFigure(drawn, size);
        const boxes = textBoxes(layout);
        expect(overlapping(boxes)).toEqual([]);
        expect(outside(boxes, layout)).toEqual([]);
      }),
      { numRuns: 150 },
    );
  });
});

import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { thinBandRemark } from "../../app/figures/index.ts";
import { layoutPlot } from "../../app/figures/layout-plot.ts";
import { spread } from "../../app/figures/spread.ts";
import { linearTicks, logTicks } from "../../app/figures/ticks.ts";
import { deepLaw, figure, profiles, series } from "./sample.ts";

const texts = (ticks: readonly { runs: readonly { text: string }[] }[]) =>
  ticks.map((tick) => tick.runs.map((run) => run.text).join("^"));

describe("ticks", () => {
  it("are at 1, 2 or 5 times a power of ten, with as many decimals as tell them apart", () => {
    expect(texts(linearTicks(0, 1.6, 4))).toEqual(["0", "0.5", "1.0", "1.5"]);
    expect(texts(linearTicks(-400000, 400000, 4))).toEqual([
      "−400\u2009000",
      "−200\u2009000",
      "0",
      "200\u2009000",
      "400\u2009000",
    ]);
  });

  it("share a power of ten where the numbers are very large or very small", () => {
    expect(texts(linearTicks(0, 4e-7, 2))).toEqual(["0", "2×10^−7", "4×10^−7"]);
  });

  it("of a logarithmic axis go below the double's range", () => {
    expect(texts(logTicks(-741, 0, 4))).toEqual(["10^−600", "10^−400", "10^−200", "1"]);
  });

  it("of a short logarithmic axis are values between the powers", () => {
    expect(texts(logTicks(Math.log10(2), Math.log10(7), 4))).toEqual(["2", "3", "4", "5", "6", "7"]);
  });
});

describe("labels apart", () => {
  it("stay in order, in bounds and 14 apart, and do not move when they need not", () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: 0, max: 300, noNaN: true }), { maxLength: 12 }), (wanted) => {
        const placed = spread(wanted, 14, 0, 300);
        const order = wanted.map((_, i) => i).sort((a, b) => (wanted[a] ?? 0) - (wanted[b] ?? 0) || a - b);
        for (let k = 0; k < order.length; k += 1) {
          const here = placed[order[k] ?? 0] ?? Number.NaN;
          expect(here).toBeGreaterThanOrEqual(-1e-9);
          expect(here).toBeLessThanOrEqual(300 + 1e-9);
          if (k > 0) expect(here - (placed[order[k - 1] ?? 0] ?? Number.NaN)).toBeGreaterThanOrEqual(14 - 1e-9);
        }
      }),
    );
    expect(spread([10, 50, 200], 14, 0, 300)).toEqual([10, 50, 200]);
  });

  it("move as little as possible: two at one place go half a gap each way", () => {
    expect(spread([100, 100], 14, 0, 300)).toEqual([93, 107]);
  });
});

describe("layout", () => {
  it("lets labels that say where their curves start be the ticks of the vertical axis", () => {
    const layout = layoutPlot(profiles, { width: 500 });
    expect(layout.yTicks).toEqual([]);
    expect(layout.labels).toHaveLength(7);
    const heights = layout.labels.map((label) => label.y).sort((a, b) => a - b);
    for (let i = 1; i < heights.length; i += 1)
      expect((heights[i] ?? 0) - (heights[i - 1] ?? 0)).toBeGreaterThanOrEqual(13.99);
  });

  it("keeps the ticks when a label says no number, so that the scale is never lost", () => {
    const named = figure({
      series: [series({ name: "a", label: "\\text{exact}", labelAt: "start", x: [0, 1], y: [3, 4] })],
    });
    expect(layoutPlot(named, { width: 500 }).yTicks.length).toBeGreaterThan(1);
  });

  it("draws values far below the double's range on a log axis", () => {
    const layout = layoutPlot(deepLaw, { width: 500 });
    expect(layout.series[0]?.marks).toHaveLength(1000);
    expect(layout.y.low).toBeCloseTo(-741, 6); // the sample falls by 0.741 decades a step: exact by its construction
    const heights = layout.series[0]?.marks.map((mark) => mark.y) ?? [];
    expect(heights.every((y, i) => i === 0 || (y ?? Number.NaN) > (heights[i - 1] ?? Number.POSITIVE_INFINITY))).toBe(
      true,
    );
  });

  it("parts a line at a gap and cuts it exactly at a chosen range", () => {
    const gap = figure({ series: [series({ name: "a", x: [0, 1, 2, 3, 4], y: [0, 1, null, 3, 4] })] });
    expect(layoutPlot(gap, { width: 500 }).series[0]?.line.match(/M/g)).toHaveLength(2);
    const cut = figure({
      x: { label: "x", scale: "linear", range: [0.5, 3] },
      series: [series({ name: "a", x: [0, 4], y: [0, 4] })],
    });
    const layout = layoutPlot(cut, { width: 500 });
    expect(layout.series[0]?.line).toMatch(new RegExp(`^M${layout.frame.left.toFixed(2).replace(/\.?0+$/, "")},`));
    expect(layout.y.high).toBe(1); // no point of the data lies within: the axis stands for itself
  });

  it("does not draw a band thinner than its line, and says so", () => {
    const thin = figure({ series: [series({ name: "a", x: [0, 1], y: [0, 1], low: [-1e-9, 1], high: [1e-9, 1] })] });
    const layout = layoutPlot(thin, { width: 500 });
    expect(layout.series[0]?.band).toBe("");
    expect(thinBandRemark(thin)).toBe("The error of a is thinner than its line.");
    const wide = figure({ series: [series({ name: "a", x: [0, 1], y: [0, 1], low: [-0.2, 0.8], high: [0.2, 1.2] })] });
    expect(layoutPlot(wide, { width: 500 }).series[0]?.band).toMatch(/^M.*Z$/);
    expect(thinBandRemark(wide)).toBeNull();
  });

  it("leaves out what is not positive on a log axis instead of drawing it somewhere", () => {
    const some = figure({
      y: { label: "p", scale: "log", range: null },
      series: [series({ name: "a", mark: "points", x: [0, 1, 2], y: [0, 0.1, 0.01] })],
    });
    expect(layoutPlot(some, { width: 500 }).series[0]?.marks).toHaveLength(2);
  });

  it("gives an empty figure axes and nothing else", () => {
    const empty = layoutPlot(figure({ series: [] }), { width: 500 });
    expect(empty.series).toEqual([]);
    expect(empty.xTicks.length).toBeGreaterThan(1);
  });
});

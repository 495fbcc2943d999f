import { describe, expect, it } from "vitest";
import { crossings, type Figure, layoutFigure, levelCrossings, type Series } from "../../app/figures/index.ts";
import { layoutPlot } from "../../app/figures/layout-plot.ts";
import { seriesColours, seriesDashes } from "../../app/figures/palette.ts";
import { jump, law, panels, portrait, withInset } from "./gallery.ts";
import { figure, series } from "./sample.ts";

const WIDE = { width: 660 };

function placed(drawn: Figure, name: string) {
  const found = layoutPlot(drawn, WIDE).series.find((one) => one.name === name);
  if (!found) throw new Error(`No ${name}.`);
  return found;
}

describe("bars and rings", () => {
  it("reach down to the frame from a lower end of 0 on a log axis, also where the value itself cannot stand there", () => {
    const plot = layoutPlot(law, WIDE);
    const rings = placed(law, "S");
    expect(rings.ring).toBe("open"); // the exact law's points are seen within
    const none = rings.marks.at(-1);
    expect(none?.y).toBeNull();
    expect(none?.bar?.[0]).toBe(plot.inner.bottom);
    expect(none?.bar?.[1]).toBeLessThan(plot.inner.bottom);
  });

  it("are not drawn where no interval is to be had, and the ring is", () => {
    const ring = placed(withInset, "simulated");
    expect([ring.ring, ring.marks[0]?.bar]).toEqual(["filled", null]);
    expect(ring.colour).toBe(placed(withInset, "s4").colour);
  });

  it("of several series of points the later are smaller, so that none hides another", () => {
    const two = figure({
      series: ["a", "b"].map((name) => series({ name, mark: "points", x: [0, 1, 2], y: [1, 2, 3] })),
    });
    const [a, b] = layoutPlot(two, WIDE).series.map(({ radius }) => radius);
    expect(b).toBeLessThan((a ?? 0) * 0.7);
  });
});

describe("dots, arrows and references", () => {
  it("a jump's ends are dots, the one not attained a ring, on both sides of a dotted vertical", () => {
    const plot = layoutPlot(jump, WIDE);
    expect(plot.series.map(({ dots }) => dots.map(({ hollow }) => hollow))).toEqual([[true], [false]]);
    const [vertical] = plot.verticals;
    for (const { dots } of plot.series) expect(dots[0]?.x).toBeCloseTo(vertical?.at ?? Number.NaN, 6);
    expect(plot.topLabels).toHaveLength(2);
  });

  it("an arrowhead points where the curve goes", () => {
    const line = figure({ series: [series({ name: "a", parametric: true, arrow: true, x: [1, 0], y: [0, 0] })] });
    const [tip, barb] = placed(line, "a").arrow ?? [];
    expect(tip?.x).toBeLessThan(barb?.x ?? Number.NaN);
  });

  it("a reference beyond a chosen range is neither drawn nor labelled", () => {
    const drawn = figure({
      x: { label: "x", scale: "linear", range: [0, 1] },
      y: { label: "w", scale: "linear", range: [0, 1] },
      series: [series({ name: "a", label: "", x: [0, 1], y: [0, 1] })],
      levels: [{ label: "high", y: 2 }],
      verticals: [{ label: "far", x: 2 }],
    });
    const plot = layoutPlot(drawn, WIDE);
    expect([plot.levels, plot.verticals, plot.labels, plot.topLabels]).toEqual([[], [], [], []]);
  });
});

describe("insets and panels", () => {
  it("an inset stands in a corner that nothing is drawn in, and under a narrow plate", () => {
    const [main, inset] = layoutFigure(withInset, WIDE).plots;
    const corner = { left: inset?.left ?? 0, top: inset?.top ?? 0 };
    const under = main?.plot.series.flatMap(({ pieces }) => pieces.flat()) ?? [];
    const covered = under.filter(
      ({ x, y }) =>
        x > corner.left &&
        x < corner.left + (inset?.plot.width ?? 0) &&
        y > corner.top &&
        y < corner.top + (inset?.plot.height ?? 0),
    );
    expect(covered).toEqual([]);
    const narrow = layoutFigure(withInset, { width: 334 });
    expect(narrow.plots[1]?.top).toBeGreaterThan(narrow.plots[0]?.plot.height ?? Number.NaN);
  });

  it("a chosen corner is taken", () => {
    const chosen = { figure: portrait, corner: "bottom right" as const };
    const [main, inset] = layoutFigure({ ...withInset, inset: chosen }, WIDE).plots;
    expect(inset?.top).toBeGreaterThan((main?.plot.height ?? 0) / 4);
    expect(inset?.left).toBeGreaterThan((main?.plot.width ?? 0) / 3);
  });

  it("panels of one row are of one height and lettered in reading order", () => {
    const { plots, width } = layoutFigure(panels, WIDE);
    expect(plots.map(({ head }) => head?.letter)).toEqual(["(a)", "(b)", "(c)"]);
    expect(plots[0]?.plot.frame.bottom).toBe(plots[1]?.plot.frame.bottom);
    expect((plots[1]?.left ?? 0) + (plots[1]?.plot.width ?? 0)).toBeCloseTo(width, 6);
    expect(plots[2]?.top).toBeGreaterThan(plots[0]?.plot.height ?? Number.NaN);
    expect(layoutFigure(panels, { width: 334 }).plots.map(({ left }) => left)).toEqual([0, 0, 0]);
  });
});

describe("colours and dashes", () => {
  it("a series may take another's colour, and then its dashes; fine and dotted ones count for nothing", () => {
    const all: Series[] = [
      series({ name: "a", x: [0, 1], y: [0, 1] }),
      series({ name: "b", x: [0, 1], y: [1, 0] }),
      series({ name: "b2", colourOf: "b", x: [2, 3], y: [0, 1] }),
      series({ name: "t", role: "thin", x: [0, 1], y: [0, 0] }),
    ];
    expect(seriesColours(figure({ series: all }))).toEqual(["blue", "ochre", "ochre", "edge"]);
    expect(seriesDashes(figure({ series: all }))).toEqual([0, 1, 1, 0]);
  });
});

describe("crossings", () => {
  const x = [0, 1, 2, 3, 4];
  const up = series({ name: "up", x, y: x });
  const down = series({ name: "down", x, y: x.map((at) => 3 - at) });

  it("lie where lines meet, within the axis", () => {
    const drawn = figure({ series: [up, down] });
    expect(crossings(drawn, up, down)).toEqual([{ x: 1.5, between: [1, 2], firstAbove: true }]);
    expect(levelCrossings(drawn, down, 1.25).map((crossing) => crossing.x)).toEqual([1.75]);
    const cut = figure({ x: { label: "x", scale: "linear", range: [2, 4] }, series: [up, down] });
    expect(crossings(cut, up, down)).toEqual([]);
  });

  it("are none where curves lie within their errors of one another", () => {
    const wide = { ...down, low: x.map((at) => 3 - at - 4), high: x.map((at) => 3 - at + 4) };
    expect(crossings(figure({ series: [up, wide] }), up, wide)).toEqual([]);
  });
});

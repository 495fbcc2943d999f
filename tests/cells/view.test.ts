import { describe, expect, test } from "vitest";
import type { CellView } from "../../app/cells/index.ts";
import { viewCell } from "../../app/cells/index.ts";
import type { Figure, TableData } from "../../app/figures/index.ts";
import { cell, computed, LARVAE, plannedCell, quantityOf, valueIn } from "./papers.ts";

function viewIn(text: string, id: string, overrides: Record<string, string> = {}): CellView {
  const { plan, results, outcomes } = computed(LARVAE + text, overrides);
  const result = results.get(id);
  if (result === undefined) throw new Error(JSON.stringify([plan.problems, outcomes.get(id)]));
  return viewCell(plannedCell(plan, id), result, plan, results);
}

function figureIn(text: string, id: string, overrides: Record<string, string> = {}): Figure {
  const { figure } = viewIn(text, id, overrides);
  if (figure === null) throw new Error(`${id} has no figure.`);
  return figure;
}

function texts(table: TableData | null, column: number): (string | undefined)[] {
  return table?.rows.map((row) => row[column]?.text) ?? [];
}

describe("profiles", () => {
  const PROFILE = cell("profile w", "of: larvae", "s: [0, 1/2, 2, s0]");

  test("curves begin at their s, labelled by it; that of s0 is the principal one", () => {
    const figure = figureIn(PROFILE, "w");
    expect(figure.series.map(({ label, role, labelAt }) => [label, role, labelAt])).toEqual([
      ["s=0", "ordinary", "start"],
      ["1/2", "ordinary", "start"],
      ["2", "ordinary", "start"],
      ["s_0=5.437", "principal", "start"],
    ]);
    expect(figure.series.map(({ y }) => y[0])).toEqual([0, 0.5, 2, expect.closeTo(5.436877834, 8)]);
    expect(figure.levels).toEqual([{ label: "1", y: 1 }]);
    expect(figure.alternative).toContain("s0 = 5.437 leaves the barrier without slope");
  });

  test("the range ends where every curve is within 1e-3 of its limit, and not much later", () => {
    const figure = figureIn(PROFILE, "w");
    const ends = figure.series.map(({ y }) => Math.abs((y.at(-1) ?? 0) - 1));
    expect(Math.max(...ends)).toBeLessThan(1e-3);
    expect(Math.max(...ends)).toBeGreaterThan(3e-4);
    expect(figure.series.every(({ x }) => x[0] === 0)).toBe(true);
  });

  test("a given range is kept; bands are the errors", () => {
    const figure = figureIn(cell("profile w", "of: larvae", "x: 0 to 1.6"), "w");
    const [curve] = figure.series;
    expect([curve?.x[0], curve?.x.at(-1)]).toEqual([0, 1.6]);
    expect(curve?.y.length).toBe(curve?.x.length);
    for (const [index, y] of (curve?.y ?? []).entries()) {
      expect(curve?.low?.[index]).toBeLessThanOrEqual(y ?? 0);
      expect(curve?.high?.[index]).toBeGreaterThanOrEqual(y ?? 0);
    }
  });

  test("an s beyond s0 has no curve, and the remarks say so", () => {
    const figure = figureIn(cell("profile w", "of: larvae", "s: [0, 4]"), "w", { mu: "1.5" });
    expect(figure.series).toHaveLength(1);
    expect(figure.remarks.join()).toContain("No curve for s = 4, which is beyond s0 = 2.172");
  });

  test("s = 1 is drawn as the limit itself", () => {
    const figure = figureIn(cell("profile w", "of: larvae", "s: [0, 1]"), "w");
    expect(figure.series[1]).toMatchObject({ role: "reference", label: "1" });
    expect(figure.levels).toEqual([]);
  });

  test("points list what is plotted", () => {
    const { points, figure } = viewIn(PROFILE, "w");
    expect(points?.columns).toHaveLength(5);
    expect(points?.rows).toHaveLength(figure?.series[0]?.x.length ?? -1);
  });
});

describe("counts", () => {
  const COUNTS = cell("counts K", "of: larvae", "start: 1", "up_to: 200", "axes: {x: 0 to 50}", "labels: {y: p_n}");

  test("stems on a logarithmic axis; axes and labels are the body's", () => {
    const figure = figureIn(COUNTS, "K");
    expect(figure.y).toEqual({ label: "p_n", scale: "log", range: null });
    const otherwise = { scale: "linear", range: null };
    expect(figure.x).toEqual({ label: "n", scale: "linear", range: [0, 50], otherwise });
    expect(figure.series[0]).toMatchObject({ mark: "stems", x: Array.from({ length: 201 }, (_, n) => n) });
  });

  test("beyond the double's range the logarithm is kept", () => {
    const figure = figureIn(cell("counts K", "of: larvae", "start: 1", "up_to: 1000"), "K");
    const [series] = figure.series;
    expect(series?.x.at(-1)).toBe(1000);
    expect(series?.y.at(-1)).toBe(0);
    // Source: log10 P(K = 1000) of the reference, see halfline.test.ts.
    expect(series?.log10y?.at(-1)).toBeCloseTo(-740.588594928044, 9);
    expect(figure.remarks.join()).toContain("are drawn");
  });

  test("the table is thinned to rows one can read", () => {
    const { table } = viewIn(COUNTS, "K");
    expect(texts(table, 0)).toEqual(["0", "1", "2", "3", "4", "5", "6", "7", "8", "9", "10", "20", "50", "100", "200"]);
    expect(texts(table, 1)[1]).toBe("0.0278681");
    expect(table?.rows[14]?.[1]?.full).toMatch(/^5\.4926\d+e-152$/);
  });

  test("P(K > n) of the table is that of the callable", () => {
    const text = cell("counts K", "of: larvae", "start: {0.3: 2}", "up_to: 400");
    const { table } = viewIn(text, "K");
    for (const [index, n] of ["0", "1", "7", "50", "400"].entries()) {
      const row = table?.rows.find((entries) => entries[0]?.text === n);
      const { mantissa, exponent, error } = quantityOf(valueIn(LARVAE + text, `K.above(${n})`));
      const [printed, power] = (row?.[2]?.full ?? "").split("e");
      const log10 = Math.log10(Number(printed)) + Number(power ?? 0);
      expect(log10, `row ${index}`).toBeCloseTo(Math.log10(mantissa) + exponent * Math.log10(2), 11);
      expect(error).toBeGreaterThan(0);
    }
  });

  test("full precision stands behind each entry, beyond the double's range too", () => {
    const { table } = viewIn(cell("counts K", "of: larvae", "start: 1", "up_to: 1000"), "K");
    const last = table?.rows.at(-1)?.[1];
    expect(last?.text).toBe("2.57873×10⁻⁷⁴¹");
    expect(last?.full).toMatch(/^2\.578725245316\d*e-741$/);
    expect(last?.error).toMatch(/e-75\d$/);
  });
});

describe("tails", () => {
  test("the ratio tends to 1, in figure, table and words", () => {
    const { figure, table } = viewIn(cell("tail T", "of: larvae", "start: 1"), "T");
    const ratios = figure?.series[0]?.y ?? [];
    expect(ratios.at(-1)).toBeCloseTo(1.000152646895801, 12);
    expect(figure?.x.scale).toBe("log");
    expect(figure?.alternative).toContain("At n = 1000 it is 1.00015");
    expect(texts(table, 3).at(-1)).toBe("1.00015");
  });
});

test("views read nothing but the result: axes may change while the result is an old one", () => {
  const text = LARVAE + cell("counts K", "of: larvae", "start: 1");
  const old = computed(text).results.get("K");
  const { plan } = computed(`${text}`.replace("start: 1", "start: 3\naxes: {linear: y}"));
  if (old === undefined) throw new Error("K was computed.");
  expect(viewCell(plannedCell(plan, "K"), old, plan, new Map()).figure?.y.scale).toBe("linear");
});

test("the paper's macros are unfolded in a figure's labels, its panels' and its inset's", () => {
  const front = "---\nmacros: {\\E: '\\mathbb{E}', \\W: 'w_{#1}'}\n---\n\n";
  const text = `${cell("profile w", "of: larvae", "s: [0]", "labels: {y: '\\W{s}'}")}${cell("figure F", "panels: [w]", "labels: {w: \\E K}")}`;
  const { plan, results, outcomes } = computed(front + LARVAE + text);
  const figureOf = (id: string) => {
    const result = results.get(id);
    if (result === undefined) throw new Error(JSON.stringify([plan.problems, outcomes.get(id)]));
    return viewCell(plannedCell(plan, id), result, plan, results).figure;
  };
  expect(figureOf("w")?.y.label).toBe("w_{s}");
  const panel = figureOf("F")?.panels?.[0];
  expect([panel?.title, panel?.figure.y.label]).toEqual(["\\mathbb{E} K", "w_{s}"]);
});

import { describe, expect, test } from "vitest";
import { viewCell } from "../../app/cells/index.ts";
import type { Figure, Series } from "../../app/figures/index.ts";
import { toDouble } from "../../app/formulas/index.ts";
import { cell, computed, keyOf, LARVAE, plannedCell, planOf, quantityOf, valueIn } from "./papers.ts";

const SETUP =
  LARVAE +
  cell("profile w", "of: larvae", "s: [0, 2, s0]") +
  cell("counts K", "of: larvae", "start: 1", "up_to: 30") +
  cell("tail T", "of: larvae", "start: 1", "up_to: 30");

function viewIn(text: string, id = "F") {
  const { plan, results, outcomes } = computed(text);
  const result = results.get(id);
  if (result === undefined) throw new Error(JSON.stringify([plan.problems, outcomes.get(id)]));
  return viewCell(plannedCell(plan, id), result, plan, results);
}

function figureIn(text: string, id = "F"): Figure {
  const { figure } = viewIn(text, id);
  if (figure === null) throw new Error(`${id} has no figure.`);
  return figure;
}

function seriesOf(figure: Figure, name: string): Series {
  const series = figure.series.find((one) => one.name === name);
  if (series === undefined) throw new Error(`No ${name} among ${figure.series.map((one) => one.name).join(", ")}.`);
  return series;
}

const figure = (...lines: string[]) => SETUP + cell("figure F", ...lines);
const problemsOf = (text: string) => planOf(text).problems.map(({ line, message }) => ({ line, message }));

describe("curves over a new name", () => {
  test("have each formula's own value at every point, both ends included", () => {
    const text = figure("over: {x: 0 to 4}", "curves:", "  survival: w(x)", "  linear: 1 - exp(-larvae.decay*x)");
    const drawn = figureIn(text);
    const survival = seriesOf(drawn, "survival");
    expect(survival.x[0]).toBe(0);
    expect(survival.x.at(-1)).toBe(4);
    for (const i of [0, 17, 60, 120])
      expect(survival.y[i]).toBe(toDouble(quantityOf(valueIn(text, `w(${survival.x[i]})`))));
    // e^{-(2+√2)x} with λ = μ + √(μ² − 2β) for D = 1/2, μ = 2, β = 1: the meaning of `decay` in the paper language.
    const linear = seriesOf(drawn, "linear");
    linear.x.forEach((x, i) => {
      expect(linear.y[i]).toBeCloseTo(1 - Math.exp(-(2 + Math.SQRT2) * x), 13);
    });
  });

  test("have their points where they bend: no chord is further from the curve than 1/500 of the plate's height", () => {
    const drawn = seriesOf(figureIn(figure("over: {x: 0 to 10}", "curves: {front: 1/(1 + exp(20*(x - 5)))}")), "front");
    // A curve that is flat but for a step at 5; computed by an independent method: its formula between the points.
    const exact = (x: number) => 1 / (1 + Math.exp(20 * (x - 5)));
    for (let i = 1; i < drawn.x.length; i += 1) {
      const slope = (10 * ((drawn.y[i] ?? 0) - (drawn.y[i - 1] ?? 0))) / ((drawn.x[i] ?? 0) - (drawn.x[i - 1] ?? 0));
      const middle = ((drawn.x[i - 1] ?? 0) + (drawn.x[i] ?? 0)) / 2;
      const chord = ((drawn.y[i - 1] ?? 0) + (drawn.y[i] ?? 0)) / 2;
      expect(Math.abs(chord - exact(middle)) / Math.hypot(1, slope)).toBeLessThan(1 / 500);
    }
  });

  test("are broken where they are refused, with the reason in the caption", () => {
    const drawn = figureIn(figure("over: {x: 0 to 3}", "curves: {root: sqrt(x - 1)}", "points: 31"));
    const root = seriesOf(drawn, "root");
    root.x.forEach((x, i) => {
      expect(root.y[i] === null).toBe(x < 1);
    });
    expect(drawn.remarks.join(" ")).toMatch(/^No root for x from 0 to 0\.\d+: /);
  });

  test("have points even in the logarithm too where the interval spans decades", () => {
    const drawn = seriesOf(figureIn(figure("over: {t: 1 to 10000}", "curves: {a: 1/t}", "axes: {log: x}")), "a");
    const decades = [1, 10, 100, 1000].map((from) => drawn.x.filter((x) => x >= from && x <= 10 * from).length);
    for (const count of decades) expect(count).toBeGreaterThan(10);
  });
});

describe("what exists at whole numbers only", () => {
  test("is drawn as points at the whole numbers of the interval", () => {
    const text = figure("over: {n: 1 to 30}", "curves: {exact: K(n), half: n/2}");
    const drawn = figureIn(text);
    const exact = seriesOf(drawn, "exact");
    expect(exact.mark).toBe("points");
    expect(exact.x).toEqual(Array.from({ length: 30 }, (_, i) => i + 1));
    expect(exact.y[2]).toBe(toDouble(quantityOf(valueIn(text, "K(3)"))));
    expect(seriesOf(drawn, "half").mark).toBe("line");
  });

  test("is thinned to the points asked for, and the caption says so", () => {
    const drawn = figureIn(figure("over: {n: 0 to 2000}", "curves: {exact: K(n)}", "points: 41"));
    const exact = seriesOf(drawn, "exact");
    expect(exact.x).toHaveLength(41);
    expect(exact.x.every(Number.isInteger)).toBe(true);
    expect(drawn.remarks).toContain("Of n = 0 to 2000, 41 are drawn.");
    // Far below the double's range the axis takes logarithms; s0 = 5.4368778 falls by 0.7354 decades a step: its log10.
    const fall = ((exact.log10y?.[40] ?? 0) - (exact.log10y?.[20] ?? 0)) / 1000;
    expect(fall).toBeCloseTo(-Math.log10(5.436877834), 2);
    expect(drawn.y.scale).toBe("log");
  });

  test("a list gives points where it says", () => {
    const drawn = seriesOf(figureIn(figure("over: {n: [1, 2, 5, 10]}", "curves: {exact: K(n)}")), "exact");
    expect([drawn.mark, drawn.x]).toEqual(["points", [1, 2, 5, 10]]);
  });
});

describe("curves over a parameter", () => {
  const text = figure("over: {mu: 1 to 3}", "curves: {turning: w.s0}", "points: 16");

  test("are what the paper gives with the parameter set so, and leave its own cells as they are", () => {
    const turning = seriesOf(figureIn(text), "turning");
    const last = turning.x.length - 1;
    expect(turning.x[last]).toBe(3);
    expect(turning.y[last]).toBe(toDouble(quantityOf(valueIn(SETUP, "w.s0", { mu: "3" }))));
    expect(computed(text).results.get("w")?.key).toBe(computed(SETUP).results.get("w")?.key);
  });

  test("break at the critical drift √(4 D f'(1)) = √2, where the law jumps", () => {
    const drawn = figureIn(text);
    expect(drawn.verticals?.map(({ x }) => x)).toEqual([expect.closeTo(Math.SQRT2, 12)]);
    expect(drawn.remarks.join(" ")).toContain("the drift is critical");
    expect(seriesOf(drawn, "turning").dots?.map(({ hollow }) => hollow)).toEqual([true, false]);
    expect(drawn.alternative).toContain("it jumps at 1.414");
  });

  test("tell their cost before they are computed, and refuse what is too much", () => {
    const { cost, quick } = plannedCell(planOf(text), "F");
    expect(cost).toEqual({ noun: "point", points: 16, cells: 2 });
    expect(quick).toBe(false);
    const many = problemsOf(figure("over: {mu: 1 to 3}", "curves: {a: w.s0, b: K(0), c: T(1)}", "points: 900"));
    expect(many[0]?.message).toContain("at most 2000");
  });

  test("may stand beside nothing that depends on the parameter", () => {
    const level = problemsOf(figure("over: {mu: 2 to 3}", "curves: {a: w.s0}", "levels: [2*mu]"));
    expect(level[0]?.message).toBe("`levels.0` depends on `mu`, which this cell varies; it must stand without it.");
    const drawn = problemsOf(figure("over: {mu: 2 to 3}", "curves: {a: w.s0, b: K}"));
    expect(drawn[0]?.message).toContain("`curves.b` depends on `mu`");
    const own = problemsOf(figure("over: {mu: 2 to 3*mu}", "curves: {a: w.s0}"));
    expect(own[0]?.message).toContain("are computed from `mu` itself");
  });
});

describe("bands and levels", () => {
  test("a band with a curve's name is that curve's, another stands alone", () => {
    const drawn = figureIn(
      figure(
        "over: {x: 0 to 2}",
        "curves: {mid: exp(-x)}",
        "bands:",
        "  mid: [0.9*exp(-x), 1.1*exp(-x)]",
        "  wide: [x, 2*x]",
      ),
    );
    const mid = seriesOf(drawn, "mid");
    mid.x.forEach((x, i) => {
      expect(mid.low?.[i]).toBeCloseTo(0.9 * Math.exp(-x), 14);
      expect(mid.high?.[i]).toBeCloseTo(1.1 * Math.exp(-x), 14);
    });
    const wide = seriesOf(drawn, "wide");
    expect(wide.mark).toBe("band");
    expect(wide.y.every((y) => y === null)).toBe(true);
    expect(wide.high?.at(-1)).toBe(4);
  });

  test("a band at whole numbers is a bar at each, and makes rings of its curve", () => {
    const drawn = figureIn(
      figure("over: {n: 1 to 5}", "curves: {S: K(n)}", "bands: {S: [K(n)/2, 2*K(n)], other: [K(n), 3*K(n)]}"),
    );
    const rings = seriesOf(drawn, "S");
    expect(rings.mark).toBe("points");
    expect((rings.high?.[0] ?? 0) / (rings.low?.[0] ?? 1)).toBeCloseTo(4, 12);
    expect(seriesOf(drawn, "other").mark).toBe("points");
  });

  test("levels are labelled by their numbers, their names or their parameter's symbol", () => {
    const labels = (levels: string) =>
      figureIn(figure("over: {x: 0 to 1}", "curves: {a: x}", `levels: ${levels}`)).levels.map(({ label, y }) => [
        label,
        y,
      ]);
    expect(labels("[1/2, mu]")).toEqual([
      ["0.5", 0.5],
      ["\\mu", 2],
    ]);
    expect(labels("{half: 1/2}")).toEqual([["half", 0.5]]);
    const refused = figureIn(figure("over: {x: 0 to 1}", "curves: {a: x}", "levels: [log(0)]"));
    expect(refused.levels).toEqual([]);
    expect(refused.remarks.join(" ")).toMatch(/No level 1: /);
  });
});

describe("other cells", () => {
  test("are drawn by their own points, a law's tail by itself and not by its ratio", () => {
    const text = figure("curves: {exact: K, tail: T}", "labels: {exact: exact law, tail: 'C n^{-3/2} s_0^{-n}'}");
    const drawn = figureIn(text);
    const exact = seriesOf(drawn, "exact");
    const own = figureIn(SETUP, "K").series[0];
    expect(exact.x).toEqual(own?.x);
    expect(exact.y).toEqual(own?.y);
    expect([exact.mark, exact.label]).toEqual(["points", "exact law"]);
    const tail = seriesOf(drawn, "tail");
    expect(tail.mark).toBe("line");
    const at = tail.x.indexOf(10);
    expect(tail.y[at]).toBeCloseTo(toDouble(quantityOf(valueIn(text, "T(10)"))), 20);
    expect([drawn.x.label, drawn.y.label, drawn.y.scale]).toEqual(["n", "P(K=n)", "log"]);
  });

  test("several curves of one cell keep their labels", () => {
    const drawn = figureIn(figure("over: {x: 0 to 2}", "curves: {w: w, half: 1/2 + 0*x}"));
    expect(drawn.series.map(({ name }) => name)).toEqual(["w: w(x, 0)", "w: w(x, 2)", "w: w(x, s0)", "half"]);
    expect(drawn.x.range).toEqual([0, 2]);
  });

  test("an inset is another cell's figure with the looks it has there", () => {
    const text = SETUP.replace("up_to: 30\n", "up_to: 30\nlabels: {y: p_n}\n");
    const corner = cell("figure F", "over: {x: 0 to 4}", "curves: {a: w(x)}", "inset: {cell: K, at: bottom right}");
    const drawn = figureIn(text + corner);
    expect(drawn.inset?.corner).toBe("bottom right");
    expect(drawn.inset?.figure.y.label).toBe("p_n");
    expect(figureIn(figure("over: {x: 0 to 4}", "curves: {a: w(x)}", "inset: w")).inset?.corner).toBeNull();
  });

  test("panels are other cells' figures, their remarks lettered", () => {
    const inner = cell("figure G", "over: {x: 0 to 2}", "curves: {root: sqrt(x - 1)}");
    const { figure: drawn, points } = viewIn(
      SETUP + inner + cell("figure F", "panels: [K, G]", "labels: {K: the law}"),
    );
    expect(drawn?.panels?.map(({ title }) => title)).toEqual(["the law", ""]);
    expect(drawn?.panels?.[0]?.figure.series[0]?.name).toBe("K(n)");
    expect(drawn?.remarks.some((remark) => remark.startsWith("(b) No root"))).toBe(true);
    expect(drawn?.alternative).toMatch(/^\(a\) the law: The law of K .*\(b\) /);
    expect(points?.columns.map(({ name }) => name)).toContain("(a) K(n)");
  });
});

describe("keys and results", () => {
  const base = figure("over: {x: 0 to 1}", "curves: {a: w(x), b: K}", "inset: w");

  test("looks and names of drawn cells do not enter the key, what is drawn does", () => {
    const key = keyOf(base, "F");
    const looks = figure(
      "over: {x: 0 to 1}",
      "curves: {b: K, a: w(x)}",
      "inset: {cell: w, at: top left}",
      "labels: {a: A}",
      "axes: {log: y}",
    );
    expect(keyOf(looks, "F")).toBe(key);
    const renamed = base.replace("counts K", "counts L").replace("b: K}", "b: L}");
    expect(keyOf(renamed, "F")).toBe(key);
    expect(keyOf(base.replace("up_to: 30", "up_to: 31"), "F")).not.toBe(key);
    expect(keyOf(base.replace("s: [0, 2, s0]", "s: [0, 3]"), "F")).not.toBe(key);
    expect(keyOf(base.replace("x: 0 to 1", "x: 0 to 2"), "F")).not.toBe(key);
  });

  test("a result is drawn as it was, also by a paper that calls its cells otherwise or has changed since", () => {
    const before = computed(base);
    const result = before.results.get("F");
    if (result === undefined) throw new Error("F was not computed.");
    const then = viewCell(plannedCell(before.plan, "F"), result, before.plan, before.results).figure;
    const renamed = planOf(base.replace("counts K", "counts L").replace("b: K}", "b: L}"));
    const drawn = viewCell(plannedCell(renamed, "F"), result, renamed, new Map()).figure?.series;
    // A sentence quotes a point by the name that its cell has now.
    expect(drawn?.map(({ quote }) => quote)).toEqual(["w(#)", "L(#)"]);
    const unquoted = (all: typeof drawn) => all?.map(({ quote: _, ...series }) => series);
    expect(unquoted(drawn)).toEqual(unquoted(then?.series));
    const changed = computed(base, { mu: "3" });
    const now = viewCell(plannedCell(changed.plan, "F"), result, changed.plan, changed.results).figure;
    expect(now?.series).toEqual(then?.series);
  });
});

describe("what is wrong is said at its line", () => {
  const last = SETUP.split("\n").length;
  test.each([
    [["caption: none"], "none of them is given"],
    [["curves: {a: w.s0 + x}", "over: {x: 0 to 1, y: 0 to 1}"], "`over` takes one name"],
    [["curves: {a: 1 + mu}"], "`over` says for which name and values"],
    [["panels: [K]", "curves: {a: K}"], "draws other cells' figures and nothing of its own"],
    [["panels: [larvae]"], "`larvae` is a process cell; `panels.0` names a cell with a figure"],
    [["panels: [Kk]"], "Did you mean `K`?"],
    [["curves: {a: larvae}"], "names a cell with a figure"],
    [["inset: {cell: w, at: middle}", "over: {x: 0 to 1}", "curves: {a: x}"], "`at` is `top left`"],
    [["over: {x: 0 to 1}", "curves: {a: x}", "bands: {b: [x]}"], "A band has two ends"],
    [["over: {x: 0 to 1}", "curves: {'a b': x}"], "`a b` is not a name"],
    [["over: {x: [1, 2]}", "curves: {a: x}", "points: 5"], "`points` goes with an interval"],
    [["over: {x: 0 to 0}", "curves: {a: x}"], "its ends must be apart"],
    [["over: {K: 0 to 1}", "curves: {a: w(1)}"], "`K` is the name of a cell"],
    [["over: {x: 0 to 1}", "curves: {a: x}", "labels: {b: B}"], "`b` is not a key of `labels`"],
    [["panels: [F]"], "reads itself"],
  ])("%j", (lines, words) => {
    const problems = problemsOf(figure(...lines));
    const found = problems.find(({ message }) => message.includes(words));
    expect(problems.map(({ message }) => message).join("\n")).toContain(words);
    expect(found?.line).toBeGreaterThan(last - 1);
  });
});

describe("the alternative states the finding", () => {
  test("ends, turns and crossings", () => {
    const { alternative } = figureIn(figure("over: {x: 0 to 4}", "curves: {up: x, hill: x*(4 - x)}", "levels: [2]"));
    expect(alternative).toContain("2 curves over x from 0 to 4.");
    expect(alternative).toContain("up rises from 0 at 0 to 4 at 4.");
    expect(alternative).toContain("hill rises from 0 at 0 to 4 at 2 and falls to 0 at 4.");
    expect(alternative).toContain("up and hill cross near 3."); // x = x (4 − x) at 3
    expect(alternative).toContain("up passes 2 near 2.");
  });

  test("points cross between whole numbers", () => {
    // 1.0036 > 1 from n = 3 on, 0.97 at n = 2: K(n)/T(n) of the same paper, read from its own table.
    const { alternative } = figureIn(figure("over: {n: 1 to 9}", "curves: {exact: K(n), tail: T(n)}"));
    const ratio = (n: number) => toDouble(quantityOf(valueIn(SETUP, `K(${n})/T(${n})`)));
    expect([ratio(2) < 1, ratio(3) > 1]).toEqual([true, true]);
    expect(alternative).toContain("exact and tail cross between 2 and 3.");
  });
});

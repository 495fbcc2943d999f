import { describe, expect, test } from "vitest";
import { computeCell, viewCell } from "../../app/cells/index.ts";
import type { Figure } from "../../app/figures/index.ts";
import { toDouble } from "../../app/formulas/index.ts";
import { cell, computed, keyOf, LARVAE, plannedCell, planOf, quantityOf, reasonOf, valueIn } from "./papers.ts";

const SETUP = LARVAE + cell("profile w", "of: larvae") + cell("counts K", "of: larvae", "start: 1", "up_to: 10");

function viewIn(text: string, id: string) {
  const { plan, results } = computed(text);
  const result = results.get(id);
  if (result === undefined) throw new Error(JSON.stringify(plan.problems));
  return viewCell(plannedCell(plan, id), result, plan, results);
}

function figureIn(text: string, id: string): Figure {
  const { figure } = viewIn(text, id);
  if (figure === null) throw new Error(`${id} has no figure.`);
  return figure;
}

function numberIn(text: string, formula: string, overrides: Record<string, string> = {}): number {
  return toDouble(quantityOf(valueIn(text, formula, overrides)));
}

function problemsOf(...lines: string[]): string {
  return planOf(SETUP + cell("sweep sw", ...lines))
    .problems.map(({ message }) => message)
    .join(" ");
}

describe("what is recorded", () => {
  const listed = SETUP + cell("sweep sw", "over: {mu: [1.5, 3, 2]}", "record:", "  s0: w.s0", "  zero: K.zero");

  test("is exactly what the paper gives with the parameter set so", () => {
    for (const [index, mu] of ["1.5", "3", "2"].entries()) {
      expect(valueIn(listed, `sw.s0(${index + 1})`)).toEqual(valueIn(SETUP, "w.s0", { mu }));
      expect(valueIn(listed, `sw.zero(${index + 1})`)).toEqual(valueIn(SETUP, "K.zero", { mu }));
      expect(numberIn(listed, `sw.mu(${index + 1})`)).toBe(Number(mu));
    }
    expect(numberIn(listed, "sw.points")).toBe(3);
    expect(reasonOf(valueIn(listed, "sw.s0(4)"))).toContain("counted from 1 to 3");
  });

  // s0 at drift 1.5, 3 and 2: computed by an independent method, a Taylor series of order 85 in 65 digits.
  test("agrees with turning values found by another method", () => {
    const known = [2.171627555658629, 14.11029411326788, 5.436877834061205];
    known.forEach((s0, index) => {
      expect(Math.abs(numberIn(listed, `sw.s0(${index + 1})`) / s0 - 1)).toBeLessThan(1e-13);
    });
  });

  test("a point's error is that of the value itself", () => {
    const value = quantityOf(valueIn(listed, "sw.s0(3)"));
    expect(value.error).toBeGreaterThan(0);
    expect(value.error).toBe(quantityOf(valueIn(SETUP, "w.s0")).error);
  });
});

describe("points on an interval", () => {
  test("lie evenly, or evenly in the logarithm, ends among them", () => {
    const linear = LARVAE + cell("sweep sw", "over: {x: 1 to 16}", "points: 4", "record: {r: 1/x}");
    expect([1, 2, 3, 4].map((i) => numberIn(linear, `sw.x(${i})`))).toEqual([1, 6, 11, 16]);
    expect([1, 2, 3, 4].map((i) => numberIn(linear, `sw.r(${i})`))).toEqual([1, 1 / 6, 1 / 11, 1 / 16]);
    const log = LARVAE + cell("sweep sw", "over: {x: 1 to 16}", "points: 5", "scale: log", "record: {r: 1/x}");
    [1, 2, 4, 8, 16].forEach((x, index) => {
      expect(numberIn(log, `sw.x(${index + 1})`)).toBeCloseTo(x, 13);
    });
    expect(figureIn(log, "sw").x.scale).toBe("log");
    expect(numberIn(LARVAE + cell("sweep sw", "over: {x: 0 to 1}", "record: {r: x}"), "sw.points")).toBe(40);
  });

  test("a second name gives a curve for each of its values", () => {
    const two =
      SETUP + cell("sweep sw", "over: {mu: 2 to 3}", "vary: {beta: [1, 2]}", "points: 3", "record: {s0: w.s0}");
    expect(numberIn(two, "sw.points")).toBe(6);
    for (const [j, beta] of ["1", "2"].entries()) {
      for (const [i, mu] of ["2", "2.5", "3"].entries()) {
        const direct = valueIn(SETUP, "w.s0", { mu, beta });
        expect(valueIn(two, `sw.s0(${i + 1}, ${j + 1})`)).toEqual(direct);
        expect(valueIn(two, `sw.s0(${3 * j + i + 1})`)).toEqual(direct);
      }
    }
    expect(reasonOf(valueIn(two, "sw.s0(1, 3)"))).toContain("no curve 3");
    expect(figureIn(two, "sw").series.map(({ label }) => label)).toEqual(["\\beta=1", "2"]);
  });

  test("a dummy over, a parameter varied: cells are computed again once a curve", () => {
    const text = SETUP + cell("sweep sw", "over: {x: 0 to 2}", "vary: {mu: [2, 3]}", "points: 5", "record: {p: w(x)}");
    expect(valueIn(text, "sw.p(3, 2)")).toEqual(valueIn(SETUP, "w(1)", { mu: "3" }));
    expect(plannedCell(planOf(text), "sw").cost).toEqual({ noun: "point", points: 2, cells: 2 });
  });
});

describe("at the critical drift", () => {
  const adapted = (points: number) =>
    LARVAE +
    cell("sweep sw", "over: {mu: 1 to 4}", "scale: adapted", `points: ${points}`, "record: {lam: larvae.decay}");
  const turning =
    SETUP + cell("sweep sw", "over: {mu: 1.3 to 1.6}", "scale: adapted", "points: 12", "record: {s0: w.s0}");

  test("the square root is resolved: chords follow the closed form far better than as many even points", () => {
    // λ = μ + √(μ² − 2) for D = 1/2, rate 1, binary: closed form.
    const decay = (mu: number) => mu + Math.sqrt(Math.max(0, mu * mu - 2));
    const chordError = (figure: Figure): number => {
      const [series] = figure.series;
      const points = (series?.x ?? []).flatMap((x, i) => {
        const y = series?.y[i] ?? null;
        return y === null ? [] : [{ x, y }];
      });
      let most = 0;
      for (let i = 1; i < points.length; i += 1) {
        const [a, b] = [points[i - 1], points[i]];
        if (a === undefined || b === undefined) continue;
        for (let step = 1; step < 50; step += 1) {
          const t = step / 50;
          most = Math.max(most, Math.abs(a.y + (b.y - a.y) * t - decay(a.x + (b.x - a.x) * t)));
        }
      }
      return most;
    };
    // √2 is critical; so the even points too have the beginning of the root among them.
    const even = LARVAE + cell("sweep sw", "over: {mu: sqrt(2) to 4}", "points: 40", "record: {lam: larvae.decay}");
    const [fine, coarse] = [chordError(figureIn(adapted(40), "sw")), chordError(figureIn(even, "sw"))];
    expect(coarse).toBeGreaterThan(2 * fine);
    const dense = LARVAE + cell("sweep sw", "over: {mu: sqrt(2) to 4}", "points: 400", "record: {lam: larvae.decay}");
    expect(fine).toBeLessThan(chordError(figureIn(dense, "sw")) * 1.5);
  });

  test("the curve breaks, and both one-sided ends are drawn", () => {
    const [series] = figureIn(turning, "sw").series;
    if (series === undefined) throw new Error("no series");
    const gap = series.y.indexOf(null);
    expect(gap).toBeGreaterThan(0);
    expect(series.y.lastIndexOf(null)).toBe(gap);
    const [below = 0, above = 0] = [series.x[gap - 1], series.x[gap + 1]];
    expect(Math.abs(below - Math.SQRT2)).toBeLessThan(1e-14);
    expect(Math.abs(above - Math.SQRT2)).toBeLessThan(1e-14);
    expect(below).toBeLessThan(series.x[gap] ?? 0);
    expect(series.x[gap] ?? 0).toBeLessThan(above);
    // s0 at the critical drift: numerics note, 1.34865038… for binary branching, computed by an independent method.
    expect(series.y[gap + 1]).toBeCloseTo(1.34865038, 8);
    // From below, the value is the one that the drifts before it tend to.
    expect(series.y[gap - 1]).toBeCloseTo(numberIn(SETUP, "w.s0", { mu: "1.41421356" }), 5);
    expect(series.dots).toEqual([
      { at: gap - 1, label: "", hollow: true },
      { at: gap + 1, label: "", hollow: false },
    ]);
  });

  test("caption and alternative text say where and why", () => {
    const figure = figureIn(turning, "sw");
    expect(figure.remarks[0]).toBe(
      "At μ = 1.414 the drift is critical in larvae: below, K is infinite with positive probability; from there on, K is finite. No curve is drawn across.",
    );
    expect(figure.verticals).toHaveLength(1);
    expect(figure.alternative).toMatch(
      /^s_0 against μ: rises from .* to 5\.595 at 1\.414; it jumps at 1\.414, from where on it rises from 1\.349 at 1\.414/,
    );
  });

  test("even points are not moved, but nothing is drawn across", () => {
    const text = SETUP + cell("sweep sw", "over: {mu: 1.2 to 1.7}", "points: 6", "record: {s0: w.s0}");
    const [series] = figureIn(text, "sw").series;
    expect(series?.x.filter((_, i) => series.y[i] !== null)).toHaveLength(6);
    const gap = series?.y.indexOf(null) ?? -1;
    expect(series?.x[gap - 1]).toBeLessThan(Math.SQRT2);
    expect(series?.x[gap + 1]).toBeGreaterThan(Math.SQRT2);
    expect(numberIn(text, "sw.points")).toBe(6);
  });

  test("with fewer points than the ends at a jump take, nothing is drawn across it all the same", () => {
    const text = SETUP + cell("sweep sw", "over: {mu: 1 to 3}", "scale: adapted", "points: 3", "record: {s0: w.s0}");
    const [series] = figureIn(text, "sw").series;
    expect(numberIn(text, "sw.points")).toBe(3);
    const gap = series?.y.indexOf(null) ?? -1;
    expect(series?.x[gap - 1]).toBeLessThan(Math.SQRT2);
    expect(series?.x[gap + 1]).toBeGreaterThan(Math.SQRT2);
  });

  test("processes that are critical together break a curve once", () => {
    const text =
      LARVAE +
      cell("process pups", "drift: mu", "rate: 3*beta/3*0.1*10") +
      cell("sweep sw", "over: {mu: 1 to 3}", "scale: adapted", "record: {a: larvae.limit + pups.limit}");
    const figure = figureIn(text, "sw");
    expect(figure.verticals).toHaveLength(1);
    expect(figure.remarks[0]).toContain("the drift is critical in larvae and pups");
    const x = figure.series[0]?.x ?? [];
    expect(x.every((place, index) => index === 0 || place > (x[index - 1] ?? 0))).toBe(true);
  });

  test("both critical drifts of one sweep are found, and the one of each curve", () => {
    const both = LARVAE + cell("sweep sw", "over: {mu: -3 to 3}", "scale: adapted", "record: {q: larvae.limit}");
    const remarks = figureIn(both, "sw").remarks.join(" ");
    expect(remarks).toContain("At μ = −1.414 the drift is critical in larvae: up to there, K is finite");
    expect(remarks).toContain("At μ = 1.414");
    const rates =
      SETUP + cell("sweep sw", "over: {mu: 1.2 to 3}", "vary: {beta: [1, 2]}", "points: 4", "record: {s0: w.s0}");
    expect(figureIn(rates, "sw").remarks[0]).toContain("At μ = 1.414 (β = 1) and μ = 2 (β = 2) the drift is critical");
  });
});

describe("gaps", () => {
  test("where a value is refused there is a gap, with the reason and from where to where", () => {
    const text = LARVAE + cell("sweep sw", "over: {mu: 1 to 2}", "points: 5", "record: {lam: larvae.decay}");
    const figure = figureIn(text, "sw");
    expect(reasonOf(valueIn(text, "sw.lam(1)"))).toContain("between");
    expect(figure.remarks.join(" ")).toMatch(/No lam for μ from 1 to 1\.25: /);
    expect(figure.series[0]?.y.slice(0, 2)).toEqual([null, null]);
  });

  test("gaps of several curves for one reason are told together", () => {
    const text =
      LARVAE +
      cell("sweep sw", "over: {mu: 1 to 3}", "vary: {beta: [1, 2]}", "points: 5", "record: {lambda: larvae.decay}");
    const told = figureIn(text, "sw").remarks.filter((remark) => remark.startsWith("No "));
    expect(told).toHaveLength(1);
    expect(told[0]).toMatch(/^No λ for μ at 1 \(β = 1\) and from 1 to 1\.5 \(β = 2\): /);
  });

  test("where a cell refuses, every record of it gives the reason", () => {
    const text = SETUP + cell("sweep sw", "over: {beta: [-1, 1]}", "record: {s0: w.s0}");
    expect(reasonOf(valueIn(text, "sw.s0(1)"))).toContain("`rate` is -1");
    expect(numberIn(text, "sw.s0(2)")).toBeCloseTo(numberIn(SETUP, "w.s0"), 14);
  });

  test("a record without any number has no panel; several numbers have one each", () => {
    const words = LARVAE + cell("sweep sw", "over: {mu: [1, 2]}", "record: {r: larvae.regime}");
    const view = viewIn(words, "sw");
    expect(view.figure).toBeNull();
    expect(view.points?.rows.map((row) => row[1]?.text)).toEqual(["between", "away"]);
    const three =
      LARVAE +
      cell("sweep sw", "over: {mu: 2 to 3}", "points: 3", "record: {a: mu, r: larvae.regime, b: larvae.decay}");
    expect(figureIn(three, "sw").panels?.map(({ title }) => title)).toEqual(["a", "b"]);
  });

  test("a number that spans decades is drawn in logarithms, below the range of doubles too", () => {
    const text = SETUP + cell("sweep sw", "over: {x: 1 to 800}", "points: 5", "record: {small: 10^(-x)}");
    const figure = figureIn(text, "sw");
    expect(figure.y.scale).toBe("log");
    expect(figure.series[0]?.log10y?.at(-1)).toBeCloseTo(-800, 9);
  });
});

describe("planning", () => {
  test("the cost is known before anything is computed, and short sweeps are quick", () => {
    const many = plannedCell(planOf(SETUP + cell("sweep sw", "over: {mu: 2 to 3}", "record: {s0: w.s0}")), "sw");
    expect(many.cost).toEqual({ noun: "point", points: 40, cells: 2 });
    expect(many.quick).toBe(false);
    const few = plannedCell(planOf(SETUP + cell("sweep sw", "over: {mu: [2, 3]}", "record: {s0: w.s0}")), "sw");
    expect(few.quick).toBe(true);
    expect(plannedCell(planOf(LARVAE + cell("sweep sw", "over: {x: 0 to 1}", "record: {a: x}")), "sw").cost).toBeNull();
  });

  test("progress counts the points of all curves", () => {
    const text =
      SETUP + cell("sweep sw", "over: {mu: 2 to 3}", "vary: {beta: [1, 1.5]}", "points: 3", "record: {s0: w.s0}");
    const { plan, results } = computed(text);
    const { task } = plannedCell(plan, "sw");
    if (task === null) throw new Error("no task");
    const told: string[] = [];
    computeCell(task, results, { progress: (done, total) => told.push(`${done}/${total}`) });
    expect(told).toEqual(["1/6", "2/6", "3/6", "4/6", "5/6", "6/6"]);
  });

  test("what enters the computation enters the key, what does not does not", () => {
    const text = (...lines: string[]) => SETUP + cell("sweep sw", "over: {mu: 2 to 3}", "record: {s0: w.s0}", ...lines);
    expect(keyOf(text("points: 40", "scale: linear"), "sw")).toBe(keyOf(text(), "sw"));
    expect(keyOf(text("caption: Along the drift."), "sw")).toBe(keyOf(text(), "sw"));
    expect(keyOf(text(), "sw", { mu: "2.5" })).toBe(keyOf(text(), "sw"));
    expect(keyOf(text("points: 41"), "sw")).not.toBe(keyOf(text(), "sw"));
    expect(keyOf(text("scale: adapted"), "sw")).not.toBe(keyOf(text(), "sw"));
    expect(keyOf(text(), "sw", { beta: "1.5" })).not.toBe(keyOf(text(), "sw"));
  });

  test("faults are told with what is allowed", () => {
    const record = "record: {s0: w.s0}";
    expect(problemsOf("over: {mu: 1.5 to 2, beta: 1 to 2}", record)).toContain("`over` takes one name");
    expect(problemsOf("over: {mu: [1.5, 2]}", "points: 9", record)).toContain("`points` goes with an interval");
    expect(problemsOf("over: {mu: 0 to 2}", "scale: log", record)).toContain("must begin above 0");
    expect(problemsOf("over: {mu: 2 to 2}", record)).toContain("ends must be apart");
    expect(problemsOf("over: {mu: 3 to 2}", record)).toContain("second end must be the larger");
    expect(problemsOf("over: {mu: 2 to 3}", "scale: adaptive", record)).toContain("`linear`, `log` or `adapted`");
    expect(problemsOf("over: {mu: 2 to 3}", "points: 1", record)).toContain("from 2 to 2000");
    expect(problemsOf("over: {w: 2 to 3}", record)).toContain("`w` is the name of a cell");
    expect(problemsOf("over: {mu: 2 to 3}", "vary: {mu: [1, 2]}", record)).toContain("given twice");
    expect(problemsOf("over: {mu: 2 to mu + 1}", record)).toContain("computed from `mu` itself");
    expect(problemsOf("over: {mu: 2 to 3}", "record: {}")).toContain("`record` is empty");
    expect(problemsOf("over: {mu: 2 to 3}", "vary: {beta: 1 to 40}", record)).toContain("more than 12 curves");
    expect(problemsOf("over: {mu: 2 to 3}", "points: 2000", "vary: {beta: 1 to 3}", record)).toContain("at most 2000");
  });
});

import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { viewCell } from "../../app/cells/index.ts";
import { toDouble } from "../../app/formulas/index.ts";
import { references } from "../solvers/reference.ts";
import { cell, computed, LARVAE, plannedCell, planOf, quantityOf, reasonOf, valueIn } from "./papers.ts";
import { referenceProcess } from "./reference-process.ts";

const G = cell("generating_function g", "of: larvae", "start: [1, 1/2]");

function number(text: string, formula: string, overrides: Record<string, string> = {}): { x: number; error: number } {
  const quantity = quantityOf(valueIn(text, formula, overrides));
  return { x: toDouble(quantity), error: quantity.error * 2 ** quantity.exponent };
}

// Source of the equations: J. Berestycki, É. Brunet, S. C. Harris, P. Miłoś, J. Funct. Anal. 273 (2017) 2107–2143.
// Numbers computed by an independent method: Taylor series of order 85 at 65 digits.
describe.each(references.map((entry) => [entry.id, entry] as const))("generating function of %s", (_, entry) => {
  const text = `${referenceProcess(entry)}${G}`;

  test("at s = 0, and at the very end s0", () => {
    for (const [formula, wanted] of [
      ...Object.entries(entry.w0).map(([x, w]) => [`g(0, ${x})`, w]),
      ...Object.entries(entry.wS0).map(([x, w]) => [`g(g.s0, ${x})`, w]),
    ]) {
      const { x, error } = number(text, formula ?? "");
      expect(Math.abs(x - Number(wanted))).toBeLessThanOrEqual(error + 2e-16 * x);
      expect(error).toBeLessThan(1e-12);
    }
  });

  test("its slope at s = 1 is the mean", () => {
    // E K = e^{−decay x}, by the same authors; the derivative is taken of g itself.
    const mean = Math.exp(-Number(entry.decay));
    expect(number(text, "g.mean").x).toBeCloseTo(mean, 14);
    const slope = number(text, "derivative(g(s), s, 1)");
    expect(Math.abs(slope.x - mean)).toBeLessThan(slope.error + 1e-15);
    expect(slope.error).toBeLessThan(1e-10);
  });
});

describe("what holds of every generating function", () => {
  const text = `${LARVAE}${G}`;
  const position = fc.double({ min: 0.01, max: 3, noNaN: true });
  const share = fc.double({ min: 0, max: 1, noNaN: true });

  // Source: K is a branching process in x, T. E. Harris, The Theory of Branching Processes (1963), chapter V: F(x + y, s) = F(x, F(y, s)).
  test("starts add up: g(s, x + y) = g(g(s, y), x), up to s0 and away or not", () => {
    const drift = fc.constantFrom("2", "1.45", "3.3", "1", "0.2", "-0.7");
    fc.assert(
      fc.property(drift, position, position, share, (mu, x, y, t) => {
        const { x: s0 } = number(text, "g.s0", { mu });
        const s = -1 + t * (s0 + 1);
        const once = number(text, `g(${s}, ${x} + ${y})`, { mu });
        const twice = number(text, `g(g(${s}, ${y}), ${x})`, { mu });
        expect(Math.abs(once.x - twice.x)).toBeLessThanOrEqual(once.error + twice.error);
        // near s0 the rounding of s itself counts as much as a square root makes of it
        expect(once.error + twice.error).toBeLessThan(2e-12 + 3e-14 / Math.sqrt(Math.max(1 - t, 1e-16)));
      }),
      { numRuns: 40 },
    );
  });

  // Computed by an independent method: the law from contours in s, summed as a series.
  test.each(["2", "1"])("it is the series of the law, with drift %s", (mu) => {
    const both = `${text}${cell("counts K", "of: larvae", "start: 1", "up_to: 120")}`;
    for (const s of ["0.3", "1", "2"]) {
      const series = number(both, `sum(K(n)*${s}^n, n, 0, 120)`, { mu });
      const closed = number(text, `g(${s})`, { mu });
      expect(closed.x / series.x - 1).toBeCloseTo(0, 11);
    }
  });

  // Closed form by hand: with drift 0, binary branching at rate 1 and D = 1/2, the energy integral of w″/2 + w² − w = 0 is
  // (w′)² = 2 w² − 4 w³/3, so that w = (3/2)/cosh²((x + c)/√2) with w(0) = s, and s0 = 3/2.
  test("without drift it is the closed form, beyond s = 1 and at s0 = 3/2", () => {
    const closed = (s: number, x: number) => {
      const h = Math.tanh(x / Math.SQRT2);
      return (s * (1 - h * h)) / (1 + h * Math.sqrt(Math.max(0, 1 - (2 * s) / 3))) ** 2;
    };
    expect(number(text, "g.s0", { mu: "0" }).x).toBeCloseTo(1.5, 14);
    for (const x of [0.2, 1, 2.5]) {
      for (const s of [0.1, 0.9, 1, 1.3, 1.499]) {
        const { x: g, error } = number(text, `g(${s}, ${x})`, { mu: "0" });
        expect(Math.abs(g - closed(s, x))).toBeLessThanOrEqual(error + 1e-15);
      }
      expect(number(text, `g(g.s0, ${x})`, { mu: "0" }).x).toBeCloseTo(closed(1.5, x), 13);
    }
    const slope = (closed(1 + 1e-5, 1) - closed(1 - 1e-5, 1)) / 2e-5;
    expect(number(text, "g.mean", { mu: "0" }).x).toBeCloseTo(slope / closed(1, 1), 8);
  });
});

describe("with a drift toward the barrier", () => {
  const drift = -5 / (2 * Math.sqrt(3));
  const text = `${cell("process larvae", `drift: ${drift}`, "rate: 1")}${G}`;

  // Source: M. J. Ablowitz, A. Zeppetella, Bull. Math. Biol. 41 (1979) 835–840: their front at the speed 5/√6, read backwards,
  // is 1 − E_x[s^K] = (1 − s)/(ρ + (1 − ρ) √(1 − s))², ρ = e^{−x/√3}.
  test("it is the front of the integrable speed, up to s = 1 where it ends", () => {
    for (const x of [0.3, 1, 2.5]) {
      const rho = Math.exp(-x / Math.sqrt(3));
      for (const s of [0.05, 0.5, 0.9, 0.999, 1]) {
        const wanted = 1 - (1 - s) / (rho + (1 - rho) * Math.sqrt(1 - s)) ** 2;
        const { x: g, error } = number(text, `g(${s}, ${x})`);
        expect(Math.abs(g - wanted)).toBeLessThanOrEqual(error + 1e-15);
        expect(error).toBeLessThan(1e-12);
      }
    }
    expect(number(text, "g.s0").x).toBe(1);
    expect(number(text, "g.mean").x).toBeCloseTo(Math.exp(2 / Math.sqrt(3)), 12);
    expect(reasonOf(valueIn(text, "g(1.01)"))).not.toBe("");
  });

  test("it is drawn to s = 1", () => {
    const { plan, results } = computed(text);
    const result = results.get("g");
    if (result === undefined) throw new Error("not computed");
    const { figure } = viewCell(plannedCell(plan, "g"), result, plan, results);
    expect(figure?.series[0]?.x.at(-1)).toBe(1);
    expect(figure?.alternative).toContain("Beyond s = 1 E s^K is infinite.");
  });
});

describe("the cell", () => {
  test("beyond s0 it refuses, in its callable and in its body", () => {
    expect(reasonOf(valueIn(`${LARVAE}${G}`, "g(g.s0 + 1e-9)"))).toContain("E[s^K] is infinite");
    const { outcomes } = computed(`${LARVAE}${cell("generating_function g", "of: larvae", "start: 1", "s: 0 to 6")}`);
    const outcome = outcomes.get("g");
    if (outcome?.status !== "failed") throw new Error("It should have failed.");
    expect(outcome.failure.message).toBe(
      "`s` goes to 6, beyond s0 = 5.437, where E s^K is infinite; `s: 0 to s0` ends there.",
    );
    expect(outcome.failure.line).toBe(14);
  });

  test.each([
    ["start: -1", "`start` is -1; it must be a number not below 0."],
    ["start: {1: 2}", "A map stands where a list is expected"],
    ["start: 1\ns: 3", "`s` takes an interval"],
    ["start: 1\ns: s0 to 1", "goes from 5.4"],
    ["start: 1\ns: -2 to 1", "must be a number not below -1"],
  ])("%j is refused", (lines, message) => {
    const text = `${LARVAE}${cell("generating_function g", "of: larvae", ...lines.split("\n"))}`;
    const outcome = computed(text).outcomes.get("g");
    const told = [...planOf(text).problems.map((problem) => problem.message)];
    if (outcome?.status === "failed") told.push(outcome.failure.message);
    expect(told.join("\n")).toContain(message);
  });

  test("curves end in dots at s0 and approach it as a square root does", () => {
    const { plan, results } = computed(`${LARVAE}${G}`);
    const result = results.get("g");
    if (result === undefined) throw new Error("not computed");
    const { figure, points } = viewCell(plannedCell(plan, "g"), result, plan, results);
    const [curve] = figure?.series ?? [];
    if (figure == null || curve === undefined) throw new Error("no curve");
    expect(figure.verticals?.map(({ x }) => x)).toEqual([1, 5.436877834061205]);
    expect(curve.dots).toEqual([{ at: curve.x.length - 1, label: "", hollow: false }]);
    const y = curve.y.map((value) => value ?? Number.NaN);
    // Near a square root equal steps of its argument are equal steps of the value: none is a jump.
    const steps = y.slice(1).map((value, i) => value - (y[i] ?? Number.NaN));
    expect(Math.max(...steps)).toBeLessThan((4 * ((y.at(-1) ?? 0) - (y[0] ?? 0))) / y.length);
    expect(figure.alternative).toContain("from 0.9698 through 1 at s = 1 to 1.415 (x = 1)");
    expect(figure.alternative).toContain("At s0 = 5.437 each ends with a vertical tangent");
    expect(points?.rows.length).toBe(curve.x.length);
  });

  test("where nothing branches it is drawn to s = 1, and has no s0", () => {
    const text = `${cell("process p", "drift: -1", "rate: 1", "offspring: {0: 0.5, 1: 0.5}")}${cell("generating_function g", "of: p", "start: 1")}`;
    const { results } = computed(text);
    expect(reasonOf(results.get("g")?.values.s0)).toContain("two or more children");
    expect(number(text, "g(7) - (1 + 6*g.mean)").x).toBeCloseTo(0, 14);
  });
});

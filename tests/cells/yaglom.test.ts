import { describe, expect, test } from "vitest";
import { viewCell } from "../../app/cells/index.ts";
import { log10Of, toDouble } from "../../app/formulas/index.ts";
import { references } from "../solvers/reference.ts";
import { cell, computed, LARVAE, plannedCell, quantityOf, reasonOf, valueIn } from "./papers.ts";
import { referenceProcess } from "./reference-process.ts";

/** Relative agreement, also far below the range of doubles, and an error that holds and is not a caricature. */
function agrees(value: Parameters<typeof quantityOf>[0], reference: string, relative: number): void {
  const quantity = quantityOf(value);
  const [digits = "", power = "0"] = reference.split("e");
  const off = Math.abs(10 ** (log10Of(quantity) - Number(power)) / Number(digits) - 1);
  const error = quantity.error / Math.abs(quantity.mantissa);
  // log10 of a number near 10^−400 is known to about 1e−13
  expect(off).toBeLessThanOrEqual(error + 3e-16 * (1 + Math.abs(Number(power))));
  expect(off).toBeLessThan(relative);
  expect(error).toBeLessThan(1e-8);
}

// Source of the equations: J. Berestycki, É. Brunet, S. C. Harris, P. Miłoś, J. Funct. Anal. 273 (2017) 2107–2143.
// Numbers computed by an independent method: Cauchy integral of B_s on |s| = r < s0 at 65 digits; mean 1/B_0.
describe.each(references.map((entry) => [entry.id, entry] as const))("limit law of %s", (_, entry) => {
  const text = `${referenceProcess(entry)}${cell("yaglom Y", "of: larvae", "up_to: 120")}`;
  const result = computed(text).results.get("Y");

  test("mean, P(Y = 1) and the constant of its tail", () => {
    agrees(result?.values.mean, entry.limit.mean, 1e-12);
    agrees(result?.values.one, entry.limit.p["1"] ?? "", 1e-10);
    agrees(result?.values.constant, entry.limit.tailConstant, 1e-10);
  });

  test("its law, within up_to and beyond", () => {
    for (const n of [2, 7, 20, 50, 100, 500]) agrees(valueIn(text, `Y(${n})`), entry.limit.p[n] ?? "", 1e-9);
  });

  test("variance and P(Y > n) are those of the law itself", () => {
    // Computed by an independent method: sums over the law from its contour; the variance is found from power series.
    const p = Array.from({ length: 121 }, (_, n) => toDouble(quantityOf(valueIn(text, `Y(${n})`))));
    const sum = (f: (n: number) => number, from = 0) => p.reduce((s, q, n) => (n < from ? s : s + f(n) * q), 0);
    const mean = sum((n) => n);
    expect(toDouble(quantityOf(result?.values.variance))).toBeCloseTo(sum((n) => n * n) - mean * mean, 9);
    expect(sum(() => 1)).toBeCloseTo(1, 12);
    expect(toDouble(quantityOf(valueIn(text, "Y.above(2)")))).toBeCloseTo(
      sum(() => 1, 3),
      12,
    );
  });
});

describe("the limit law as a cell", () => {
  test("nothing is counted at 0 or below, and everything above it", () => {
    const text = `${LARVAE}${cell("yaglom Y", "of: larvae")}`;
    expect(toDouble(quantityOf(valueIn(text, "Y(0)")))).toBe(0);
    expect(toDouble(quantityOf(valueIn(text, "Y(-3)")))).toBe(0);
    expect(toDouble(quantityOf(valueIn(text, "Y.above(0)")))).toBe(1);
    expect(reasonOf(valueIn(text, "Y(1/2)"))).toContain("not a whole number");
  });

  test.each([
    ["1", "between"],
    ["-1", "between"],
  ])("with drift %s there is none, and the cell says why", (drift, regime) => {
    const { outcomes } = computed(`${LARVAE}${cell("yaglom Y", "of: larvae")}`, { mu: drift });
    const outcome = outcomes.get("Y");
    if (outcome?.status !== "failed") throw new Error("It should have failed.");
    expect(outcome.failure.message).toContain(`the regime is ${regime}`);
    expect(outcome.failure.message).toContain("not below the critical one, 1.414");
    expect(outcome.failure.line).toBe(12);
  });

  test("toward the barrier there is none either", () => {
    const { outcomes } = computed(`${LARVAE}${cell("yaglom Y", "of: larvae")}`, { mu: "-2" });
    const outcome = outcomes.get("Y");
    expect(outcome?.status === "failed" && outcome.failure.message).toContain("the regime is toward");
  });

  test("without branching Y is 1, and has no tail", () => {
    const text = `${cell("process p", "drift: -1", "rate: 1", "offspring: {0: 0.5, 1: 0.5}")}${cell("yaglom Y", "of: p", "up_to: 5")}`;
    const values = computed(text).results.get("Y")?.values ?? {};
    expect(toDouble(quantityOf(values.one))).toBe(1);
    expect(toDouble(quantityOf(values.variance))).toBeCloseTo(0, 15);
    expect(reasonOf(values.constant)).toContain("two or more children");
  });

  test("a subcritical branching has one whatever the drift", () => {
    // The mean of the law is one over the profile's amplitude: read from two different cells.
    const text = `${cell("process p", "drift: -1", "rate: 1", "offspring: {0: 0.6, 2: 0.4}")}${cell("yaglom Y", "of: p")}${cell("profile w", "of: p")}`;
    expect(toDouble(quantityOf(valueIn(text, "Y.mean*w.amplitude")))).toBeCloseTo(1, 13);
  });

  test("figure, table and points show the law and the law of large n", () => {
    const { plan, results } = computed(`${LARVAE}${cell("yaglom Y", "of: larvae", "up_to: 1000")}`);
    const result = results.get("Y");
    if (result === undefined) throw new Error("not computed");
    const { figure, table, points } = viewCell(plannedCell(plan, "Y"), result, plan, results);
    const [law, tail] = figure?.series ?? [];
    expect(law?.mark).toBe("stems");
    expect(tail?.role).toBe("reference");
    // Exact over asymptotic at n = 1000 tends to 1 like 1/n; from the points drawn, far below the range of doubles.
    const end = (law?.log10y?.at(-1) ?? 0) - (tail?.log10y?.at(-1) ?? 0);
    expect(Math.abs(10 ** end - 1)).toBeLessThan(1e-3);
    expect(figure?.alternative).toContain("P(Y = 1) = 0.9189, E Y = 1.091");
    expect(table?.rows[0]?.[0]?.text).toBe("1");
    expect(points?.columns.at(-1)?.name).toBe("tail law");
    expect(points?.rows.length).toBe(figure?.series[0]?.x.length);
  });
});

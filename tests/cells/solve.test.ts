import { describe, expect, test } from "vitest";
import { findingOf } from "../../app/cells/index.ts";
import { toDouble } from "../../app/formulas/index.ts";
import { integrable, references } from "../solvers/reference.ts";
import { cell, computed, keyOf, LARVAE, plannedCell, planOf, quantityOf, valueIn } from "./papers.ts";

const READ = `${cell("counts K", "of: larvae", "start: 1")}${cell("profile w", "of: larvae")}`;

function solved(...lines: string[]): { text: string; root: number; error: number; residual: number; se: number } {
  const text = `${LARVAE}${READ}${cell("solve r", ...lines)}`;
  const { results, outcomes } = computed(text);
  const result = results.get("r");
  if (result === undefined) throw new Error(JSON.stringify(outcomes.get("r")));
  const root = quantityOf(result.values.root);
  return {
    text,
    root: toDouble(root),
    error: root.error,
    se: root.se,
    residual: toDouble(quantityOf(result.values.residual)),
  };
}

function failureOf(...lines: string[]): { message: string; line: number } {
  const outcome = computed(`${LARVAE}${READ}${cell("solve r", ...lines)}`).outcomes.get("r");
  if (outcome?.status !== "failed") throw new Error(JSON.stringify(outcome));
  return outcome.failure;
}

describe("roots in a parameter, everything that reads it computed again", () => {
  test("the drift at which s0 is that of the integrable speed", () => {
    // Source: M. J. Ablowitz, A. Zeppetella, Bull. Math. Biol. 41 (1979) 835–840, for the speed 5/√6, drift 5/(2√3) here;
    // s0 there in closed form by Weierstrass' function: see tests/solvers/reference.json.
    const { root, error } = solved("vary: mu", "between: 1.42 to 3", `where: K.s0 - ${integrable.s0}`);
    expect(Math.abs(root - 5 / (2 * Math.sqrt(3)))).toBeLessThan(error + 1e-15);
    expect(error).toBeLessThan(1e-14);
  });

  test("the drift at which the mean is 1/50 is that of its closed form", () => {
    // E K = e^{−(mu + √(mu² − 2))}: mu = (L² + 2)/(2 L) with L = ln 50.
    const { root, error } = solved("vary: mu", "between: 1.5 to 4", "where: K.mean - 1/50");
    const L = Math.log(50);
    expect(Math.abs(root - (L * L + 2) / (2 * L))).toBeLessThan(error + 1e-15);
    expect(error).toBeLessThan(1e-13);
  });

  test("reference values of s0 and of the amplitude lead back to their drifts", () => {
    // Computed by an independent method: see tests/solvers/reference.json.
    for (const entry of references.filter(({ id }) => /^away\/binary\/mu\d/.test(id))) {
      const between = "between: 1.45 to 6";
      for (const where of [`w.s0 - ${entry.s0}`, `w.amplitude - ${entry.amplitude}`]) {
        const { root, error } = solved("vary: mu", between, `where: ${where}`);
        expect(Math.abs(root - entry.model.drift)).toBeLessThan(error + 4e-16 * root);
        expect(error).toBeLessThan(1e-12);
      }
    }
  });

  test("a probability far below the range of doubles", () => {
    const { root, text } = solved("vary: mu", "between: 1.5 to 3", "where: log10(K(1000)) + 740.5885949280441");
    // Computed by an independent method: log10 P(K = 1000) at drift 2.
    expect(root).toBeCloseTo(2, 12);
    expect(planOf(text).problems).toEqual([]);
  });
});

describe("a root among other cells", () => {
  const root = cell("solve r", "vary: mu", "between: 3 to 6", "where: K.s0 - 20");

  test("does not hang from the value that the varied parameter has now, but from all others", () => {
    const text = `${LARVAE}${READ}${root}`;
    expect(keyOf(text, "r", { mu: "3" })).toBe(keyOf(text, "r", { mu: "4" }));
    expect(keyOf(text, "r", { beta: "2" })).not.toBe(keyOf(text, "r"));
    expect(plannedCell(planOf(text), "r").parameters).toEqual(["beta"]);
  });

  test("is found again for each row of a table that varies another parameter", () => {
    const text = `${LARVAE}${READ}${root}${cell("table t", "rows: {beta: [1, 1.2]}", "columns: {root: r.root}")}`;
    for (const [row, beta] of [1, 1.2].entries()) {
      const inRow = quantityOf(valueIn(text, `t.root(${row + 1})`));
      const alone = quantityOf(valueIn(text, "r.root", { beta: String(beta) }));
      expect(inRow).toEqual(alone);
    }
  });
});

describe("roots in a new name", () => {
  test("of a formula of its own", () => {
    const { root, residual } = solved("vary: x", "between: 0 to 2", "where: x^2 - mu");
    expect(root).toBe(Math.SQRT2);
    expect(Math.abs(residual)).toBeLessThan(1e-15);
  });

  test("of a profile: where w(x) = 1/2", () => {
    const { root, text } = solved("vary: x", "between: 0 to 4", "where: w(x) - 1/2");
    const { results } = computed(`${text}${cell("formula f", "back: w(r.root)")}`);
    const back = quantityOf(results.get("f")?.values.back);
    expect(root).toBeGreaterThan(0);
    expect(Math.abs(toDouble(back) - 1 / 2)).toBeLessThan(back.error + 1e-16);
  });

  test("chance in the formula is passed on: its standard error over the slope", () => {
    const text = `${cell("parameters", "a: {value: 9, se: 0.06}")}${cell("solve r", "vary: x", "between: 0 to 9", "where: x^2 - a")}`;
    const root = quantityOf(computed(text).results.get("r")?.values.root);
    expect(toDouble(root)).toBeCloseTo(3, 14);
    expect(root.se).toBeCloseTo(0.06 / 6, 8);
    expect(root.error).toBeLessThan(1e-14);
  });
});

describe("what cannot be solved says so", () => {
  test("no change of sign: the values at both ends", () => {
    const { message, line } = failureOf("vary: mu", "between: 1.5 to 3", "where: K.s0 - 20");
    expect(message).toBe(
      "`where` is −17.8284 at mu = 1.5 and −5.88971 at mu = 3: it does not change sign between them. `between` takes two ends at which its signs differ.",
    );
    expect(line).toBe(22);
  });

  test("the jump of s0 at the critical drift is no root", () => {
    const { message } = failureOf("vary: mu", "between: 1.1 to 1.43", "where: K.s0 - 2");
    expect(message).toContain("`where` jumps at mu = 1.41421 from 3.59");
    // the same from above alone has a root
    expect(solved("vary: mu", "between: 1.42 to 3", "where: K.s0 - 2").root).toBeCloseTo(1.4752066, 6);
  });

  test("an end where the formula has no value is moved to where it has one", () => {
    const below = solved("vary: mu", "between: 1 to 3", "where: w.amplitude - 0.8");
    const inside = solved("vary: mu", "between: 1.5 to 3", "where: w.amplitude - 0.8");
    expect(Math.abs(below.root - inside.root)).toBeLessThan(below.error + inside.error);
    const { plan, results } = computed(below.text);
    const result = results.get("r");
    const finding = result === undefined ? null : findingOf(plannedCell(plan, "r"), result, plan);
    expect(finding?.isGrave).toBe(false);
    expect(finding?.words).toMatch(/^The formula has no value at mu = 1: .*here the regime is between\.$/);
  });

  test("nowhere a value", () => {
    const { message } = failureOf("vary: mu", "between: 0.5 to 1", "where: w.amplitude - 0.8");
    expect(message).toContain("`where` has no value for any `mu` tried from 0.5 to 1: ");
    expect(message).toContain("here the regime is between");
  });

  test.each([
    ["where: K.s0 == 2", "`where` is a comparison"],
    ["where: larvae.regime", "gives no number here"],
    ["where: K.so - 2", "Did you mean `s0`?"],
    ["between: 3", "`between` takes an interval"],
    ["between: 3 to 2", "the second end must be the larger one"],
    ["between: 2 to 2", "`between` begins and ends at 2"],
    ["between: 1 to mu + 1", "depends on `mu`, which this cell varies"],
    ["vary: 2x", "is not a name"],
    ["vary: K", "is the name of a cell"],
  ])("%s", (line, message) => {
    const lines = ["vary: mu", "between: 1.5 to 3", "where: K.s0 - 3"].map((usual) =>
      usual.split(":")[0] === line.split(":")[0] ? line : usual,
    );
    const text = `${LARVAE}${READ}${cell("solve r", ...lines)}`;
    const outcome = computed(text).outcomes.get("r");
    const told = planOf(text).problems.map((problem) => problem.message);
    if (outcome?.status === "failed") told.push(outcome.failure.message);
    expect(told.join("\n")).toContain(message);
  });
});

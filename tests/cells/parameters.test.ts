import { describe, expect, test } from "vitest";
import { parameterWords } from "../../app/cells/index.ts";
import { toDouble } from "../../app/formulas/index.ts";
import { cell, computed, LARVAE, planOf, quantityOf, valueIn } from "./papers.ts";

describe("parameters", () => {
  test("carry what the rule shows, and where to edit their value", () => {
    const plan = planOf(LARVAE);
    const mu = plan.parameters.find(({ name }) => name === "mu");
    expect(mu).toMatchObject({
      source: "2",
      min: 1.45,
      max: 4,
      step: 0.05,
      symbol: "\\mu",
      note: "drift away from the barrier",
      line: 3,
    });
    expect(LARVAE.slice(mu?.from, mu?.to)).toBe("2");
    const quoted = cell("parameters", "a: '1 + 1'");
    const [a] = planOf(quoted).parameters;
    expect(a?.source).toBe("1 + 1");
    expect(quoted.slice(a?.from, a?.to)).toBe("'1 + 1'");
    const folded = cell("parameters", "b:\n  value: |\n    1 + 1\n  note: sum");
    const [b] = planOf(folded).parameters;
    expect([b?.source.trim(), folded.slice(b?.from, b?.to)]).toEqual(["1 + 1", "|\n    1 + 1"]);
  });

  test("without a symbol stand by their names, Greek letters in Greek", () => {
    const plan = planOf(
      cell("parameters", "mu: 1", "x: 1", "x0: 1", "beta_max: 1", "Gamma: 1", "speed: 1", "k_on_1: 2"),
    );
    expect(plan.parameters.map(({ symbol }) => symbol)).toEqual([
      "\\mu",
      "x",
      "x_{0}",
      "\\beta_{\\mathrm{max}}",
      "\\Gamma",
      "\\mathrm{speed}",
      "k_{\\mathrm{on},1}",
    ]);
  });

  test("may read other parameters in any order, and nothing else", () => {
    const text = cell("parameters", "c: a + b", "a: 2*b", "b: 1.5");
    expect(toDouble(quantityOf(planOf(text).parameters[0]?.value))).toBe(4.5);
    const wrong = LARVAE + cell("parameters", "a: larvae.decay");
    expect(
      planOf(wrong)
        .problems.map(({ message }) => message)
        .join(),
    ).toContain("parameters only");
  });

  test("are exact, whatever their formulas' rounding", () => {
    const [root] = planOf(cell("parameters", "r: sqrt(2)")).parameters;
    expect(quantityOf(root?.value)).toEqual({ mantissa: Math.SQRT2, exponent: 0, error: 0, se: 0 });
  });

  test("keep their standard error", () => {
    const [a] = planOf(cell("parameters", "a: {value: 2, se: 0.1}")).parameters;
    expect(quantityOf(a?.value).se).toBe(0.1);
  });

  test("off their scale are told so, and keep their value", () => {
    const text = cell("parameters", "a: {value: 5, min: 0, max: 4}") + cell("formula f", "b: a");
    const { plan, results } = computed(text);
    expect(plan.problems).toMatchObject([{ severity: "warning", line: 3 }]);
    expect(results.get("f")?.values.b).toMatchObject({ quantity: { mantissa: 5 } });
  });

  test("are read through their cell's name too", () => {
    const text = cell("parameters setup", "a: 3") + cell("formula f", "b: setup.a + 1");
    expect(toDouble(quantityOf(valueIn(text, "f.b")))).toBe(4);
    expect(toDouble(quantityOf(valueIn(text, "setup.a")))).toBe(3);
    expect(planOf(text).byId.get("f")).toMatchObject({ needs: [], parameters: ["a"] });
  });

  test("are values of their cell", () => {
    expect(computed(LARVAE).results.get("parameters@1")?.values).toMatchObject({
      beta: { quantity: { mantissa: 1 } },
      mu: { quantity: { mantissa: 2 } },
    });
  });

  test("overridden by what is none, or by nonsense, are a problem", () => {
    const messages = (overrides: Record<string, string>) =>
      planOf(LARVAE, overrides)
        .problems.map(({ message }) => message)
        .join();
    expect(messages({ nu: "1" })).toContain("`nu` is not a parameter");
    expect(messages({ mu: "1 +" })).toContain("`mu` cannot be set");
    expect(messages({ mu: "larve" })).toContain("`larve`");
    expect(messages({ mu: "beta + 1" })).toBe("");
  });

  test("print as typed where a number was typed", () => {
    const [a, b, c] = planOf(cell("parameters", "a: 1.90", "b: 2*a", "c: 1/3")).parameters;
    if (a === undefined || b === undefined || c === undefined) throw new Error("Three parameters were declared.");
    expect([a, b, c].map(parameterWords)).toEqual(["1.90", "3.8", "0.333333"]);
  });
});

describe("what cells read", () => {
  const text =
    LARVAE.replace("beta: 1", "beta: 1\nhalf: mu/2\nx: 1").replace("drift: mu", "drift: 2*half") +
    cell("counts K", "of: larvae", "start: x");

  test("parameters through parameters and through cells, in the order of the text", () => {
    const { byId } = planOf(text);
    expect(byId.get("larvae")?.parameters).toEqual(["beta", "half", "mu"]);
    expect(byId.get("K")).toMatchObject({
      needs: ["larvae"],
      parameters: ["beta", "half", "x", "mu"],
      parameterValues: { mu: "2", half: "1", x: "1", beta: "1" },
    });
  });

  test("cells stand after those they read, whatever the order of the text", () => {
    const turned = cell("formula f", "a: g.b") + cell("formula g", "b: h.c") + cell("formula h", "c: 1");
    expect(planOf(turned).cells.map(({ id }) => id)).toEqual(["h", "g", "f"]);
  });
});

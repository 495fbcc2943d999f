import { describe, expect, test } from "vitest";
import { viewCell } from "../../app/cells/index.ts";
import { toDouble } from "../../app/formulas/index.ts";
import { cell, computed, LARVAE, plannedCell, quantityOf, reasonOf, valueIn } from "./papers.ts";

const SETUP =
  LARVAE.replace("beta: 1", "beta: 1\nnu: mu^2") +
  cell("profile w", "of: larvae") +
  cell("counts K", "of: larvae", "start: 1");

function tableIn(text: string, id: string) {
  const { plan, results } = computed(text);
  const result = results.get(id);
  if (result === undefined) throw new Error(JSON.stringify(plan.problems));
  const { table } = viewCell(plannedCell(plan, id), result, plan, results);
  if (table === null) throw new Error(`${id} has no table.`);
  return table;
}

describe("rows of a dummy", () => {
  const text = `${SETUP}${cell("table t", "rows: {n: 1 to 4}", "columns:", "  exact: K(n)", "  share: {formula: K(n)/(1 - K(0)), head: 'share of $K>0$', digits: 3, as: percent}")}`;

  test("an interval goes in steps of 1, and each entry is the formula there", () => {
    for (const n of [1, 2, 3, 4])
      expect(valueIn(text, `t.exact(${n}) - K(${n})`)).toEqual(valueIn(text, `K(${n}) - K(${n})`));
    expect(toDouble(quantityOf(valueIn(text, "t.n(3)")))).toBe(3);
    expect(reasonOf(valueIn(text, "t.exact(5)"))).toContain("counted from 1 to 4");
  });

  test("heads, digits and percent are those of the body", () => {
    const table = tableIn(text, "t");
    expect(table.columns.map(({ head, tex }) => [head, tex])).toEqual([
      ["n", true],
      ["exact", false],
      ["\\text{share of }K>0", true],
    ]);
    expect(table.rows.map((row) => row[2]?.text.replace(/\s/, " "))).toEqual([
      "92.1 %",
      "7.02 %",
      "0.726 %",
      "0.0875 %",
    ]);
    expect(table.rows[0]?.[1]?.text).toBe("0.0278681");
  });

  test("several lists of equal length go together", () => {
    const zipped = SETUP + cell("table t", "rows: {n: [1, 2, 3], m: [10, 20, 30]}", "columns: {a: n + m}");
    expect([1, 2, 3].map((row) => toDouble(quantityOf(valueIn(zipped, `t.a(${row})`))))).toEqual([11, 22, 33]);
  });
});

describe("rows that vary a parameter", () => {
  const varied = cell(
    "table t",
    "rows: {mu: [1.5, 2, 3]}",
    "columns:",
    "  turning: w.s0",
    "  zero: K(0)",
    "  square: nu",
    "  own: mu",
  );
  const text = SETUP + varied;

  test("give exactly what the paper gives with the parameter set so", () => {
    for (const [index, mu] of ["1.5", "2", "3"].entries()) {
      const row = index + 1;
      const direct = { mu };
      expect(valueIn(text, `t.turning(${row})`)).toEqual(valueIn(SETUP, "w.s0", direct));
      expect(valueIn(text, `t.zero(${row})`)).toEqual(valueIn(SETUP, "K(0)", direct));
      expect(toDouble(quantityOf(valueIn(text, `t.square(${row})`)))).toBe(Number(mu) ** 2);
      expect(toDouble(quantityOf(valueIn(text, `t.own(${row})`)))).toBe(Number(mu));
    }
  });

  test("leave the paper's own cells as they are", () => {
    const { results } = computed(text);
    expect(results.get("w")?.key).toBe(computed(SETUP).results.get("w")?.key);
  });

  test("a value at which a cell refuses becomes a gap, with its reason", () => {
    const table = tableIn(SETUP + cell("table t", "rows: {mu: [1, 2]}", "columns: {far: w.amplitude}"), "t");
    // The amplitude at drift 2 is 0.91656339…: computed by an independent method, a Taylor series in 65 digits.
    expect(table.rows.map((row) => row[1]?.text)).toEqual(["", "0.916563"]);
    expect(table.remarks.join(" ")).toContain("μ = 1");
    expect(table.remarks.join(" ")).toContain("between");
  });

  test("a table may vary what another table has varied already", () => {
    const inner = cell("table u", "rows: {beta: [1, 2]}", "columns: {a: w.decay}");
    const outer = cell("table t", "rows: {mu: [3, 4]}", "columns: {first: u.a(1), second: u.a(2)}");
    const both = SETUP + inner + outer;
    expect(valueIn(both, "t.second(2)")).toEqual(valueIn(SETUP, "w.decay", { mu: "4", beta: "2" }));
    expect(valueIn(both, "t.first(1)")).toEqual(valueIn(SETUP, "w.decay", { mu: "3" }));
  });

  test("cells that the parameter does not touch are computed once, before", () => {
    const other = SETUP + cell("process still", "drift: 2", "rate: beta") + cell("profile v", "of: still");
    const { plan, outcomes } = computed(other + cell("table t", "rows: {mu: [2, 3]}", "columns: {a: w.s0/v.s0}"));
    const task = plannedCell(plan, "t").task;
    expect(task?.recomputed?.cells.map(({ id }) => id)).toEqual(["larvae", "w"]);
    expect(Object.keys(task?.needs ?? {})).toEqual(["v"]);
    expect(outcomes.get("t")?.status).toBe("computed");
  });

  test("too many computations are refused before they are begun", () => {
    const many = SETUP + cell("table t", "rows: {mu: 2 to 900}", "columns: {a: w.s0, b: K(0)}");
    const { plan } = computed(many);
    expect(plan.problems.map(({ message }) => message).join()).toContain("at most 2000");
    const rows = SETUP + cell("table t", "rows: {n: 1 to 5000}", "columns: {a: n}");
    expect(
      computed(rows)
        .plan.problems.map(({ message }) => message)
        .join(),
    ).toContain("more than 1000 rows");
  });
});

test("formula cells read earlier keys, and pass errors on", () => {
  const text = SETUP + cell("formula f", "a: K(1)", "b: a/K(1) - 1", "c: 2*beta + mu");
  const ratio = quantityOf(valueIn(text, "f.b"));
  expect(Math.abs(ratio.mantissa)).toBeLessThanOrEqual(ratio.error);
  expect(toDouble(quantityOf(valueIn(text, "f.c")))).toBe(4);
});

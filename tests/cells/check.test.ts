import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { findingOf, reportPaper } from "../../app/cells/index.ts";
import { toDouble } from "../../app/formulas/index.ts";
import { readPaper } from "../../app/paper/index.ts";
import { cell, computed, keyOf, LARVAE, plannedCell, planOf, quantityOf, reasonOf } from "./papers.ts";

const AROUND = `${LARVAE}${cell("counts K", "of: larvae", "start: 1")}`;

function checked(that: string, ...more: string[]) {
  const { plan, results, outcomes } = computed(`${AROUND}${cell("check c", `that: ${that}`, ...more)}`);
  const result = results.get("c");
  if (result === undefined) throw new Error(JSON.stringify(outcomes.get("c")));
  const { verdict, left, right } = result.values;
  if (verdict?.type !== "text") throw new Error("The verdict is a word.");
  return { verdict: verdict.text, left, right, finding: findingOf(plannedCell(plan, "c"), result, plan) };
}

describe("verdicts", () => {
  test.each([
    ["1 < 2", "holds"],
    ["2 <= 2", "holds"],
    ["1/4 + 1/4 == 0.5", "holds"],
    ["3 > 4", "fails"],
    ["3 != 3", "fails"],
    // decay 2 + √2: see tests/cells/halfline.test.ts
    ["larvae.decay > 3.41421356", "holds"],
    ["larvae.decay > 3.41421357", "fails"],
    // the same number by two ways: neither equal nor different, as far as their errors tell
    ["K.mean == exp(-larvae.decay)", "undecided"],
    ["K.mean != exp(-larvae.decay)", "undecided"],
    ["K.mean < exp(-larvae.decay)", "undecided"],
    ["abs(K.mean - exp(-larvae.decay)) < 1e-14", "holds"],
    ["larvae.regime == larvae.regime", "holds"],
    ["not (1 < 2)", "fails"],
    ["not (K.mean == exp(-larvae.decay))", "undecided"],
    ["1 < 2 and 2 < 3", "holds"],
    ["1 < 2 and K.mean == exp(-larvae.decay)", "undecided"],
    ["K.mean == exp(-larvae.decay) and 1 < 2", "undecided"],
    ["K.mean == exp(-larvae.decay) and 1 > 2", "fails"],
    ["K.mean == exp(-larvae.decay) or 1 < 2", "holds"],
    ["if(mu > 1, 2 > 1, 2 < 1)", "holds"],
  ])("%s: %s", (that, verdict) => {
    expect(checked(that).verdict).toBe(verdict);
  });

  test("of exact numbers are those of arithmetic", () => {
    const whole = fc.integer({ min: -3, max: 3 });
    fc.assert(
      fc.property(whole, whole, (a, b) => {
        const holds = (that: string) => checked(that).verdict === "holds";
        expect([holds(`${a} < ${b}`), holds(`${a} <= ${b}`), holds(`${a} == ${b}`)]).toEqual([a < b, a <= b, a === b]);
      }),
      { numRuns: 15 },
    );
  });

  test("both sides are values, with their errors", () => {
    const { left, right } = checked("K.mean < 1/20");
    expect(toDouble(quantityOf(left))).toBeCloseTo(Math.exp(-2 - Math.SQRT2), 15);
    expect(quantityOf(left).error).toBeGreaterThan(0);
    expect(toDouble(quantityOf(right))).toBe(0.05);
    expect(reasonOf(checked("1 < 2 or 3 < 4").left)).toContain("no one left and right side");
  });
});

describe("what a check says where it stands", () => {
  test("nothing where it holds", () => {
    expect(checked("K.mean < 0.05", "because: few come back").finding).toBeNull();
  });

  test("the comparison in numbers and the reason where it fails", () => {
    expect(checked("K.mean > 0.05", "because: Many come back.").finding).toEqual({
      isGrave: true,
      words: "0.0329023 > 0.05 does not hold. It should hold because: Many come back.",
    });
    expect(checked("1 > 2 and 3 > 2").finding?.words).toBe("What it compares does not hold.");
  });

  test("that the errors leave it open", () => {
    expect(checked("K.mean == exp(-larvae.decay)").finding?.words).toContain("is undecided within the errors.");
  });

  test("the report lists it among the problems, at its line", () => {
    const text = `${LARVAE}${cell("check c", "that: mu > 3")}`;
    const { problems, cells } = reportPaper(readPaper(text, ""));
    expect(problems).toEqual([{ line: 11, message: "`c`: 2 > 3 does not hold." }]);
    expect(cells.c?.status).toBe("computed");
    expect(reportPaper(readPaper(text, ""), { mu: "4" }).problems).toEqual([]);
  });

  test("its reason does not enter its key", () => {
    const of = (because: string) => keyOf(`${AROUND}${cell("check c", "that: K.mean < 0.05", because)}`, "c");
    expect(of("because: one")).toBe(of("because: two"));
  });
});

test.each([
  ["that: K.mean", "`that` is no comparison"],
  ["that: 3", "`that` is no comparison"],
  ["that: K.man < 1", "Did you mean `mean`?"],
  ["that: 1 < 2\nbecause: [a, b]", "A list stands where the words of `because` is expected"],
])("%j is refused", (lines, message) => {
  const told = planOf(`${AROUND}${cell("check c", ...lines.split("\n"))}`).problems.map((problem) => problem.message);
  expect(told.join("\n")).toContain(message);
});

test("a side without a value fails the check, with the reason", () => {
  const { outcomes } = computed(`${AROUND}${cell("check c", "that: K.quantile(1) < 3")}`);
  const outcome = outcomes.get("c");
  expect(outcome?.status === "failed" && outcome.failure.message).toContain(
    "`that` has no value: The quantile at 1 is infinite",
  );
});

import { describe, expect, test } from "vitest";
import type { AnswerBorder } from "../../app/cells/index.ts";
import { answerRange, answerRangeSteps, planPaper } from "../../app/cells/index.ts";
import { readPaper } from "../../app/paper/index.ts";
import { cell, LARVAE } from "./papers.ts";

function bordersOf(text: string, name: string): readonly AnswerBorder[] {
  const paper = readPaper(text, "");
  return answerRange(paper, planPaper(paper), name).borders;
}

/** A paper with one process, its parameters on scales wide enough for every critical drift. */
function paperOf(offspring: string, { D = 0.5, rate = 1, drift = 2 } = {}): string {
  return (
    cell(
      "parameters",
      `mu: {value: ${drift}, min: -9, max: 9}`,
      `beta: {value: ${rate}, min: 0.01, max: 40}`,
      `D: ${D}`,
    ) + cell("process larvae", "drift: mu", "rate: beta", "diffusion: D", `offspring: ${offspring}`)
  );
}

/** Mean numbers of children: closed forms of each law. */
const LAWS: readonly (readonly [string, number])[] = [
  ["binary", 2],
  ["ternary", 3],
  ["{0: 0.1, 2: 0.6, 3: 0.3}", 2.1],
  ["{law: geometric, mean: 1.5}", 1.5],
  ["{law: geometric, mean: 2}", 2],
  ["{law: poisson, mean: 2}", 2],
];

describe("the critical drift", () => {
  // ±√(4 D β (m − 1)): closed form.
  for (const [offspring, mean] of LAWS) {
    for (const [D, rate] of [
      [0.5, 1],
      [0.8, 2.5],
      [2, 0.3],
    ] as const) {
      test(`${offspring}, D = ${D}, rate ${rate}: both lie where theory has them, to 1e-12`, () => {
        const critical = Math.sqrt(4 * D * rate * (mean - 1));
        const borders = bordersOf(paperOf(offspring, { D, rate }), "mu");
        expect(borders).toHaveLength(2);
        const [lower, upper] = borders;
        for (const x of [lower?.below, lower?.above]) expect(Math.abs((x ?? 0) / -critical - 1)).toBeLessThan(1e-12);
        for (const x of [upper?.below, upper?.above]) expect(Math.abs((x ?? 0) / critical - 1)).toBeLessThan(1e-12);
        expect([lower?.open, upper?.open]).toEqual(["above", "below"]);
        expect(upper?.why).toBe("the drift is critical in larvae");
        expect(upper?.sides.below.holds).toBe("K is infinite with positive probability");
        expect(upper?.sides.above.holds).toBe("K is finite");
      });
    }
  }

  test("it is a border of the other parameters too: β = μ²/(4 D (m − 1)), D = μ²/(4 β (m − 1)): closed forms", () => {
    const text = paperOf("binary").replace("D: 0.5", "D: {value: 0.5, min: 0.05, max: 9}");
    const [beta, ...others] = bordersOf(text, "beta");
    expect(others).toEqual([]);
    expect(Math.abs((beta?.above ?? 0) / 2 - 1)).toBeLessThan(1e-12);
    expect(beta?.open).toBe("above");
    const [D] = bordersOf(text, "D");
    expect(Math.abs((D?.above ?? 0) - 1)).toBeLessThan(1e-12);
  });

  test("a drift computed from the parameter, through another one", () => {
    const text =
      cell("parameters", "nu: {value: 1, min: 0.1, max: 3}", "half: nu/2 + 1/4", "mu: 4*half - 1") +
      cell("process larvae", "drift: mu", "rate: 1");
    // mu = 2 nu, so the border is √2/2.
    const [border, ...others] = bordersOf(text, "nu");
    expect(others).toEqual([]);
    expect(Math.abs((border?.above ?? 0) / Math.SQRT1_2 - 1)).toBeLessThan(1e-12);
  });

  test("without a scale the nearest borders around the value are found", () => {
    const borders = bordersOf(LARVAE.replace(/mu: \{.*\}/, "mu: 2"), "mu");
    expect(borders.map(({ above }) => Math.abs(Math.abs(above) / Math.SQRT2 - 1) < 1e-12)).toEqual([true, true]);
  });

  test("two processes at one border are told together, each at its own apart", () => {
    const same = LARVAE + cell("process pups", "drift: mu", "rate: beta");
    expect(bordersOf(same, "mu")).toEqual([]);
    const wide = same.replace("min: 1.45", "min: 1");
    expect(bordersOf(wide, "mu").map(({ why }) => why)).toEqual(["the drift is critical in larvae and pups"]);
    const other = wide.replaceAll("max: 4", "max: 4").replace(/rate: beta\n```\n$/, "rate: 2*beta\n```\n");
    expect(bordersOf(other, "mu").map(({ why }) => why)).toEqual([
      "the drift is critical in larvae",
      "the drift is critical in pups",
    ]);
  });
});

describe("where there is none", () => {
  test("a Malthusian parameter below 0: every drift is away", () => {
    expect(bordersOf(paperOf("{0: 0.6, 2: 0.4}"), "mu")).toEqual([]);
  });

  test("a parameter that no cell reads, and one whose scale stays on one side", () => {
    expect(bordersOf(LARVAE, "mu")).toEqual([]);
    expect(bordersOf(`${LARVAE}${cell("parameters more", "z: {value: 1, min: 0, max: 9}")}`, "z")).toEqual([]);
    expect(bordersOf(LARVAE, "nothing")).toEqual([]);
  });
});

describe("cells without an answer", () => {
  const text =
    LARVAE.replace("min: 1.45", "min: 1") + cell("yaglom Y", "of: larvae") + cell("counts K", "of: larvae", "start: 1");

  test("are told on the side where they have none, with the reason", () => {
    const [border] = bordersOf(text, "mu");
    expect(border?.sides.above.without).toEqual([]);
    expect(border?.sides.below.without.map(({ id }) => id)).toEqual(["Y"]);
    expect(border?.sides.below.without[0]?.reason).toContain("between");
  });

  test("those that read them have none either", () => {
    const reads = text + cell("formula f", "one: Y.one");
    expect(bordersOf(reads, "mu")[0]?.sides.below.without.map(({ id }) => id)).toEqual(["Y", "f"]);
  });

  test("an input that goes out of its range is a border by itself", () => {
    const wide = LARVAE.replace("beta: 1", "beta: {value: 1, min: -1, max: 1.5}");
    const [border, ...others] = bordersOf(wide, "beta");
    expect(others).toEqual([]);
    expect(border?.why).toBe("");
    expect(border?.open).toBe("below");
    expect(Math.abs(border?.above ?? 1)).toBeLessThan(1e-12);
    expect(border?.sides.below.without.map(({ id }) => id)).toEqual(["larvae"]);
    expect(border?.sides.below.without[0]?.reason).toContain("must be a number above 0");
  });
});

test("the search goes in many small steps", () => {
  const paper = readPaper(
    LARVAE.replace("min: 1.45", "min: 1") +
      cell("profile w", "of: larvae") +
      cell("counts K", "of: larvae", "start: 1"),
    "",
  );
  const steps = answerRangeSteps(paper, planPaper(paper), "mu");
  let count = 0;
  while (steps.next().done !== true) count += 1;
  // The looks at the scale, the halvings, and for each of the two stretches one for its plan and one for each of three cells.
  expect(count).toBeGreaterThan(48 + 40 + 2 * (1 + 3));
  expect(count).toBeLessThan(48 + 64 + 2 * (1 + 3));
});

test("a parameter that counts is asked at whole numbers alone", () => {
  const counting = (least: number) =>
    `${LARVAE}${cell("parameters", `last: {value: 1000, min: ${least}, max: 2000, step: 100}`)}${cell("tail T", "of: larvae", "start: 1", "up_to: last")}`;
  expect(bordersOf(counting(200), "last")).toEqual([]);
  // `up_to` is at least 1.
  const [border, ...others] = bordersOf(counting(-200), "last");
  expect(others).toEqual([]);
  expect([border?.below, border?.above]).toEqual([0, 1]);
  expect(border?.sides.below.without.map(({ id }) => id)).toEqual(["T"]);
});

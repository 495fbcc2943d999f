import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { planPaper } from "../../app/cells/index.ts";
import {
  freeStep,
  isPlainNumber,
  type Scale,
  scaleOf,
  scaleTicks,
  shareOf,
  shownValue,
  sourceOf,
  stepped,
  valueAt,
  yamlScalar,
} from "../../app/editor/model/scale.ts";
import { readPaper } from "../../app/paper/index.ts";

const MU: Scale = { min: 1.45, max: 4, step: 0.05 };

describe("scale", () => {
  test("there is one only between a least and a greatest value", () => {
    expect(scaleOf({ min: null, max: 2, step: null })).toBeNull();
    expect(scaleOf({ min: 2, max: 2, step: null })).toBeNull();
    expect(scaleOf({ min: 0, max: 2, step: null })).toEqual({ min: 0, max: 2, step: 0.1 });
    expect(scaleOf({ min: 0, max: 2, step: 0.25 })).toEqual({ min: 0, max: 2, step: 0.25 });
  });

  test("a place on it is a step, and a step a place", () => {
    fc.assert(
      fc.property(fc.double({ min: -0.5, max: 1.5, noNaN: true }), (share) => {
        const value = valueAt(MU, share);
        expect(value).toBeGreaterThanOrEqual(MU.min);
        expect(value).toBeLessThanOrEqual(MU.max);
        const steps = (value - MU.min) / MU.step;
        expect(Math.abs(steps - Math.round(steps))).toBeLessThan(1e-9);
        expect(valueAt(MU, shareOf(MU, value))).toBe(value);
      }),
    );
  });

  test.each([
    [1.6, 1, 1, 1.65],
    [1.6, -1, 1, 1.55],
    [1.6, 1, 10, 2.1],
    [1.6, 1, 0.1, 1.605],
    [1.605, 1, 1, 1.65],
    [4, 1, 1, 4],
    [1.45, -1, 10, 1.45],
  ] as const)("from %d, direction %d, fineness %d: %d", (from, direction, fineness, to) => {
    expect(stepped(from, MU.step, direction, fineness, MU)).toBe(to);
  });

  test("without a scale a step is a twentieth of the value, rounded", () => {
    expect(freeStep(1000, null)).toBe(50);
    expect(freeStep(0, null)).toBe(0.1);
    expect(freeStep(3, 0.5)).toBe(0.5);
    expect(stepped(1000, freeStep(1000, null), 1, 1, null)).toBe(1050);
  });

  test("ticks lie within, the coarse among the fine ones' gaps", () => {
    const { fine, coarse } = scaleTicks(MU);
    expect(coarse.length).toBeGreaterThan(2);
    for (const share of [...fine, ...coarse]) {
      expect(share).toBeGreaterThanOrEqual(0);
      expect(share).toBeLessThanOrEqual(1);
    }
    expect(fine.filter((share) => coarse.includes(share))).toEqual([]);
  });
});

describe("values as they are shown and written", () => {
  test.each([
    [2, "2", 0.05, "2.00"],
    [1.605, "1.605", 0.05, "1.605"],
    [400000, "400000", null, "400\u2009000"],
    [1000, "1000", 1, "1000"],
    [-0.5, "-0.5", 0.1, "−0.5"],
    [Math.SQRT2, "sqrt(2)", null, "1.41421"],
    [Math.SQRT2 * 1000, "1000*sqrt(2)", 0.5, "1414.21"],
    [3, "1 + 2", 0.05, "3.00"],
    [1e-7, "1e-7", null, "1e-7"],
    [Math.SQRT2, "sqrt(2)", 0.01, "1.41421"],
  ] as const)("%d of %s with step %s is %s", (value, source, step, shown) => {
    expect(shownValue(value, source, step)).toBe(shown);
  });

  test("a value that was stepped is written without the dust of doubles", () => {
    expect(sourceOf(0.1 + 0.2)).toBe("0.3");
    expect(sourceOf(1.6 + 0.05 + 0.05)).toBe("1.7");
  });

  test.each(["1.6", "-2", ".5", "1e-3", "+4"])("%s is a plain number", (source) => {
    expect(isPlainNumber(source)).toBe(true);
  });
  test.each(["sqrt(2)", "1/2", "", "1.6 m", "0x10"])("%s is not", (source) => {
    expect(isPlainNumber(source)).toBe(false);
  });

  test.each([
    ["2", 2],
    ["sqrt(2)", Math.SQRT2],
    ["max(1, 2)", 2],
    ["if(1 > 0, 3, 4)", 3],
    ["-1 + 2", 1],
    ["2*3", 6],
  ])("%s, set on the rule, is read from the text again", (source, value) => {
    const text = `\`\`\`parameters\na: {value: ${yamlScalar(source)}, note: n}\nb: ${yamlScalar(source)}\n\`\`\`\n`;
    const paper = readPaper(text, "");
    const plan = planPaper(paper);
    expect([...paper.problems, ...plan.problems]).toEqual([]);
    for (const parameter of plan.parameters) {
      expect(parameter.value.type === "number" ? parameter.value.quantity.mantissa : parameter.value).toBeCloseTo(
        value,
        12,
      );
    }
  });
});

import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { cell, keyOf, LARVAE, plannedCell, planOf } from "./papers.ts";

const COUNTS = cell("counts K", "of: larvae", "start: 1", "up_to: 200");
const PAPER = LARVAE + COUNTS;

/** Each turns the paper into another text whose results are the same. */
const HARMLESS: readonly [string, (text: string) => string][] = [
  ["a caption", (text) => text.replace("up_to: 200", "up_to: 200\ncaption: How many reach $0$.")],
  ["show", (text) => text.replace("up_to: 200", "up_to: 200\nshow: [figure, table]")],
  ["axes and labels", (text) => text.replace("up_to: 200", "up_to: 200\naxes: {x: 0 to 4, log: y}\nlabels: {x: n}")],
  ["a comment in the body", (text) => text.replace("up_to: 200", "# to here\nup_to: 200 # and no further")],
  ["the order of keys", (text) => text.replace("of: larvae\nstart: 1\nup_to: 200", "up_to: 200\nstart: 1\nof: larvae")],
  ["prose", (text) => `# A heading\n\nSome words.\n\n${text}\n\nMore words.`],
  ["a space in a formula", (text) => text.replace("start: 1", "start:   ( 1 )")],
  ["quotes", (text) => text.replace("start: 1", "start: '1'")],
  [
    "block style",
    (text) => text.replace("mu: {value: 2, min: 1.45, max: 4, step: 0.05,", "mu: {max: 5, value: 2, min: 1,"),
  ],
  ["note, unit and symbol", (text) => text.replace("note: drift", "unit: m/s, note: the drift").replace("\\mu", "m")],
  ["a default written out", (text) => text.replace("rate: beta", "rate: beta\ndiffusion: 1/2")],
  ["binary as a map", (text) => text.replace("rate: beta", "rate: beta\noffspring: {2: 1}")],
  ["the name of the process", (text) => text.replaceAll("larvae", "spores")],
  ["a value typed otherwise", (text) => text.replace("value: 2,", "value: 2.00,")],
  ["a parameter put in", (text) => text.replace("start: 1", "start: beta")],
  ["another parameter", (text) => text.replace("beta: 1", "beta: 1\nnu: 17")],
  ["another cell", (text) => text + cell("counts L", "of: larvae", "start: 3")],
  ["the name of a parameter", (text) => text.replaceAll("beta", "gamma_1")],
  ["cells in another order", () => COUNTS + LARVAE],
];

/** Each turns the paper into one whose K is another. */
const CHANGES: readonly [string, (text: string) => string][] = [
  ["the drift", (text) => text.replace("value: 2,", "value: 2.05,")],
  ["the rate", (text) => text.replace("beta: 1", "beta: 1.1")],
  ["the diffusion", (text) => text.replace("rate: beta", "rate: beta\ndiffusion: 0.6")],
  ["the law", (text) => text.replace("rate: beta", "rate: beta\noffspring: ternary")],
  ["a probability", (text) => text.replace("rate: beta", "rate: beta\noffspring: {1: 0.1, 2: 0.9}")],
  ["the start", (text) => text.replace("start: 1", "start: 1.01")],
  ["particles", (text) => text.replace("start: 1", "start: {1: 2}")],
  ["up_to", (text) => text.replace("up_to: 200", "up_to: 201")],
  ["the kind", (text) => text.replace("counts K", "tail K")],
];

describe("keys of cells", () => {
  const key = keyOf(PAPER, "K");

  test("are SHA-256 in hexadecimal", () => expect(key).toMatch(/^[0-9a-f]{64}$/));

  for (const [what, change] of HARMLESS) {
    test(`stay when ${what} changes`, () => {
      const changed = change(PAPER);
      expect(changed).not.toBe(PAPER);
      expect(planOf(changed).problems).toEqual([]);
      expect(keyOf(changed, "K")).toBe(key);
    });
  }

  for (const [what, change] of CHANGES) {
    test(`change when ${what} changes`, () => {
      const changed = change(PAPER);
      expect(changed).not.toBe(PAPER);
      expect(keyOf(changed, "K")).not.toBe(key);
    });
  }

  test("any harmless changes together leave the key, any change of a value makes a new one", () => {
    const harmless = HARMLESS.filter(([what]) => what !== "cells in another order");
    fc.assert(
      fc.property(fc.subarray(harmless), fc.double({ min: 1.5, max: 4, noNaN: true }), (changes, mu) => {
        const text = changes.reduce((text, [, change]) => change(text), PAPER);
        expect(keyOf(text, "K")).toBe(key);
        const moved = keyOf(text, "K", { mu: String(mu) });
        expect(moved === key).toBe(mu === 2);
        expect(keyOf(PAPER, "K", { mu: String(mu) })).toBe(moved);
      }),
      { numRuns: 60 },
    );
  });

  test("an override gives the key of the text with that value", () => {
    expect(keyOf(PAPER, "K", { mu: "1.9" })).toBe(keyOf(PAPER.replace("value: 2,", "value: 1.9,"), "K"));
  });

  test("a table that varies a parameter does not depend on its value, and does on everything else", () => {
    const table = cell("table t", "rows: {mu: [1.5, 2, 3]}", "columns: {turning: w.s0}");
    const profile = cell("profile w", "of: larvae");
    const text = PAPER + profile + table;
    const before = keyOf(text, "t");
    expect(keyOf(text, "t", { mu: "3" })).toBe(before);
    expect(keyOf(text, "w", { mu: "3" })).not.toBe(keyOf(text, "w"));
    expect(keyOf(text, "t", { beta: "1.1" })).not.toBe(before);
    expect(keyOf(text.replace("drift: mu", "drift: 1.0*mu"), "t")).not.toBe(before);
    expect(keyOf(text.replace("[1.5, 2, 3]", "[1.5, 2, 4]"), "t")).not.toBe(before);
    expect(plannedCell(planOf(text), "t").parameters).toEqual(["beta"]);
  });

  test("a parameter computed from a varied one stays a formula of it", () => {
    const setup = LARVAE.replace("beta: 1", "beta: 1\nnu: 2*mu").replace("drift: mu", "drift: nu/2");
    const text =
      setup + cell("profile w", "of: larvae") + cell("table t", "rows: {mu: [1.5, 2]}", "columns: {a: w.s0}");
    expect(keyOf(text, "t", { mu: "3" })).toBe(keyOf(text, "t"));
    expect(keyOf(text.replace("nu: 2*mu", "nu: 2*mu + 0.1"), "t")).not.toBe(keyOf(text, "t"));
  });

  test("working keys tell a change of the cell itself from one behind it, and neither from a parameter", () => {
    const working = (text: string) => plannedCell(planOf(text), "K").workingKey?.split(".") ?? [];
    const [own, whole] = working(PAPER);
    expect(working(PAPER.replace("value: 2,", "value: 3,"))).toEqual([own, whole]);
    const [ownBehind, wholeBehind] = working(PAPER.replace("drift: mu", "drift: mu + 1"));
    expect(ownBehind).toBe(own);
    expect(wholeBehind).not.toBe(whole);
    expect(working(PAPER.replace("up_to: 200", "up_to: 300"))[0]).not.toBe(own);
  });

  test("a long chain of cells that read each other many times is planned at once", () => {
    const links = Array.from({ length: 40 }, (_, k) =>
      cell(`formula f${k}`, `a: ${k === 0 ? "mu" : `f${k - 1}.a + f${k - 1}.a*f${k - 1}.a - f${k - 1}.a^2`}`),
    );
    const plan = planOf(LARVAE + links.join(""));
    expect(plan.problems).toEqual([]);
    expect(new Set(plan.cells.map(({ key }) => key)).size).toBe(42);
  });
});

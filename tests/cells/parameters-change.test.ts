import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { changesParameter, type FieldChanges, PARAMETER_FIELDS, parameterFields } from "../../app/cells/index.ts";
import { readPaper } from "../../app/paper/index.ts";
import { changed, faults, lines, made, order, TEXT } from "./parameters-text.ts";

test("the paper of this test is sound", () => {
  expect(faults(TEXT)).toEqual([]);
});

describe("a parameter changed keeps what else is written of it", () => {
  test("a value alone, beside its comment", () => {
    expect(lines(changed(TEXT, "beta", { value: "sqrt(2) + 0.1" }), TEXT)).toEqual([
      "beta: sqrt(2) + 0.1 # splitting rate",
    ]);
  });

  test("in braces: replaced, added and taken away where it stands, with the author's quotation marks", () => {
    const after = changed(TEXT, "mu", { value: "min(2, 3)", min: "", max: "5", note: "the drift", unit: "m/d" });
    expect(lines(after, TEXT)).toEqual([
      `mu: {value: 'min(2, 3)', max: 5, note: "the drift", unit: m/d} # the current`,
    ]);
  });

  test("in lines of its own: comments stay, and what is added has a line", () => {
    const after = changed(TEXT, "x_0", { value: "0.7", note: "", min: "0", unit: "1: of what?", step: "" });
    expect(after).toContain(
      "x_0:\n  value: 0.7   # start\n  min: 0\n  unit: '1: of what?'\n  # where they begin\nspare: 3",
    );
  });

  test("more said of a value alone goes into braces, or into lines where its neighbours have lines", () => {
    expect(lines(changed(TEXT, "beta", { note: "rate, per day" }), TEXT)).toEqual([
      "beta: {value: 1, note: 'rate, per day'} # splitting rate",
    ]);
    const inLines = "```parameters\na:\n  value: 1\n  note: x\nb: 2 # two\n```\n";
    expect(changed(inLines, "b", { note: "y" })).toBe(
      "```parameters\na:\n  value: 1\n  note: x\nb: # two\n  value: 2\n  note: y\n```\n",
    );
  });

  test("texts on lines of their own, quotes and empty entries", () => {
    const text = "```parameters\na:\n  note: |\n    long\n    words\n  unit:\n  value: '1'\nb: 2\n```\n";
    expect(changed(text, "a", { note: "short", unit: "m", value: "3" })).toBe(
      "```parameters\na:\n  note: short\n  unit: m\n  value: '3'\nb: 2\n```\n",
    );
  });

  test("whatever is written reads back, and nothing else changes", () => {
    const words = fc.oneof(
      fc.string({ unit: "grapheme", maxLength: 12 }),
      fc.string({ unit: fc.constantFrom(..."ab1 :#,{}[]'\"\\-?&*!|>%@`$"), maxLength: 10 }),
      fc.constantFrom("no", "~", "null", "- a", "a: b", "\\mu", "it's", "x #y", "---", "..."),
    );
    fc.assert(
      fc.property(
        fc.constantFrom("beta", "mu", "x_0", "R"),
        fc.record({ symbol: words, unit: words, note: words }, { requiredKeys: [] }),
        (name, changes) => {
          const edit = changesParameter(readPaper(TEXT, ""), "", name, changes);
          const after = readPaper(made(TEXT, edit), "");
          const asked = { ...parameterFields(readPaper(TEXT, ""), name), ...changes };
          const read = parameterFields(after, name);
          for (const field of PARAMETER_FIELDS)
            expect(read?.[field]).toBe((asked[field] ?? "").replace(/[\s\p{Cc}\ufeff]+/gu, " ").trim());
          for (const other of ["beta", "mu", "x_0", "spare", "R"].filter((each) => each !== name))
            expect(parameterFields(after, other)).toEqual(parameterFields(readPaper(TEXT, ""), other));
          for (const comment of [
            "# of the larvae",
            "# splitting rate",
            "# the current",
            "# start",
            "# where they begin",
          ])
            expect(after.text).toContain(comment);
          expect(order(after.text)).toEqual(order(TEXT));
        },
      ),
    );
  });
});

describe("what cannot stand is said at its field", () => {
  const problem = (name: string, changes: FieldChanges) => changesParameter(readPaper(TEXT, ""), "", name, changes);

  test.each([
    ["mu", { value: "sqrt(2*bta)" }, "value", "`bta` is not a parameter of this paper. Did you mean `beta`?"],
    ["mu", { value: "2*(1" }, "value", "bracket"],
    ["mu", { value: "" }, "value", "A parameter needs a value"],
    ["mu", { value: "sqrt(-1)" }, "value", "It has no value"],
    ["mu", { value: "mu + 1" }, "value", "reads itself"],
    ["mu", { value: "K.mean" }, "value", "K"],
    ["mu", { max: "1" }, "max", "upwards"],
    ["mu", { min: "gama" }, "min", "`gama`"],
    ["mu", { min: "log(-1)" }, "min", "no number"],
    ["mu", { step: "0" }, "step", "above 0"],
    ["gone", { value: "1" }, null, "not a parameter"],
  ])("%s %j", (name, changes, field, words) => {
    expect(problem(name, changes)).toEqual({ field, problem: expect.stringContaining(words) });
  });

  test("a circle of two", () => {
    const text = TEXT.replace("beta: 1 #", "beta: spare #");
    expect(changesParameter(readPaper(text, ""), "", "spare", { value: "beta" })).toEqual({
      field: "value",
      problem: "`beta` and `spare` need each other. One of them must stand without the others.",
    });
  });

  test("a value off its scale is the author's own affair", () => {
    expect(problem("mu", { value: "9" })).toHaveProperty("edits");
  });
});

import fc from "fast-check";
import { describe, expect, test } from "vitest";
import {
  addsParameter,
  changesParameter,
  type FieldChanges,
  movesParameter,
  PARAMETER_FIELDS,
  parameterFields,
  planPaper,
  removesParameter,
} from "../../app/cells/index.ts";
import { readPaper } from "../../app/paper/index.ts";

const TEXT = `---
title: On the shore
---

\`\`\`parameters
# of the larvae
beta: 1 # splitting rate
mu: {value: 1.6, min: 1.45, max: 4, note: "drift, offshore"} # the current
x_0:
  value: 0.5   # start
  # where they begin
  note: from the shore
  step: 0.1
spare: 3
\`\`\`

At :value[mu] it is :value[K.mean].

\`\`\`process larvae
drift: mu
rate: beta
\`\`\`

\`\`\`counts K
of: larvae
start: x_0
up_to: 6
\`\`\`

\`\`\`table t
rows: {n: [1, 2, 3]}
columns: {p: K(n)}
\`\`\`

\`\`\`parameters more
R: 400000
\`\`\`
`;

interface Made {
  readonly edits: readonly { readonly from: number; readonly to: number; readonly insert: string }[];
}

function made(text: string, edit: Made | object): string {
  if (!("edits" in edit)) throw new Error(JSON.stringify(edit));
  let after = "";
  let at = 0;
  for (const { from, to, insert } of edit.edits) {
    expect(from).toBeGreaterThanOrEqual(at);
    after += text.slice(at, from) + insert;
    at = to;
  }
  return after + text.slice(at);
}

const changed = (text: string, name: string, changes: FieldChanges) =>
  made(text, changesParameter(readPaper(text, ""), "", name, changes));
const added = (text: string, name: string, fields: FieldChanges) =>
  made(text, addsParameter(readPaper(text, ""), "", name, fields));
const removed = (text: string, name: string) => made(text, removesParameter(readPaper(text, ""), "", name));
const moved = (text: string, name: string, by: -1 | 1) => made(text, movesParameter(readPaper(text, ""), "", name, by));

const order = (text: string) => planPaper(readPaper(text, "")).parameters.map(({ name }) => name);
const faults = (text: string) => [...readPaper(text, "").problems, ...planPaper(readPaper(text, "")).problems];
/** Lines that one text has and another has not. */
const lines = (text: string, other: string) => text.split("\n").filter((line) => !other.split("\n").includes(line));

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

describe("a parameter added", () => {
  test("stands last in the first cell of parameters", () => {
    expect(added(TEXT, "growth", { value: "0.2" })).toContain("spare: 3\ngrowth: 0.2\n```");
    expect(added(TEXT, "growth", { value: "max(1, mu)", note: "rate: slow" })).toContain(
      "spare: 3\ngrowth: {value: 'max(1, mu)', note: 'rate: slow'}\n```",
    );
  });

  test("or in a new cell after the front matter, or at the beginning", () => {
    expect(added("---\ntitle: T\n---\n\nWords.\n", "a", { value: "1" })).toBe(
      "---\ntitle: T\n---\n\n```parameters\na: 1\n```\n\nWords.\n",
    );
    expect(added("---\ntitle: T\n---", "a", { value: "1" })).toBe("---\ntitle: T\n---\n\n```parameters\na: 1\n```\n");
    expect(added("---\ntitle: T\n---\nWords.\n", "a", { value: "1" })).toBe(
      "---\ntitle: T\n---\n\n```parameters\na: 1\n```\n\nWords.\n",
    );
    expect(added("Words.\n", "a", { value: "1" })).toBe("```parameters\na: 1\n```\n\nWords.\n");
    expect(added("", "a", { value: "1" })).toBe("```parameters\na: 1\n```\n");
  });

  test("into an empty cell, a body in braces, and a cell at the end of the text", () => {
    expect(added("```parameters\n```\n", "a", { value: "1" })).toBe("```parameters\na: 1\n```\n");
    expect(added("```parameters\n{b: 2}\n```\n", "a", { value: "max(1, 2)" })).toBe(
      "```parameters\n{b: 2, a: 'max(1, 2)'}\n```\n",
    );
  });

  test.each([
    ["mu", "parameter already"],
    ["K", "cell already"],
    ["2x", "starting with a letter"],
    ["", "starting with a letter"],
    ["sqrt", "meaning of its own"],
    ["n", "has n for a name of its own"],
  ])("under the name %j is refused", (name, words) => {
    expect(addsParameter(readPaper(TEXT, ""), "", name, { value: "1" })).toEqual({
      field: "name",
      problem: expect.stringContaining(words),
    });
  });

  test("mends what wanted it", () => {
    const text = TEXT.replace("rate: beta", "rate: growth");
    expect(faults(text)).not.toEqual([]);
    expect(faults(added(text, "growth", { value: "1" }))).toEqual([]);
  });

  test("a bound name of a sum is not taken", () => {
    const text = `${TEXT}\n:value[sum(K(j), j, 0, 3)]\n`;
    expect(addsParameter(readPaper(text, ""), "", "j", { value: "1" })).toEqual({
      field: "name",
      problem: expect.stringContaining("must be a new one"),
    });
  });

  test("where the cells of parameters cannot be read they are to be mended first", () => {
    expect(addsParameter(readPaper("```parameters\na: [\n```\n", ""), "", "b", { value: "1" })).toEqual({
      field: null,
      problem: "The parameters in line 1 cannot be read; they are to be mended first.",
    });
  });
});

describe("a parameter removed", () => {
  test("leaves with its lines", () => {
    expect(removed(TEXT, "spare")).toBe(TEXT.replace("spare: 3\n", ""));
  });

  test("takes its cell with it when it was alone there", () => {
    expect(removed(TEXT, "R")).toBe(TEXT.replace("```parameters more\nR: 400000\n```\n", ""));
    expect(removed("A.\n\n```parameters\nR: 1\n```\n\nB.\n", "R")).toBe("A.\n\nB.\n");
  });

  test("out of braces", () => {
    expect(removed("```parameters\n{a: 1, b: 2}\n```\n", "b")).toBe("```parameters\n{a: 1}\n```\n");
  });

  test("after it was added gives back the text as it was, to the sign", () => {
    const words = fc.string({ unit: "grapheme", maxLength: 8 });
    fc.assert(
      fc.property(
        fc.constantFrom("growth", "z9", "A_b"),
        fc.record({ value: fc.constantFrom("1", "2*mu", "max(1, mu)"), note: words, unit: words }),
        (name, fields) => {
          expect(removed(added(TEXT, name, fields), name)).toBe(TEXT);
        },
      ),
      { numRuns: 40 },
    );
  });

  test("is not removed while something reads it, which is told", () => {
    expect(removesParameter(readPaper(TEXT, ""), "", "mu")).toEqual({
      readers: [
        { at: TEXT.indexOf("mu]"), line: 17 },
        { at: TEXT.indexOf("mu\nrate"), line: 20 },
      ],
    });
    const other = TEXT.replace("spare: 3", "spare: more.R");
    expect(removesParameter(readPaper(other, ""), "", "R")).toEqual({
      readers: [{ at: other.indexOf("R\n"), line: 14 }],
    });
  });
});

describe("a parameter moved", () => {
  test("within its cell, with the comments directly above it", () => {
    const later = moved(TEXT, "beta", 1);
    expect(later).toContain("# the current\n# of the larvae\nbeta: 1 # splitting rate\nx_0:");
    expect(order(later)).toEqual(["mu", "beta", "x_0", "spare", "R"]);
    expect(moved(TEXT, "spare", -1)).toContain("the current\nspare: 3\nx_0:\n");
  });

  test("past the end of its cell, into the neighbour's", () => {
    const over = moved(TEXT, "R", -1);
    expect(order(over)).toEqual(["beta", "mu", "x_0", "R", "spare"]);
    expect(over).not.toContain("parameters more");
    expect(order(moved(TEXT, "spare", 1))).toEqual(["beta", "mu", "x_0", "R", "spare"]);
    expect(moved(TEXT, "spare", 1)).toContain("```parameters more\nR: 400000\nspare: 3\n```");
  });

  test("in one line", () => {
    expect(moved("```parameters\n{a: 1, b: {value: 2}}\n```\n", "b", -1)).toBe(
      "```parameters\n{b: {value: 2}, a: 1}\n```\n",
    );
  });

  test("the ends are ends", () => {
    expect(movesParameter(readPaper(TEXT, ""), "", "beta", -1)).toEqual({
      field: null,
      problem: "beta is the first parameter.",
    });
    expect(movesParameter(readPaper(TEXT, ""), "", "R", 1)).toHaveProperty("problem", "R is the last parameter.");
  });

  test("there and back again is the same order and the same values, whatever the way", () => {
    const names = ["beta", "mu", "x_0", "spare", "R"];
    fc.assert(
      fc.property(
        fc.array(fc.tuple(fc.constantFrom(...names), fc.constantFrom<-1 | 1>(-1, 1)), { maxLength: 8 }),
        (ways) => {
          let text = TEXT;
          const expected = [...names];
          for (const [name, by] of ways) {
            const at = expected.indexOf(name);
            const other = expected[at + by];
            const edit = movesParameter(readPaper(text, ""), "", name, by);
            if (other === undefined) {
              expect(edit).toHaveProperty("problem");
              continue;
            }
            expected[at] = other;
            expected[at + by] = name;
            text = made(text, edit);
            expect(order(text)).toEqual(expected);
            expect(faults(text)).toEqual([]);
          }
          for (const name of names)
            expect(parameterFields(readPaper(text, ""), name)).toEqual(parameterFields(readPaper(TEXT, ""), name));
        },
      ),
    );
  });
});

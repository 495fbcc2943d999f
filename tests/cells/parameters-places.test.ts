import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { addsParameter, movesParameter, parameterFields, removesParameter } from "../../app/cells/index.ts";
import { readPaper } from "../../app/paper/index.ts";
import { added, faults, made, moved, order, removed, TEXT } from "./parameters-text.ts";

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

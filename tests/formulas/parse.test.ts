import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { type Formula, FUNCTIONS, freeNames, parseFormula, RESERVED_NAMES } from "../../app/formulas/index.ts";
import { problemOf, quantityOf, valueOfSource } from "./evaluating.ts";

function read(source: string): Formula {
  const parsed = parseFormula(source);
  if (!parsed.ok) throw new Error(parsed.problem.message);
  return parsed.formula;
}

/** The tree alone, without the places of its parts in the source. */
function withoutOffsets(formula: Formula): unknown {
  return JSON.parse(JSON.stringify(formula, (key, value) => (key === "at" ? undefined : value)));
}

describe("what a formula means", () => {
  test.each([
    ["1 + 2*3", 7],
    ["(1 + 2)*3", 9],
    ["-2^2", -4],
    ["2^3^2", 512],
    ["2^-1", 0.5],
    ["8/4/2", 1],
    ["8 - 4 - 2", 2],
    ["1/2*4", 2],
    ["--3", 3],
    ["+3", 3],
    ["2*-3", -6],
    [".5", 0.5],
    ["60E05", 6000000],
    ["010", 10],
    ["if(1 < 2 and not (2 < 1), 3, 4)", 3],
    ["if(1 < 2 or 1/0 < 1, 3, 4)", 3],
    ["if(2 <= 2, 1, 0) + if(2 >= 3, 1, 0) + if(2 == 2, 10, 0) + if(2 != 2, 10, 0)", 11],
  ])("%s = %d", (source, value) => {
    expect(quantityOf(source).mantissa).toBe(value);
  });

  test("the tree holds names, members and calls with their places", () => {
    expect(read("K.above(n) + T.s0")).toEqual({
      node: "apply",
      name: "add",
      at: 11,
      args: [
        { node: "call", of: "K", member: "above", args: [{ node: "name", name: "n", at: 8 }], at: 0 },
        { node: "member", of: "T", member: "s0", at: 13 },
      ],
    });
  });

  test("none draws nothing", () => {
    expect(valueOfSource("none")).toEqual({ type: "none" });
    expect(valueOfSource("if(1 < 2, none, 3)")).toEqual({ type: "none" });
  });
});

describe("what is refused, where, and with what cure", () => {
  test.each([
    ["", "The formula is empty", ""],
    ["2x", "Between 2 and x an operator is missing; a product is written with *, as 2*x.", "2x"],
    ["2 (3)", "a product is written with *, as 2*(...).", "2 ("],
    ["(1)(2)", "a product is written with *, as (...)*(...).", ")("],
    ["a b", "a product is written with *, as a*b.", "a b"],
    ["a not in b", "a product is written with *", "a not"],
    ["0x10", "Numbers are written in base 10", "0x"],
    ["1e400", "1e400 is out of range.", "1e400"],
    ["1e-400", "1e-400 is out of range.", "1e-400"],
    ["1.2.3", "A number has one decimal point", ""],
    ["5%", "There is no percent sign in formulas; write 0.05 for 5 %.", "%"],
    ["n!", "a factorial n! as gamma(n + 1)", "!"],
    ["f'", "A derivative is written derivative(F, x, at).", "'"],
    ["x = 3", "Two numbers are compared with ==", "="],
    ["x := 3", "There are no ranges in formulas", ":"],
    ["1:3", "There are no ranges in formulas", ":"],
    ["[1, 2]", "There are no lists or matrices", "["],
    ["{a: 1}", "Round brackets group and call", "{"],
    ['"text"', "There are no strings", '"'],
    ["a ? b : c", "A choice is written if(condition, a, b).", "?"],
    ["x**2", "A power is written with ^", "**"],
    ["a && b", "`and` is written as a word.", "&&"],
    ["a | b", "no bit operators", "|"],
    ["~a", "`not` is written as a word.", "~"],
    ["1 << 2", "Between < and < a number, a name or a bracket is missing.", "<"],
    ["7 mod 3", "There is no mod here", "mod"],
    ["a xor b", "There is no xor here", "xor"],
    ["5 in cm", "There are no units", "in"],
    ["true", "There is no word true", "true"],
    ["Infinity", "Infinity is not a number here", "Infinity"],
    ["a; b", "A formula is one expression", ";"],
    ["\\mu", "Formulas are not TeX", "\\"],
    ["μ", "Names are made of the letters a to z", "μ"],
    ["2 − 1", "A minus is written with the hyphen sign -.", "−"],
    ["a < b < c", "Comparisons do not chain; write a < b and b < c.", "a < b < c"],
    ["1 + (a < b)", "a < b holds or does not; it is not a number that + could take.", "(a < b)"],
    ["not a < b", "Put brackets round what not denies, as not (a < b).", "not a"],
    ["1 and 2", "and takes a comparison, such as x < 1, not 1.", "1"],
    ["if(1, 2, 3)", "if takes a comparison", "1"],
    ["(1", "This bracket is never closed.", "("],
    ["1)", "This bracket closes nothing", ")"],
    ["()", "There is nothing between these brackets.", ")"],
    ["sin()", "sin() has no argument.", ")"],
    ["1,5", "a decimal number has a point, as 1.5.", ","],
    ["1 +", "The formula ends after +", "+"],
    ["* 2", "A formula cannot begin with *", "*"],
    ["1 + * 2", "Between + and * a number", "*"],
    ["sin(1, 2)", "sin takes 1 argument, not 2: sin(x).", "sin(1, 2)"],
    ["if(a < b, 1)", "if takes 3 arguments, not 2", "if(a < b, 1)"],
    ["sqrt", "sqrt is a function and needs its brackets: sqrt(x).", "sqrt"],
    ["sqrt.x", "sqrt is a function and has no values of its own.", "."],
    ["a.b.c", "A point stands between a cell's name and the name of one of its values", "."],
    ["a.", "The formula ends after .", "."],
    ["pi(3)", "pi is a word of the language", "pi"],
    ["sum(n, 2, 1, 3)", "The second argument of sum is the name of its variable", "2"],
    ["sum(n, pi, 1, 3)", "The second argument of sum is the name of its variable", "pi"],
    ["least(n, n + 1, 1, 3)", "The second argument of least", "n + 1"],
  ])("%s", (source, message, part) => {
    const problem = problemOf(source);
    expect(problem.message).toContain(message);
    if (part !== "") expect(problem.part).toBe(part);
  });

  test("a misspelled function says what was meant", () => {
    expect(valueOfSource("sqr(2)")).toEqual({ type: "refused", reason: "sqr cannot be called; did you mean sqrt?" });
  });

  test.each([
    ["brackets", `${"(".repeat(5000)}1${")".repeat(5000)}`],
    ["fewer brackets", `${"(".repeat(70)}1${")".repeat(70)}`],
    ["minus signs", `${"-".repeat(1900)}1`],
    ["powers", Array.from({ length: 900 }, () => "2").join("^")],
    ["nots", `${"not ".repeat(400)}(1 < 2)`],
  ])("too many %s", (_, source) => {
    expect(parseFormula(source).ok).toBe(false);
  });

  test("a long flat sum is no trouble", () => {
    expect(quantityOf(Array.from({ length: 999 }, () => "1").join("+")).mantissa).toBe(999);
  });
});

describe("whatever the text", () => {
  const pieces = [
    "1",
    "2.5",
    "x",
    "K",
    ".",
    "(",
    ")",
    ",",
    "+",
    "-",
    "^",
    "<",
    "==",
    "not",
    "and",
    "if",
    "sum",
    " ",
    "e",
    "constructor",
    "__proto__",
    "toString",
    "[",
    "%",
    "π",
    "\0",
    "1e9",
  ];

  test("a problem lies within the text; a formula evaluates to a value", () => {
    fc.assert(
      fc.property(
        fc.oneof(
          fc.string(),
          fc.array(fc.constantFrom(...pieces)).map((p) => p.join("")),
        ),
        (source) => {
          const parsed = parseFormula(source);
          if (parsed.ok) {
            expect(valueOfSource(source, undefined, 1000).type).toMatch(/^(number|truth|none|refused)$/);
            return;
          }
          const { from, to, message } = parsed.problem;
          expect(0 <= from && from <= to && to <= Math.max(source.length, 1)).toBe(true);
          expect(message.length).toBeGreaterThan(10);
        },
      ),
      { numRuns: 3000 },
    );
  });

  const name = fc.constantFrom("x", "mu", "constructor", "n_1");
  const { formula } = fc.letrec<{ formula: string }>((tie) => ({
    formula: fc.oneof(
      { depthSize: "small", withCrossShrink: true },
      fc.integer({ min: 0, max: 999 }).map(String),
      name,
      fc
        .tuple(tie("formula"), fc.constantFrom("+", "-", "*", "/", "^"), tie("formula"))
        .map(([a, o, b]) => `(${a}) ${o} (${b})`),
      tie("formula").map((a) => `-(${a})`),
      tie("formula").map((a) => `sqrt(${a})`),
      fc.tuple(tie("formula"), tie("formula"), tie("formula")).map(([a, b, c]) => `if(${a} < ${b}, ${c}, K.s0)`),
      fc.tuple(tie("formula"), tie("formula")).map(([a, b]) => `K.above(${a}, ${b})`),
    ),
  }));

  test("spaces and needless brackets change nothing but offsets", () => {
    fc.assert(
      fc.property(formula, (source) => {
        const spaced = ` ( ${source.replaceAll("(", " ( ").replaceAll(",", " , ")} ) `;
        expect(withoutOffsets(read(spaced))).toEqual(withoutOffsets(read(source)));
      }),
    );
  });
});

describe("the tree's names", () => {
  test("free names are listed once, bound variables left out", () => {
    expect(freeNames(read("a*sum(n*b + K(n), n, 1, c) + K.mean + n + a"))).toEqual({
      names: ["a", "b", "c", "n"],
      cells: [
        { of: "K", member: "", called: true },
        { of: "K", member: "mean", called: false },
      ],
    });
  });

  test("reserved names are all the words of the language", () => {
    for (const word of [...FUNCTIONS.map((f) => f.name), "pi", "e", "and", "or", "not", "none", "true", "mod"]) {
      expect(RESERVED_NAMES.has(word), word).toBe(true);
    }
    expect(RESERVED_NAMES.has("mu")).toBe(false);
  });
});

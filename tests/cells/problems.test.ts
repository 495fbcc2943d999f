import { describe, expect, test } from "vitest";
import type { Problem } from "../../app/paper/index.ts";
import { cell, computed, LARVAE, plannedCell, planOf } from "./papers.ts";

/** Problems of a text, each with the words it stands at. */
function problemsOf(text: string): (Problem & { at: string })[] {
  return planOf(text).problems.map((problem) => ({ ...problem, at: text.slice(problem.from, problem.to) }));
}

/** The line of the first place where some words stand. */
function lineOf(text: string, words: string): number {
  return text.slice(0, text.indexOf(words)).split("\n").length;
}

interface Case {
  readonly what: string;
  readonly text: string;
  /** The words at which the problem stands. */
  readonly at: string;
  /** Its line is that of these words. */
  readonly line: string;
  readonly says: readonly string[];
}

const CASES: readonly Case[] = [
  {
    what: "an unknown kind",
    text: LARVAE + cell("count K", "of: larvae"),
    at: "count",
    line: "count K",
    says: ["`count` is not a kind of cell", "`counts`", "Did you mean"],
  },
  {
    what: "an unknown key",
    text: LARVAE + cell("counts K", "of: larvae", "starts: 1", "start: 1"),
    at: "starts",
    line: "starts: 1",
    says: ["`starts` is not a key of a counts cell", "`start`", "Did you mean `start`?"],
  },
  {
    what: "a missing key",
    text: LARVAE + cell("counts K", "of: larvae"),
    at: "```counts K",
    line: "counts K",
    says: ["`start` is missing"],
  },
  {
    what: "a reference to nothing",
    text: LARVAE + cell("counts K", "of: larve", "start: 1"),
    at: "larve",
    line: "of: larve\n",
    says: ["`larve` is not a cell", "Did you mean `larvae`?"],
  },
  {
    what: "a reference to another kind",
    text: LARVAE + cell("profile w", "of: larvae") + cell("counts K", "of: w", "start: 1"),
    at: "w",
    line: "of: w\n",
    says: ["`w` is a profile cell", "a process cell"],
  },
  {
    what: "an unknown name in a formula",
    text: LARVAE + cell("formula f", "a: 2*bata + 1"),
    at: "bata",
    line: "a: 2*bata",
    says: ["`bata` is not a parameter", "Did you mean `beta`?"],
  },
  {
    what: "an unknown value of a cell",
    text: LARVAE + cell("profile w", "of: larvae") + cell("formula f", "a: w.amplitud"),
    at: "w",
    line: "a: w.amplitud",
    says: ["`amplitud` is not a value", "`w.amplitude`", "Did you mean `amplitude`?"],
  },
  {
    what: "a cell where a number is meant",
    text: LARVAE + cell("profile w", "of: larvae") + cell("formula f", "a: 2*w"),
    at: "w",
    line: "a: 2*w",
    says: ["`w` is a profile cell, not a number", "`w.s0`"],
  },
  {
    what: "a callable without its argument",
    text: LARVAE + cell("counts K", "of: larvae", "start: 1") + cell("formula f", "a: K.above"),
    at: "K",
    line: "a: K.above",
    says: ["needs an argument"],
  },
  {
    what: "too many arguments",
    text: LARVAE + cell("profile w", "of: larvae") + cell("formula f", "a: w(1, 2, 3)"),
    at: "w",
    line: "a: w(1, 2, 3)",
    says: ["takes 1 or 2 arguments; here are 3"],
  },
  {
    what: "a broken formula",
    text: LARVAE + cell("formula f", "a: 2*(mu + 1"),
    at: "(",
    line: "a: 2*(mu",
    says: ["never closed"],
  },
  {
    what: "a rate that is none",
    text: LARVAE.replace("beta: 1", "beta: -1"),
    at: "beta",
    line: "rate: beta",
    says: ["`rate` is -1; it must be a number above 0"],
  },
  {
    what: "an up_to out of range",
    text: LARVAE + cell("counts K", "of: larvae", "start: 1", "up_to: 1000000"),
    at: "1000000",
    line: "up_to: 1000000",
    says: ["a whole number from 1 to 100000"],
  },
  {
    what: "probabilities that do not sum to 1",
    text: LARVAE.replace("rate: beta", "rate: beta\noffspring: {0: 0.1, 2: 0.8}"),
    at: "0.8",
    line: "offspring:",
    says: ["sum to 0.9"],
  },
  {
    what: "an offspring law that is none",
    text: LARVAE.replace("rate: beta", "rate: beta\noffspring: trinary"),
    at: "trinary",
    line: "offspring:",
    says: ["`ternary`", "{law: geometric, mean: 2}"],
  },
  {
    what: "a reserved name",
    text: LARVAE + cell("formula sqrt", "a: 1"),
    at: "```formula sqrt",
    line: "formula sqrt",
    says: ["`sqrt` has a meaning of its own"],
  },
  {
    what: "a parameter given twice",
    text: LARVAE + cell("parameters", "nu: 1", "mu: 3"),
    at: "mu",
    line: "mu: 3",
    says: ["`mu` is given already, in line 3"],
  },
  {
    what: "a dummy that shadows a cell",
    text: LARVAE + cell("table t", "rows: {larvae: 1 to 3}", "columns: {a: 2}"),
    at: "larvae",
    line: "rows: {larvae",
    says: ["is the name of a cell"],
  },
  {
    what: "the turning value hidden by a parameter",
    text: LARVAE.replace("beta: 1", "beta: 1\ns0: 3") + cell("profile w", "of: larvae", "s: [0, s0]"),
    at: "[0, s0]",
    line: "s: [0, s0]",
    says: ["`s0` is the name of a parameter"],
  },
  {
    what: "a column that shadows a parameter",
    text: LARVAE + cell("table t", "rows: {n: 1 to 3}", "columns: {mu: n}"),
    at: "mu",
    line: "columns: {mu",
    says: ["is the name of a parameter"],
  },
  {
    what: "a bound variable that shadows a parameter",
    text: LARVAE + cell("formula f", "a: sum(mu^2, mu, 1, 3)"),
    at: "sum",
    line: "a: sum",
    says: ["must be a new one"],
  },
  {
    what: "lists of unequal length",
    text: LARVAE + cell("table t", "rows:", "  n: [1, 2, 3]", "  m: [1, 2]", "columns: {a: n + m}"),
    at: "rows",
    line: "rows:",
    says: ["`n` has 3 values and `m` has 2"],
  },
  {
    what: "a varied parameter given by itself",
    text: LARVAE + cell("table t", "rows: {mu: [beta, 2*mu]}", "columns: {a: larvae.decay}"),
    at: "mu",
    line: "rows: {mu",
    says: ["computed from `mu` itself"],
  },
  {
    what: "a part that a kind has not",
    text: LARVAE + cell("counts K", "of: larvae", "start: 1", "show: figures"),
    at: "figures",
    line: "show: figures",
    says: ["is not a part of a counts cell", "`none`"],
  },
  {
    what: "an axis given by a result",
    text: LARVAE + cell("counts K", "of: larvae", "start: 1", "axes: {x: 0 to K.mean}"),
    at: "0 to K.mean",
    line: "axes:",
    says: ["by numbers and parameters"],
  },
  {
    what: "a formula cell without formulas",
    text: LARVAE + cell("formula f", "caption: Nothing."),
    at: "```formula f",
    line: "formula f",
    says: ["at least one name"],
  },
  {
    what: "a later key read too early",
    text: LARVAE + cell("formula f", "a: b + 1", "b: 2"),
    at: "b",
    line: "a: b + 1",
    says: ["`b` is not a parameter"],
  },
  {
    what: "a number of the prose that reads nothing",
    text: `${LARVAE}\nSo :value[mu + nu] it is.\n`,
    at: "nu",
    line: "So :value",
    says: ["`nu` is not a parameter"],
  },
];

describe("each problem stands at its line, and says what is allowed", () => {
  for (const { what, text, at, line, says } of CASES) {
    test(what, () => {
      const problems = problemsOf(text);
      expect(problems.map((problem) => problem.at)).toContain(at);
      const problem = problems.find((candidate) => candidate.at === at);
      expect(problem?.line).toBe(lineOf(text, line));
      for (const words of says) expect(problem?.message).toContain(words);
    });
  }

  test("a fix, accepted as it stands, mends the paper", () => {
    const whole = `${LARVAE}${cell("counts K", "of: larvae", "start: 1")}${cell("formula f", "a: 2*beta + K.mean")}\nIt is :value[beta + K(1)].\n`;
    expect(planOf(whole).problems).toEqual([]);
    const damages: readonly [string, string][] = [
      ["counts K", "count K"],
      ["start: 1", "strat: 1"],
      ["of: larvae", "of: lavrae"],
      ["2*beta", "2*bata"],
      ["+ K.mean", "+ k.mean"],
      ["[beta +", "[bete +"],
    ];
    for (const [right, wrong] of damages) {
      const text = whole.replace(right, wrong);
      const fix = planOf(text).problems.find((problem) => problem.fix !== undefined)?.fix;
      if (fix === undefined) throw new Error(`No fix is offered for ${wrong}.`);
      expect(text.slice(0, fix.from) + fix.insert + text.slice(fix.to)).toBe(whole);
    }
  });

  test("the other cells still compute", () => {
    const text = `${LARVAE}${cell("counts K", "of: larvae", "start: -1")}${cell("counts L", "of: larvae", "start: 1")}`;
    const { outcomes, plan } = computed(text);
    expect(outcomes.get("K")).toMatchObject({ status: "failed", failure: { line: lineOf(text, "start: -1") } });
    expect(outcomes.get("L")?.status).toBe("computed");
    expect(plannedCell(plan, "K").key).toBeNull();
  });
});

describe("circles are named", () => {
  test("of parameters", () => {
    const text = cell("parameters", "a: b + 1", "b: 2*c", "c: a", "d: 1") + cell("formula f", "x: d");
    const { plan, outcomes } = computed(text);
    expect(plan.problems.some(({ message }) => message.includes("`a`, `b` and `c` need each other"))).toBe(true);
    expect(plan.parameters.map(({ name, value }) => [name, value.type])).toEqual([
      ["a", "refused"],
      ["b", "refused"],
      ["c", "refused"],
      ["d", "number"],
    ]);
    expect(outcomes.get("f")?.status).toBe("computed");
  });

  test("of cells, with their lines; what reads them waits, what does not computes", () => {
    const text =
      cell("formula f", "x: g.y") +
      cell("formula g", "y: f.x") +
      cell("formula h", "z: g.y") +
      cell("formula k", "u: 1");
    const { plan, outcomes } = computed(text);
    const named = plan.problems.filter(({ message }) => message.includes("`f` and `g` need each other (lines 2, 6)"));
    expect(named.map(({ line }) => line)).toEqual([2, 6]);
    expect(outcomes.get("f")?.status).toBe("failed");
    expect(outcomes.get("h")).toEqual({ status: "waiting", needs: ["g"] });
    expect(outcomes.get("k")?.status).toBe("computed");
  });

  test("of one alone", () => {
    expect(problemsOf(cell("formula f", "x: f.x")).map(({ message }) => message)).toContain(
      "`f` reads itself. What it is computed from must stand without it.",
    );
  });
});

test("an arbitrary text is planned without a throw", () => {
  const texts = [
    "",
    "```process\n```",
    "```counts K\n- 1\n- 2\n```",
    "```table t\nrows: 3\ncolumns: [1]\n```",
    "```parameters\na: {b: {c: 1}}\n```",
  ];
  for (const text of texts) expect(() => computed(text)).not.toThrow();
});

import { describe, expect, test } from "vitest";
import { KINDS } from "../../../app/cells/index.ts";
import { SheetReader } from "../../../app/editor/reading/sheet-reader.ts";
import { meaningAt } from "../../../app/editor/writing/meaning.ts";
import { SAMPLE, tellText } from "../sample.ts";

const reader = new SheetReader();
reader.hear(tellText(SAMPLE));
const knowledge = reader.sheet();

/** What is said where `|` stands. */
function at(marked: string) {
  const offset = marked.indexOf("|");
  const text = marked.slice(0, offset) + marked.slice(offset + 1);
  const found = meaningAt(text, offset, knowledge);
  return found && { ...found, word: text.slice(found.from, found.to) };
}

describe("What a word means", () => {
  test("a kind and a key, with what stands when it is left out", () => {
    expect(at("```cou|nts K\n```")).toMatchObject({
      term: "Counts",
      words: KINDS.get("counts")?.documentation.summary,
      word: "counts",
    });
    expect(at("```counts K\nup|_to: 3\n```")).toMatchObject({
      words: "largest n of the law, at most 100000; otherwise 100",
    });
    expect(at("```counts K\nof|: larvae")?.words).toContain("required");
    expect(at("```counts K\nnonsense|: 3")).toBeNull();
    expect(at("```parameters\nx: {value: 1, ma|x: 2}")?.words).toBe("right end of its scale");
  });

  test("what formulas read: parameters with their note, cells, members, functions", () => {
    expect(at(":value[m|u]")?.words).toBe("parameter, 1.6; drift; from 1.45 to 4 in steps of 0.05");
    expect(at("```process p\ndrift: bet|a\n```")?.words).toBe("parameter, 1");
    expect(at(":value[K.me|an]{digits=3}")).toMatchObject({ word: "K.mean", words: "E K, given that K is finite" });
    expect(at("$\\value{|K(3)}$")).toMatchObject({ term: "K(n)", words: "P(K = n), also beyond up_to" });
    expect(at("```check c\nthat: sq|rt(2) > 1")?.term).toBe("sqrt(x)");
    expect(at("```counts L\nof: larv|ae\n```")?.words).toBe("process larvae");
    expect(at(":value[un|known]")).toBeNull();
  });

  test("a parameter that is a formula says what it comes to, with its unit and as much of a range as it has", () => {
    const text =
      "```parameters\na: {value: sqrt(2), unit: m, max: 9}\nb: {value: a, min: 0, step: 1, note: the other}\n```\n";
    reader.hear(tellText(text));
    expect(reader.sheet().names.parameters.map(({ meaning }) => meaning)).toEqual([
      "parameter, sqrt(2) = 1.41421 m; up to 9",
      "parameter, a = 1.41421; the other; from 0 in steps of 1",
    ]);
  });

  test("what bears a name of the paper's own may be renamed, and nothing else", () => {
    const named = [
      ":value[m|u]",
      ":value[K.me|an]",
      "$\\value{|K(3)}$",
      "See :ref[kp|p].",
      "```counts L\nof: larv|ae\n```",
    ];
    expect(named.map((text) => at(text)?.names)).toEqual(["mu", "K", "K", "kpp", "larvae"]);
    const given = ["```cou|nts K\n```", "```counts K\nof|: larvae", ":value[sq|rt(2)]", "By :cite[kesten1978|]"];
    expect(given.map((text) => at(text)?.names)).toEqual([null, null, null, null]);
  });

  test("a parameter by its symbol in mathematics; a letter may be a variable, and words are words", () => {
    const text =
      "```parameters\nmu: 1\nx_0: {value: 2, note: start}\nb: {value: 3, symbol: '\\beta_{\\max}'}\nN: 4\n```\n";
    reader.hear(tellText(text));
    const names = reader.sheet().names;
    const term = (marked: string) => {
      const offset = marked.indexOf("|");
      return meaningAt(marked.replace("|", ""), offset, { words: knowledge.words, names })?.term ?? null;
    };
    expect(["At $\\m|u$.", "$$\ne^{-\\mu x|_0}", "$|x_{0}$", "$2\\beta_{\\m|ax}$"].map(term)).toEqual([
      "mu",
      "x_0",
      "x_0",
      "b",
    ]);
    expect(["At $N|$.", "At \\m|u.", "x|_0", "$\\mu_|1$", "$x$ x_|0"].map(term)).toEqual([
      null,
      null,
      null,
      null,
      null,
    ]);
  });

  test("the target of a reference, and a citation's entry", () => {
    expect(at("See :ref[K|].")).toMatchObject({ term: "Figure 1", words: "The law of $K$." });
    expect(at("By :ref[kp|p]")?.term).toBe("Equation (1)");
    expect(at("By :cite[none, kesten1978|]")?.words).toMatch(/Kesten.*Branching.*1978/);
    expect(at("By :cite[none|]")).toBeNull();
    expect(at("Plain wo|rds with mu.")).toBeNull();
  });
});

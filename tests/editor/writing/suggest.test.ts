import { describe, expect, test } from "vitest";
import { KINDS } from "../../../app/cells/index.ts";
import type { Knowledge } from "../../../app/editor/model/knowledge.ts";
import { SheetReader } from "../../../app/editor/reading/sheet-reader.ts";
import { suggestionsAt } from "../../../app/editor/writing/suggest.ts";
import { TEX_ENVIRONMENTS, TEX_WORDS } from "../../../app/editor/writing/tex-words.ts";
import { renderMath } from "../../../app/ui/math.ts";
import { SAMPLE, tellText } from "../sample.ts";

const reader = new SheetReader();
reader.hear(
  tellText(`${SAMPLE}
\`\`\`formula both
twice: 2*K.mean
half: 1/2
\`\`\`

\`\`\`table law
rows: {n: [0, 1]}
columns:
  exact: K(n)
\`\`\`
`),
);
const knowledge: Knowledge = reader.sheet();

/** What is suggested where `|` stands. */
function at(marked: string) {
  const offset = marked.indexOf("|");
  const text = marked.slice(0, offset) + marked.slice(offset + 1);
  const found = suggestionsAt(text, offset, knowledge);
  return (
    found && { word: text.slice(found.from, offset), list: found.list, labels: found.list.map(({ label }) => label) }
  );
}

describe("What may be written", () => {
  test("after a fence, every kind with its summary", () => {
    const found = at("Words.\n\n```co|");
    expect(found?.word).toBe("co");
    expect(found?.labels).toEqual([...KINDS.keys()]);
    expect(found?.list.find(({ label }) => label === "counts")).toMatchObject({
      meaning: KINDS.get("counts")?.documentation.summary,
      insert: "counts ",
    });
    expect(at("```counts K\n```|")).toBeNull();
  });

  test("in a body, the keys that it has not yet", () => {
    const found = at("```counts K\nof: larvae\nst|\nup_to: 3\n```");
    expect(found?.word).toBe("st");
    expect(found?.labels).toEqual(["start", "caption", "show", "axes", "labels"]);
    expect(found?.list[0]?.meaning).toContain("required");
    expect(found?.list[0]?.insert).toBe("start: ");
    expect(at("```process p\n|\n```")?.labels).toEqual(["drift", "rate", "diffusion", "offspring", "caption", "show"]);
    expect(at("```counts K\naxes:\n  lo|")?.labels).toEqual(["x", "y", "log", "linear"]);
    expect(at("```parameters\nmu: {value: 2, m|}\n```")?.labels).toEqual([
      "min",
      "max",
      "step",
      "symbol",
      "unit",
      "note",
      "se",
    ]);
  });

  test("as a value, what the key takes", () => {
    expect(at("```counts C\nof: |\n```")?.labels).toEqual(["larvae"]);
    expect(at("```counts C\nshow: [figure, ta|\n```")).toMatchObject({
      word: "ta",
      labels: ["figure", "table", "points", "none"],
    });
    expect(at("```process p\noffspring: bi|")?.labels).toContain("ternary");
    expect(at("```sweep p\nscale: |")?.labels).toEqual(["linear", "log", "adapted"]);
    expect(at("```process p\ndrift: m|")?.labels).toEqual(expect.arrayContaining(["mu", "beta", "K", "sqrt"]));
    expect(at("```process p\ndrift: 2|")).toBeNull();
    expect(at("```counts K\ncaption: How many|")).toBeNull();
  });

  test("in a formula, names, and after a dot their members", () => {
    for (const before of [":value[", "$\\value{", "$\\value[digits=3]{", "```check c\nthat: 2 > "]) {
      expect(at(`${before}K|`)?.word).toBe("K");
      expect(at(`${before}2*larvae.de|`)).toMatchObject({ word: "de" });
      expect(at(`${before}larvae.|`)?.labels).toEqual(expect.arrayContaining(["decay", "survival"]));
    }
    expect(at(":value[K.|]")?.list.find(({ label }) => label === "above")).toMatchObject({
      insert: "above()",
      back: 1,
    });
    expect(at(":value[both.|]")?.labels).toEqual(["twice", "half"]);
    expect(at(":value[law.|]")?.labels).toEqual(["n", "exact"]);
    expect(at(":value[nothing.|]")).toBeNull();
    expect(at(":value[K(|)]")?.labels).toContain("mu");
  });

  test("in a formula, first the names of its own", () => {
    const own = (marked: string) => {
      const all = at(marked)?.list ?? [];
      const first = all.findIndex(({ label }) => label === "mu");
      return all.slice(0, first).map(({ label, meaning }) => `${label}: ${meaning}`);
    };
    expect(own(":value[sum(K(|), m, 0, 5)]")).toEqual(["m: the variable of sum"]);
    expect(own(":value[integral(2*|, x, 0, 1)]")).toEqual(["x: the variable of integral"]);
    expect(own(":value[sum(integral(|, x, 0, n), n, 0, 5)]")).toEqual([
      "x: the variable of integral",
      "n: the variable of sum",
    ]);
    // The variable is not written yet: the letter of the definition.
    expect(own("```check c\nthat: sum(K(|")).toEqual(["n: the variable of sum"]);
    // Beyond the body of the sum its variable means nothing.
    expect(own(":value[sum(K(m), m, 0, |)]")).toEqual([]);
    expect(own(":value[sum(K(m), m, 0, 5) + |]")).toEqual([]);
    expect(own("```table t\nrows: {j: 1 to 3}\ncolumns:\n  a: K(|)\n```")).toEqual(["j: named by rows"]);
    expect(own("```sweep s\nover:\n  y: 0 to 1\nvary: {mu: [1, 2]}\nrecord: {a: |}\n```")).toEqual([
      "y: named by over",
    ]);
    expect(own("```formula f\none: 1\ntwo: 2*|\nthree: 3\n```")).toEqual(["one: named above"]);
    expect(own("```parameters\na: 1\nb: 2*|\n```")).toEqual([]);
  });

  test("nothing where a variable is being named", () => {
    expect(at(":value[sum(K(n), |")).toBeNull();
    expect(at(":value[sum(K(n), m|, 0, 5)]")).toBeNull();
    expect(at(":value[choose(5, m|)]")?.labels).toContain("mu");
  });

  test("keys that its own map has are not offered again, those of another map are", () => {
    expect(at("```parameters\nmu: {value: 2, m|, max: 3, note: a}\n```")?.labels).toEqual([
      "min",
      "step",
      "symbol",
      "unit",
      "se",
    ]);
    expect(at("```counts K\naxes:\n  x: 0 to 1\n  |\nlabels:\n  y: p\n```")?.labels).toEqual(["y", "log", "linear"]);
    expect(at("```counts K\n|\nof: larvae\nstart: 1\n```")?.labels).toEqual([
      "up_to",
      "caption",
      "show",
      "axes",
      "labels",
    ]);
  });

  test("in braces, attributes", () => {
    expect(at(":value[K.mean]{|}")?.labels).toContain("digits=6");
    expect(at(":value[K.mean]{digits=6 a|}")).toMatchObject({ word: "a" });
    expect(at("$\\value[di|")?.labels).toContain("decimals=3");
    expect(at(":cite[kesten1978]{|}")?.labels).toEqual(["at", "as=text"]);
  });

  test("surroundings, labels, citations and the directives themselves", () => {
    expect(at(":::th|")).toMatchObject({ word: "th", labels: expect.arrayContaining(["theorem", "proof"]) });
    const labels = at("See :ref[k|")?.list ?? [];
    expect(labels.map(({ label }) => label).sort()).toEqual(["K", "kpp", "law", "model", "shift"]);
    expect(labels.find(({ label }) => label === "K")?.meaning).toBe("Figure 1: The law of $K$.");
    expect(labels.find(({ label }) => label === "kpp")?.meaning).toBe("equation (1): $w'' + \\mu w' = \\value{mu}$");
    expect(labels.find(({ label }) => label === "model")?.meaning).toBe("Section 1: Model");
    expect(labels.find(({ label }) => label === "shift")?.meaning).toBe("Theorem 1.1: Shift");
    expect(at(":cite[kesten1978, ke|]")).toMatchObject({ word: "ke", labels: ["kesten1978"] });
    expect(at("As :re|")?.labels).toEqual(["value", "ref", "cite"]);
    expect(at("at 12:30|")).toBeNull();
    expect(at("Plain words|")).toBeNull();
  });

  test("commands after a backslash, in mathematics alone", () => {
    expect(at("The $\\al|")?.word).toBe("\\al");
    expect(at("The $x$ \\al|")).toBeNull();
    expect(at("$$\nx = \\fr|\n$$")?.list.find(({ label }) => label === "\\frac")).toMatchObject({
      insert: "\\frac{}{}",
      back: 3,
    });
    expect(at("$$\\begin{|")?.labels).toContain("aligned");
    expect(at("```parameters\nmu: {value: 1, symbol: \\m|}\n```")?.labels).toContain("\\mu");
  });

  test("every command that is offered can be set", () => {
    for (const { label, insert } of TEX_WORDS) {
      if (["\\value", "\\label", "\\begin"].includes(label)) continue;
      const filled = insert.replace("( ", "(x").replaceAll("{}", "{x}");
      const tex = ["\\lfloor", "\\lceil", "\\langle"].includes(label) ? `${filled} x` : filled;
      expect(renderMath(tex, true), label).not.toContain("‡");
    }
    for (const { name } of TEX_ENVIRONMENTS) {
      const columns = name === "array" ? "{c}" : "";
      expect(renderMath(`\\begin{${name}}${columns} x \\end{${name}}`, true), name).not.toContain("‡");
    }
  });

  test("in a long paper as in a short one", () => {
    const long = `${SAMPLE}${"Words and $x$ and words. ".repeat(8000)}\n\nSee :ref[`;
    expect(long.length).toBeGreaterThan(200_000);
    expect(suggestionsAt(long, long.length, knowledge)?.list.length).toBeGreaterThan(3);
  });
});

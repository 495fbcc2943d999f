import { describe, expect, test } from "vitest";
import { outlineOf, proseWords } from "../../../app/editor/finding/outline.ts";
import { readPaper } from "../../../app/paper/index.ts";
import { SAMPLE } from "../sample.ts";

const wordsOf = (runs: ReturnType<typeof outlineOf>[number]["runs"]) =>
  runs.map((run) => (run.run === "text" ? run.text : run.run === "math" ? `$${run.tex}$` : "")).join("");

describe("the outline", () => {
  test("has sections, theorems and figures with their numbers, at their lines and in their order", () => {
    const entries = outlineOf(readPaper(SAMPLE, ""));
    expect(entries.map(({ level, number, runs }) => [level, number, wordsOf(runs)])).toEqual([
      [1, "1", "Model"],
      [2, "Theorem 1.1", "Shift"],
      [2, "Figure 1", "The law of $K$."],
    ]);
    for (const { from, line } of entries) expect(SAMPLE.slice(0, from).split("\n")).toHaveLength(line);
    expect(SAMPLE.slice(entries[0]?.from ?? 0)).toMatch(/^## Model/);
    expect(SAMPLE.slice(entries[2]?.from ?? 0)).toMatch(/^```counts K/);
  });

  test("subsections stand deeper, a proof has no number and no entry, what stands in a list is found", () => {
    const text = "## A\n\n### B\n\n:::proof\nx\n:::\n\n:::remark[R]\ny\n:::\n\n## C with *stress*\n";
    expect(outlineOf(readPaper(text, "")).map(({ level, number, runs }) => [level, number, wordsOf(runs)])).toEqual([
      [1, "1", "A"],
      [2, "1.1", "B"],
      [3, "Remark 1.1", "R"],
      [1, "2", "C with stress"],
    ]);
  });

  test("long captions are cut at a word", () => {
    const text = `\`\`\`process P\ndrift: 2\nrate: 1\n\`\`\`\n\n\`\`\`profile w\nof: P\ncaption: ${"word ".repeat(60)}\n\`\`\`\n`;
    const entries = outlineOf(readPaper(text, ""));
    expect(entries).toHaveLength(1);
    expect(wordsOf(entries[0]?.runs ?? [])).toMatch(/^(word )+…$/);
    expect(wordsOf(entries[0]?.runs ?? []).length).toBeLessThanOrEqual(92);
  });

  test("an empty paper has none", () => {
    expect(outlineOf(readPaper("Only words.\n", ""))).toEqual([]);
  });
});

describe("words of prose", () => {
  test("are counted without formulas, numbers, workings, comments and marks", () => {
    const text =
      "## Two words\n\nThe mean-field front, $w(x)$, doesn't :value[1+1] stop <!-- or so --> **here**.\n\n```process P\ndrift: 2\nrate: 1\ncaption: not counted, as it prints nothing\n```\n";
    // Two words; The mean-field front doesn't stop here
    expect(proseWords(readPaper(text.replace(/caption:.*\n/, ""), ""))).toBe(2 + 6);
  });

  test("title, abstract, captions and titles of theorems count", () => {
    const text =
      "---\ntitle: A title\nabstract: Two words.\n---\n\n:::lemma[Its name]\nIt holds.\n:::\n\n```table t\nrows: {i: [1]}\ncolumns: {a: i}\ncaption: Three more words.\n```\n";
    expect(proseWords(readPaper(text, ""))).toBe(2 + 2 + 2 + 2 + 3);
  });
});

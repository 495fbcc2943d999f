import { describe, expect, test } from "vitest";
import type { Cell, Paper, Yaml } from "../../app/paper/index.ts";
import { readPaper } from "../../app/paper/index.ts";

function firstCell(text: string): { paper: Paper; cell: Cell } {
  const paper = readPaper(text, "");
  const cell = paper.cells[0];
  if (cell === undefined) throw new Error("The text has no cell.");
  return { paper, cell };
}

/** A body as plain values, for comparison. */
function plain(node: Yaml | null): unknown {
  if (node === null) return null;
  if (node.yaml === "scalar") return node.text;
  if (node.yaml === "list") return node.items.map(plain);
  return Object.fromEntries(node.entries.map((entry) => [entry.key, plain(entry.value)]));
}

describe("what is a cell", () => {
  test("kind and name come from the info string, the body stands at its place", () => {
    const text = "One.\n\n```counts K\nof: larvae\nstart: 1\n```\n\nTwo.\n";
    const { paper, cell } = firstCell(text);
    expect(paper.problems).toEqual([]);
    expect(cell).toMatchObject({ id: "K", slot: "K", kind: "counts", name: "K" });
    expect(cell.span).toEqual({ from: 6, to: text.indexOf("\n\nTwo"), line: 3, lastLine: 6 });
    expect(text.slice(cell.bodyFrom, cell.bodyTo)).toBe("of: larvae\nstart: 1\n");
    expect(plain(cell.body)).toEqual({ of: "larvae", start: "1" });
    const start = cell.body?.entries[1];
    expect(start).toMatchObject({ key: "start", line: 5 });
    expect(text.slice(start?.keyFrom, start?.keyTo)).toBe("start");
    expect(text.slice(start?.value.from, start?.value.to)).toBe("1");
  });

  test("unnamed cells are told apart by line, and by their order for what stays", () => {
    const paper = readPaper("```parameters\na: 1\n```\n\n```parameters\nb: 2\n```\n", "");
    expect(paper.cells.map(({ id, slot, name }) => [id, slot, name])).toEqual([
      ["parameters@1", "parameters#1", null],
      ["parameters@5", "parameters#2", null],
    ]);
  });

  test("a second cell of one name keeps its name and has an id of its own", () => {
    const paper = readPaper("```counts K\nof: a\n```\n\n```counts K\nof: b\n```\n", "");
    expect(paper.cells.map(({ id, slot, name }) => [id, slot, name])).toEqual([
      ["K", "K", "K"],
      ["counts@5", "counts#1", "K"],
    ]);
  });

  test("two words are a cell even of an unknown kind; one foreign word, or attributes, are plain code", () => {
    const text =
      "```pyton K\na: 1\n```\n\n```python\nx = 1\n```\n\n```js {1,3}\nx\n```\n\n    counts K\n\n```\nx\n```\n";
    const paper = readPaper(text, "");
    expect(paper.cells.map((cell) => cell.kind)).toEqual(["pyton"]);
    expect(paper.problems).toEqual([]);
  });

  test("one word that is nearly a kind is plain code with a warning and a fix", () => {
    const paper = readPaper("```paramters\na: 1\n```\n", "");
    expect(paper.cells).toEqual([]);
    expect(paper.problems).toMatchObject([
      { line: 1, severity: "warning", fix: { from: 3, to: 12, insert: "parameters" } },
    ]);
  });

  test("a name that cannot be one is reported where it stands", () => {
    const text = "```counts 2K\nof: a\n```\n";
    const { paper, cell } = firstCell(text);
    expect(cell.name).toBeNull();
    expect(paper.problems).toMatchObject([{ from: 10, to: 12, line: 1, cell: "counts@1" }]);
    expect(paper.problems[0]?.message).toContain("begins with a letter");
  });

  test("a cell that nothing closes is reported and still read", () => {
    const { paper, cell } = firstCell("```counts K\nof: a\n");
    expect(plain(cell.body)).toEqual({ of: "a" });
    expect(paper.problems[0]?.message).toContain("not closed");
  });

  test("in a list the body's offsets are still those of the text", () => {
    const text = "- item\n\n  ```counts K\n  of: larvae\n  start: [1,\n    2]\n  ```\n";
    const { paper, cell } = firstCell(text);
    expect(paper.problems).toEqual([]);
    expect(plain(cell.body)).toEqual({ of: "larvae", start: ["1", "2"] });
    for (const entry of cell.body?.entries ?? []) expect(text.slice(entry.keyFrom, entry.keyTo)).toBe(entry.key);
    expect(cell.body?.entries[1]?.line).toBe(5);
  });

  test("an empty body has no entries; a body that is no mapping is refused", () => {
    expect(firstCell("```check c\n```\n").cell.body?.entries).toEqual([]);
    const { paper, cell } = firstCell("```check c\nmean > 1\n```\n");
    expect(cell.body).toBeNull();
    expect(paper.problems).toMatchObject([{ line: 2, cell: "c" }]);
  });

  test("scalars keep their characters: the failsafe schema", () => {
    const { cell } = firstCell(
      "```parameters\na: 60E05\nb: no\nc: 010\nd: 1_000\ne: null\nf: ~\ng: 2024-01-01\nh:\n```\n",
    );
    const expected = { a: "60E05", b: "no", c: "010", d: "1_000", e: "null", f: "~", g: "2024-01-01", h: "" };
    expect(plain(cell.body)).toEqual(expected);
  });
});

describe("traps of YAML are reported as such, with what to write instead", () => {
  const traps: [name: string, line: string, message: RegExp, insert: string][] = [
    ["comma in a list", "start: [max(a, b) + 1, d]", /cuts this formula at its comma/, "'max(a, b) + 1'"],
    ["comma in a map", "record: {f: max(a, b), g: 2}", /cuts this formula at its comma/, "'max(a, b)'"],
    ["colon", "caption: The law: how it falls", /cuts this text at “: ”/, "'The law: how it falls'"],
    ["comment in a formula", "that: max(a #b, c)", /“ #”/, "'max(a #b, c)'"],
    ["comment in a caption", "caption: Case #2 of it's kind", /“ #”/, "'Case #2 of it''s kind'"],
    ["comment for a value", "symbol: #1", /comment/, "'#1'"],
    ["star", "that: *a", /leading \* for an alias/, "'*a'"],
    ["minus and space", "that: - mu", /leading - for an item/, "'- mu'"],
    ["brace", "that: {a} + b", /leading \{ for a map/, "'{a} + b'"],
    ["bracket", "caption: [here](https://a.b) it is", /leading \[ for a list/, "'[here](https://a.b) it is'"],
    ["percent", "that: %a", /leading %/, "'%a'"],
    ["at sign", "that: @a", /leading @/, "'@a'"],
    ["backtick", "caption: `a` is", /leading `/, "'`a` is'"],
    ["bar", "that: |a| < 3", /leading \|/, "'|a| < 3'"],
    ["greater", "that: > 3", /leading >/, "'> 3'"],
    ["quotation", 'caption: "A" and b', /leading "/, `'"A" and b'`],
    ["TeX in double quotes that fails", 'symbol: "\\mu"', /single quotes/, "'\\mu'"],
    ["TeX in double quotes that does not", 'symbol: "\\nu"', /reads \\n as an escape/, "'\\nu'"],
  ];
  for (const [name, line, message, insert] of traps) {
    test(name, () => {
      const text = `Prose.\n\n\`\`\`check c\nbecause: all is well\n${line}\n\`\`\`\n`;
      const { paper, cell } = firstCell(text);
      expect(cell.body).toBeNull();
      expect(paper.problems).toHaveLength(1);
      const problem = paper.problems[0];
      expect(problem).toMatchObject({ line: 5, cell: "c", severity: "error", fix: { insert } });
      expect(problem?.message).toMatch(message);
      const fix = problem?.fix;
      if (fix === undefined) throw new Error("no fix");
      const cured = readPaper(text.slice(0, fix.from) + fix.insert + text.slice(fix.to), "");
      expect(cured.problems).toEqual([]);
      expect(cured.cells[0]?.body?.entries).toHaveLength(2);
    });
  }

  const mistakes: [name: string, body: string, line: number, message: RegExp][] = [
    ["a key twice", "a: 1\nb: 2\na: 3", 4, /“a” is given twice here.* first in line 2/],
    ["a tab", "a:\n\tb: 1", 3, /tab is not allowed/],
    ["an anchor", "a: &x y", 2, /Anchors/],
    ["a tag", "a: !foo x", 2, /Tags/],
    ["a standard tag", "a: !!str x", 2, /Tags/],
    ["an alias", "a: [*x, y]", 2, /alias/],
    ["a list as a key", "[a]: b", 2, /plain word/],
    ["a question mark", "? a\n: b", 2, /plain word/],
    ["an unclosed list", "a: [1", 2, /leading \[|not closed/],
    ["two documents", "a: 1\n---\nb: 2", 3, /leave it out/],
    ["depth beyond reason", `a: ${"[".repeat(2000)}`, 2, /nested too deeply/],
  ];
  for (const [name, body, line, message] of mistakes) {
    test(name, () => {
      const { paper, cell } = firstCell(`\`\`\`check c\n${body}\n\`\`\`\n`);
      expect(cell.body).toBeNull();
      expect(paper.problems[0]?.message).toMatch(message);
      expect(paper.problems[0]?.line).toBe(line);
    });
  }

  test("plain comments, trailing commas and several lines are no problem", () => {
    const { paper, cell } = firstCell(
      "```check c\n# why\nthat: a < b # a remark\nx: [1, 2,]\ny: |\n  max(a, b)\nz: a +\n  b\n```\n",
    );
    expect(paper.problems).toEqual([]);
    expect(plain(cell.body)).toEqual({ that: "a < b", x: ["1", "2"], y: "max(a, b)\n", z: "a + b" });
  });
});

test("a caption is read in its place: numbers, math and references are the paper's", () => {
  const text = '```counts K\nof: a\ncaption: "The law $p_n$ for :value[mu*2], see :ref[K]"\n```\n';
  const paper = readPaper(text, "");
  const node = paper.root.children[0];
  if (node?.type !== "cell") throw new Error("no cell");
  expect(node.caption.map((part) => part.type)).toEqual([
    "text",
    "inlineMath",
    "text",
    "boundNumber",
    "text",
    "reference",
  ]);
  expect(paper.numbers).toMatchObject([{ formula: "mu*2", formulaFrom: text.indexOf("mu*2"), span: { line: 3 } }]);
  expect(node.caption.at(-1)).toMatchObject({ target: { noun: "Figure", number: "1" } });
});

import fc from "fast-check";
import type { Nodes } from "mdast";
import { describe, expect, test } from "vitest";
import type { Cell, Paper, PaperNode, Yaml } from "../../app/paper/index.ts";
import { plainText, readInline, readPaper, walk } from "../../app/paper/index.ts";
import { readParsed } from "../../app/paper/read.ts";
import { parseTree } from "../../app/paper/syntax/tree.ts";
import { bibliography, samplePaper } from "./sample-paper.ts";

const { text: sample } = samplePaper(3000);

/** Pieces that mean something in the language, in any order: more telling than arbitrary characters. */
const telling = fc.array(
  fc.oneof(
    fc.constantFrom(
      ..."$ $$ : ::: ```counts|K\n ``` ~~~ --- \n \n\n <!-- --> [ ] ( ) { } * _ ` | # > - 1. \\ {#a} :ref[ :value[ :cite[ ]{at=".split(
        " ",
      ),
      ":::theorem[A]{#a}\n",
      ":::proof\n",
      "\n:::\n",
      "```counts K\nof: a\n```\n",
      "\n$$\nx \\label{a}\n$$\n",
      "\\value{K(3)}",
      "\n    ",
      "\t",
      "\r\n",
      "[^n]",
      "\n[^n]: ",
      "\n[a]: https://b.c\n",
      "caption: ",
      "|-|-|\n",
      " ",
      "a",
    ),
    fc.string({ maxLength: 3, unit: "binary" }),
  ),
  { maxLength: 40 },
);
const anyText = fc.oneof(
  telling.map((parts) => parts.join("")),
  fc.string({ maxLength: 60, unit: "binary" }),
);

/** The sample with stretches taken out and others put in. */
const changed = fc
  .array(fc.tuple(fc.nat(sample.length), fc.nat(40), anyText), { minLength: 1, maxLength: 4 })
  .map((changes) =>
    changes.reduce((text, [at, length, insert]) => text.slice(0, at) + insert + text.slice(at + length), sample),
  );

const papers = fc.oneof(anyText, changed);

function expectSound(paper: Paper): void {
  const { text } = paper;
  const inside = (from: number, to: number, length = text.length) => {
    expect(from).toBeGreaterThanOrEqual(0);
    expect(to).toBeGreaterThanOrEqual(from);
    expect(to).toBeLessThanOrEqual(length);
  };
  for (const { from, to, line, where, fix } of paper.problems) {
    const length = where === "bibliography" ? Number.MAX_SAFE_INTEGER : text.length;
    inside(from, to, length);
    if (fix !== undefined) inside(fix.from, fix.to, length);
    if (where === undefined) expect(line).toBe(text.slice(0, from).split(/\r\n?|\n/).length);
  }
  const ids = new Set<string>();
  for (const cell of paper.cells) {
    inside(cell.span.from, cell.span.to);
    inside(cell.bodyFrom, cell.bodyTo);
    expect(ids.has(cell.id)).toBe(false);
    ids.add(cell.id);
    if (cell.body !== null) expectYamlInside(cell.body, inside);
  }
  expect(new Set(paper.numbers.map((number) => number.id)).size).toBe(paper.numbers.length);
  for (const number of paper.numbers) inside(number.span.from, number.span.to);
  walk(paper.root.children, (node) => expectKnown(node, inside));
  expect(() => plainText(paper.root.children)).not.toThrow();
}

function expectYamlInside(node: Yaml, inside: (from: number, to: number) => void): void {
  inside(node.from, node.to);
  if (node.yaml === "list") for (const item of node.items) expectYamlInside(item, inside);
  if (node.yaml === "map") {
    for (const entry of node.entries) {
      inside(entry.keyFrom, entry.keyTo);
      expectYamlInside(entry.value, inside);
    }
  }
}

const knownTypes =
  "blockquote break cell code emphasis environment footnoteDefinition footnoteReference heading image inlineCode inlineMath link list listItem math paragraph strong table tableCell tableRow text thematicBreak reference citation boundNumber".split(
    " ",
  );

function expectKnown(node: PaperNode, inside: (from: number, to: number) => void): void {
  expect(knownTypes).toContain(node.type);
  if (node.position !== undefined) inside(node.position.start.offset ?? -1, node.position.end.offset ?? -1);
  if (node.type === "link") expect(node.url).toMatch(/^(https?:|mailto:)/i);
}

const patience = { timeout: 120_000 };

describe("any text whatsoever gives a paper", patience, () => {
  test("with every position within it", () => {
    fc.assert(
      fc.property(papers, anyText, (text, bibtex) => expectSound(readPaper(text, bibtex))),
      { numRuns: 150 },
    );
  });

  test("a number's formula stands where it says, unless it goes over lines", () => {
    fc.assert(
      fc.property(changed, (text) => {
        for (const { formula, formulaFrom, span } of readPaper(text, "").numbers) {
          if (span.line !== span.lastLine || text.includes("\0")) continue;
          expect(text.slice(formulaFrom, formulaFrom + formula.length)).toBe(formula);
        }
      }),
      { numRuns: 80 },
    );
  });

  test("reading again gives the same", () => {
    fc.assert(
      fc.property(papers, (text) => {
        const first = structuredClone(readPaper(text, bibliography));
        expect(readPaper(text, bibliography)).toEqual(first);
      }),
      { numRuns: 100 },
    );
  });

  test("captions and titles too", () => {
    fc.assert(
      fc.property(anyText, (text) => {
        for (const node of readInline(text, 0)) expect(knownTypes).toContain(node.type);
      }),
      { numRuns: 150 },
    );
  });
});

/** A cell without its end: blank lines at the end of an unclosed one may be counted to it or not. */
function heart({ id, slot, kind, name, body }: Cell): unknown {
  return { id, slot, kind, name, entries: body?.entries };
}

describe("texts made to exhaust the reader give a paper all the same", patience, () => {
  const hostile: Record<string, string> = {
    quotes: ">".repeat(3000),
    "lists in a line": "- ".repeat(3000),
    "nested lists": Array.from({ length: 300 }, (_, depth) => `${" ".repeat(depth * 2)}- x`).join("\n"),
    emphasis: "*a ".repeat(1000) + "b* ".repeat(1000),
    strong: `${"**".repeat(1500)}a${"**".repeat(1500)}`,
    brackets: "[".repeat(3000),
    links: "[a](".repeat(1500),
    surroundings: ":::proof\n".repeat(500) + ":::\n".repeat(500),
    comments: "<!--\n".repeat(2000),
    "open numbers": ":value[".repeat(2000),
    dollars: "$$ a ".repeat(2000),
    "YAML brackets": `\`\`\`check c\na: ${"[".repeat(20000)}\n\`\`\``,
    "YAML lists": `\`\`\`check c\n${"- ".repeat(20000)}\n\`\`\``,
    "YAML indents": `\`\`\`check c\n${Array.from({ length: 300 }, (_, depth) => `${" ".repeat(depth)}a:`).join("\n")}\n\`\`\``,
  };
  for (const [name, text] of Object.entries(hostile)) test(name, () => expectSound(readPaper(text, text)));
});

/** Types and words, with neighbouring texts joined: how brackets that are no reference are cut does not matter. */
function gist(nodes: readonly Nodes[]): unknown[] {
  const parts: unknown[] = [];
  for (const node of nodes) {
    const last = parts.at(-1);
    if (node.type === "text") {
      if (typeof last === "string") parts[parts.length - 1] = last + node.value;
      else parts.push(node.value);
    } else if ("children" in node) parts.push({ [node.type]: gist(node.children) });
    else if (node.type === "cell") parts.push(heart(node.cell));
    else if ("value" in node) parts.push({ [node.type]: node.value.trimEnd() });
    else parts.push({ ...node, position: undefined });
  }
  return parts;
}

test("parsing in pieces gives what parsing the whole text gives", patience, () => {
  const body = sample.slice(sample.indexOf("## Section 1"));
  const texts = fc.oneof(
    fc.array(telling, { maxLength: 6 }).map((lists) => lists.map((parts) => parts.join("")).join("\n\n")),
    fc
      .array(fc.tuple(fc.nat(body.length), fc.nat(40), anyText), { minLength: 1, maxLength: 4 })
      .map((changes) =>
        changes.reduce((text, [at, length, insert]) => text.slice(0, at) + insert + text.slice(at + length), body),
      ),
  );
  fc.assert(
    fc.property(texts, (text) => {
      fc.pre(!/^\uFEFF?---/.test(text));
      const inPieces = readPaper(text, "");
      const whole = readParsed(text, "", parseTree(text));
      expect(gist(inPieces.root.children)).toEqual(gist(whole.root.children));
      expect(inPieces.cells.map(heart)).toEqual(whole.cells.map(heart));
      expect(inPieces.numbers).toEqual(whole.numbers);
    }),
    { numRuns: 150 },
  );
});

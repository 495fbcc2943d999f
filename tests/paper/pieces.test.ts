import type { Root } from "mdast";
import { describe, expect, test } from "vitest";
import { parseBlocks } from "../../app/paper/syntax/index.ts";
import { parseTree } from "../../app/paper/syntax/tree.ts";
import { samplePaper } from "./sample-paper.ts";

/** Parsing in pieces is an optimisation: the tree is that of parsing the whole text at once (an independent path). */
function expectSameTree(text: string): void {
  const whole: Root = parseTree(text);
  expect(parseBlocks(text).children).toEqual(whole.children);
}

const texts: Record<string, string> = {
  "paragraphs and headings": "a\n\nb\nc\n\n# d\ne\n\n\nf\n===\n",
  "loose lists": "- a\n\n- b\n\n  c\n\nd\n\n1. e\n\n2. f\n\n* g\n",
  "a list that ends": "- a\n\n      code\n\nb\n\n    indented\n\n  still\n",
  "fences with blank lines": "```\na\n\nb\n```\n\n~~~ x\n\n```\n\n~~~\n\nc",
  "an unclosed fence": "a\n\n``` x\n\nb\n\nc",
  "a false fence": "``` a`b\n\nc\n\n```\nd\n\ne\n```\n",
  "a fence in a list": "- a\n\n  ```\n  b\n\n  c\n  ```\n\nd\n",
  "a fence in a quote": "> ```\n> a\n\nb\n\nc\n",
  "comments with blank lines": "a\n\n<!-- b\n\nc\n\n-->\n\nd\n\n<!-- e -->\nf\n\n<!-- g\n\nh",
  "a comment with words after it": "<!-- a\n\nb --> c\n\nd\n\n```\ne\n\nf\n```\n",
  "a fence inside a comment": "<!--\n```\n-->\n\na\n\n```\nb\n\nc\n```\n",
  "references far from definitions":
    "[a] and [B c][b  C] and [^n] and [d]\n\n[^n]: note\n\n    more\n\n[b c]: https://x.y\n\n[a]: u 't'\n",
  "definitions in quotes": "see [q]\n\n> [q]: https://q.q\n\n[q] again\n",
  tables: "| a | b |\n|---|---|\n| $x$ | :value[K(3)] |\n\n| c |\n|-|\n\nd\n",
  displays: "$$\na\n$$\n\n$$\nb\n\nc $$\n\nd\n$$ e $$\nf\n",
  environments: ":::theorem[A]{#a}\nb\n\n:::\n\n:::proof\n\nc\n:::\nd\n",
  "carriage returns": "a\r\n\r\n```\r\nb\r\n\r\nc\r\n```\r\n\r\n- d\r\n\r\n- e\r\n\r\nf\r\n",
  "thematic breaks": "a\n\n---\n\nb\n\n---\nc\n",
};

describe("a text parsed in pieces has the tree of the whole", () => {
  for (const [name, text] of Object.entries(texts)) test(name, () => expectSameTree(text));

  test("a sample paper without its front matter", () => {
    const { text } = samplePaper(6000);
    expectSameTree(text.slice(text.indexOf("## Section 1")));
  });
});

test("a tree is the caller's to change: reading again gives the same", () => {
  const text = "a :value[K(3)] b\n\n[c](https://d.e)\n";
  const before = structuredClone(parseBlocks(text));
  const tree = parseBlocks(text);
  for (const child of tree.children) if ("children" in child) child.children.length = 0;
  expect(parseBlocks(text)).toEqual(before);
});

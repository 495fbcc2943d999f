import { describe, expect, test } from "vitest";
import { citationText, readInline, readPaper, referenceText, walk } from "../../app/paper/index.ts";
import { bibliography } from "./sample-paper.ts";

function targets(text: string): Record<string, string> {
  return Object.fromEntries([...readPaper(text, "").targets].map(([label, target]) => [label, referenceText(target)]));
}

function messages(text: string, bibtex = ""): string[] {
  return readPaper(text, bibtex).problems.map((problem) => problem.message);
}

describe("numbers are those that amsthm and the article class print (computed by hand)", () => {
  test("sections from the least depth; surroundings share a counter within each section", () => {
    const text = `:::remark{#r}
:::

## One {#one}
:::theorem{#t}
:::proof
:::
:::
:::definition{#d}
:::
### Sub {#sub}
:::lemma{#l}
:::
## Two
### Sub {#sub2}
#### Subsub {#subsub}
:::corollary{#c}
:::
`;
    expect(targets(text)).toEqual({
      r: "Remark 0.1",
      one: "Section 1",
      t: "Theorem 1.1",
      d: "Definition 1.2",
      sub: "Section 1.1",
      l: "Lemma 1.3",
      sub2: "Section 2.1",
      subsub: "Section 2.1.1",
      c: "Corollary 2.1",
    });
  });

  test("equations through the paper, only labelled ones; figures and tables each in order of the cells that print", () => {
    const text = `# A
$$ a $$
$$ b \\label{b} $$
# B
- $$ c \\label{c} $$

\`\`\`counts K
\`\`\`
\`\`\`process P
\`\`\`
\`\`\`table t
\`\`\`
\`\`\`counts J
show: [points, figure]
\`\`\`
\`\`\`counts L
show: none
\`\`\`
\`\`\`counts M
show: table
\`\`\`
\`\`\`wave W
\`\`\`
`;
    expect(targets(text)).toEqual({
      b: "equation (1)",
      c: "equation (2)",
      K: "Figure 1",
      t: "Table 1",
      J: "Figure 2",
      M: "Table 3",
      W: "Figure 3",
    });
  });

  test("a heading within a quote has no number and takes no label", () => {
    expect(messages("> # A {#a}\n")).toEqual([expect.stringContaining("has no number")]);
  });

  test("a label is taken off its heading, also after other marks", () => {
    const { root, targets: found } = readPaper("# A *b* {#c}\n\n# {#d}\n\n# E {x}\n", "");
    expect([...found.keys()]).toEqual(["c", "d"]);
    expect(root.children.map((node) => (node.type === "heading" ? node.children.length : -1))).toEqual([2, 0, 1]);
  });
});

describe("labels and references", () => {
  test("a label given twice, whatever it labels", () => {
    expect(messages("# A {#x}\n\n# B {#x}\n")).toEqual([expect.stringContaining("name of a label in line 1")]);
    expect(messages("```process x\n```\n\n$$ a \\label{x} $$\n")).toEqual([
      expect.stringContaining("name of a cell in line 1"),
    ]);
    expect(messages("# A {#1?}\n")).toEqual([expect.stringContaining("cannot be a label")]);
  });

  test("a reference to nothing names the nearest; to a silent cell says why", () => {
    expect(messages("# A {#shift}\n\n:ref[shft] :ref[zzz]\n")).toEqual([
      "Nothing that is printed is labelled “shft”. Did you mean “shift”?",
      "Nothing that is printed is labelled “zzz”.",
    ]);
    expect(messages("```process P\n```\n\n:ref[P]\n")).toEqual([expect.stringContaining("prints nothing")]);
    expect(messages(":ref[] :ref[a]{b=c}\n\n# A {#a}\n")).toEqual([
      expect.stringContaining(":ref[label]"),
      expect.stringContaining("takes no attributes"),
    ]);
  });

  test("references stand in titles, captions, notes, tables and the abstract", () => {
    const text = `---
title: On :ref[a]
abstract: As :ref[a]
---

# A :ref[a] {#a}

:::lemma[:ref[a]]
| :ref[a] |
|---|
| b[^n] |
:::

[^n]: :ref[a]

\`\`\`counts K
caption: see :ref[a]
\`\`\`
`;
    const { front, root, problems } = readPaper(text, "");
    expect(problems).toEqual([]);
    let resolved = 0;
    walk([...front.titleNodes, ...front.abstractNodes, ...root.children], (node) => {
      if (node.type === "reference" && node.target?.label === "a") resolved++;
    });
    expect(resolved).toBe(7);
  });

  test("words read on their own are resolved against the paper", () => {
    const paper = readPaper("# A {#a}\n\n:cite[kesten1978]\n", bibliography);
    const nodes = readInline("in :ref[a] by :cite[kesten1978]", 5, paper);
    expect(nodes).toMatchObject([{ value: "in " }, { target: { number: "1" } }, {}, { entries: [{ number: 1 }] }]);
    expect(nodes[1]?.position?.start).toMatchObject({ offset: 8, line: 1 });
  });
});

describe("citations", () => {
  test("keys, place and form", () => {
    const text = ':cite[kesten1978, bramson1983]{at="Theorem 1.2"} and :cite[kesten1978]{as=text}';
    const { root, problems } = readPaper(text, bibliography);
    expect(problems).toEqual([]);
    const printed: string[] = [];
    walk(root.children, (node) => {
      if (node.type === "citation") printed.push(citationText(node.entries, { as: node.as, at: node.at }));
    });
    expect(printed).toEqual(["[1, 2, Theorem 1.2]", "Kesten (1978)"]);
  });

  test("mistakes", () => {
    expect(messages(":cite[kesten1987] :cite[] :cite[kesten1978]{as=txt}", bibliography)).toEqual([
      "The bibliography has no entry “kesten1987”. Did you mean “kesten1978”?",
      expect.stringContaining("A citation names keys"),
      expect.stringContaining("Did you mean “text”?"),
    ]);
  });
});

import { describe, expect, test } from "vitest";
import { plainText, readPaper } from "../../app/paper/index.ts";

function front(yaml: string) {
  const paper = readPaper(`---\n${yaml}\n---\n\nText.\n`, "");
  return { ...paper, messages: paper.problems.map((problem) => problem.message) };
}

describe("front matter", () => {
  test("every entry", () => {
    const text = `---
title: On $K$
authors:
  - name: Ada Author
    affiliation: University of Somewhere
    email: ada@example.org
    orcid: 0000-0002-1825-0097
  - Ben Author
abstract: |
  First, :value[mu].

  Second.
keywords: [fronts, "branching, absorbed"]
msc:
  - 60E05
macros:
  \\E: \\mathbb{E}
  \\norm: '\\left\\|#1\\right\\|'
---

Text.
`;
    const paper = readPaper(text, "");
    expect(paper.problems).toEqual([]);
    expect(paper.front).toMatchObject({
      title: "On $K$",
      authors: [
        {
          name: "Ada Author",
          affiliation: "University of Somewhere",
          email: "ada@example.org",
          orcid: "0000-0002-1825-0097",
        },
        { name: "Ben Author" },
      ],
      abstract: "First, :value[mu].\n\nSecond.",
      keywords: ["fronts", "branching, absorbed"],
      msc: ["60E05"],
      macros: { "\\E": "\\mathbb{E}", "\\norm": "\\left\\|#1\\right\\|" },
    });
    expect(plainText(paper.front.titleNodes)).toBe("On K");
    expect(paper.front.abstractNodes).toHaveLength(2);
    expect(paper.numbers).toMatchObject([{ formula: "mu", formulaFrom: text.indexOf("mu"), span: { line: 10 } }]);
    expect(paper.front.span).toEqual({ from: 0, to: text.indexOf("\n\nText"), line: 1, lastLine: 19 });
  });

  test("a text without it, or with one that is not closed, has none", () => {
    expect(readPaper("Text.\n", "").front).toMatchObject({ title: "", authors: [], span: null });
    expect(readPaper("---\ntitle: A\n\nText.\n", "").front).toMatchObject({ title: "", span: null });
    expect(front("").messages).toEqual([]);
  });

  test("what could be read stays, what is wrong is said", () => {
    expect(front("title: A\nabstract: B: c").front.title).toBe("A");
    expect(front("titel: A").messages).toEqual([expect.stringContaining("Did you mean “title”?")]);
    expect(front("keywords: a, b").messages).toEqual([expect.stringContaining("are a list")]);
    expect(front("authors:\n  - nam: A").messages).toEqual([
      expect.stringContaining("Did you mean “name”?"),
      "An author needs a name.",
    ]);
    expect(front("authors:\n  - name: A\n    orcid: 0000-0002-1825-0098").messages).toEqual([
      expect.stringContaining("not an ORCID"),
    ]);
    expect(front("macros:\n  E: x").messages).toEqual([expect.stringContaining("cannot be a macro")]);
    expect(front("title: [a]").messages).toEqual(["The title is one text."]);
  });

  test("the line of a problem is the text's", () => {
    expect(front("title: A\nmsc: 60J80").problems).toMatchObject([{ line: 3, from: 18, to: 23 }]);
  });

  test("a byte order mark does not hide it", () => {
    const text = "\uFEFF---\ntitle: A\n---\n\n:value[b]\n";
    const paper = readPaper(text, "");
    expect(paper.front.title).toBe("A");
    expect(paper.numbers[0]?.formulaFrom).toBe(text.indexOf("b]"));
  });
});

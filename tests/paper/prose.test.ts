import { describe, expect, test } from "vitest";
import type { PaperNode } from "../../app/paper/index.ts";
import { mathTex, plainText, readInline, readPaper, walk } from "../../app/paper/index.ts";

/** The tree in short: types and words, without positions. */
function short(nodes: readonly PaperNode[]): unknown[] {
  return nodes.map((node) => {
    if (node.type === "boundNumber") return { value: node.number.formula };
    if (node.type === "reference") return { ref: node.label };
    if (node.type === "citation") return { cite: node.keys };
    if ("children" in node) return { [node.type]: short(node.children) };
    return "value" in node && node.type === "text" ? node.value : { [node.type]: "value" in node ? node.value : "" };
  });
}

function blocks(text: string): unknown[] {
  return short(readPaper(text, "").root.children);
}

function words(text: string): unknown[] {
  return short(readInline(text, 0));
}

describe("marks among words", () => {
  test("a formula is verbatim: stars, underscores, brackets", () => {
    expect(words("a :value[K*x_0*2]{digits=6} b")).toEqual(["a ", { value: "K*x_0*2" }, " b"]);
    expect(words(":value[f([1, 2])]")).toEqual([{ value: "f([1, 2])" }]);
    expect(words("*so :value[a*b] it is*")).toEqual([{ emphasis: ["so ", { value: "a*b" }, " it is"] }]);
  });

  test("unknown directives are plain text", () => {
    for (const text of ["at 12:30", "D:u", "a:b[c]{d}", "::value[x]", ":value", ":values[x]", "\\:value[x]", "e::f"]) {
      expect(plainText(readInline(text, 0))).toBe(text.replace("\\", ""));
      expect(words(text)).toHaveLength(1);
    }
  });

  test("dollars: mathematics where they close, else dollars", () => {
    expect(words("$5 and $6")).toEqual(["$5 and $6"]);
    expect(words("It costs $5, and $x_1$ is")).toEqual(["It costs $5, and ", { inlineMath: "x_1" }, " is"]);
    expect(words("$2x$ and $10^3$ and $1$.")).toEqual([
      { inlineMath: "2x" },
      " and ",
      { inlineMath: "10^3" },
      " and ",
      { inlineMath: "1" },
      ".",
    ]);
    expect(words("US$ and CA$ are")).toEqual(["US$ and CA$ are"]);
    expect(words("$ x $")).toEqual([{ inlineMath: " x " }]);
    expect(words("\\$5 and $a\\$b$")).toEqual(["$5 and ", { inlineMath: "a\\$b" }]);
    expect(words("`$x$` and $*a*$")).toEqual([{ inlineCode: "$x$" }, " and ", { inlineMath: "*a*" }]);
  });

  test("comments are dropped; other HTML is text", () => {
    expect(words("a <!-- b $c$ --> d")).toEqual(["a  d"]);
    expect(words("a <b>c</b> <!-- d")).toEqual(["a <b>c</b> <!-- d"]);
    expect(blocks("<div onclick='x'>\n\n<!-- a\n\nb -->\n\nc")).toEqual([
      { paragraph: ["<div onclick='x'>"] },
      { paragraph: ["c"] },
    ]);
  });

  test("attributes of numbers; what is not allowed is said with what is", () => {
    const text =
      ":value[a]{digits=6 as=scientific with=se unit=yes} :value[b]{digits=0} :value[c]{digit=3} :value[d]{as=plian}";
    const { numbers, problems } = readPaper(text, "");
    expect(numbers[0]?.options).toEqual({ digits: 6, as: "scientific", withError: true, withUnit: true });
    expect(problems.map((problem) => problem.message)).toEqual([
      "“digits” is a whole number from 1 to 15.",
      expect.stringContaining("Did you mean “digits”?"),
      expect.stringContaining("Did you mean “plain”?"),
    ]);
    for (const problem of problems) expect(text.slice(problem.from, problem.to)).toMatch(/=/);
  });

  test("a number over two lines, in a quote, keeps a formula of one line", () => {
    const { numbers, problems } = readPaper("> a :value[K(3) +\n> 1] b\n", "");
    expect(problems).toEqual([]);
    expect(numbers[0]).toMatchObject({ formulaFrom: 11, span: { line: 1, lastLine: 2 } });
    expect(numbers[0]?.formula.replace(/\s+/g, " ")).toBe("K(3) + 1");
  });

  test("nearly a mark, or an open one, is text with a word about it", () => {
    expect(readPaper("a :valeu[x] b", "").problems).toMatchObject([
      { severity: "warning", fix: { insert: "value", from: 3, to: 8 } },
    ]);
    expect(readPaper("a :value[x b", "").problems).toMatchObject([{ severity: "error", from: 2, to: 9 }]);
  });

  test("links lead to http, https, mailto and DOIs only", () => {
    const text =
      "[a](https://x.y) [b](javascript:alert(1)) [c](doi:10.1/z) [d](//evil) <mailto:a@b.c> [e](JavaScript:x) [f](data:x)";
    const { root, problems } = readPaper(text, "");
    const urls: string[] = [];
    walk(root.children, (node) => {
      if (node.type === "link") urls.push(node.url);
    });
    expect(urls).toEqual(["https://x.y", "https://doi.org/10.1/z", "mailto:a@b.c"]);
    expect(problems).toHaveLength(4);
    expect(plainText(root.children)).toContain("b");
  });

  test("link definitions are looked up; what nothing defines keeps its brackets", () => {
    expect(blocks("[a b] and [t][A  B] and [c]\n\n[A B]: https://x.y\n")).toEqual([
      { paragraph: [{ link: ["a b"] }, " and ", { link: ["t"] }, " and [c]"] },
    ]);
    const { root } = readPaper("see [q] and [t][q] and [^z]\n\n```\n[q]: x\n\n[^z]: y\n```\n", "");
    expect(plainText(root.children.slice(0, 1))).toBe("see [q] and [t][q] and [^z]");
  });

  test("an image is an uploaded file's name", () => {
    const { root, problems } = readPaper(
      "![a $x$](shore%20line.png) ![b](https://x.y/z.png) ![c](../etc/passwd) ![d](.env)",
      "",
    );
    expect(short(root.children)[0]).toMatchObject({
      paragraph: [{ image: "" }, " ", "b", " ", "c", " ", "d"],
    });
    expect(problems).toHaveLength(3);
  });
});

describe("displays", () => {
  test("on one line or several, among words or alone", () => {
    expect(blocks("a\n$$\nx\n- y\n$$\nb\n\n$$ z $$\n\nc $$w$$ d")).toEqual([
      { paragraph: ["a"] },
      { math: "\nx\n- y\n" },
      { paragraph: ["b"] },
      { math: " z " },
      { paragraph: ["c "] },
      { math: "w" },
      { paragraph: [" d"] },
    ]);
  });

  test("what goes on after a display is no new paragraph", () => {
    const { root } = readPaper("a\n$$ x $$\nb\n\n$$ y $$\n\nc", "");
    expect(root.children.map((node) => node.type === "paragraph" && node.data?.continues === true)).toEqual([
      false,
      false,
      true,
      false,
      false,
    ]);
  });

  test("a display that nothing closes swallows nothing and is reported", () => {
    const { root, problems } = readPaper("$$ x\ny\n\n# H\n", "");
    expect(root.children.map((node) => node.type)).toEqual(["paragraph", "heading"]);
    expect(problems).toMatchObject([{ from: 0, to: 2, line: 1 }]);
  });

  test("labels number displays; numbers in math are found and put in", () => {
    const text =
      "$$ a \\label{kpp} = \\value[digits=3]{K(3)} $$\n\n$$ b $$\n\n$$ c \\label{two} $$ and $\\value{x_0} \\\\label{no}$\n";
    const { root, numbers, targets, problems } = readPaper(text, "");
    expect(problems).toEqual([]);
    const display = root.children[0];
    if (display?.type !== "math") throw new Error("no display");
    expect(display.data).toMatchObject({ label: "kpp", number: "1" });
    expect(mathTex(display, () => "7.1")).toBe("a  = {7.1}");
    expect(targets.get("two")).toMatchObject({ noun: "equation", number: "2" });
    expect(numbers).toMatchObject([
      { formula: "K(3)", formulaFrom: text.indexOf("K(3)"), inMath: true, options: { digits: 3 } },
      { formula: "x_0", formulaFrom: text.indexOf("x_0") },
    ]);
  });

  test("mistakes in displays", () => {
    const say = (text: string) => readPaper(text, "").problems.map((problem) => problem.message);
    expect(say("$a \\label{x}$")).toEqual([expect.stringContaining("Only a display is numbered")]);
    expect(say("$$ \\label{x} \\label{y} $$")).toEqual([expect.stringContaining("labelled “x” already")]);
    expect(say("$$ \\value{K(3) $$")).toEqual([expect.stringContaining("braces closed")]);
    expect(say("$$ $$")).toEqual([expect.stringContaining("no formula")]);
    expect(say("# $$ x $$")).toEqual([expect.stringContaining("cannot stand here")]);
  });
});

describe("surroundings", () => {
  test("equally many colons nest; titles are read", () => {
    const { root, problems } = readPaper(
      ":::theorem[Shift by $x$]{#shift}\nA.\n\n:::proof[of Theorem :ref[shift]]\nB.\n:::\n:::\n\nC.\n",
      "",
    );
    expect(problems).toEqual([]);
    expect(short(root.children)).toEqual([
      { environment: [{ paragraph: ["A."] }, { environment: [{ paragraph: ["B."] }] }] },
      { paragraph: ["C."] },
    ]);
    const theorem = root.children[0];
    if (theorem?.type !== "environment") throw new Error("no theorem");
    expect(theorem).toMatchObject({ environment: "theorem", label: "shift", number: "0.1" });
    expect(plainText(theorem.title)).toBe("Shift by x");
    expect(theorem.position).toMatchObject({ start: { offset: 0, line: 1 }, end: { line: 7 } });
  });

  test("unknown surroundings are text, near ones with a hint, stray ends with a word", () => {
    expect(blocks("a\n:::note[b *c*]\nd\n:::\n")).toEqual([
      { paragraph: ["a"] },
      { paragraph: [":::note[b ", { emphasis: ["c"] }, "]"] },
      { paragraph: ["d"] },
      { paragraph: [":::"] },
    ]);
    expect(readPaper(":::note\nd\n:::\n", "").problems).toEqual([]);
    expect(readPaper(":::lemm\nd\n:::\n", "").problems).toMatchObject([
      { severity: "warning", fix: { insert: "lemma" } },
    ]);
    expect(readPaper("a\n\n:::\n", "").problems).toMatchObject([{ severity: "warning", line: 3 }]);
  });

  test("unclosed surroundings end before the next heading", () => {
    const { root, problems } = readPaper(":::lemma\na\n\n# H\n\nb\n", "");
    expect(short(root.children)).toEqual([
      { environment: [{ paragraph: ["a"] }] },
      { heading: ["H"] },
      { paragraph: ["b"] },
    ]);
    expect(problems).toMatchObject([{ line: 1, severity: "error" }]);
  });

  test("a title outside brackets is reported with the fix", () => {
    const text = ":::lemma Shift\na\n:::\n";
    const { problems } = readPaper(text, "");
    expect(problems[0]?.fix).toMatchObject({ insert: ":::lemma[Shift]", from: 0, to: 14 });
    expect(readPaper(":::proof{#p}\na\n:::\n", "").problems[0]?.message).toContain("no number");
  });

  test("cells and lists stand in surroundings; colons in code do nothing", () => {
    const { cells, problems, root } = readPaper(
      ":::example\n- a\n\n```check c\nthat: 1 < 2\nbecause: |\n  :::\n```\n\n:::\n",
      "",
    );
    expect(problems).toEqual([]);
    expect(cells).toHaveLength(1);
    expect(root.children).toHaveLength(1);
  });
});

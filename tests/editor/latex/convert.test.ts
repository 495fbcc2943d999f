import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { conversionWords, convertLatex } from "../../../app/editor/latex/index.ts";
import { looksLikeLatex } from "../../../app/editor/latex/look.ts";
import { readPaper } from "../../../app/paper/index.ts";

/** What LaTeX becomes, without what is around it. */
function converted(source: string, around = ""): string | undefined {
  return convertLatex(source, around)?.text;
}

/** As LaTeX typesets it by its own definition, and the paper by its language: one line for one thing that is sure. */
describe("What is sure is converted", () => {
  test.each([
    ["a section with its label", "\\section{The tail of $K$}\\label{sec:tail}", "## The tail of $K$ {#sec:tail}"],
    ["deeper ones", "\\subsection*{A}\n\\subsubsection{B}", "### A\n\n#### B"],
    ["emphases", "\\emph{a} \\textbf{b} {\\em c} {\\bf d} \\texttt{e}", "*a* **b** *c* **d** `e`"],
    ["citations", "\\cite{a,b} \\citep[Thm.~2]{a} \\citet{b}", ':cite[a, b] :cite[a]{at="Thm. 2"} :cite[b]{as=text}'],
    [
      "references, whose nouns a paper writes",
      "by Theorem~\\ref{t} and \\eqref{k}, \\S\\ref{s}",
      "by :ref[t] and :ref[k], :ref[s]",
    ],
    ["quotes and dashes", "\\emph{a} ``b'' `c' 3--7---d", "*a* “b” ‘c’ 3–7—d"],
    ["signs", "\\emph{a} 50\\% \\& \\$5 \\#1 x\\_y \\ldots", "*a* 50% & \\$5 \\#1 x\\_y …"],
    ["accents", "\\emph{P\\'olya} Erd\\H{o}s na\\\"{\\i}ve \\c{c} \\v s", "*Pólya* Erdős naïve ç š"],
    ["spaces that do not break", "\\emph{a}~b", "*a*\u00a0b"],
    ["what would mean something in a paper", "\\emph{a} 2*3*4 [x] <b>", "*a* 2\\*3\\*4 \\[x\\] \\<b>"],
    ["remarks", "\\emph{a} % see b\nc", "*a* <!-- see b -->\nc"],
    ["formulas in parentheses", "\\(x^2\\) and $y$", "$x^2$ and $y$"],
    ["displays", "\\[ x = y \\]", "$$\nx = y\n$$"],
    ["numbered ones", "\\begin{equation}\\label{k} a \\end{equation}", "$$\na\n\\label{k}\n$$"],
    [
      "aligned ones",
      "\\begin{align*} a &= b \\nonumber \\\\ c &= d \\end{align*}",
      "$$\n\\begin{aligned}\na &= b  \\\\ c &= d\n\\end{aligned}\n$$",
    ],
    ["lists", "\\begin{itemize}\\item a\n b \\item c\\end{itemize}", "- a\n  b\n- c"],
    [
      "lists in lists",
      "\\begin{enumerate}\\item a \\begin{itemize}\\item b\\end{itemize} \\item c\\end{enumerate}",
      "1. a\n   - b\n2. c",
    ],
    [
      "tables",
      "\\begin{tabular}{l|r}\\hline $n$ & law \\\\ \\hline 1 & $|x|$ \\\\ 2 & y \\end{tabular}",
      "| $n$ | law |\n| --- | ---: |\n| 1 | $\\vert x\\vert $ |\n| 2 | y |",
    ],
    ["theorems", "\\begin{thm}[Shift]\\label{s}Let $x$.\\end{thm}", ":::theorem[Shift]{#s}\nLet $x$.\n:::"],
    ["proofs", "\\begin{proof}[Proof of Theorem~\\ref{s}] a\\end{proof}", ":::proof[of :ref[s]]\na\n:::"],
    ["footnotes", "a\\footnote{b $c$}.", "a[^1].\n\n[^1]: b $c$"],
  ])("%s", (_what, source, text) => {
    expect(converted(source)).toBe(text);
  });

  test("footnotes get names that the paper has not given", () => {
    expect(converted("a\\footnote{b}", "x[^1]\n\n[^1]: y")).toBe("a[^2]\n\n[^2]: b");
  });

  test("a bar within a cell's formula ends no cell when the paper is read", () => {
    const paper = readPaper(converted("\\begin{tabular}{ll} a & b \\\\ c & $|x|$ \\end{tabular}") ?? "", "");
    expect(JSON.stringify(paper.root.children[0])).toContain('"value":"\\\\vert x\\\\vert "');
  });
});

describe("What is not sure stays as it was", () => {
  test.each([
    ["macros nobody knows, with their arguments", "\\emph{a} \\foo{b}[c]", "*a* \\foo{b}\\[c\\]", ["\\foo"]],
    [
      "figures",
      "\\emph{a}\n\n\\begin{figure}\\x{_a_}\\end{figure}",
      "*a*\n\n\\begin{figure}\\x{_a_}\\end{figure}",
      ["figure"],
    ],
    [
      "cells that span others",
      "\\emph{a}\n\n\\begin{tabular}{ll}\\multicolumn{2}{c}{x}\\\\ a & b\\end{tabular}",
      null,
      ["tabular"],
    ],
    ["rows numbered one by one", "\\emph{a}\n\n\\begin{align}a\\label{p}\\\\b\\label{q}\\end{align}", null, ["align"]],
    ["items with words of their own", "\\emph{a}\n\n\\begin{itemize}\\item[x] b\\end{itemize}", null, ["itemize"]],
    ["two remarks of one citation", "\\emph{a} \\cite[see][p.~2]{b}", "*a* \\cite[see][p.~2]{b}", ["\\cite"]],
    ["definitions", "\\newcommand{\\E}{\\mathbb{E}} \\emph{a}", "\\newcommand{\\E}{\\mathbb{E}} *a*", ["\\newcommand"]],
  ])("%s", (_what, source, text, left) => {
    const conversion = convertLatex(source, "");
    expect(conversion?.text).toBe(text ?? source.replace("\\emph{a}", "*a*"));
    expect(conversion?.left).toEqual(left);
  });

  test("and a text of the paper itself is none of LaTeX", () => {
    for (const own of [
      "See :ref[x] and \\emph{a}",
      "$$\n\\begin{aligned} a \\\\ b \\end{aligned} \\label{k}\n$$",
      "Plain words, 50% of them, in $\\text{all}$.",
      ":::theorem\n\\emph{a}\n:::",
    ]) {
      expect(looksLikeLatex(own)).toBe(false);
      expect(converted(own)).toBeUndefined();
    }
  });
});

test("it is told what was converted, what was left, and which macros the paper lacks", () => {
  const conversion = convertLatex("\\cite{a} \\cite{b} \\[ \\E x + \\R \\] \\foo", "");
  if (conversion === null) throw new Error("nothing was converted");
  expect(conversionWords(conversion, { "\\R": "\\mathbb{R}" })).toBe(
    "2 citations and 1 display were converted. As it was stays \\foo. The paper has no macro \\E: its front matter may define it.",
  );
});

test("a paper's own words survive: letters and digits of any prose, in their order", () => {
  const word = fc.stringMatching(/^[a-zA-Z0-9.,;:()*_~[\]<>`'-]{1,8}$/);
  fc.assert(
    fc.property(fc.array(word, { minLength: 1, maxLength: 6 }), (words) => {
      const text = converted(`\\emph{x} ${words.join(" ")}`) ?? "";
      expect(text.replace(/[^a-zA-Z0-9]/g, "")).toBe(`x${words.join("").replace(/[^a-zA-Z0-9]/g, "")}`);
    }),
  );
});

test("whatever is pasted, nothing throws, and what comes out is no LaTeX to convert again", () => {
  const part = fc.constantFrom(
    "\\section{",
    "}",
    "\\begin{thm}",
    "\\end{thm}",
    "\\emph{",
    "$",
    "$$",
    "\\cite[",
    "]",
    "{",
    "a",
    " ",
    "\n\n",
    "%",
    "\\item",
    "\\begin{itemize}",
    "\\end{itemize}",
    "\\begin{tabular}{ll}",
    "\\end{tabular}",
    "&",
    "\\\\",
    "\\label{",
    "\\'",
    "\\foo",
    "~",
    "``",
  );
  fc.assert(
    fc.property(fc.array(part, { maxLength: 20 }), (parts) => {
      expect(() => convertLatex(parts.join(""), "")).not.toThrow();
    }),
    { numRuns: 300 },
  );
});

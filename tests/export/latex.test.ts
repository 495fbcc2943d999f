import { describe, expect, it } from "vitest";
import { paperToLatex } from "../../app/export/index.ts";
import { BIBLIOGRAPHY, computed, EVERYTHING, NOTHING_SHOWN } from "./sample.ts";

function latexOf(text: string, bibliography = "", options = {}) {
  const { paper, plan, results } = computed(text, bibliography);
  return paperToLatex(paper, plan, results, NOTHING_SHOWN, { bibliography, ...options });
}

const mainOf = (latex: ReturnType<typeof latexOf>) => latex.files[0]?.text ?? "";

describe("a paper as LaTeX", () => {
  const latex = latexOf(EVERYTHING, BIBLIOGRAPHY);
  const main = mainOf(latex);

  it("has its text, the points of its figures and its bibliography in files of their own", () => {
    expect(latex.problems).toEqual([]);
    expect(latex.files.map((file) => file.name)).toEqual([
      "main.tex",
      "figure-1.dat",
      "figure-2.dat",
      "bibliography.bbl",
      "bibliography.bib",
    ]);
    expect(latex.files.at(-1)?.text).toBe(BIBLIOGRAPHY);
  });

  it("numbers through labels and references, and cites by key", () => {
    expect(main).toContain("\\begin{theorem}[{Shift \\& turn}]\\label{at:shift}");
    expect(main).toContain(
      "equation~\\eqref{at:kpp}, Theorem~\\ref{at:shift}, Figure~\\ref{fig:K}, Table~\\ref{tab:t}",
    );
    expect(main).toContain("\\cite[{Theorem 1.2}]{maduro}");
    expect(main).toContain("Castellane and Thorvik (2009)");
    expect(main).toContain("\\qedhere\n\\]\n\\end{proof}");
  });

  it("prints every number by its cell's result, in prose and in formulas", () => {
    const { plan, results } = computed(EVERYTHING);
    const mean = results.get("K")?.values.mean;
    expect(plan.problems).toEqual([]);
    const value = mean?.type === "number" ? mean.quantity.mantissa * 2 ** mean.quantity.exponent : Number.NaN;
    // E[K] = e^{-λx} with λ = μ + sqrt(μ² - 2β), μ = 2, β = 1, x = 1. Source: the many-to-one formula and the Laplace
    // transform of a drifting Brownian motion's hitting time (Borodin and Salminen, Handbook of Brownian Motion, 2.2.0.1).
    expect(value).toBeCloseTo(Math.exp(-(2 + Math.SQRT2)), 12);
    expect(main).toContain(`The mean is \\num{${value.toPrecision(5).replace(/0+$/, "")}`);
    expect(main).toContain(`{${value.toPrecision(3)}}`);
  });

  it("drops comments and keeps its own options", () => {
    expect(main).not.toContain("a remark to ourselves");
    const other = mainOf(latexOf(EVERYTHING, BIBLIOGRAPHY, { anonymous: true, lineNumbers: true, provenance: true }));
    expect(main).toContain("\\author{Inês Valadão}");
    expect(other).not.toContain("Valadão");
    expect(other).toContain("\\linenumbers");
    expect(other).toContain("\\footnotesize");
  });

  it("knows the paper's line of each of its own", () => {
    const lines = main.split("\n");
    const at = (words: string) => latex.lineMap(lines.findIndex((line) => line.includes(words)) + 1);
    const paperLine = (words: string) => EVERYTHING.split("\n").findIndex((line) => line.includes(words)) + 1;
    expect(at("Stop each lineage")).toBe(paperLine("Stop each lineage"));
    expect(at("and \\ref")).toBe(null);
    expect(at("The mean is")).toBe(paperLine("The mean is"));
    expect(at("Special:")).toBe(paperLine("Special:"));
    expect(at("Latin:")).toBe(paperLine("Latin:"));
    expect(at("\\newcommand{\\half}")).toBe(1);
  });

  it("keeps from print what has no value, what may not be used and what no font has, each at its line", () => {
    const problems = latexOf(
      "# A\n\nA :value[nothing.mean] here.\n\nAnd $\\input{x}$.\n\nA 🐚.\n\n:ref[nowhere] :cite[nobody]\n",
    ).problems;
    expect(problems.map(({ line }) => line)).toEqual([3, 5, 7, 9, 9]);
    expect(problems[0]?.message).toMatch(/^`nothing.mean` has no value: /);
    expect(problems[1]?.message).toBe("`\\input` cannot be used in a formula.");
    expect(problems[2]?.message).toContain("“🐚” (U+1F41A)");
  });

  it("does not let prose, titles, names, labels or files act as TeX", () => {
    const hostile = [
      "---",
      "title: \\input{/etc/passwd} $x$",
      "authors: [{name: '\\write18{id}', affiliation: '}\\input{x}'}]",
      "keywords: ['\\input{y}']",
      "msc: ['\\input{z}']",
      "abstract: \\input{a}",
      "---",
      "## \\input{b} {#a}",
      "\\input{c} and `\\input{d}` and [\\input{e}](https://x.example/\\input{f})",
      "",
      "    \\end{verbatim}\\input{g}",
      "",
      "| \\input{h} |",
      "|---|",
      "| \\\\[1ex] |",
    ].join("\n");
    const text = mainOf(latexOf(hostile));
    const after = text.slice(text.indexOf("\\begin{document}"));
    expect(after).not.toMatch(/\\(input|write)\b/);
    expect(after.match(/\\textbackslash\{\}input/g)?.length).toBeGreaterThanOrEqual(8);
  });
});

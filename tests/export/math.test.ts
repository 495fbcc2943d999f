import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { paperMacros } from "../../app/export/macros.ts";
import { mathTex } from "../../app/export/math.ts";
import { ALIGNMENTS, COMMANDS, ENVIRONMENTS, TEXT_COMMANDS } from "../../app/export/math-words.ts";

const none = new Map<string, string>();
const set = (tex: string) => mathTex(tex, none);

describe("formulas for print", () => {
  it.each([
    ["\\omega_s(x) = \\varphi(e^{-\\lambda x})", "\\omega_s(x) = \\varphi(e^{-\\lambda x})"],
    ["\\begin{align*}a&=b\\\\c&=d\\end{align*}", "\\begin{aligned}a&=b\\\\c&=d\\end{aligned}"],
    ["x≤∞", "x{\\le}{\\infty}"],
    ["a % said aside\n+b", "a \n+b"],
    ["a\n\n\nb", "a\nb"],
    ["\\text{if $x>0$ & 5 % é}", "\\text{if $x>0$ \\& 5 \\% é}"],
    ["\\hspace{1.5em}x", "\\hspace{1.5em}x"],
  ])("lets %j through as %j", (tex, expected) => {
    expect(set(tex)).toEqual({ tex: expected, problems: [] });
  });

  it.each([
    "\\input{/etc/passwd}",
    "\\write18{id}",
    "\\immediate\\write18{id}",
    "\\openin5=/etc/passwd",
    "\\read5 to \\x",
    "\\catcode`\\%=12",
    "\\csname input\\endcsname",
    "\\def\\x{y}",
    "\\let\\x=\\input",
    "\\newcommand{\\x}{y}",
    "\\expandafter\\input",
    "\\include{x}",
    "\\special{x}",
    "\\directlua{x}",
    "\\href{javascript:x}{y}",
    "\\includegraphics{x}",
    "\\char92",
    "\\begin{filecontents}{x}\\end{filecontents}",
    "\\begin{verbatim}x\\end{verbatim}",
    "^^5cinput{/etc/passwd}",
    "\\text{\\input{x}}",
    "\\text{$\\input{x}$}",
    "\\hspace{10000em}",
    "$\\input{x}$",
    "x $ y",
    "#1",
    "x }\\input{y}{",
    "\\end{document}",
  ])("refuses %j, and says so", (tex) => {
    expect(set(tex).problems.length).toBeGreaterThan(0);
  });

  it("does not let a comment bring two `^` together", () => {
    expect(set("x^%\n^5c").tex).toBe("x^\n^5c");
  });

  it("says what is refused in words", () => {
    expect(set("\\input{x}").problems).toEqual(["`\\input` cannot be used in a formula."]);
    expect(set("{x").problems).toEqual(["A brace `{` is not closed."]);
    expect(set("\\begin{cases}x").problems).toEqual(["`\\begin{cases}` has no `\\end`."]);
  });

  it("gives back nothing but commands of the list, balanced and without a way out, whatever it is given", () => {
    const piece = fc.oneof(
      fc.constantFrom(
        "\\",
        "{",
        "}",
        "^",
        "^^",
        "$",
        "%",
        "#",
        "\n",
        "&",
        "_",
        "\\text{",
        "\\begin{",
        "\\end{",
        "align}",
        "input",
        "\\alpha",
        "x",
        "²",
        "\\\\",
      ),
      fc.string({ maxLength: 3 }),
    );
    const allowed = new Set([
      ...COMMANDS,
      ...TEXT_COMMANDS,
      "begin",
      "end",
      "hspace",
      "ensuremath",
      "textbackslash",
      "textasciicircum",
      "textasciitilde",
      "textquotedbl",
      "textasciigrave",
      "textbar",
      "textless",
      "textgreater",
      "textsubscript",
      "textsuperscript",
      "quad",
      "c",
      "v",
      "u",
      "H",
      "k",
      "r",
      "d",
      "b",
    ]);
    fc.assert(
      fc.property(fc.array(piece, { maxLength: 14 }), (pieces) => {
        const { tex, problems } = set(pieces.join(""));
        if (problems.length > 0) return;
        // A line break before the word "begin" begins nothing.
        const unbroken = tex.replaceAll("\\\\", " ");
        for (const [, name] of unbroken.matchAll(/\\([A-Za-z]+)/g)) expect(allowed.has(name ?? "")).toBe(true);
        for (const [, name] of unbroken.matchAll(/\\begin\{([^}]*)\}/g))
          expect(ENVIRONMENTS.has(name ?? "") || ALIGNMENTS.has(name ?? "")).toBe(true);
        expect(tex).not.toContain("^^");
        let depth = 0;
        for (const [brace] of tex.replace(/\\[\\{}]/g, "").matchAll(/[{}]/g)) {
          depth += brace === "{" ? 1 : -1;
          expect(depth).toBeGreaterThanOrEqual(0);
        }
        expect(depth).toBe(0);
      }),
      { numRuns: 2000 },
    );
  });
});

describe("macros of a paper", () => {
  it("are defined with the arguments their bodies use", () => {
    const { definitions, problems } = paperMacros({ "\\E": "\\mathbb{E}", "\\half": "\\frac{#1}{2}" });
    expect(problems).toEqual([]);
    expect(definitions).toEqual(["\\newcommand{\\E}{\\mathbb{E}}", "\\newcommand{\\half}[1]{\\frac{#1}{2}}"]);
  });

  it("may redefine a symbol, and get another name where prose needs theirs", () => {
    const { definitions, known } = paperMacros({ "\\epsilon": "\\varepsilon", "\\P": "\\mathbb{P}" });
    expect(definitions).toEqual(["\\renewcommand{\\epsilon}{\\varepsilon}", "\\newcommand{\\paperP}{\\mathbb{P}}"]);
    expect(mathTex("\\P(K)", known).tex).toBe("\\paperP(K)");
    expect(mathTex("\\P x", known).tex).toBe("\\paperP x");
  });

  it("are refused where they unfold without end, have no name or hold what may not be used", () => {
    expect(paperMacros({ "\\a": "\\b", "\\b": "\\a" }).problems).toEqual([
      "The macros `\\a` and `\\b` unfold into each other without end.",
    ]);
    expect(paperMacros({ E: "x" }).problems[0]).toContain("cannot name a macro");
    expect(paperMacros({ "\\x": "\\input{y}" }).problems).toEqual([
      "In the macro `\\x`: `\\input` cannot be used in a formula.",
    ]);
    expect(paperMacros({ "\\x}\\input{y": "z" }).problems[0]).toContain("cannot name a macro");
  });
});

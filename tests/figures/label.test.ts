import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { isWords, labelRuns, labelText } from "../../app/figures/index.ts";

describe("labels of plates", () => {
  it("sets letters as variables, digits and relations upright, and lowers subscripts", () => {
    expect(labelRuns("s_0=5.437")).toEqual([
      { text: "s", style: "variable", shift: "base" },
      { text: "0", style: "upright", shift: "sub" },
      { text: " = 5.437", style: "upright", shift: "base" },
    ]);
  });

  it.each([
    ["\\mu", "μ"],
    ["\\omega_s(x)", "ω_s(x)"],
    ["n^{-3/2}", "n^−3/2"],
    ["\\mathbb{P}(K=n)", "ℙ(K = n)"],
    ["\\frac{1}{2}", "½"],
    ["\\sqrt{s_0}", "√(s_0)"],
    ["\\bar{u}", "u\u0304"],
    ["w'", "w′"],
    ["\\text{law / exact}", "law / exact"],
    ["x \\le 4", "x ≤ 4"],
    ["11/2", "11/2"],
  ])("reads %s as %s", (tex, text) => {
    expect(labelText(tex)).toBe(text);
  });

  it("takes words without TeX as words", () => {
    expect(isWords("simulated, 95 %")).toBe(true);
    expect(isWords("xy")).toBe(false);
    expect(labelRuns("tail law")).toEqual([{ text: "tail law", style: "upright", shift: "base" }]);
  });

  it("falls back to plain text for what it does not know, names of object members among it", () => {
    expect(labelRuns("\\begin{matrix}a\\end{matrix}")).toHaveLength(1);
    expect(labelText("\\constructor")).toBe("constructor");
    expect(labelText("a}{b")).toBe("ab");
  });

  it("never throws and never gives back a control sequence's backslash, whatever it is given", () => {
    fc.assert(
      fc.property(fc.string({ unit: fc.constantFrom(..."\\{}_^$ax1/=+-'~ "), maxLength: 30 }), (tex) => {
        for (const run of labelRuns(tex)) expect(run.text).not.toContain("\\");
      }),
    );
  });
});

import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { addressTex, codeTex, textTex } from "../../app/export/text.ts";

describe("text as LaTeX", () => {
  it.each([
    ["\\", "\\textbackslash{}"],
    ["{}$&#%_", "\\{\\}\\$\\&\\#\\%\\_"],
    ["^~", "\\textasciicircum{}\\textasciitilde{}"],
    ['"a"', "\\textquotedbl{}a\\textquotedbl{}"],
    ["[x]*", "{[}x{]}{*}"],
  ])("escapes %s", (text, tex) => {
    expect(textTex(text)).toEqual({ tex, missing: [] });
  });

  it("keeps apart what the fonts would join: two hyphens are no dash, two apostrophes no quotation mark", () => {
    expect(textTex("a--b ''c ,,d ?`e").tex).toBe("a-{}-b '{}'c ,{},d ?{}\\textasciigrave{}e");
  });

  it("sets letters with accents, Greek, Cyrillic and mathematical characters", () => {
    expect(textTex("é ş ế").tex).toBe("é ş \\'{\\^{e}}");
    expect(textTex("e\u0301").tex).toBe("é");
    expect(textTex("x\u0304").tex).toBe("\\={x}");
    expect(textTex("Ωμέγα").tex).toBe("Ωμέγα");
    // Source of the positions: the encoding vector of the Washington Cyrillic fonts (AMSFonts 3): K o l at 75, 111, 108.
    expect(textTex("Кол").tex).toBe("\\cyr{\\char75{}\\char111{}\\char108{}}");
    expect(textTex("x ≤ ∞, 𝔼, x², y₀").tex).toBe(
      "x \\ensuremath{\\le} \\ensuremath{\\infty}, \\ensuremath{\\mathbb{E}}, x², y\\textsubscript{0}",
    );
  });

  it("names the characters that no font of print holds", () => {
    expect(textTex("a 🐚 b 漢").missing).toEqual(["🐚", "漢"]);
  });

  it("keeps straight quotes straight in code", () => {
    expect(codeTex("a'b").tex).toBe("\\texttt{a\\textquotesingle{}b}");
  });

  it("leaves nothing that TeX would act on, whatever the text", () => {
    fc.assert(
      fc.property(fc.string({ unit: "binary", maxLength: 60 }), (text) => {
        const { tex } = textTex(text);
        // Every command left is one that the setter itself writes.
        for (const [command] of tex.matchAll(/\\[A-Za-z]+/g)) {
          expect(command).toMatch(
            /^\\(text(backslash|asciicircum|asciitilde|quotedbl|asciigrave|bar|less|greater|superscript|subscript)|ensuremath|cyr|char|mbox|enspace|quad|[a-zA-Z]+)$/,
          );
        }
        const bare = tex.replace(/\\[{}$&#%_]/g, "").replace(/\\ensuremath\{[^}]*\}+/g, "");
        expect(bare).not.toMatch(/[%#&$_]/);
        expect(depthOf(tex)).toBe(0);
      }),
    );
  });

  it("leaves nothing in an address that could end it", () => {
    expect(addressTex("https://a.example/b_c?d=%20#e~f{}\\")).toBe(
      "https://a.example/b\\_c?d=\\%20\\#e\\string~f\\%7B\\%7D\\%5C",
    );
  });
});

/** Braces opened and not closed, escaped ones apart. */
function depthOf(tex: string): number {
  let depth = 0;
  for (const [brace] of tex.replace(/\\[{}]/g, "").matchAll(/[{}]/g)) {
    depth += brace === "{" ? 1 : -1;
    if (depth < 0) return depth;
  }
  return depth;
}

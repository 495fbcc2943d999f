import { describe, expect, it } from "vitest";
import { renderMath } from "../../app/ui/math.ts";

describe("formulas as HTML", () => {
  it("sets a formula with MathML beside it, for screen readers", () => {
    const html = renderMath("s_0=\\max_{z>0}\\varphi(z)", false);
    expect(html).toContain("<math");
    expect(html).not.toContain("katex-display");
    expect(renderMath("x", true)).toContain("katex-display");
  });

  it("uses the paper's macros, with arguments, and lets none of them leak into another formula", () => {
    expect(renderMath("\\E[K]", false, { "\\E": "\\mathbb{E}" })).toContain("mathbb");
    expect(renderMath("\\half{x}", false, { "\\half": "\\frac{#1}{2}" })).toContain("mfrac");
    renderMath("\\gdef\\leak{x}\\leak", false);
    expect(renderMath("\\leak", false)).toContain("math-unset");
  });

  it("shows what it cannot set as its source, with the reason in words", () => {
    const html = renderMath("\\frac{1}{<b>", false);
    expect(html).toContain("‡");
    expect(html).toContain("This formula cannot be set:");
    expect(html).not.toContain("<b>");
    expect(html).not.toContain("KaTeX");
  });

  it.each([
    ["\\href{javascript:alert(1)}{x}", "javascript:alert"],
    ["\\htmlClass{steal}{x}", 'class="steal"'],
    ["\\includegraphics{https://example.com/x.png}", "<img"],
    ['\\text{<img src="x" onerror="alert(1)">}', "<img"],
  ])("does not let %s through", (tex, forbidden) => {
    const html = renderMath(tex, false);
    const markup = html.replace(/<annotation[\s\S]*?<\/annotation>/g, "").replace(/<code>[\s\S]*?<\/code>/g, "");
    expect(markup).not.toContain(forbidden);
  });

  it("gives classes that are named for it, and no others", () => {
    const own = /^ours(?: ours-[a-z]+)?$/;
    expect(renderMath("\\htmlClass{ours ours-x}{12}", false, {}, own)).toContain('class="enclosing ours ours-x"');
    for (const tex of [
      "\\htmlClass{theirs}{12}",
      "\\htmlClass{ours x}{12}",
      "\\htmlStyle{color: red}{1}",
      "\\href{https://x.example}{1}",
    ])
      expect(renderMath(tex, false, {}, own).replace(/<annotation[\s\S]*?<\/annotation>/g, "")).not.toMatch(
        /class="enclosing|style="color: red|<a /,
      );
  });

  it("stops a macro that unfolds for ever, in bounded time", () => {
    const begun = performance.now();
    expect(renderMath("\\def\\a{\\a\\a}\\a", false)).toContain("unfolds without end");
    expect(renderMath("\\rule{10000em}{10000em}", false)).not.toContain("10000em;");
    expect(performance.now() - begun).toBeLessThan(1000);
  });

  it("refuses a formula longer than any formula", () => {
    expect(renderMath("x".repeat(20_000), false)).toContain("20000 characters");
  });

  it("gives the same for the same, from what it keeps", () => {
    const first = renderMath("\\sum_{n\\ge 0} p_n s^n", true);
    expect(renderMath("\\sum_{n\\ge 0} p_n s^n", true)).toBe(first);
  });
});

import { describe, expect, it } from "vitest";
import type { ShownPaper } from "../../app/cells/index.ts";
import { renderGalley } from "../../app/galley/index.ts";
import { partIntoStrips } from "../../app/galley/strips.ts";
import { BIBLIOGRAPHY, computed, EVERYTHING, NOTHING_SHOWN, shownAs } from "../export/sample.ts";

const galleyOf = (text: string, bibliography = "", shown: ShownPaper = NOTHING_SHOWN) =>
  renderGalley({ ...computed(text, bibliography), shown });

/** The words of HTML, formulas by their TeX, as somebody would read them. */
function wordsOf(html: string): string {
  return html
    .replace(/<span class="katex-mathml">[\s\S]*?<\/math><\/span>/g, "")
    .replace(/<[^>]+>/g, "")
    .replaceAll("&amp;", "&")
    .replaceAll("&#x27;", "'")
    .replace(/\s+/g, " ");
}

describe("a galley", () => {
  const html = galleyOf(EVERYTHING, BIBLIOGRAPHY);
  const words = wordsOf(html);

  it("typesets every part of the paper on the server", () => {
    for (const part of [
      "Inês Valadão",
      "Андрей Щербина",
      "Keywords: branching diffusion, absorption",
      "Theorem 1.1 (Shift & turn).",
      "See equation (1), Theorem 1.1, Figure 1, Table 2 and Section 1; also [2, Theorem 1.2] and [1, 2].",
      "Castellane and Thorvik (2009)",
      "Figure 1. How many reach the shore, with mean 0.0329",
      "Table 2. The law against the exact one.",
      "L. Maduró. Killed branching motions & more.",
    ]) {
      expect(words).toContain(part);
    }
    expect(html).not.toContain("a remark to ourselves");
    expect(html).not.toMatch(/NaN|undefined|\[object/);
  });

  it("prints numbers by their cells' results", () => {
    // E[K] = e^{-(2+√2)}: see tests/export/latex.test.ts for its source.
    expect(words).toContain(`The mean is ${Math.exp(-(2 + Math.SQRT2)).toPrecision(5)}`);
    expect(words).toContain("2.20×10−4");
  });

  it("leads every reference, citation and footnote to a place that is there", () => {
    const places = new Set([...html.matchAll(/ id="([^"]+)"/g)].map((match) => match[1]));
    const links = [...html.matchAll(/ href="#([^"]+)"/g)].map((match) => match[1]);
    expect(links.length).toBeGreaterThan(8);
    expect(links.filter((link) => !places.has(link))).toEqual([]);
    expect(places.size).toBe([...html.matchAll(/ id="/g)].length);
  });

  it("ends a proof with a box, in its last display where it ends in one", () => {
    expect(galleyOf(":::proof\nWords.\n:::\n").match(/end of proof/g)).toHaveLength(1);
    expect(galleyOf(":::proof\nOne.\n\nTwo.\n:::\n")).toMatch(/Two\.<span class="g-box"/);
    expect(galleyOf(":::proof\n- One.\n:::\n").match(/end of proof/g)).toHaveLength(1);
    const inDisplay = galleyOf(":::proof\nSo\n$$ x=y $$\n:::\n");
    expect(inDisplay).toMatch(/g-equation"[\s\S]*end of proof/);
    expect(inDisplay.match(/end of proof/g)).toHaveLength(1);
  });

  it("lets nothing of the text become markup", () => {
    const hostile = galleyOf(
      '---\ntitle: "<script>alert(1)</script>"\nauthors: [{name: "<img src=x onerror=alert(1)>"}]\n---\n<script>alert(2)</script>\n\n<b onclick="x">a</b> $\\href{javascript:alert(3)}{x}$ [x](javascript:alert(4))\n\n```counts "><script>\n```\n',
    );
    expect(hostile).not.toMatch(/<script|<img|onclick="x"|href="javascript/);
  });

  it("says what has no value, and why", () => {
    const text =
      "Here :value[nothing.mean] is, and $x=\\value{nothing.mean}$.\n\n```counts K\nof: nobody\nstart: 1\n```\n";
    const missing = galleyOf(text);
    expect(missing).toMatch(/class="g-none" title="[^"]+">no value<sup>‡<\/sup>/);
    expect(missing).toContain("no value}^{\\ddagger}");
    expect(wordsOf(missing)).toContain("‡ Figure 1 has no result.");
  });

  it("marks what is out of date with a dagger and one note that says with what it was set", () => {
    const before = computed(EVERYTHING);
    const after = EVERYTHING.replace("value: 2, min", "value: 2.5, min");
    const { paper, plan } = computed(after);
    const stale = renderGalley({ paper, plan, results: before.results, shown: shownAs(before) });
    const said = wordsOf(stale);
    expect(said).toMatch(/The mean is 0\.032902†/);
    expect(said).toContain("† Out of date. Set with");
    expect(stale.match(/id="note-1"/g)).toHaveLength(1);
    expect(stale).toContain("is now 2.5");
    expect(stale).not.toContain("note-2");
  });
});

describe("strips", () => {
  const paragraphs = (count: number) =>
    computed(Array.from({ length: count }, (_, i) => `${i} ${"words ".repeat(120)}`).join("\n\n")).paper.root.children;

  it("hold the whole text in order, about evenly, and never end with a heading", () => {
    const { children } = computed(EVERYTHING).paper.root;
    const strips = partIntoStrips(children, () => 400, 100);
    const printed = children.filter((node) => !["yaml", "footnoteDefinition", "definition"].includes(node.type));
    expect(strips.flatMap((strip) => strip.nodes)).toEqual(printed);
    for (const strip of strips) expect(strip.nodes.at(-1)?.type).not.toBe("heading");
    expect(partIntoStrips(paragraphs(24), () => 0, 0).map((strip) => strip.nodes.length)).toEqual([
      3, 3, 3, 3, 3, 3, 3, 3,
    ]);
  });

  it("are one where there is little, and one where there is nothing", () => {
    expect(partIntoStrips(paragraphs(1), () => 0, 0)).toHaveLength(1);
    expect(partIntoStrips([], () => 0, 0)).toEqual([{ nodes: [], firstLine: 1, lastLine: 1 }]);
  });
});

// @vitest-environment jsdom
import { describe, expect, it } from "vitest";
import { figureToSvg } from "../../app/figures/index.server.ts";
import { GALLERY } from "./gallery.ts";
import { figure, series } from "./sample.ts";

describe("a figure as an SVG file", () => {
  it.each(Object.entries(GALLERY))("%s: well-formed, alone, and in colours of its own", (_, drawn) => {
    const svg = figureToSvg(drawn);
    expect(svg.startsWith('<?xml version="1.0" encoding="UTF-8"?>\n<svg xmlns="http://www.w3.org/2000/svg"')).toBe(
      true,
    );
    const read = new DOMParser().parseFromString(svg, "image/svg+xml");
    expect(read.documentElement.localName).toBe("svg");
    expect(read.querySelector("parsererror")).toBeNull();
    expect(svg).not.toMatch(/var\(|class=|href=|NaN|Infinity|undefined/);
    expect(svg).toContain('font-family="Commissioner, Helvetica, Arial, sans-serif"');
  });

  it("says its finding, and has double-struck letters where KaTeX's face is not", () => {
    const svg = figureToSvg(
      figure({
        alternative: "p falls from 1 to 0 & <ends>.",
        y: { label: "\\mathbb{P}(K=n)", scale: "linear", range: null },
        series: [series({ name: "p", x: [0, 1], y: [1, 0] })],
      }),
    );
    expect(svg).toContain("<title>p falls from 1 to 0 &amp; &lt;ends&gt;.</title>");
    expect(svg).toContain("ℙ");
    expect(svg).not.toContain("KaTeX_AMS");
  });
});

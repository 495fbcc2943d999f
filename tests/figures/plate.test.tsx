import { renderToStaticMarkup } from "react-dom/server";
import { describe, expect, it } from "vitest";
import { FigurePlate, figureToPgfplots } from "../../app/figures/index.ts";
import { deepLaw, figure, profiles, series } from "./sample.ts";

describe("a plate on the page", () => {
  it("says its finding, is drawn on the server and takes its colours from the design", () => {
    const svg = renderToStaticMarkup(<FigurePlate figure={profiles} />);
    expect(svg).toContain('role="img"');
    expect(svg).toContain("<title>What the figure finds.</title>");
    expect(svg).toContain("var(--strand-1)");
    expect(svg).not.toMatch(/NaN|Infinity|undefined/);
  });

  it("stands alone as a file in the colours of paper", () => {
    const svg = renderToStaticMarkup(<FigurePlate figure={profiles} theme="print" />);
    expect(svg).not.toContain("var(");
    expect(svg).toContain('xmlns="http://www.w3.org/2000/svg"');
  });

  it("does not let a label out of its text", () => {
    const hostile = figure({
      series: [series({ name: "a", label: "<script>alert(1)</script>", x: [0, 1], y: [0, 1] })],
    });
    expect(renderToStaticMarkup(<FigurePlate figure={hostile} />)).not.toContain("<script>");
  });
});

/** What a careful document hands in: here, everything but letters and digits is dropped. */
const setMath = (tex: string) => tex.replace(/[^A-Za-z0-9]/g, "");
const print = { dataFile: "f.dat", widthMm: 76, setMath, setText: setMath };

describe("a figure for print", () => {
  it("reads its points from a file of its own and sets the page's ticks", () => {
    const { tex, data } = figureToPgfplots(deepLaw, { ...print, dataFile: "figure-1.dat" });
    expect(tex).toContain("{figure-1.dat}");
    expect(tex).toContain("$10^{-600}$");
    const lines = data.trimEnd().split("\n");
    expect(lines[1]).toBe("value1 x1 log10_y1");
    expect(lines.at(-1)).toBe("1e-741 1000 -741");
  });

  it("tells lines apart by dashes once there are more than four", () => {
    const parallel = (count: number) =>
      figure({ series: Array.from({ length: count }, (_, k) => series({ name: `c${k}`, x: [0, 1], y: [k, k + 1] })) });
    const dashes = (count: number) => figureToPgfplots(parallel(count), print).tex.match(/dash pattern/g) ?? [];
    expect(dashes(4)).toHaveLength(0);
    expect(dashes(5)).toHaveLength(4);
  });

  it("tells lines apart by dashes where they cross", () => {
    const crossing = figure({
      series: [series({ name: "a", x: [0, 1], y: [0, 1] }), series({ name: "b", x: [0, 1], y: [1, 0] })],
    });
    expect(figureToPgfplots(crossing, print).tex).toContain("dash pattern");
  });

  it("sets a label only as the document vouches for it", () => {
    const hostile = figure({ series: [series({ name: "a", label: "\\input{/etc/passwd}", x: [0, 1], y: [0, 1] })] });
    expect(figureToPgfplots(hostile, print).tex).not.toContain("\\input");
    expect(() => figureToPgfplots(hostile, { ...print, dataFile: "x} \\input{y" })).toThrow(/cannot name a data file/);
  });
});

import { describe, expect, it } from "vitest";
import { findPlate, type Plate, plateFace, takeAway } from "../../app/plate/index.server.ts";
import { computed, NOTHING_SHOWN } from "../export/sample.ts";

const TEXT = `---
title: A plate
---

\`\`\`parameters
mu: {value: 2, symbol: \\mu, note: drift}
\`\`\`

\`\`\`process larvae
drift: mu
rate: 1
\`\`\`

\`\`\`counts K
of: larvae
start: 1
up_to: 5
caption: The law from 1, with mean :value[K.mean]{digits=3}.
\`\`\`

In the mean :value[K.mean]{digits=5} come, $\\value{K(2)}$ being the chance of two; again :value[K.mean]{digits=2}.
And :value[mu]{digits=2} hangs from nothing else.
`;

const printed = { ...computed(TEXT, ""), shown: NOTHING_SHOWN };

function plateOf(id: string): Plate {
  const found = findPlate(printed, id);
  if ("absent" in found) throw new Error(found.absent);
  return found;
}

function textOf(file: string): string {
  const taken = takeAway(file, plateOf("K"), printed);
  if (taken === null || !("text" in taken)) throw new Error(`${file} is no text`);
  return taken.text;
}

/** E[K] = e^{-(2+√2)}: see tests/export/latex.test.ts for its source. */
const MEAN = Math.exp(-(2 + Math.SQRT2));

describe("a plate", () => {
  const face = plateFace(plateOf("K"), printed);

  it("says what it is, its values with a way to quote them, what it hangs from and where it is quoted", () => {
    expect(face.title).toBe("Figure 1");
    const mean = face.values.find(({ name }) => name === "mean");
    expect(mean?.printed?.known).toBe(MEAN.toPrecision(12));
    expect(mean?.quote).toBe(":value[K.mean]");
    expect(face.parameters.map(({ name, note }) => [name, note])).toEqual([["mu", "drift"]]);
    const at = TEXT.split("\n").findIndex((line) => line.startsWith("In the mean")) + 1;
    expect(face.quotations.filter(({ line }) => line === at)).toEqual([
      { line: at, formula: "K.mean" },
      { line: at, formula: "K(2)" },
    ]);
    expect(face.markup.caption).toContain("The law from 1, with mean");
    expect(face.markup.points.match(/<tr>/g)?.length).toBe(1 + 6);
  });

  it("says at each point of the figure what stands there, with supported digits alone", () => {
    const [law] = face.readings;
    expect(law?.texts).toHaveLength(6);
    expect(law?.texts[2]).toMatch(/^n = 2, P ?\(K ?= ?n\) = 0\.0\d+$/);
  });

  it("of a cell that prints nothing still has its values", () => {
    const process = plateFace(plateOf("larvae"), printed);
    expect(process.title).toBe("Process larvae");
    expect(process.figure).toBeNull();
    expect(process.values.find(({ name }) => name === "regime")?.words).toBe("away");
  });

  it("is absent, with the reason, where there is no cell or no result", () => {
    expect(findPlate(printed, "nobody")).toEqual({ absent: "This paper has no cell `nobody`." });
    expect(findPlate({ ...printed, results: new Map() }, "K")).toEqual({
      absent: "`K` has no result yet. Recompute it on the sheet first.",
    });
  });
});

describe("what is taken away of a plate", () => {
  it("points as CSV: a row a count, adding up to one less what lies beyond", () => {
    const [head, ...rows] = textOf("points.csv").trimEnd().split("\r\n");
    expect(head?.startsWith("n,")).toBe(true);
    const law = rows.map((row) => Number(row.split(",")[1]));
    expect(law).toHaveLength(6);
    const total = law.reduce((sum, p) => sum + p, 0);
    expect(total).toBeLessThan(1);
    expect(total).toBeGreaterThan(1 - 1e-4);
  });

  it("the whole result as JSON: what entered, what computed it, every value with its error", () => {
    const record = JSON.parse(textOf("result.json"));
    expect(record).toMatchObject({ cell: "K", kind: "counts", parameters: { mu: "2" } });
    expect(record.key).toMatch(/^[0-9a-f]{64}$/);
    expect(Math.abs(record.values.mean.value - MEAN)).toBeLessThanOrEqual(record.values.mean.error);
    expect(record.points).toHaveLength(6);
  });

  it("the figure as LaTeX on a page of its own, which reads its points from a file beside it", () => {
    const taken = takeAway("plate.pdf", plateOf("K"), printed);
    if (taken === null || !("latex" in taken)) throw new Error("no LaTeX");
    expect(taken.latex.problems).toEqual([]);
    const [main, ...data] = taken.latex.files;
    expect(main?.text).toContain("standalone");
    for (const { name } of data) expect(main?.text).toContain(name);
  });

  it("the figure as an SVG file that stands alone", () => {
    const svg = textOf("plate.svg");
    expect(svg).toMatch(/^<\?xml /);
    expect(svg).toContain("<svg");
    expect(svg).not.toContain("var(--");
  });

  it("nothing where the cell has no such part, or there is no such file", () => {
    expect(takeAway("points.csv", plateOf("larvae"), printed)).toBeNull();
    expect(takeAway("nothing.txt", plateOf("K"), printed)).toBeNull();
  });
});

import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { type AxesSaid, axesEdits, axesSaid, NO_AXES_SAID } from "../../app/cells/axes-editing.ts";
import { edited } from "../../app/cells/text-edits.ts";
import { readPaper } from "../../app/paper/index.ts";

/** A paper with a figure of that body, and words around it. */
const paperOf = (body: string) => `Before.\n\n\`\`\`figure F\n${body}\n\`\`\`\n\nAfter.\n`;

function cellOf(text: string) {
  const [cell] = readPaper(text, "").cells;
  if (cell === undefined) throw new Error(`No cell in:\n${text}`);
  return cell;
}

function rewritten(body: string, wanted: AxesSaid): string {
  const text = paperOf(body);
  const made = edited(text, axesEdits(text, cellOf(text), wanted));
  expect(axesSaid(cellOf(made))).toEqual(wanted);
  return made.slice("Before.\n\n```figure F\n".length, -"\n```\n\nAfter.\n".length);
}

const x04 = { range: ["0", "4"], scale: null } as const;
const asItIs = { range: null, scale: null } as const;
const inLog = { range: null, scale: "log" } as const;

describe("axes are written into a working", () => {
  it("as a key of their own after the last, where there was none", () => {
    expect(rewritten("over: {x: 0 to 1}\ncurves: {a: x} # one", { x: x04, y: inLog })).toBe(
      "over: {x: 0 to 1}\ncurves: {a: x} # one\naxes: {x: 0 to 4, log: y}",
    );
    expect(rewritten("{over: {x: 0 to 1}, curves: {a: x}}", { x: x04, y: asItIs })).toBe(
      "{over: {x: 0 to 1}, curves: {a: x}, axes: {x: 0 to 4}}",
    );
    expect(rewritten("over: {x: 0 to 1}\naxes:\ncaption: C", { x: x04, y: asItIs })).toBe(
      "over: {x: 0 to 1}\naxes: {x: 0 to 4}\ncaption: C",
    );
  });

  it("in the author's way, where they stand in lines", () => {
    const lines = "axes:\n    # of the shore\n    x: 0 to 2   # metres\n    log: y\ncaption: C";
    expect(rewritten(lines, { x: x04, y: inLog })).toBe(lines.replace("0 to 2", "0 to 4"));
    expect(rewritten(lines, { x: x04, y: asItIs })).toBe(
      "axes:\n    # of the shore\n    x: 0 to 4   # metres\ncaption: C",
    );
    expect(rewritten(lines, { x: { range: ["0", "2"], scale: null }, y: { range: ["1", "2"], scale: "log" } })).toBe(
      lines.replace("    log: y\n", "    log: y\n    y: 1 to 2\n"),
    );
  });

  it("with both axes on one scale as a list, and a formula with a comma in quotes", () => {
    expect(rewritten("axes: {log: y}", { x: inLog, y: inLog })).toBe("axes: {log: [x, y]}");
    expect(rewritten("axes: {log: [x, y]}", { x: asItIs, y: inLog })).toBe("axes: {log: y}");
    expect(rewritten("axes: {log: x}", { x: { range: ["0", "max(1, 2)"], scale: null }, y: asItIs })).toBe(
      "axes: {x: '0 to max(1, 2)'}",
    );
  });

  it("not at all, where nothing is said otherwise; and away, where nothing is left to be said", () => {
    const body = "axes: {  x:   0  to  4 , log: [ y ]  }\ncaption: C";
    expect(rewritten(body, { x: x04, y: inLog })).toBe(body);
    expect(rewritten(body, NO_AXES_SAID)).toBe("caption: C");
    expect(rewritten("over: {x: 0 to 1}\naxes:\n  x: 0 to 4\n  log: y", NO_AXES_SAID)).toBe("over: {x: 0 to 1}");
  });

  it("in any of these ways: they read back as they were asked for, and nothing else of the paper is changed", () => {
    const end = fc.constantFrom("0", "0.5", "-2", "2*mu", "min(1, mu)", "1e-30", "s0");
    const axis = fc.record({
      range: fc.option(fc.tuple(end, end), { nil: null }),
      scale: fc.constantFrom("linear", "log", null),
    });
    const axes = fc.record({ x: axis, y: axis });
    const ways = fc.constantFrom(
      (said: string) => said,
      (said: string) => `{over: {x: 0 to 1}${said === "" ? "" : `, ${said}`}, caption: C}`,
      (said: string) => `over: {x: 0 to 1}\n${said}${said === "" ? "" : "  # mine\n"}\ncaption: C, with a comma # why`,
      (said: string) => `${said}\n\n# A remark.\ncaption: |\n  Of two\n  lines\n`,
    );
    fc.assert(
      fc.property(axes, axes, ways, (first, second, way) => {
        const blank = way("");
        const begun = rewritten(way("axes: {}"), first);
        const then = rewritten(begun, second);
        const back = rewritten(then, NO_AXES_SAID);
        const others = (body: string) =>
          cellOf(paperOf(body))
            .body?.entries.filter(({ key }) => key !== "axes")
            .map(({ key, value }) => [key, value.yaml === "scalar" ? value.text : value.yaml]) ?? [];
        expect(others(then)).toEqual(others(blank));
        expect(others(back)).toEqual(others(blank));
        const comments = (body: string) => body.match(/# .*/g) ?? [];
        expect(comments(then)).toEqual(comments(way("axes: {}")));
      }),
      { numRuns: 30 },
    );
  });
});

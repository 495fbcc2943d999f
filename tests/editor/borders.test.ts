import { describe, expect, test } from "vitest";
import { planPaper } from "../../app/cells/index.ts";
import { type BorderFace, borderWords, crossedBorder, scaleWords, sideOf } from "../../app/editor/model/borders.ts";
import { BorderFinder, type Ground } from "../../app/editor/reading/border-finder.ts";
import { SheetReader } from "../../app/editor/reading/sheet-reader.ts";
import { readPaper } from "../../app/paper/index.ts";

const CRITICAL: BorderFace = {
  at: 2,
  open: "below",
  shown: "2",
  why: "the drift is critical in larvae",
  below: { holds: "K is infinite with positive probability", without: [] },
  above: { holds: "K is finite", without: ["Figure 1"] },
};
const NEGATIVE: BorderFace = {
  at: -2,
  open: "above",
  shown: "−2",
  why: "the drift is critical in larvae",
  below: { holds: "K is finite, with a power law for its tail", without: [] },
  above: { holds: "K is infinite with positive probability", without: [] },
};
const INPUT: BorderFace = {
  at: 0,
  open: "below",
  shown: "0",
  why: "",
  below: { holds: "", without: ["Figure 1", "Figure 2", "Table 1", "Table 2", "Table 3"] },
  above: { holds: "", without: [] },
};

describe("sides", () => {
  test("the border belongs to the side that reaches it", () => {
    expect([1.999, 2, 2.001].map((x) => sideOf(CRITICAL, x))).toEqual(["below", "above", "above"]);
    expect([-2.001, -2, -1.999].map((x) => sideOf(NEGATIVE, x))).toEqual(["below", "below", "above"]);
  });

  test("of several borders crossed, the one nearest to where one has got to is told", () => {
    const borders = [NEGATIVE, CRITICAL];
    expect(crossedBorder(borders, 3, 2)).toBeNull();
    expect(crossedBorder(borders, 3, 1)).toBe(CRITICAL);
    expect(crossedBorder(borders, 3, -2)).toBe(NEGATIVE);
    expect(crossedBorder(borders, null, 1)).toBeNull();
    expect(crossedBorder(borders, 3, null)).toBeNull();
    expect(borders).toEqual([NEGATIVE, CRITICAL]);
  });
});

describe("words", () => {
  test("each side by whether it reaches the border", () => {
    expect(borderWords("mu", CRITICAL, "below")).toBe(
      "Below mu = 2, where the drift is critical in larvae, K is infinite with positive probability.",
    );
    expect(borderWords("mu", CRITICAL, "above")).toBe(
      "From mu = 2 on, where the drift is critical in larvae, K is finite. Figure 1 has no answer there.",
    );
    expect(borderWords("mu", NEGATIVE, "below")).toBe(
      "Up to mu = −2, where the drift is critical in larvae, K is finite, with a power law for its tail.",
    );
    expect(borderWords("mu", NEGATIVE, "above")).toContain("Above mu = −2, where");
  });

  test("an input out of its range", () => {
    expect(borderWords("beta", INPUT, "below")).toBe(
      "Below beta = 0 Figure 1, Figure 2, Table 1 and 2 more have no answer.",
    );
    expect(borderWords("beta", INPUT, "above")).toBe("From beta = 0 on all cells have an answer.");
  });

  test("of a scale, what lies beyond each border", () => {
    expect(scaleWords("mu", [NEGATIVE, CRITICAL], 0)).toBe(
      `${borderWords("mu", NEGATIVE, "below")} ${borderWords("mu", CRITICAL, "above")}`,
    );
    expect(scaleWords("mu", [], 0)).toBe("");
  });
});

describe("the finder", () => {
  const TEXT = `\`\`\`parameters
beta: {value: 1, min: 0.5, max: 1.5}
mu: {value: 2, min: 1, max: 4, symbol: \\mu}
\`\`\`

\`\`\`process larvae
drift: mu
rate: beta
\`\`\`

\`\`\`yaglom Y
of: larvae
\`\`\`
`;
  const groundOf = (text: string, overrides: Record<string, string> = {}): Ground => {
    const paper = readPaper(text, "");
    const titles = new Map([["Y", "Figure 1"]]);
    return { paper, plan: planPaper(paper, { overrides }), overrides, titles, known: () => undefined };
  };
  const finish = (finder: BorderFinder): number => {
    let steps = 0;
    while (finder.step()) steps += 1;
    return steps;
  };

  test("comes to the critical drift step by step, and names the cell that has no answer there", () => {
    const finder = new BorderFinder();
    finder.stand(groundOf(TEXT));
    expect(finder.faces()).toEqual({});
    expect(finish(finder)).toBeGreaterThan(5);
    const faces = finder.faces();
    expect(Object.keys(faces)).toEqual(["mu"]);
    const [border] = faces.mu ?? [];
    expect(border?.shown).toBe("1.414");
    expect(border?.at).toBeCloseTo(Math.SQRT2, 12);
    expect(border?.below.without).toEqual(["Figure 1"]);
    expect(border?.above.without).toEqual([]);
  });

  test("remembers: prose and the parameter's own value ask nothing again, other parameters and workings do", () => {
    const finder = new BorderFinder();
    finder.stand(groundOf(TEXT));
    finish(finder);
    finder.stand(groundOf(`Some prose.\n\n${TEXT}`));
    expect(finish(finder)).toBe(0);
    finder.stand(groundOf(TEXT, { mu: "1.2" }));
    // beta's borders depend on mu: 1.2²/2 = 0.72 is within its scale now.
    expect(finish(finder)).toBeGreaterThan(0);
    expect(finder.faces().beta?.map(({ shown }) => shown)).toEqual(["0.72"]);
    expect(finder.faces().mu?.map(({ shown }) => shown)).toEqual(["1.414"]);
    finder.stand(groundOf(TEXT, { beta: "1.28" }));
    finish(finder);
    expect(finder.faces().mu?.map(({ shown }) => shown)).toEqual(["1.6"]);
    finder.stand(groundOf(TEXT.replace("rate: beta", "rate: 2*beta")));
    finish(finder);
    expect(finder.faces().mu?.map(({ shown }) => shown)).toEqual(["2"]);
  });

  test("what the worker holds gives it its ground, but not while a parameter is under the hand", () => {
    const reader = new SheetReader();
    expect(reader.ground()).toBeNull();
    reader.hear({ tell: "text", version: 1, text: TEXT, bibliography: "" });
    reader.sheet();
    reader.hear({ tell: "preview", settled: {}, trial: { mu: "1.2" } });
    reader.sheet();
    expect(reader.ground()).toBeNull();
    reader.hear({ tell: "preview", settled: { beta: "1.28" }, trial: {} });
    reader.sheet();
    const ground = reader.ground();
    if (ground === null) throw new Error("There is no ground.");
    const finder = new BorderFinder();
    finder.stand(ground);
    finish(finder);
    expect(finder.faces().mu?.map(({ shown }) => shown)).toEqual(["1.6"]);
    expect(finder.faces().mu?.[0]?.below.without).toEqual(["Figure 1"]);
  });

  test("work under way goes on when what it is for is still wanted, and is dropped when not", () => {
    const finder = new BorderFinder();
    finder.stand(groundOf(TEXT));
    for (let step = 0; step < 3; step += 1) finder.step();
    finder.stand(groundOf(`Prose.\n\n${TEXT}`));
    const rest = finish(finder);
    const other = new BorderFinder();
    other.stand(groundOf(TEXT));
    expect(rest).toBe(finish(other) - 3);
    finder.stand(groundOf("No cells."));
    expect([finish(finder), finder.faces()]).toEqual([0, {}]);
  });
});

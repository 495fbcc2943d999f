import { beforeEach, describe, expect, test } from "vitest";
import type { NumberFace, Piece, SheetModel } from "../../app/editor/model/types.ts";
import { SheetReader } from "../../app/editor/reading/sheet-reader.ts";
import { computed, SAMPLE, tellText } from "./sample.ts";

let reader: SheetReader;

beforeEach(() => {
  reader = new SheetReader();
});

function numbersOf(model: SheetModel): NumberFace[] {
  return model.pieces.middle.flatMap((piece) =>
    piece.piece === "set" && piece.content.content === "number" ? [piece.content.number] : [],
  );
}

function cell(model: SheetModel, slot: string) {
  const face = model.cells.find((each) => each.slot === slot);
  if (face === undefined) throw new Error(`There is no cell ${slot}.`);
  return face;
}

function source(piece: Piece): string {
  return SAMPLE.slice(piece.from, piece.to);
}

/** As the server does it: what is shown, then the results that were asked for. */
function showAll(text: string): void {
  const { shown, results } = computed(text);
  reader.hear(shown);
  reader.hear({ tell: "results", results });
}

describe("pieces", () => {
  test("each stands where its source stands", () => {
    reader.hear(tellText(SAMPLE));
    const {
      pieces: { middle: pieces },
      front,
    } = reader.sheet();
    const joins = pieces.filter(({ piece }) => piece === "join").map(source);
    const blanks = pieces.filter(({ piece }) => piece === "blank").map(({ from }) => from);
    const set = pieces.flatMap((piece) => (piece.piece === "set" ? [[piece.content.content, source(piece)]] : []));
    expect(set).toContainEqual(["number", ":value[larvae.decay]{digits=8}"]);
    expect(set).toContainEqual(["math", "$\\E[K]$"]);
    expect(set).toContainEqual(["pointer", ":ref[kpp]"]);
    expect(set).toContainEqual(["display", "$$w'' + \\mu w' = \\value{mu} \\label{kpp}$$"]);
    expect(pieces.filter(({ piece }) => piece === "cell").map(source)).toEqual([
      expect.stringMatching(/^```parameters[\s\S]*```$/),
      expect.stringMatching(/^```process larvae[\s\S]*```$/),
      expect.stringMatching(/^```counts K[\s\S]*```$/),
    ]);
    expect(pieces.filter(({ piece }) => piece === "parameter").map(source)).toEqual(["1.6", "1"]);
    expect(front.title[0]).toEqual(expect.objectContaining({ text: "How many reach " }));
    expect(joins).toEqual(["\n"]);
    for (const at of blanks) expect(SAMPLE.charAt(at)).toBe("\n");
  });

  test("they are in order, and none crosses another", () => {
    reader.hear(tellText(SAMPLE));
    const { middle: pieces } = reader.sheet().pieces;
    const open: Piece[] = [];
    for (const piece of pieces) {
      while (open.length > 0 && (open.at(-1)?.to ?? 0) <= piece.from) open.pop();
      const around = open.at(-1);
      if (around !== undefined && piece.piece !== "lines" && around.piece !== "lines") {
        expect(piece.to, `${source(piece)} within ${source(around)}`).toBeLessThanOrEqual(around.to);
      }
      open.push(piece);
    }
  });

  test("references, labels and numbers in math are put in", () => {
    reader.hear(tellText(SAMPLE));
    const texts = reader.sheet().pieces.middle.flatMap((piece) => {
      if (piece.piece !== "set") return [];
      if (piece.content.content === "pointer") return [piece.content.text];
      return piece.content.content === "display" ? [`${piece.content.tex} (${piece.content.number})`] : [];
    });
    const bound = "\\htmlClass{hl-bound hl-bound-current hl-first-1 hl-second-1}{1.6}";
    expect(texts).toEqual(["equation (1)", "Figure 1", `w'' + \\mu w' = {${bound}} (1)`, "[1]"]);
  });
});

describe("states", () => {
  test("nothing is computed at first, and numbers say so", () => {
    reader.hear(tellText(SAMPLE));
    const model = reader.sheet();
    expect(cell(model, "K").state).toBe("empty");
    expect(numbersOf(model).map(({ state, known }) => [state, known])).toEqual([["empty", ""]]);
    expect(model.errata).toEqual([]);
  });

  test("what is shown is asked for once, and then stands", () => {
    reader.hear(tellText(SAMPLE));
    const { shown, results } = computed(SAMPLE);
    reader.hear(shown);
    const before = reader.sheet();
    expect(new Set(before.wanted)).toEqual(new Set(results.map(({ key }) => key)));
    reader.hear({ tell: "results", results });
    const model = reader.sheet();
    expect(model.wanted).toEqual([]);
    expect(cell(model, "K").state).toBe("current");
    // Source: λ = μ + sqrt(μ² - 2β) of the paper language's `decay` with D = 1/2.
    expect(numbersOf(model)[0]?.known).toBe((1.6 + Math.sqrt(1.6 * 1.6 - 2)).toPrecision(8));
    expect(model.views.K?.view.figure).not.toBeNull();
    expect(reader.sheet().views).toEqual({});
  });

  test("of a view crosses to the page what is printed, the points of a figure only when they are", () => {
    const told = (show: string) => {
      const text = SAMPLE.replace("up_to: 6", `up_to: 6\nshow: ${show}`);
      reader = new SheetReader();
      reader.hear(tellText(text));
      showAll(text);
      return reader.sheet().views.K?.view;
    };
    expect(told("figure")).toMatchObject({ figure: { x: {} }, table: { rows: [] }, points: null });
    expect(told("[figure, table]")?.table?.rows).toHaveLength(7);
    expect(told("[figure, points]")?.points?.rows.length).toBeGreaterThan(0);
  });

  test("a parameter that changes makes out of date what hangs from it, and the rule remembers", () => {
    reader.hear(tellText(SAMPLE));
    showAll(SAMPLE);
    reader.sheet();
    reader.hear(tellText(SAMPLE.replace("value: 1.6", "value: 1.7"), 2));
    const model = reader.sheet();
    expect(cell(model, "K").state).toBe("outOfDate");
    expect(numbersOf(model)[0]?.state).toBe("outOfDate");
    expect(numbersOf(model)[0]?.known).toBe((1.6 + Math.sqrt(1.6 * 1.6 - 2)).toPrecision(8));
    expect(model.parameters.map(({ name, shown, wasShown }) => [name, shown, wasShown])).toEqual([
      ["mu", "1.70", "1.60"],
      ["beta", "1", ""],
    ]);
    expect(model.errata.map(({ what, mark }) => [what, mark])).toEqual([
      ["number", "†"],
      ["cell", "†"],
      ["cell", "†"],
    ]);
  });

  test("what hangs from a parameter is told: what is printed and how many numbers, else what prints nothing", () => {
    const hangs = (text: string) => {
      reader.hear(tellText(text));
      return reader.sheet().parameters.map((each) => each.hangs);
    };
    expect(hangs(SAMPLE)).toEqual(["Figure 1 and 2 numbers hang from it", "Figure 1 and 1 number hang from it"]);
    const alone = "```parameters\na: 1\nb: 2\nc: a\n```\n\n```formula f\nx: c\n```\n\n:value[b]\n";
    expect(hangs(alone)).toEqual(["formula f hangs from it", "1 number hangs from it", "formula f hangs from it"]);
    expect(hangs("```parameters\na: 1\n```\n")).toEqual(["Nothing hangs from it"]);
  });

  test("what a formula comes to is shown with six digits, also when it is tried", () => {
    const text = "```parameters\na: sqrt(2)\nb: {value: 1, step: 0.5}\n```\n";
    reader.hear(tellText(text));
    expect(reader.sheet().parameters.map(({ shown, plain }) => [shown, plain])).toEqual([
      ["1.41421", false],
      ["1.0", true],
    ]);
    reader.hear({ tell: "preview", settled: { b: "a/3" }, trial: {} });
    expect(reader.sheet().parameters[1]).toMatchObject({ shown: "0.471405", overridden: true });
  });

  test("prose, captions and notes change no state", () => {
    reader.hear(tellText(SAMPLE));
    showAll(SAMPLE);
    const text = SAMPLE.replace("The mean is", "The mean, we said, is")
      .replace("note: drift", "note: off shore")
      .replace("The law", "A law");
    reader.hear(tellText(text, 2));
    expect(reader.sheet().errata).toEqual([]);
  });

  test("nothing vanishes while a newer result is fetched", () => {
    reader.hear(tellText(SAMPLE));
    showAll(SAMPLE);
    reader.sheet();
    const text = SAMPLE.replace("value: 1.6", "value: 1.7");
    const next = computed(text);
    reader.hear(tellText(text, 2));
    reader.hear(next.shown);
    const model = reader.sheet();
    expect(numbersOf(model)[0]).toMatchObject({
      state: "computing",
      known: (1.6 + Math.sqrt(1.6 * 1.6 - 2)).toPrecision(8),
    });
    expect(model.views.K).not.toBeNull();
    reader.hear({ tell: "results", results: next.results });
    expect(numbersOf(reader.sheet())[0]).toMatchObject({
      state: "current",
      known: (1.7 + Math.sqrt(1.7 * 1.7 - 2)).toPrecision(8),
    });
  });

  test("a working at fault fails by itself; the rest goes on", () => {
    const text = SAMPLE.replace("start: 1", "begin: 1");
    reader.hear(tellText(text));
    showAll(SAMPLE);
    const model = reader.sheet();
    expect(cell(model, "K").state).toBe("failed");
    expect(cell(model, "K").failureLine).not.toBeNull();
    expect(cell(model, "larvae").state).toBe("current");
    expect(model.problems.some(({ slot }) => slot === "K")).toBe(true);
  });
});

describe("private trials", () => {
  test("show what follows, and leave the rule's own value", () => {
    reader.hear(tellText(SAMPLE));
    showAll(SAMPLE);
    reader.hear({ tell: "preview", settled: {}, trial: { mu: "2" } });
    const model = reader.sheet();
    expect(model.preview).toBe(true);
    expect(cell(model, "K").state).toBe("preview");
    expect(numbersOf(model)[0]).toMatchObject({ state: "preview", known: (2 + Math.SQRT2).toPrecision(8) });
    expect(model.parameters[0]?.shown).toBe("1.60");
    reader.hear({ tell: "preview", settled: {}, trial: {} });
    expect(cell(reader.sheet(), "K").state).toBe("current");
  });

  test("are never taken for what is kept", () => {
    reader.hear(tellText(SAMPLE));
    showAll(SAMPLE);
    reader.hear({ tell: "preview", settled: {}, trial: { mu: "2" } });
    reader.sheet();
    reader.hear(tellText(SAMPLE.replace("value: 1.6", "value: 2"), 2));
    reader.hear({ tell: "preview", settled: {}, trial: {} });
    expect(cell(reader.sheet(), "K").state).toBe("outOfDate");
  });

  test("of a reader stay on the rule", () => {
    reader.hear(tellText(SAMPLE));
    reader.hear({ tell: "preview", settled: { mu: "2" }, trial: {} });
    const model = reader.sheet();
    expect(model.parameters[0]).toMatchObject({ shown: "2.00", overridden: true });
    expect(cell(model, "K").state).toBe("preview");
  });

  test("that a solver refuses say why", () => {
    reader.hear(tellText(SAMPLE));
    showAll(SAMPLE);
    reader.hear({ tell: "preview", settled: {}, trial: { beta: "-1" } });
    const face = cell(reader.sheet(), "K");
    expect(["failed", "waiting"]).toContain(face.state);
    expect(face.hasResult).toBe(true);
  });
});

describe("what formulas are now", () => {
  test("is told by the results that are shown, with the reason where there is no value", () => {
    expect(reader.values(["1 + 1"])).toEqual([]);
    reader.hear(tellText(SAMPLE));
    reader.sheet();
    expect(reader.values(["K.mean"])[0]).toMatchObject({ known: "", reason: "`K` has no result." });
    showAll(SAMPLE);
    reader.sheet();
    // First moment e^{-λx}, λ = μ + √(μ² − 2β), x = 1, μ = 1.6, β = 1: Harris, The Theory of Branching Processes (1963).
    const mean = Math.exp(-(1.6 + Math.sqrt(1.6 ** 2 - 2)));
    const [value, sum, word, wrong] = reader.values(["K.mean", "1 + 1", "larvae.regime", "K.men"]);
    expect(Number(value?.known)).toBeCloseTo(mean, 7);
    expect(sum).toEqual({ formula: "1 + 1", known: "2", unknown: "", rest: "", reason: "" });
    expect(word?.known).toBe("away");
    expect(wrong?.reason).not.toBe("");
  });
});

test("texts of any kind are read", () => {
  for (const text of [
    "",
    "---\n",
    "```counts\n",
    "$$",
    ":::theorem",
    "| a |\n|--|",
    "# {#a}\n",
    "- \n  - ",
    "![](",
    "> - # x\n",
  ]) {
    reader.hear(tellText(text, 1));
    expect(() => reader.sheet()).not.toThrow();
  }
});

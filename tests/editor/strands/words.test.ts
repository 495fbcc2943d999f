import { describe, expect, test } from "vitest";
import type { SheetModel } from "../../../app/editor/model/types.ts";
import { SheetReader } from "../../../app/editor/reading/sheet-reader.ts";
import { digitsOf, withDigits } from "../../../app/editor/strands/digits.ts";
import { glossInLine, glossOf } from "../../../app/editor/strands/gloss.ts";
import { modeAfter } from "../../../app/editor/strands/mode.ts";
import { reachOf } from "../../../app/editor/strands/reach.ts";
import { computed, SAMPLE, tellText } from "../sample.ts";

function read(text: string): SheetModel {
  const reader = new SheetReader();
  reader.hear(tellText(text));
  const { shown, results } = computed(text);
  reader.hear(shown);
  reader.hear({ tell: "results", results });
  return reader.sheet();
}

const model = read(SAMPLE);
const pieces = model.pieces.middle;
const reach = reachOf(pieces, model.cells, model.parameters.length);

function numberOf(formula: string) {
  for (const piece of pieces) {
    if (piece.piece !== "set") continue;
    const { content } = piece;
    const faces = content.content === "number" ? [content.number] : "numbers" in content ? (content.numbers ?? []) : [];
    const found = faces.find((face) => face.formula === formula);
    if (found !== undefined) return { face: found, at: piece.from };
  }
  throw new Error(`No number ${formula} is bound.`);
}

function slotOf(name: string): string {
  return model.cells.find((cell) => cell.name === name)?.slot ?? "";
}

describe("what hangs where", () => {
  test("a number knows its cell, the parameters it reads itself and those it hangs from", () => {
    expect(numberOf("larvae.decay").face).toMatchObject({ cells: [slotOf("larvae")], reads: [], strands: [0, 1] });
    expect(numberOf("mu").face).toMatchObject({ cells: [], reads: [0], strands: [0] });
  });

  test("a quote within a formula counts, and a strand reaches to the last that hangs from it", () => {
    expect(reach.cells.get(slotOf("larvae"))?.quotes).toEqual({
      first: numberOf("larvae.decay").at,
      last: numberOf("larvae.decay").at,
      count: 1,
    });
    expect(reach.cells.get(slotOf("K"))?.quotes).toBeNull();
    expect(reach.strands[0]).toBe(SAMPLE.indexOf("```counts K"));
  });

  test("a caption that quotes ties there", () => {
    const text = SAMPLE.replace("The law of $K$.", "The law, mean :value[K.mean].");
    const { cells, pieces: drawn, parameters } = read(text);
    const found = reachOf(drawn.middle, cells, parameters.length);
    const k = cells.find(({ name }) => name === "K");
    expect(found.cells.get(k?.slot ?? "")?.quotes?.first).toBe(k?.from);
  });

  test("cells say in words what they hang from", () => {
    expect(model.cells.find(({ name }) => name === "K")?.hangs).toBe("hangs from mu and beta");
  });
});

describe("the gloss", () => {
  test("of a number: value, source, parameters, good digits", () => {
    const { face } = numberOf("larvae.decay");
    const gloss = glossOf({ lit: "number", id: "a", faces: [face], pointed: true }, model, reach);
    expect(gloss?.lead).toEqual([{ name: "larvae.decay", known: "2.3483315", unknown: "" }]);
    expect(gloss?.where).toBe("from process larvae");
    expect(gloss?.parameters.map(({ place, shown }) => [place, shown])).toEqual([
      [0, "1.60"],
      [1, "1"],
    ]);
    expect(gloss?.also).toMatch(/^good to 1\d digits$/);
    expect(gloss && glossInLine(gloss).rest).toMatch(/^from process larvae, good to 1\d digits$/);
  });

  test("of a number in doubt: its state instead", () => {
    const face = { ...numberOf("larvae.decay").face, state: "outOfDate" as const };
    const gloss = glossOf({ lit: "number", id: "a", faces: [face], pointed: true }, model, reach);
    expect(gloss?.also).toBe("† out of date");
  });

  test("of a parameter: what hangs from it; of a cell: where it is quoted", () => {
    const strand = glossOf({ lit: "strand", place: 1, pointed: true }, model, reach);
    expect(strand?.also).toBe("from it hang process larvae and Figure 1");
    const cord = glossOf({ lit: "cord", slot: slotOf("larvae"), pointed: true }, model, reach);
    expect([cord?.lead[0]?.name, cord?.also]).toEqual(["process larvae", "quoted in 1 place"]);
    expect(glossOf({ lit: "cord", slot: "nowhere", pointed: true }, model, reach)).toBeNull();
  });
});

describe("digits shown", () => {
  test.each([
    [":value[K.s0]", 6, ":value[K.s0]{digits=7}"],
    [":value[K.s0]{digits=8}", 8, ":value[K.s0]{digits=7}"],
    [":value[K.s0]{digits=8 as=plain}", 8, ":value[K.s0]{digits=7 as=plain}"],
    [":value[K.s0]{as=plain}", 6, ":value[K.s0]{as=plain digits=7}"],
    [":value[K.s0]{}", 6, ":value[K.s0]{digits=7}"],
  ])("%s asks for %i, and with 7 it is %s", (source, digits, seven) => {
    expect(digitsOf(source)).toBe(digits);
    expect(withDigits(source, 7)).toBe(seven);
  });

  test("what is told decimals is left alone, and digits stay between 1 and 15", () => {
    expect(withDigits(":value[K.s0]{decimals=3}", 7)).toBeNull();
    expect(withDigits("$x$", 7)).toBeNull();
    expect(withDigits(":value[x]{digits=2}", 0)).toBe(":value[x]{digits=1}");
    expect(withDigits(":value[x]{digits=2}", 99)).toBe(":value[x]{digits=15}");
  });
});

test("marks and strands: shown, only the lit one, hidden, and round again", () => {
  expect([modeAfter("shown"), modeAfter("lit"), modeAfter("hidden")]).toEqual(["lit", "hidden", "shown"]);
});

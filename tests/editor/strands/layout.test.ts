import fc from "fast-check";
import { describe, expect, test } from "vitest";
import type { CellStateName } from "../../../app/editor/model/types.ts";
import { layOut } from "../../../app/editor/strands/layout.ts";
import type { Scene } from "../../../app/editor/strands/types.ts";
import { cellAt, faceOf, numbersOf, quoteAt, sceneOf } from "./scenes.ts";

/** A figure K at 400 with its ring at 660, quoted at 100. */
function oneCord(state: CellStateName, more: Partial<Scene> = {}, done: number | null = null): Scene {
  return sceneOf(2, { cells: [cellAt("K", 400, { state, done })], quotes: [quoteAt("a", 100, ["K"])], ...more });
}

function cordOf(scene: Scene) {
  const { cords } = layOut(scene);
  expect(cords).toHaveLength(1);
  const cord = cords[0];
  if (cord === undefined) throw new Error("No cord is drawn.");
  return cord;
}

describe("strands", () => {
  test("branch to each cell that hangs from them, with a dot and a letter, and end at the last", () => {
    const { strands, reach } = layOut(sceneOf(2, { cells: [cellAt("K", 400), cellAt("T", 900, { strands: [1] })] }));
    // The outermost is drawn first, so that inner ones lie above it where they cross.
    expect(strands.map(({ place }) => place)).toEqual([1, 0]);
    const [beta, mu] = strands;
    expect(mu?.dots).toEqual([{ x: -28, y: 430 }]);
    expect(beta?.dots).toEqual([
      { x: -28, y: 443 },
      { x: -28, y: 930 },
    ]);
    expect(beta?.letters.map(({ x, y }) => [x, y])).toEqual([
      [-23, 443],
      [-23, 930],
    ]);
    expect(reach).toEqual([430, 930]);
  });

  test("run on where something hangs below what is drawn, and are not drawn where nothing does", () => {
    const strands = [
      { place: 0, below: true },
      { place: 1, below: false },
    ];
    const picture = layOut(sceneOf(2, { strands, bottom: 700 }));
    expect(picture.strands.map(({ place }) => place)).toEqual([0]);
    expect(picture.strands[0]?.solid).toBe("M-97 0V700");
  });

  test("a branch whose parameter put the cell out of date is dashed, and so is what leads to it alone", () => {
    const cells = [cellAt("K", 100), cellAt("T", 900, { state: "outOfDate", changed: [0] })];
    const [beta, mu] = layOut(sceneOf(2, { cells })).strands;
    expect(numbersOf(mu?.dashed ?? "")).toContain(930);
    expect(numbersOf(mu?.solid ?? "")).not.toContain(930);
    expect(beta?.dashed).toBe("");
  });

  test("are tied to the lines that quote their parameter itself", () => {
    const { strands } = layOut(sceneOf(1, { quotes: [quoteAt("a", 200, [], { reads: [0] })] }));
    expect(strands[0]?.ties.map(({ x, y, mark }) => [x, y, mark])).toEqual([[-20, 200, ""]]);
  });

  test("too many share a lane, grey and counted, and one that is lit comes out of it in its colour", () => {
    const strands = Array.from({ length: 12 }, (_, place) => place);
    const scene = sceneOf(12, { cells: [cellAt("K", 400, { strands })] });
    const dull = layOut(scene);
    expect(dull.strands).toHaveLength(7);
    expect(dull.strandBundle?.count.words).toBe("+5");
    const lit = layOut({ ...scene, lit: { lit: "strand", place: 10, pointed: true } });
    expect(lit.strands.map(({ place }) => place)).toContain(10);
    expect(lit.strandBundle?.count.words).toBe("+4");
  });
});

describe("cords", () => {
  test("go from the ring at the caption to a tie on each line that quotes the cell", () => {
    const quotes = [quoteAt("a", 100, ["K"]), quoteAt("b", 300, ["K"]), quoteAt("c", 301, ["K"])];
    const cord = cordOf(sceneOf(2, { cells: [cellAt("K", 400)], quotes }));
    expect(cord.ring).toEqual({ x: -20, y: 660, open: false });
    expect(cord.ties.map(({ y }) => y)).toEqual([100, 301]);
  });

  test("a cell that nothing quotes has none", () => {
    expect(layOut(sceneOf(2, { cells: [cellAt("K", 400, { quoted: false })] })).cords).toEqual([]);
  });

  test("run off the page where the ring is elsewhere, and of one that only passes nothing is drawn", () => {
    const away = cellAt("K", 0, { box: null, below: true });
    const cord = cordOf(sceneOf(2, { cells: [away], quotes: [quoteAt("a", 100, ["K"])] }));
    expect(cord.ring).toBeNull();
    expect(Math.max(...numbersOf(cord.course))).toBe(2000);
    const passing = cellAt("K", 0, { box: null, above: true, below: true });
    expect(layOut(sceneOf(2, { cells: [passing] })).cords).toEqual([]);
  });

  test.each<[CellStateName, string, boolean]>([
    ["current", "none", true],
    ["preview", "none", true],
    ["outOfDate", "dashed", false],
    ["cancelled", "dashed", false],
    ["stands", "solid", false],
    ["waiting", "dotted", false],
    ["empty", "dotted", false],
  ])("%s: loose strands %s, twisted %s", (state, loose, twisted) => {
    const cord = cordOf(oneCord(state));
    expect(cord.loose).toBe(loose);
    expect(cord.plies.some(({ under, over }) => under + over !== "")).toBe(twisted);
    expect(cord.plies.some((ply) => ply.loose !== "")).toBe(!twisted);
    expect(cord.bar).toBeNull();
    expect(cord.cut).toBeNull();
  });

  test.each<[CellStateName, string]>([
    ["current", ""],
    ["outOfDate", "†"],
    ["cancelled", "†"],
    ["stands", "†"],
    ["failed", "†"],
  ])("%s: the tie bears %s", (state, mark) => {
    expect(cordOf(oneCord(state)).ties[0]?.mark).toBe(mark);
  });

  test("a number without a value is marked ‡", () => {
    const quotes = [quoteAt("a", 100, ["K"], { state: "failed" })];
    expect(cordOf(oneCord("failed", { quotes })).ties[0]?.mark).toBe("‡");
  });

  test("twists from the top as far as the work is; where motion is not wanted the bar alone moves", () => {
    const lowest = (share: number, still = false) => {
      const cord = cordOf(oneCord("computing", { still }, share));
      const twisted = cord.plies.map(({ under, over }) => under + over).join("");
      return { bar: cord.bar?.y ?? Number.NaN, twisted: Math.max(0, ...numbersOf(twisted)) };
    };
    const [some, more] = [lowest(0.3), lowest(0.8)];
    expect(more.bar).toBeGreaterThan(some.bar);
    expect(Math.abs(some.twisted - some.bar)).toBeLessThan(1);
    expect(Math.abs(more.twisted - more.bar)).toBeLessThan(1);
    expect(lowest(0.8, true)).toEqual({ bar: more.bar, twisted: 0 });
  });

  test("a failed cell's is cut beyond a stub at its ring", () => {
    const cord = cordOf(oneCord("failed"));
    expect(cord.cut?.upright).toBe(false);
    expect(cord.cut?.y).toBeGreaterThan(590);
    expect(cord.cut?.y).toBeLessThan(660);
    expect(Math.min(...numbersOf(cord.course).filter((n) => n > 0))).toBeGreaterThan(590);
  });

  test("a waiting cell has an open ring", () => {
    expect(cordOf(oneCord("waiting")).ring?.open).toBe(true);
  });

  test("several on one line end above each other", () => {
    const cells = [cellAt("K", 400), cellAt("T", 800)];
    const { cords } = layOut(sceneOf(2, { cells, quotes: [quoteAt("a", 100, ["K"]), quoteAt("b", 100, ["T"])] }));
    const ys = cords.flatMap(({ ties }) => ties.map(({ y }) => y));
    expect(new Set(ys).size).toBe(2);
  });

  test("beyond six in view the unlit ones are one grey bundle with their count", () => {
    const slots = ["A", "B", "C", "D", "E", "F", "G"];
    const of = (count: number) => ({
      cells: slots.slice(0, count).map((slot, at) => cellAt(slot, 100 + 220 * at)),
      quotes: slots.slice(0, count).map((slot, at) => quoteAt(slot, 40 + 220 * at, [slot])),
    });
    const six = layOut(sceneOf(2, of(6)));
    expect([six.cords.length, six.cordBundle]).toEqual([6, null]);
    const seven = layOut(sceneOf(2, of(7)));
    expect([seven.cords.length, seven.cordBundle?.count.words]).toEqual([0, "7"]);
    expect(seven.cordBundle?.ties).toHaveLength(7);
    const lit = layOut(sceneOf(2, { ...of(7), lit: { lit: "cord", slot: "C", pointed: true } }));
    expect([lit.cords.map(({ slot }) => slot), lit.cordBundle?.count.words]).toEqual([["C"], "6"]);
    expect(lit.lanes.size).toBe(2);
  });

  test("wherever cells and numbers stand, nothing is drawn above or below what is drawn, nor in the text", () => {
    const place = fc.integer({ min: -500, max: 3000 });
    fc.assert(
      fc.property(
        fc.array(place, { maxLength: 8 }),
        fc.array(fc.tuple(place, fc.nat(7)), { maxLength: 30 }),
        (tops, at) => {
          const cells = tops.map((top, k) => cellAt(`c${k}`, top, { strands: [k % 3] }));
          const quotes = at.map(([y, cell], k) => quoteAt(`q${k}`, y, [`c${cell}`]));
          const picture = layOut(sceneOf(3, { cells, quotes }));
          const paths = [
            ...picture.strands.flatMap(({ solid, dashed }) => [solid, dashed]),
            ...picture.cords.flatMap(({ plies }) => plies.flatMap(({ under, over }) => [under, over])),
          ];
          for (const path of paths) {
            expect(path).not.toMatch(/NaN|Infinity/);
            const found = numbersOf(path);
            expect(Math.max(0, ...found)).toBeLessThanOrEqual(2004);
          }
        },
      ),
    );
  });
});

describe("what is lit", () => {
  const scene = sceneOf(3, {
    cells: [cellAt("K", 400), cellAt("T", 900, { strands: [2] })],
    quotes: [quoteAt("a", 100, ["K"]), quoteAt("b", 800, ["T"])],
  });
  const litOf = (picture: ReturnType<typeof layOut>) => ({
    strands: picture.strands.filter(({ lit }) => lit).map(({ place }) => place),
    cords: picture.cords.filter(({ lit }) => lit).map(({ slot }) => slot),
  });

  test("a strand lights what hangs from it, and all else stands back", () => {
    const picture = layOut({ ...scene, lit: { lit: "strand", place: 2, pointed: true } });
    expect(litOf(picture)).toEqual({ strands: [2], cords: ["T"] });
    expect(picture.dim).toBe(true);
  });

  test("a number lights its cord and the strands it hangs from; a hairline leads to it; under the caret nothing stands back", () => {
    const lit = { lit: "number", id: "a", faces: [faceOf()], pointed: false } as const;
    const picture = layOut({ ...scene, lit });
    expect(litOf(picture)).toEqual({ strands: [1, 0], cords: ["K"] });
    expect(picture.dim).toBe(false);
    expect(picture.hairlines.join("")).toContain("H120");
    expect(picture.gloss).toEqual({ y: 100, to: -83 });
  });

  test("only the lit one is drawn where that is chosen, and nothing where nothing is to be", () => {
    const lit = { lit: "cord", slot: "T", pointed: true } as const;
    const only = layOut({ ...scene, mode: "lit", lit });
    expect([only.strands.map(({ place }) => place), only.cords.map(({ slot }) => slot)]).toEqual([[2], ["T"]]);
    expect(layOut({ ...scene, mode: "lit" }).strands).toEqual([]);
    const hidden = layOut({ ...scene, mode: "hidden", lit });
    expect([hidden.strands, hidden.cords, hidden.dim]).toEqual([[], [], false]);
    expect(hidden.gloss).not.toBeNull();
  });
});

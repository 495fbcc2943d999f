import type { NumberFace } from "../../../app/editor/model/types.ts";
import { frameOf } from "../../../app/editor/strands/frame.ts";
import type { Scene, SceneCell, SceneQuote } from "../../../app/editor/strands/types.ts";

/** A cell beside a figure from `top` on, with its caption under it. */
export function cellAt(slot: string, top: number, more: Partial<SceneCell> = {}): SceneCell {
  return {
    slot,
    state: "current",
    strands: [0, 1],
    changed: [],
    done: null,
    box: { top, bottom: top + 300, caption: top + 260 },
    above: false,
    below: false,
    quoted: true,
    ...more,
  };
}

export function quoteAt(id: string, y: number, cells: readonly string[], more: Partial<SceneQuote> = {}): SceneQuote {
  return { id, y, left: 120, cells, reads: [], state: "current", ...more };
}

/** A scene of a wide page with so many parameters. */
export function sceneOf(parameters: number, more: Partial<Scene> = {}): Scene {
  const places = Array.from({ length: parameters }, (_, place) => place);
  return {
    frame: frameOf(400, places),
    top: 0,
    bottom: 2000,
    stepTop: 0,
    strands: places.map((place) => ({ place, below: false })),
    cells: [],
    quotes: [],
    lit: null,
    mode: "shown",
    lanes: new Map(),
    still: false,
    ...more,
  };
}

export function faceOf(more: Partial<NumberFace> = {}): NumberFace {
  return {
    known: "5.4368778",
    unknown: "",
    rest: "",
    formula: "K.s0",
    good: 11,
    state: "current",
    cells: ["K"],
    reads: [],
    strands: [0, 1],
    said: "",
    ...more,
  };
}

/** All numbers of a path. */
export function numbersOf(path: string): number[] {
  return [...path.matchAll(/-?\d+(?:\.\d+)?/g)].map(([found]) => Number(found));
}

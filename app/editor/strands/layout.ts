import { px } from "./course.ts";
import { layCords } from "./lay-cords.ts";
import { layStrands } from "./lay-strands.ts";
import { lightingOf } from "./lighting.ts";
import { type TieLines, tieLinesOf } from "./tie-lines.ts";
import type { Picture, Scene, SceneQuote } from "./types.ts";

/** Draws up the strands and cords of a scene. Pure: the same scene, the same picture. */
export function layOut(scene: Scene): Picture {
  const { frame, top, bottom, lit, mode } = scene;
  const ties = tieLinesOf(scene.quotes);
  if (mode === "hidden") return { ...nothing(scene), ...words(scene, ties, new Map()) };
  const lighting = lightingOf(scene);
  const strands = layStrands(scene, ties, lighting);
  const cords = layCords(scene, ties, lighting);
  return {
    frame,
    top,
    bottom,
    strands: strands.strands,
    strandBundle: strands.bundle,
    cords: cords.cords,
    cordBundle: cords.bundle,
    dim: mode === "shown" && lit?.pointed === true,
    reach: strands.reach,
    lanes: cords.lanes,
    ...words(scene, ties, cords.lanes),
  };
}

function nothing({ frame, top, bottom }: Scene): Omit<Picture, "gloss" | "hairlines"> {
  return {
    frame,
    top,
    bottom,
    strands: [],
    strandBundle: null,
    cords: [],
    cordBundle: null,
    dim: false,
    reach: [],
    lanes: new Map(),
  };
}

/** The hairline to a number that is lit, and where the gloss about what is lit stands. */
function words(scene: Scene, ties: TieLines, lanes: Picture["lanes"]): Pick<Picture, "gloss" | "hairlines"> {
  const { lit, frame } = scene;
  if (lit?.lit !== "number") {
    const box = lit?.lit === "cord" ? scene.cells.find(({ slot }) => slot === lit.slot)?.box : undefined;
    return { gloss: box ? { y: box.caption, to: null } : null, hairlines: [] };
  }
  const quote = scene.quotes.find(({ id }) => id === lit.id);
  if (quote === undefined) return { gloss: null, hairlines: [] };
  const held = [...ties.cords.values(), ...ties.strands.values()]
    .flat()
    .filter(({ quotes }) => quotes.some(({ id }) => id === lit.id))
    .map(({ y }) => y);
  if (held.length === 0 || scene.mode === "hidden") return { gloss: { y: quote.y, to: null }, hairlines: [] };
  const hasCord = lit.faces.some(({ cells }) => cells.some((slot) => lanes.has(slot)));
  return {
    gloss: { y: Math.max(...held), to: hasCord ? frame.cordLanes.outer - 7 : null },
    hairlines: hairlinesOf(scene, quote, held),
  };
}

/** From each tie of a number to below its line, and along there to the number. */
function hairlinesOf({ frame }: Scene, quote: SceneQuote, ties: readonly number[]): string[] {
  const turn = frame.edge * 0.4;
  const down = ties.map((y) => `M${px(frame.edge)} ${px(y)}H${px(turn)}V${px(quote.y)}`);
  return [...down, `M${px(turn)} ${px(quote.y)}H${px(Math.max(turn, quote.left))}`];
}

import { entriesOf } from "./cell-entries.ts";
import { px } from "./course.ts";
import { COUNT_BELOW } from "./frame.ts";
import type { Lighting } from "./lighting.ts";
import type { TieLines } from "./tie-lines.ts";
import type { BundleDrawing, End, Scene, StrandDrawing } from "./types.ts";

/** From the end of a branch to its letter, and how much of a row a letter takes [px]. */
const TO_LETTER = 5;
const LETTER_WIDTH = 11;
/** Letters in a row end here, before the text. */
const ROW_END = -3;

/** Where something hangs from a strand. */
interface Hanging {
  readonly y: number;
  readonly x: number;
  readonly dashed: boolean;
  readonly tie: End | null;
  readonly letter: StrandDrawing["letters"][number] | null;
}

export interface LaidStrands {
  readonly strands: readonly StrandDrawing[];
  readonly bundle: BundleDrawing | null;
  readonly reach: readonly number[];
}

/** The strands from under the rule to all that hangs from them, the outermost first, so that inner ones lie above. */
export function layStrands(scene: Scene, ties: TieLines, lighting: Lighting): LaidStrands {
  const hanging = hangings(scene, ties);
  const reach = scene.strands.map(({ place, below }) =>
    below ? Number.POSITIVE_INFINITY : Math.max(Number.NEGATIVE_INFINITY, ...(hanging[place] ?? []).map(({ y }) => y)),
  );
  const bundled = new Set(scene.frame.bundled);
  const outermostFirst = scene.strands
    .map(({ place }) => place)
    .filter((place) => scene.frame.strandLanes[place] !== undefined)
    .sort((a, b) => b - a);
  const strands = outermostFirst.flatMap((place) => {
    if (!lighting.strand(place) && (scene.mode === "lit" || bundled.has(place))) return [];
    return drawStrand(scene, place, hanging[place] ?? [], reach[place] ?? 0, lighting);
  });
  const merged = scene.mode === "lit" ? [] : [...bundled].filter((place) => !lighting.strand(place));
  return { strands, bundle: drawBundle(scene, merged, hanging, reach), reach };
}

/** What hangs from each strand on the page, by place. */
function hangings(scene: Scene, ties: TieLines): Hanging[][] {
  const { frame } = scene;
  const made: Hanging[][] = scene.strands.map(() => []);
  for (const cell of scene.cells) {
    if (cell.box === null) continue;
    const enters = cell.enters ?? cell.strands;
    const { ys, tight, small } = entriesOf(cell.box, enters.length, cell.quoted);
    const end = frame.size === "narrow" ? frame.edge : frame.edge - 8;
    const middle = ((ys[0] ?? 0) + (ys.at(-1) ?? 0)) / 2;
    const row = Math.min(end, ROW_END - LETTER_WIDTH * enters.length - TO_LETTER);
    enters.forEach((place, k) => {
      const x = tight && frame.letters ? row : end;
      const y = ys[k] ?? middle;
      made[place]?.push({
        y,
        x,
        dashed: cell.state !== "stands" && cell.changed.includes(place),
        tie: null,
        letter: frame.letters
          ? {
              id: `${cell.slot} ${place}`,
              x: x + TO_LETTER + (tight ? LETTER_WIDTH * k : 0),
              y: tight ? middle : y,
              small,
            }
          : null,
      });
    });
  }
  for (const [place, lines] of ties.strands) {
    for (const { id, y, quotes } of lines) {
      const failed = quotes.some(({ state }) => state === "failed");
      const tie: End = { id: `strand ${place} ${id}`, x: frame.edge, y, mark: failed ? "‡" : "", faint: false };
      made[place]?.push({ y, x: frame.edge, dashed: false, tie, letter: null });
    }
  }
  return made;
}

function drawStrand(
  scene: Scene,
  place: number,
  hanging: readonly Hanging[],
  reach: number,
  lighting: Lighting,
): StrandDrawing[] {
  const { frame, top, bottom } = scene;
  if (reach <= top) return [];
  const lane = frame.strandLanes[place] ?? 0;
  const inView = hanging.filter(({ y }) => y > top && y <= bottom);
  const radius = frame.size === "narrow" ? 8 : 12;
  const branches = (dashed: boolean) =>
    inView
      .filter((each) => each.dashed === dashed)
      .map(({ x, y }) => branch(lane, x, y, Math.min(radius, x - lane, y - top)))
      .join("");
  // What is solid ends with the last that hangs on it; below it the strand leads to what is out of date alone.
  const lowest = (dashed: boolean) =>
    Math.max(top, ...hanging.filter((each) => each.dashed === dashed).map(({ y }) => y - radius));
  const solidTo = reach === Number.POSITIVE_INFINITY ? bottom : Math.min(bottom, lowest(false));
  const dashedTo = Math.min(bottom, lowest(true));
  const trunk = (from: number, to: number) => (to > from ? `M${px(lane)} ${px(from)}V${px(to)}` : "");
  return [
    {
      place,
      lit: lighting.strand(place),
      meant: lighting.meant(place),
      solid: trunk(top, solidTo) + branches(false),
      dashed: trunk(Math.max(top, solidTo), dashedTo) + branches(true),
      dots: inView.filter(({ tie }) => tie === null).map(({ x, y }) => ({ x, y })),
      ties: inView.flatMap(({ tie }) => tie ?? []),
      letters: inView.flatMap(({ letter }) => letter ?? []),
    },
  ];
}

/** Out of a lane and to the right. */
function branch(lane: number, to: number, y: number, radius: number): string {
  const r = px(radius);
  return `M${px(lane)} ${px(y - radius)}A${r} ${r} 0 0 0 ${px(lane + radius)} ${px(y)}H${px(to)}`;
}

function drawBundle(
  scene: Scene,
  places: readonly number[],
  hanging: readonly (readonly Hanging[])[],
  reach: readonly number[],
): BundleDrawing | null {
  const { frame, top, bottom } = scene;
  const hung = places.filter((place) => (reach[place] ?? 0) > top);
  const first = hung[0];
  if (first === undefined) return null;
  const lane = frame.strandLanes[first] ?? 0;
  const inView = hung.flatMap((place) => (hanging[place] ?? []).filter(({ y }) => y > top && y <= bottom));
  const to = Math.min(bottom, Math.max(...hung.map((place) => reach[place] ?? 0)));
  return {
    course: `M${px(lane)} ${px(top)}V${px(to)}${inView.map(({ x, y }) => branch(lane, x, y, 8)).join("")}`,
    rings: [],
    ties: inView.flatMap(({ tie }) => tie ?? []),
    count: { x: lane, y: scene.stepTop + COUNT_BELOW, words: `+${places.length}` },
  };
}

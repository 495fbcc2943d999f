import { px } from "./course.ts";
import type { Frame } from "./types.ts";

/** Room under the rule through which the strands run to their lanes [px]. */
export const BAND = 30;
/** Letters of the lanes stand so far below that room [px]. */
export const LETTERS_Y = 40;
/** The first strand runs so far below the rule; the others so far below each other, while there is room [px]. */
const FIRST = 9;
const APART = 5;
const ROOM = 18;
const RADIUS = 12;
/** Heads reach so far down into their lanes [px]. */
const END = BAND + 12;

/** A parameter on the rule: where its index stands, in px of the column, or at which end of it the rule hides it. */
export interface Index {
  readonly place: number;
  readonly x: number;
  readonly seen: boolean;
}

export interface HeadDrawing {
  readonly place: number;
  readonly path: string;
  readonly dot: number | null;
  readonly letter: { readonly x: number; readonly y: number } | null;
  /** Shares its lane with others, and is drawn like them. */
  readonly bundled: boolean;
}

/**
 * From the indices along under the rule and into the lanes, the outermost first, so that inner ones lie above.
 *
 * @param reach how far down each strand hangs, in px below the rule, by place; what hangs nowhere in view has no head
 */
export function layHeads(indices: readonly Index[], frame: Frame, reach: readonly number[]): HeadDrawing[] {
  const taking = indices.filter(({ place }) => frame.strandLanes[place] !== undefined);
  const lanes = [...new Set(taking.map(({ place }) => frame.strandLanes[place] ?? 0))].sort((a, b) => a - b);
  const apart = Math.min(APART, ROOM / Math.max(1, lanes.length - 1));
  return taking
    .filter(({ place }) => (reach[place] ?? Number.NEGATIVE_INFINITY) > BAND)
    .sort((a, b) => b.place - a.place)
    .map(({ place, x, seen }) => {
      const lane = frame.strandLanes[place] ?? 0;
      const y = FIRST + apart * lanes.indexOf(lane);
      const bundled = frame.bundled.includes(place);
      const lettered = frame.letters && !bundled && (reach[place] ?? 0) > BAND + LETTERS_Y + 10;
      return {
        place,
        path: pathOf(x, seen, lane, y),
        dot: seen ? x : null,
        letter: lettered ? { x: lane, y: BAND + LETTERS_Y } : null,
        bundled,
      };
    });
}

function pathOf(x: number, seen: boolean, lane: number, y: number): string {
  const turn = px(RADIUS);
  const into = `H${px(lane + RADIUS)}A${turn} ${turn} 0 0 0 ${px(lane)} ${px(y + RADIUS)}V${END}`;
  if (!seen) return `M${px(x)} ${px(y)}${into}`;
  const radius = Math.min(RADIUS, y);
  return `M${px(x)} 0V${px(y - radius)}A${px(radius)} ${px(radius)} 0 0 1 ${px(x - radius)} ${px(y)}${into}`;
}

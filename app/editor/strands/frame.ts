import type { Frame } from "./types.ts";

/** The count of a bundle stands so far below the head of the view, so that it is in view after a step of scrolling [px]. */
export const COUNT_BELOW = 170;

/** From this width of the margin [px] on there is room for a gloss beside the strands. */
const WIDE = 310;
/** Below it the strands of one section alone have room, without letters. */
const NARROW = 64;
/** Margin for which the middle frame is drawn; a narrower one has it drawn together. */
const MIDDLE = 168;

/**
 * The lanes of a margin. Those of the parameters lie outermost, the last one declared the farthest out; cords run
 * between them and the text.
 *
 * @param margin width of the page left of the text [px]
 * @param places of the parameters that take a lane, in the order of the rule
 */
export function frameOf(margin: number, places: readonly number[]): Frame {
  const { inner, outer, gap, lanes, ...rest } = measuresOf(margin);
  const own = places.length > lanes ? lanes - 1 : places.length;
  const taken = Math.min(places.length, lanes);
  const apart = taken > 1 ? Math.min(gap, (inner - outer) / (taken - 1)) : gap;
  const strandLanes: number[] = [];
  places.forEach((place, at) => {
    strandLanes[place] = inner - apart * Math.min(at, own);
  });
  return { ...rest, strandLanes, bundled: places.slice(own) };
}

type Measures = Omit<Frame, "strandLanes" | "bundled"> & {
  /** Innermost and outermost lane of a parameter, how far apart they are at most, and how many there may be. */
  readonly inner: number;
  readonly outer: number;
  readonly gap: number;
  readonly lanes: number;
};

function measuresOf(margin: number): Measures {
  if (margin >= WIDE) {
    return {
      size: "wide",
      edge: -20,
      inner: -97,
      outer: -160,
      gap: 15,
      lanes: 8,
      cordLanes: { outer: -76, inner: -40, gap: 24, most: 6 },
      letters: true,
      gloss: { left: Math.max(-360, 12 - margin), width: Math.min(176, margin - 184) },
    };
  }
  if (margin >= NARROW) {
    const share = Math.min(1, margin / MIDDLE);
    return {
      size: "middle",
      edge: -18 * share,
      inner: -89 * share,
      outer: -128 * share,
      gap: 13,
      lanes: 4,
      cordLanes: { outer: -65 * share, inner: -38 * share, gap: 24, most: share < 0.75 ? 2 : 4 },
      letters: share >= 0.75,
      gloss: null,
    };
  }
  return {
    size: "narrow",
    edge: -4,
    inner: -28.5,
    outer: -35,
    gap: 5.5,
    lanes: 4,
    cordLanes: { outer: -19, inner: -11, gap: 8, most: 2 },
    letters: false,
    gloss: null,
  };
}

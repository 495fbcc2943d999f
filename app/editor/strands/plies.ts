import { type Course, knotsWithin, pathAlong } from "./course.ts";
import type { Ply } from "./types.ts";

/** How far a twisted strand swings to either side of its cord, and over what length it comes round [px]. */
const AMPLITUDE = 2.7;
const PITCH = 22;
/** Over this length [px] a twist closes at the ends of its cord. */
const TAPER = 5;
/** Between the strands of an untwisted cord, and the whole width that they may take [px]. */
const LOOSE_GAP = 5.4;
const LOOSE_WIDTH = 12;
/** More strands than these cannot be told apart in a twist. */
const MOST_PLIES = 4;

/** Places of the strands that are seen in a cord: at least two, since one by itself cannot be twisted. */
export function pliesOf(strands: readonly number[]): readonly (number | null)[] {
  if (strands.length === 0) return [null, null];
  if (strands.length === 1) return [strands[0] ?? null, strands[0] ?? null];
  return strands.slice(0, MOST_PLIES);
}

/** Which stretch of a course is twisted, and whether the rest shows its strands side by side. */
export interface Twist {
  readonly from: number;
  readonly to: number;
}

/**
 * The strands of a cord along its courses, of which the first is the cord itself and the others the arms of its ties.
 *
 * @param twists the twisted stretch of each course, or null where all of it is loose
 * @param loose whether what is not twisted is drawn
 */
export function drawPlies(
  strands: readonly number[],
  courses: readonly Course[],
  twists: readonly (Twist | null)[],
  loose: boolean,
): Ply[] {
  const places = pliesOf(strands);
  return places.map((place, ply) => {
    const made = { id: `${ply}`, place, under: "", over: "", loose: "" };
    courses.forEach((course, k) => {
      const twist = twists[k] ?? null;
      if (twist !== null) {
        const halves = halvesOf(course, twist, ply, places.length);
        made.under += halves.under;
        made.over += halves.over;
      }
      if (loose) made.loose += looseOf(course, twist, ply, places.length);
    });
    return made;
  });
}

/** The half-waves of one strand: from one side of the cord to the other above the other strands, and back beneath them. */
function halvesOf(course: Course, twist: Twist, ply: number, plies: number): { under: string; over: string } {
  const half = PITCH / 2;
  const phase = (ply / plies) * PITCH;
  const offset = (s: number) => {
    const taper = Math.min(1, Math.max(0, (s - course.from) / TAPER), Math.max(0, (course.to - s) / TAPER));
    return AMPLITUDE * taper * -Math.cos((2 * Math.PI * (s + phase)) / PITCH);
  };
  let [under, over] = ["", ""];
  for (let k = Math.floor((twist.from + phase) / half); k * half - phase < twist.to; k += 1) {
    const from = Math.max(twist.from, k * half - phase);
    const to = Math.min(twist.to, (k + 1) * half - phase);
    if (to - from < 0.05) continue;
    const path = pathAlong(course, offset, knotsWithin(course, from, to));
    if (k % 2 === 0) over += path;
    else under += path;
  }
  return { under, over };
}

/** One strand of an untwisted cord, beside the others. */
function looseOf(course: Course, twist: Twist | null, ply: number, plies: number): string {
  const gap = Math.min(LOOSE_GAP, LOOSE_WIDTH / Math.max(1, plies - 1));
  const aside = (ply - (plies - 1) / 2) * gap;
  const along = (from: number, to: number) =>
    to - from < 0.5 ? "" : pathAlong(course, () => aside, knotsWithin(course, from, to));
  if (twist === null) return along(course.from, course.to);
  return along(course.from, twist.from) + along(twist.to, course.to);
}

/** The middle of a course. */
export function middleOf(course: Course): string {
  return pathAlong(course, () => 0, knotsWithin(course, course.from, course.to));
}

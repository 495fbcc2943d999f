import type { Branch } from "./kind.ts";

/** Where a function of a number with finitely many answers changes: between two doubles with nothing of note in between. */
export interface Border<T> {
  /** The last place where `lower` is the answer, and the first where it is not. */
  readonly below: number;
  readonly above: number;
  readonly lower: T;
  readonly upper: T;
}

/** The place to ask in a number's stead. */
export type Grid = (x: number) => number;

export const DOUBLES: Grid = (x) => x;
/** Of a parameter that counts: asked between two whole numbers, cells would only say that it is none. */
export const WHOLE_NUMBERS: Grid = Math.floor;

/** An interval is halved so often at most: enough to part neighbouring doubles of one sign and size. */
const HALVINGS = 128;
const MOST_BORDERS = 12;
/** Borders nearer to each other than this, relative to their place, are one. */
const ROUNDING = 64 * Number.EPSILON;

/**
 * The borders between the first and the last of some places, found by bisection between neighbours whose answers differ.
 * Of several changes between two neighbours all are found unless they undo each other there. One answer is asked a step.
 * @param places increasing @param same whether two answers are one @param grid the places that may be asked
 */
export function* findBordersSteps<T>(
  places: readonly number[],
  answerAt: (x: number) => T,
  same: (a: T, b: T) => boolean,
  grid: Grid = DOUBLES,
): Generator<void, Border<T>[]> {
  const borders: Border<T>[] = [];
  const [first] = places;
  if (first === undefined) return borders;
  let from: number = first;
  let lower: T = answerAt(first);
  for (const to of places.slice(1)) {
    yield;
    const upper = answerAt(to);
    while (!same(lower, upper) && borders.length < MOST_BORDERS) {
      const border: Border<T> = yield* bisected({ below: from, above: to, lower, upper }, answerAt, same, grid);
      borders.push(border);
      [from, lower] = [border.above, border.upper];
    }
    [from, lower] = [to, upper];
  }
  return borders;
}

/** The same at once. */
export function findBorders<T>(
  places: readonly number[],
  answerAt: (x: number) => T,
  same: (a: T, b: T) => boolean,
): Border<T>[] {
  return finish(findBordersSteps(places, answerAt, same));
}

/** Borders that only rounding parts, of two cells whose drifts are critical together, as one. */
export function mergedBorders<T>(borders: readonly Border<T>[]): Border<T>[] {
  const merged: Border<T>[] = [];
  for (const border of borders) {
    const last = merged.at(-1);
    const near = ROUNDING * Math.max(Math.abs(border.below), Math.abs(border.above));
    if (last === undefined || border.below - last.above > near) merged.push(border);
    else merged[merged.length - 1] = { ...border, below: last.below, lower: last.lower };
  }
  return merged;
}

/** Takes all steps of a search. */
export function finish<T>(steps: Generator<void, T>): T {
  for (;;) {
    const step = steps.next();
    if (step.done === true) return step.value;
  }
}

function* bisected<T>(
  border: Border<T>,
  answerAt: (x: number) => T,
  same: (a: T, b: T) => boolean,
  grid: Grid,
): Generator<void, Border<T>> {
  let { below, above, upper } = border;
  for (let halving = 0; halving < HALVINGS; halving += 1) {
    const middle = grid(below + (above - below) / 2);
    if (middle <= below || middle >= above) break;
    yield;
    const answer = answerAt(middle);
    if (same(border.lower, answer)) below = middle;
    else [above, upper] = [middle, answer];
  }
  return { below, above, lower: border.lower, upper };
}

/** Branches of several cells, by id: what parts one piece of a curve from the next. */
export type Branches = ReadonlyMap<string, Branch>;

/** Whether two points lie on one piece: every cell that has a branch at either has the same one at both. */
export function sameBranches(a: Branches, b: Branches): boolean {
  return a.size === b.size && [...a].every(([id, { name }]) => b.get(id)?.name === name);
}

/** What changes at a border, in words; null where no branch of a cell does. */
export interface BorderWords {
  /** "the drift of larvae is critical" */
  readonly at: string;
  /** "K is infinite with positive probability" */
  readonly below: string;
  readonly above: string;
}

/** How the first cell changes whose branch does so at a border, with all others that do so for the same reason. */
export function borderWords(lower: Branches, upper: Branches): BorderWords | null {
  const changes = [...lower].flatMap(([id, below]) => {
    const above = upper.get(id);
    return above === undefined || above.name === below.name
      ? []
      : [{ id, below, above, why: sharedBorder(below, above) }];
  });
  const [first] = changes;
  if (first === undefined) return null;
  const { why, below, above } = first;
  const ids = changes.filter((change) => change.why === why).map(({ id }) => id);
  const cells = ids.length === 1 ? ids[0] : `${ids.slice(0, -1).join(", ")} and ${ids.at(-1)}`;
  return { at: `${why} in ${cells}`, below: below.holds, above: above.holds };
}

function sharedBorder(a: Branch, b: Branch): string {
  return a.borders.find((border) => b.borders.includes(border)) ?? a.borders[0] ?? b.borders[0] ?? "the branch changes";
}

/** Which side of a border does not reach it: its own end is not attained there. */
export function openSide(lower: Branches, upper: Branches): "below" | "above" {
  for (const [id, below] of lower) {
    const above = upper.get(id);
    if (above !== undefined && above.name !== below.name) return below.closed ? "above" : "below";
  }
  return "below";
}

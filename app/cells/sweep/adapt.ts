/** A stretch without a jump, and at which of its ends what is recorded may start like a square root. */
export interface Stretch {
  readonly from: number;
  readonly to: number;
  readonly rootAt: "from" | "to" | "both" | "neither";
}

/** A point chosen: `stretch` counts from 0. */
export interface Chosen<T> {
  readonly stretch: number;
  readonly x: number;
  readonly found: T;
}

interface Placed<T> extends Chosen<T> {
  /** Place within the stretch, 0 to 1, in the variable that is halved. */
  readonly t: number;
  /** What is recorded, as it is to be drawn; null: nothing to draw. */
  readonly heights: readonly (number | null)[];
}

/** Of the points of a stretch, this share at least is laid evenly, so that nothing of note hides between them. */
const EVEN_SHARE = 1 / 4;
/** Weight of an interval's mere length against the bend of the curve at its ends. */
const LENGTH_WEIGHT = 1 / 50;
/** Weight of the length of an interval where nothing is drawn. */
const EMPTY_WEIGHT = 1e-6;
/** Where a record begins or ends to exist, the place is worth at most such a bend. */
const EDGE_WEIGHT = 1 / 20;

/**
 * Chooses `count` points on stretches of a line: first some evenly, then always the middle of the interval at whose ends the
 * recorded curves, drawn in a unit square, bend most. Towards an end with a square root the middle is that of the root's
 * argument: x = from + (to − from) t², so that the distances to the end fall fourfold at each halving.
 * Source: greedy bisection by the curvature of the polygon; common practice for drawing curves.
 * @param heightsFor given what the first points found: what is to be drawn of a point, one number for each curve
 * @returns in order of x
 */
export function adaptedPoints<T>(
  stretches: readonly Stretch[],
  count: number,
  find: (x: number) => T,
  heightsFor: (first: readonly T[]) => (found: T) => readonly (number | null)[],
): Chosen<T>[] {
  const found = (stretch: number, t: number) => {
    const x = positionOn(stretches[stretch], t);
    return { stretch, t, x, found: find(x) };
  };
  const each = Math.floor(count / Math.max(1, stretches.length));
  const even = Math.max(2, Math.min(each, 1 + Math.round(each * EVEN_SHARE)));
  const first = stretches.flatMap((_, stretch) =>
    Array.from({ length: even }, (_, index) => found(stretch, index / (even - 1))),
  );
  const heightsOf = heightsFor(first.map((point) => point.found));
  const points: Placed<T>[] = first.map((point) => ({ ...point, heights: heightsOf(point.found) }));
  const width = Math.abs((stretches.at(-1)?.to ?? 0) - (stretches[0]?.from ?? 0)) || 1;
  while (points.length < count) {
    const worst = worstInterval(points, width, stretches);
    if (worst === null) break;
    const [a, b] = [points[worst - 1], points[worst]];
    if (a === undefined || b === undefined) break;
    const middle = found(a.stretch, (a.t + b.t) / 2);
    points.splice(worst, 0, { ...middle, heights: heightsOf(middle.found) });
  }
  return points;
}

function positionOn(stretch: Stretch | undefined, t: number): number {
  if (stretch === undefined) return Number.NaN;
  const { from, to, rootAt } = stretch;
  if (t === 0) return from;
  if (t === 1) return to;
  switch (rootAt) {
    case "from":
      return from + (to - from) * t * t;
    case "to":
      return to - (to - from) * (1 - t) * (1 - t);
    case "both":
      return from + (to - from) * t * t * (3 - 2 * t);
    case "neither":
      return from + (to - from) * t;
  }
}

/** Index of the right end of the interval to be halved next; null when none can be. */
function worstInterval<T>(points: readonly Placed<T>[], width: number, stretches: readonly Stretch[]): number | null {
  const spans = spansOf(points);
  const bends = points.map((_, index) => bendAt(points, index, width, spans));
  let worst: { index: number; weight: number } | null = null;
  for (let index = 1; index < points.length; index += 1) {
    const [a, b] = [points[index - 1], points[index]];
    if (a === undefined || b === undefined || a.stretch !== b.stretch) continue;
    const middle = positionOn(stretches[a.stretch], (a.t + b.t) / 2);
    if (middle <= a.x || middle >= b.x) continue;
    const weight = Math.max(bends[index - 1] ?? 0, bends[index] ?? 0) + intervalWeight(a, b, width, spans);
    if (worst === null || weight > worst.weight) worst = { index, weight };
  }
  return worst?.index ?? null;
}

/** Of each curve, the distance from its lowest to its highest point. */
function spansOf<T>(points: readonly Placed<T>[]): number[] {
  const curves = points[0]?.heights.length ?? 0;
  return Array.from({ length: curves }, (_, curve) => {
    const heights = points.flatMap(({ heights }) => heights[curve] ?? []);
    return Math.max(...heights, Number.NEGATIVE_INFINITY) - Math.min(...heights, Number.POSITIVE_INFINITY);
  }).map((span) => (span > 0 && Number.isFinite(span) ? span : 1));
}

/** How far a point stands from the chord of its neighbours, in the unit square; the most over all curves. */
function bendAt<T>(points: readonly Placed<T>[], index: number, width: number, spans: readonly number[]): number {
  const [a, b, c] = [points[index - 1], points[index], points[index + 1]];
  if (a === undefined || b === undefined || c === undefined || a.stretch !== b.stretch || b.stretch !== c.stretch)
    return 0;
  let most = 0;
  spans.forEach((span, curve) => {
    const [ya, yb, yc] = [a.heights[curve], b.heights[curve], c.heights[curve]];
    if (ya === null || yb === null || yc === null || ya === undefined || yb === undefined || yc === undefined) return;
    const [dx, dy] = [(c.x - a.x) / width, (yc - ya) / span];
    const cross = Math.abs(dx * ((yb - ya) / span) - dy * ((b.x - a.x) / width));
    most = Math.max(most, cross / Math.hypot(dx, dy) || 0);
  });
  return most;
}

function intervalWeight<T>(a: Placed<T>, b: Placed<T>, width: number, spans: readonly number[]): number {
  const dx = (b.x - a.x) / width;
  let most = 0;
  spans.forEach((span, curve) => {
    const [ya, yb] = [a.heights[curve] ?? null, b.heights[curve] ?? null];
    if (ya === null && yb === null) most = Math.max(most, EMPTY_WEIGHT * dx);
    else if (ya === null || yb === null) most = Math.max(most, Math.min(EDGE_WEIGHT, dx));
    else most = Math.max(most, LENGTH_WEIGHT * Math.hypot(dx, (yb - ya) / span));
  });
  return most;
}

import { shortNumber } from "../values.ts";

/** A point of a curve as it is told: with the error within which a height means nothing. */
export interface Told {
  readonly x: number;
  readonly y: number;
  readonly error: number;
  /** How the height is said, where it is not the number `y` itself: a value beyond the double's range. */
  readonly words?: string;
}

/** Movements smaller than this share of a piece's height are not told. */
const SMALLEST_SHARE = 1e-6;
const MOST_TURNS = 3;

/**
 * What a piece of a curve does, in words: "rises from 1.35 at 1.41 to 5.44 at 2", with its extremes where it turns; "" where
 * there is nothing to tell. Movements within the errors are none.
 */
export function movementWords(points: readonly Told[]): string {
  const [first] = points;
  const last = points.at(-1);
  if (first === undefined || last === undefined) return "";
  if (points.length === 1) return `is ${at(first)}`;
  const corners = cornersOf(points);
  const [begin, ...others] = corners;
  if (begin === undefined || others.length === 0)
    return `stays at ${first.words ?? shortNumber(first.y)} from ${shortNumber(first.x)} to ${shortNumber(last.x)}`;
  if (others.length - 1 > MOST_TURNS) {
    const sorted = [...points].sort((a, b) => a.y - b.y);
    const [least = first, most = last] = [sorted[0], sorted.at(-1)];
    return `moves between ${at(least)} and ${at(most)}, turning ${others.length - 1} times`;
  }
  const steps = others.map((corner, index) => {
    const before = corners[index] ?? begin;
    const verb = corner.y > before.y ? "rises" : "falls";
    return index === 0 ? `${verb} from ${at(before)} to ${at(corner)}` : `${verb} to ${at(corner)}`;
  });
  return steps.length === 1 ? `${steps[0]}` : `${steps.slice(0, -1).join(", ")} and ${steps.at(-1)}`;
}

function at({ x, y, words }: Told): string {
  return `${words ?? shortNumber(y)} at ${shortNumber(x)}`;
}

/** First and last point and the turning points between; fewer than two where nothing moves. */
function cornersOf(points: readonly Told[]): readonly Told[] {
  const heights = points.map(({ y }) => y);
  const span = Math.max(...heights) - Math.min(...heights);
  const moved = (a: Told, b: Told): boolean =>
    Math.abs(b.y - a.y) > Math.max(a.error + b.error, SMALLEST_SHARE * span) && span > 0;
  const [first] = points;
  if (first === undefined) return [];
  const corners: Told[] = [first];
  /** The furthest point since the last corner. */
  let far = first;
  let direction = 0;
  for (const point of points.slice(1)) {
    if (direction === 0) {
      if (moved(first, point)) [direction, far] = [Math.sign(point.y - first.y), point];
    } else if ((point.y - far.y) * direction >= 0) far = point;
    else if (moved(far, point)) {
      corners.push(far);
      [direction, far] = [-direction, point];
    }
  }
  return direction === 0 ? corners : [...corners, far];
}

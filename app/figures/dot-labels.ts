import type { Frame, Point } from "./curve.ts";
import { type Ink, inkWithin, labelBox, overlap, textBox } from "./ink.ts";
import { type LabelRun, labelRuns } from "./label.ts";
import type { PlacedLabel } from "./labels.ts";
import { DOT_RADIUS, type PlacedSeries } from "./layout-series.ts";

/** Where labels of points may stand, and what they must keep clear of. */
export interface DotLabelPlace {
  /** The whole plate: no label leaves it. */
  readonly bounds: Frame;
  /** Lines and marks: better kept clear of. */
  readonly ink: Ink;
  /** Other labels: never overlapped. */
  readonly taken: readonly Frame[];
  readonly unit: number;
  readonly fontSize: number;
}

/** Eight directions, the best first: beside the point before above it, outward before inward. */
const DIRECTIONS: readonly (readonly [number, number])[] = [
  [1, 0],
  [1, -1],
  [1, 1],
  [0, -1],
  [0, 1],
  [-1, 0],
  [-1, -1],
  [-1, 1],
];
/** Distances from the point, in font sizes; beyond the first a line leads to the point. */
const DISTANCES = [0.7, 1.6, 2.8, 4.5, 7];

/** A label wanted at a point of the plate. */
export interface PointLabel extends Point {
  readonly tex: string;
  readonly runs: readonly LabelRun[];
  readonly colour: PlacedLabel["colour"];
}

/**
 * Places labels of single points: at the nearest place where they cover least, never over another label or beyond the
 * plate. One that has no such place is left out.
 */
export function placeDotLabels(wanted: readonly PointLabel[], place: DotLabelPlace): readonly PlacedLabel[] {
  const placed: PlacedLabel[] = [];
  const taken = [...place.taken];
  for (const point of wanted) {
    const { tex, runs, colour } = point;
    const best = bestPlace(point, runs, taken, place);
    if (!best) continue;
    const label: PlacedLabel = { runs, tex, colour, ...best };
    placed.push(label);
    taken.push(labelBox(label, place.fontSize, "middle"));
  }
  return placed;
}

/** The labels that dots of a series bear. */
export function labelsOfDots({ dots, colour }: PlacedSeries): readonly PointLabel[] {
  return dots.flatMap(({ x, y, label }) => {
    const runs = labelRuns(label);
    return runs.length === 0 ? [] : [{ x, y, tex: label, runs, colour: colour === "edge" ? "quiet" : colour }];
  });
}

type Standing = Pick<PlacedLabel, "x" | "y" | "anchor" | "leader">;

function bestPlace(
  dot: Point,
  runs: readonly LabelRun[],
  taken: readonly Frame[],
  { bounds, ink, unit, fontSize }: DotLabelPlace,
): Standing | null {
  let best: Standing | null = null;
  let least = Number.POSITIVE_INFINITY;
  DISTANCES.forEach((distance, far) => {
    for (const direction of DIRECTIONS) {
      const standing = standingAt(dot, direction, distance * fontSize, far > 0, unit);
      const box = textBox(runs, standing.x, standing.y, standing.anchor, fontSize);
      if (!isInside(box, bounds) || taken.some((other) => overlap(other, grown(box, 1)) > 0)) continue;
      // A place further off has to be clearer by some letters' width.
      const cost = inkWithin(grown(box, unit), ink) + far * 2 * fontSize;
      if (cost < least - 1e-9) [best, least] = [standing, cost];
    }
  });
  return best;
}

function standingAt(
  dot: Point,
  [dx, dy]: readonly [number, number],
  distance: number,
  led: boolean,
  unit: number,
): Standing {
  const slant = dx !== 0 && dy !== 0 ? 0.8 : 1;
  const x = dot.x + dx * (distance * slant);
  const y = dot.y + dy * (distance * slant + (dx === 0 ? 2 * unit : 0));
  const anchor = dx > 0 ? "start" : dx < 0 ? "end" : "middle";
  if (!led) return { x, y, anchor, leader: null };
  const length = Math.hypot(x - dot.x, y - dot.y) || 1;
  const from = (DOT_RADIUS + 1) * unit;
  const to = length - (dx === 0 ? 7 : 2) * unit;
  const at = (d: number) =>
    `${(dot.x + ((x - dot.x) * d) / length).toFixed(2)} ${(dot.y + ((y - dot.y) * d) / length).toFixed(2)}`;
  return { x, y, anchor, leader: `M${at(from)}L${at(to)}` };
}

const isInside = (box: Frame, bounds: Frame) =>
  box.left >= bounds.left && box.right <= bounds.right && box.top >= bounds.top && box.bottom <= bounds.bottom;

const grown = (box: Frame, by: number): Frame => ({
  left: box.left - by,
  right: box.right + by,
  top: box.top - by,
  bottom: box.bottom + by,
});

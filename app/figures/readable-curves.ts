import type { Frame } from "./curve.ts";
import type { PlacedCurve, PlacedPoint } from "./point-places.ts";
import type { CurveReadings } from "./types.ts";

/** A curve that can be read: its points that stand on the plate and have something to say. */
export interface Curve {
  readonly name: string;
  readonly points: readonly ReadPoint[];
  /** Between the axes it is drawn on. */
  readonly frame: Frame;
  /** Its abscissas need not increase. */
  readonly inPlane: boolean;
}

export interface ReadPoint extends PlacedPoint {
  readonly text: string;
}

/** A point of a curve by its number. */
export interface PointAsked {
  readonly curve: number;
  readonly at: number;
}

/** Curves with at least a point that has something to say. */
export function readableCurves(curves: readonly PlacedCurve[], readings: readonly CurveReadings[]): readonly Curve[] {
  return curves.flatMap(({ points, frame, series }, k) => {
    const { name = "", texts = [] } = readings[k] ?? {};
    const read = points.flatMap((point) => {
      const text = texts[point.i] ?? "";
      return text === "" ? [] : [{ ...point, text }];
    });
    return read.length === 0 ? [] : [{ name, points: read, frame, inPlane: series.parametric === true }];
  });
}

/** The pointer reads a point that is this near to it, or this near to the upright through it [px]. */
const REACH = 40;

/**
 * The point that a place on the plate asks for; null where there is none. Between axes each curve is asked at its point
 * nearest to the upright through the place, and the curve nearest above or below answers; a curve in the plane is asked
 * for its nearest point. Where an inset stands on the axes of another, the curves of the smaller are asked.
 */
export function nearestPoint(curves: readonly Curve[], x: number, y: number): PointAsked | null {
  let found: (PointAsked & { readonly size: number; readonly apart: number }) | null = null;
  for (const [k, { frame, inPlane, points }] of curves.entries()) {
    if (!isNear(frame, x, y)) continue;
    const size = (frame.right - frame.left) * (frame.bottom - frame.top);
    const at = leastOf(points, (point) => (inPlane ? Math.hypot(point.x - x, point.y - y) : Math.abs(point.x - x)));
    const point = at === null ? undefined : points[at];
    if (at === null || point === undefined) continue;
    const [across, apart] = [Math.abs(point.x - x), Math.hypot(point.x - x, point.y - y)];
    if ((inPlane ? apart : across) > REACH) continue;
    if (found === null || size < found.size || (size === found.size && apart < found.apart))
      found = { curve: k, at, size, apart };
  }
  return found;
}

function isNear({ left, right, top, bottom }: Frame, x: number, y: number): boolean {
  return x >= left - MARGIN && x <= right + MARGIN && y >= top - MARGIN && y <= bottom + MARGIN;
}

/** So far beyond its axes a plot is still pointed at [px]. */
const MARGIN = 12;

/** Where a measure is least; null of no points. */
function leastOf(points: readonly ReadPoint[], measure: (point: ReadPoint) => number): number | null {
  let [least, found]: [number, number | null] = [Number.POSITIVE_INFINITY, null];
  points.forEach((point, at) => {
    const own = measure(point);
    if (own >= least) return;
    [least, found] = [own, at];
  });
  return found;
}

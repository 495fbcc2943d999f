import type { PlacedCurve, PlacedPoint } from "./point-places.ts";
import type { CurveReadings } from "./types.ts";

/** A curve that can be read: its points that stand on the plate and have something to say. */
export interface Curve {
  readonly name: string;
  readonly points: readonly ReadPoint[];
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
  return curves.flatMap(({ points }, k) => {
    const { name = "", texts = [] } = readings[k] ?? {};
    const read = points.flatMap((point) => {
      const text = texts[point.i] ?? "";
      return text === "" ? [] : [{ ...point, text }];
    });
    return read.length === 0 ? [] : [{ name, points: read }];
  });
}

/** The pointer reads a point when it is this near [px]. */
const REACH = 40;

/** The point nearest to a place on the plate; null where none is within reach. */
export function nearestPoint(curves: readonly Curve[], x: number, y: number): PointAsked | null {
  let found: PointAsked | null = null;
  let distance = REACH;
  curves.forEach(({ points }, curve) => {
    points.forEach((point, at) => {
      const apart = Math.hypot(point.x - x, point.y - y);
      if (apart >= distance) return;
      distance = apart;
      found = { curve, at };
    });
  });
  return found;
}

import { area, line } from "d3-shape";

export interface Point {
  readonly x: number;
  readonly y: number;
}

export interface Frame {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

/** Points nearer than this to the straight line between their neighbours are left out: far below what can be seen. */
const FLATNESS_PX = 0.06;

/**
 * Parts a curve at its gaps and at the frame; crossings of the frame are put exactly on it.
 * @param points `null` is a gap
 * @returns pieces of two points or more, in order
 */
export function piecesWithin(points: readonly (Point | null)[], frame: Frame): readonly (readonly Point[])[] {
  const pieces: Point[][] = [];
  let piece: Point[] = [];
  const finish = () => {
    if (piece.length > 1) pieces.push(piece);
    piece = [];
  };
  for (let i = 1; i < points.length; i += 1) {
    const from = points[i - 1];
    const to = points[i];
    const cut = from && to ? clipSegment(from, to, frame) : null;
    if (!cut) {
      finish();
      continue;
    }
    const last = piece.at(-1);
    if (!last || last.x !== cut[0].x || last.y !== cut[0].y) {
      finish();
      piece.push(cut[0]);
    }
    piece.push(cut[1]);
    if (cut[1] !== to) finish();
  }
  finish();
  return pieces;
}

/** The part of a segment within a rectangle; null where none is. Liang and Barsky's clipping of a segment to a rectangle. Source: ACM Trans. Graph. 3 (1984) 1-22. */
export function clipSegment(from: Point, to: Point, frame: Frame): readonly [Point, Point] | null {
  const dx = to.x - from.x;
  const dy = to.y - from.y;
  let enter = 0;
  let leave = 1;
  const edges: readonly (readonly [number, number])[] = [
    [-dx, from.x - frame.left],
    [dx, frame.right - from.x],
    [-dy, from.y - frame.top],
    [dy, frame.bottom - from.y],
  ];
  for (const [speed, distance] of edges) {
    if (speed === 0) {
      if (distance < 0) return null;
      continue;
    }
    const at = distance / speed;
    if (speed < 0) enter = Math.max(enter, at);
    else leave = Math.min(leave, at);
  }
  if (enter > leave) return null;
  const point = (t: number): Point => ({ x: from.x + t * dx, y: from.y + t * dy });
  return [enter > 0 ? point(enter) : from, leave < 1 ? point(leave) : to];
}

/** Leaves out points that lie on the line between those kept (Douglas and Peucker, with a stack instead of recursion). */
function withoutFlatPoints(points: readonly Point[], tolerance = FLATNESS_PX): readonly Point[] {
  const keep = new Uint8Array(points.length);
  keep[0] = 1;
  keep[points.length - 1] = 1;
  const open: [number, number][] = [[0, points.length - 1]];
  for (let span = open.pop(); span; span = open.pop()) {
    const [from, to] = span;
    const a = points[from];
    const b = points[to];
    if (!a || !b) continue;
    let farthest = -1;
    let distance = tolerance;
    const length = Math.hypot(b.x - a.x, b.y - a.y) || 1;
    for (let i = from + 1; i < to; i += 1) {
      const p = points[i];
      if (!p) continue;
      const away = Math.abs((b.x - a.x) * (a.y - p.y) - (a.x - p.x) * (b.y - a.y)) / length;
      if (away > distance) {
        farthest = i;
        distance = away;
      }
    }
    if (farthest < 0) continue;
    keep[farthest] = 1;
    open.push([from, farthest], [farthest, to]);
  }
  return points.filter((_, i) => keep[i] === 1);
}

/** SVG path of the pieces, to a hundredth of a pixel. */
export function curvePath(pieces: readonly (readonly Point[])[]): string {
  const draw = line<Point>(
    (p) => p.x,
    (p) => p.y,
  ).digits(2);
  return pieces.map((piece) => draw(withoutFlatPoints(piece)) ?? "").join("");
}

export interface BandPoint {
  readonly x: number;
  readonly low: number;
  readonly high: number;
}

/** SVG path of a band, cut to the frame. `null` is a gap. */
export function bandPath(points: readonly (BandPoint | null)[], frame: Frame): string {
  const within = (y: number) => Math.min(frame.bottom, Math.max(frame.top, y));
  const draw = area<BandPoint | null>()
    .defined((p) => p !== null && p.x >= frame.left - 1e-9 && p.x <= frame.right + 1e-9)
    .x((p) => p?.x ?? 0)
    .y0((p) => within(p?.low ?? 0))
    .y1((p) => within(p?.high ?? 0))
    .digits(2);
  return draw([...points]) ?? "";
}

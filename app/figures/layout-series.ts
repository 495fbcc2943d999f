import { extent } from "d3-array";
import { type BandPoint, bandPath, curvePath, type Frame, type Point, piecesWithin } from "./curve.ts";
import type { Colour } from "./palette.ts";
import { plotted, plottedInterval, plottedY } from "./range.ts";
import type { Figure, Series } from "./types.ts";

export const ORDINARY_WIDTH = 1.7;
export const PRINCIPAL_WIDTH = 2.4;
/** Radius of a dot that is set apart on a curve, and of the ring of one that is not attained. */
export const DOT_RADIUS = 3.3;

export interface Mark {
  readonly x: number;
  /** null where the value itself cannot stand on the axis, but its interval can. */
  readonly y: number | null;
  /** Ends of the bar of its interval, where one is drawn. */
  readonly bar: readonly [number, number] | null;
}

export interface PlacedDot extends Point {
  readonly label: string;
  readonly hollow: boolean;
}

export interface PlacedSeries {
  readonly name: string;
  readonly series: Series;
  readonly colour: Colour;
  readonly principal: boolean;
  readonly reference: boolean;
  readonly thin: boolean;
  /** Path of the line; "" when the series has marks. */
  readonly line: string;
  /** The line's points, cut to the frame. */
  readonly pieces: readonly (readonly Point[])[];
  readonly band: string;
  readonly bandPoints: readonly (BandPoint | null)[];
  readonly marks: readonly Mark[];
  readonly radius: number;
  /** Means with intervals are rings: filled with paper, or open round other marks. */
  readonly ring: "filled" | "open" | null;
  /** Foot of the stems; null when none are drawn. */
  readonly foot: number | null;
  /** Dot where a labelled curve starts on the vertical axis. */
  readonly start: Point | null;
  readonly dots: readonly PlacedDot[];
  /** Tip and both barbs of the arrowhead. */
  readonly arrow: readonly [Point, Point, Point] | null;
}

/** What is fine and grey lies under the curves, the principal one over them: series are drawn in this order. */
export const weight = ({ principal, thin }: PlacedSeries): number => (principal ? 1 : thin ? -1 : 0);

/** Stems nearer than this would run into one area: their heads alone are drawn. */
const CLOSEST_STEMS = 3;

/** What a series needs to know of the plate it is put on. */
export interface Placing {
  /** Of several series of points, each is drawn smaller than the one before, so that none hides another. */
  readonly share: number;
  readonly toX: (at: number) => number;
  readonly toY: (at: number) => number;
  readonly inner: Frame;
  readonly unit: number;
  readonly labelsAreTicks: boolean;
}

export const isRing = (series: Series): boolean => series.mark === "points" && series.low !== undefined;

/** Puts one series on the plate: its path or marks, its band or bars, its dots. */
export function placeSeries(series: Series, colour: Colour, figure: Figure, placing: Placing): PlacedSeries {
  const { inner, unit } = placing;
  const points = series.x.map((_, i) => pointAt(series, i, figure, placing));
  const lined = series.mark === "line";
  const pieces = lined ? piecesWithin(points, inner) : [];
  const bandPoints = lined || series.mark === "band" ? visibleBand(series, figure, placing) : [];
  const { marks, spacing, radius } = lined || series.mark === "band" ? NO_MARKS : placeMarks(series, figure, placing);
  const first = points[0] ?? null;
  return {
    name: series.name,
    series,
    colour,
    principal: series.role === "principal",
    reference: series.role === "reference",
    thin: series.role === "thin",
    line: curvePath(pieces),
    pieces,
    band: bandPath(bandPoints, inner),
    bandPoints,
    marks,
    radius,
    ring: isRing(series) ? (placing.share > 1 ? "open" : "filled") : null,
    foot: series.mark === "stems" && spacing >= CLOSEST_STEMS * unit ? inner.bottom : null,
    start:
      lined && placing.labelsAreTicks && series.labelAt === "start" && first && isInside(first, inner) ? first : null,
    dots: (series.dots ?? []).flatMap(({ at, label, hollow }) => {
      const point = points[at];
      return point && isInside(point, inner) ? [{ ...point, label, hollow }] : [];
    }),
    arrow: series.arrow === true ? arrowhead(pieces, unit) : null,
  };
}

function pointAt(series: Series, i: number, figure: Figure, { toX, toY }: Placing): Point | null {
  const x = plotted(figure.x, series.x[i] ?? null);
  const y = plottedY(figure.y, series, i);
  return x === null || y === null ? null : { x: toX(x), y: toY(y) };
}

const isInside = (p: Point, frame: Frame) =>
  p.x >= frame.left - 0.5 && p.x <= frame.right + 0.5 && p.y >= frame.top - 0.5 && p.y <= frame.bottom + 0.5;

const NO_MARKS = { marks: [], spacing: Number.POSITIVE_INFINITY, radius: 0 };

function placeMarks(
  series: Series,
  figure: Figure,
  placing: Placing,
): { readonly marks: readonly Mark[]; readonly spacing: number; readonly radius: number } {
  const { toX, toY, inner, unit, share } = placing;
  const found = series.x.flatMap((value, i) => {
    const at = plotted(figure.x, value);
    const x = at === null ? null : toX(at);
    if (x === null || x < inner.left - 0.5 || x > inner.right + 0.5) return [];
    const point = pointAt(series, i, figure, placing);
    const interval = plottedInterval(figure.y, series, i);
    const bar = interval && clippedBar(toY(interval[0]), toY(interval[1]), inner);
    const y = point && isInside(point, inner) ? point.y : null;
    return y === null && (bar === null || point !== null) ? [] : [{ x, y, bar }];
  });
  const [first, last] = extent(found, (mark) => mark.x);
  const spacing =
    found.length > 1 && first !== undefined ? (last - first) / (found.length - 1) : Number.POSITIVE_INFINITY;
  const radius = Math.max(1, Math.min(3.3, spacing * 0.4) * share) * unit;
  // A bar that its mark hides is not drawn.
  const shown = (bar: Mark["bar"]) => bar !== null && Math.abs(bar[0] - bar[1]) > 2 * radius;
  return { marks: found.map((mark) => ({ ...mark, bar: shown(mark.bar) ? mark.bar : null })), spacing, radius };
}

/** A bar cut to the frame; null where it lies outside. */
function clippedBar(low: number, high: number, frame: Frame): readonly [number, number] | null {
  const from = Math.min(frame.bottom, low);
  const to = Math.max(frame.top, high);
  return from < frame.top || to > frame.bottom ? null : [from, to];
}

/** The points of a band; none where it is thinner than its line, which the caption says. */
function visibleBand(series: Series, figure: Figure, { toX, toY, inner, unit }: Placing): (BandPoint | null)[] {
  let thickest = 0;
  const band = series.x.map((value, i): BandPoint | null => {
    const x = plotted(figure.x, value);
    const interval = plottedInterval(figure.y, series, i);
    if (x === null || interval === null) return null;
    const low = Math.min(inner.bottom, toY(interval[0]));
    const high = toY(interval[1]);
    thickest = Math.max(thickest, Math.abs(low - high));
    return { x: toX(x), low, high };
  });
  return series.mark === "band" || thickest > ORDINARY_WIDTH * unit ? band : [];
}

/** Half-way along the longest piece, pointing where the curve goes. */
function arrowhead(pieces: readonly (readonly Point[])[], unit: number): PlacedSeries["arrow"] {
  const lengths = pieces.map(lengthOf);
  const longest = Math.max(0, ...lengths);
  const piece = pieces[lengths.indexOf(longest)];
  if (!piece || longest < 24 * unit) return null;
  let left = longest / 2;
  for (let i = 1; i < piece.length; i += 1) {
    const from = piece[i - 1];
    const to = piece[i];
    if (!from || !to) continue;
    const length = Math.hypot(to.x - from.x, to.y - from.y);
    if (length < left || length === 0) {
      left -= length;
      continue;
    }
    const [dx, dy] = [(to.x - from.x) / length, (to.y - from.y) / length];
    const tip = { x: from.x + dx * left + dx * 4 * unit, y: from.y + dy * left + dy * 4 * unit };
    const barb = (side: 1 | -1): Point => ({
      x: tip.x - dx * 8 * unit - side * dy * 3 * unit,
      y: tip.y - dy * 8 * unit + side * dx * 3 * unit,
    });
    return [tip, barb(1), barb(-1)];
  }
  return null;
}

function lengthOf(piece: readonly Point[]): number {
  return piece.reduce((sum, point, i) => {
    const before = piece[i - 1];
    return before ? sum + Math.hypot(point.x - before.x, point.y - before.y) : 0;
  }, 0);
}

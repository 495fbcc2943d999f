import { bandPath, curvePath, type Frame, type Point, piecesWithin } from "./curve.ts";
import type { Colour } from "./palette.ts";
import { plotted, plottedY } from "./range.ts";
import type { Figure, Series } from "./types.ts";

export const ORDINARY_WIDTH = 1.7;
export const PRINCIPAL_WIDTH = 2.4;
export interface Mark {
  readonly x: number;
  readonly y: number;
  /** Ends of the bar of its interval, where one is drawn. */
  readonly bar: readonly [number, number] | null;
}

export interface PlacedSeries {
  readonly name: string;
  readonly series: Series;
  readonly colour: Colour;
  readonly principal: boolean;
  readonly reference: boolean;
  /** Path of the line; "" when the series has marks. */
  readonly line: string;
  readonly band: string;
  readonly marks: readonly Mark[];
  readonly radius: number;
  /** Means with intervals are rings. */
  readonly ring: boolean;
  /** Foot of the stems; null when none are drawn. */
  readonly foot: number | null;
  /** Dot where a labelled curve starts on the vertical axis. */
  readonly start: Point | null;
}

/** Stems nearer than this would run into one area: their heads alone are drawn. */
const CLOSEST_STEMS = 3;

/** What a series needs to know of the plate it is put on. */
export interface Placing {
  readonly toX: (at: number) => number;
  readonly toY: (at: number) => number;
  readonly inner: Frame;
  readonly unit: number;
  readonly labelsAreTicks: boolean;
  readonly remarks: string[];
}

/** Puts one series on the plate: its path or marks, its band or bars. */
export function placeSeries(series: Series, colour: Colour, figure: Figure, placing: Placing): PlacedSeries {
  const { toX, toY, inner, unit } = placing;
  const points = series.x.map((value, i): Point | null => {
    const px = plotted(figure.x, value);
    const py = plottedY(figure.y, series, i);
    return px === null || py === null ? null : { x: toX(px), y: toY(py) };
  });
  const interval = (i: number): readonly [number, number] | null => {
    const low = plotted(figure.y, series.low?.[i] ?? null);
    const high = plotted(figure.y, series.high?.[i] ?? null);
    return low === null || high === null ? null : [toY(low), toY(high)];
  };
  const lined = series.mark === "line";
  const inside = (p: Point | null): p is Point =>
    p !== null &&
    p.x >= inner.left - 0.5 &&
    p.x <= inner.right + 0.5 &&
    p.y >= inner.top - 0.5 &&
    p.y <= inner.bottom + 0.5;
  const inView = lined ? [] : points.flatMap((p, i) => (inside(p) ? [{ ...p, i }] : []));
  const spacing =
    inView.length > 1
      ? ((inView.at(-1)?.x ?? 0) - (inView[0]?.x ?? 0)) / (inView.length - 1)
      : Number.POSITIVE_INFINITY;
  const radius = Math.max(1, Math.min(3.3, spacing * 0.4)) * unit;
  const marks = inView.map(({ x, y, i }): Mark => {
    const bar = series.low && series.high ? interval(i) : null;
    // A bar that its mark hides is not drawn.
    return { x, y, bar: bar && Math.abs(bar[0] - bar[1]) > 2 * radius ? bar : null };
  });
  const first = points[0];
  return {
    name: series.name,
    series,
    colour,
    principal: series.role === "principal",
    reference: series.role === "reference",
    line: lined ? curvePath(piecesWithin(points, inner)) : "",
    band: lined && series.low && series.high ? visibleBand(series, points, interval, placing) : "",
    marks,
    radius,
    ring: series.mark === "points" && series.low !== undefined,
    foot: series.mark === "stems" && spacing >= CLOSEST_STEMS * unit ? inner.bottom : null,
    start:
      lined && placing.labelsAreTicks && series.labelAt === "start" && inside(first ?? null) ? (first ?? null) : null,
  };
}

/** A band thinner than its line is not drawn, and that is said. */
function visibleBand(
  series: Series,
  points: readonly (Point | null)[],
  interval: (i: number) => readonly [number, number] | null,
  placing: Placing,
): string {
  let thickest = 0;
  const band = points.map((point, i) => {
    const ends = interval(i);
    if (!point || !ends) return null;
    thickest = Math.max(thickest, Math.abs(ends[0] - ends[1]));
    return { x: point.x, low: ends[0], high: ends[1] };
  });
  if (thickest > ORDINARY_WIDTH * placing.unit) return bandPath(band, placing.inner);
  if (thickest > 0) placing.remarks.push(`The error of ${series.name} is thinner than its line.`);
  return "";
}

import type { Axis, Figure, Series } from "./types.ts";

/** Ends of an axis in plotted coordinates (log10 of the value on a log axis), low < high. */
export interface Ends {
  readonly low: number;
  readonly high: number;
}

/** A positive quantity whose smallest value is below this share of its largest is drawn from 0. */
const SHARE_FROM_ZERO = 0.4;

/** Beyond this a linear axis has no room; below its inverse all is 0: lengths of axes stay ordinary numbers. */
const LARGEST = 1e300;
/** Ends nearer than this, relative to themselves, are one: doubles cannot tell places between them. */
const SAME = 1e-12;

/**
 * Where a value stands on its axis: itself, or its log10; null where it cannot stand there (a gap; not positive on a log axis).
 * @param log10 the value's log10 where the value itself is below the double's range
 */
export function plotted(axis: Axis, value: number | null, log10?: number | null): number | null {
  if (axis.scale === "linear") {
    if (value === null || !(Math.abs(value) < LARGEST)) return null;
    return Math.abs(value) < 1 / LARGEST ? 0 : value;
  }
  if (log10 !== undefined && log10 !== null) return Number.isFinite(log10) ? log10 : null;
  return value !== null && value > 0 && Number.isFinite(value) ? Math.log10(value) : null;
}

/** Plotted y of the i-th point of a series. */
export function plottedY(axis: Axis, series: Series, i: number): number | null {
  return plotted(axis, series.y[i] ?? null, series.log10y?.[i]);
}

/**
 * Plotted ends of the interval at the i-th point; null where there is none. On a log axis an interval from 0 or below has
 * its lower end at minus infinity: it reaches down to the frame.
 */
export function plottedInterval(axis: Axis, series: Series, i: number): readonly [number, number] | null {
  const low = series.low?.[i] ?? null;
  const high = plotted(axis, series.high?.[i] ?? null, series.log10high?.[i]);
  if (high === null) return null;
  const from = plotted(axis, low, series.log10low?.[i]);
  if (from !== null) return [from, high];
  return axis.scale === "log" && low !== null && low <= 0 ? [Number.NEGATIVE_INFINITY, high] : null;
}

/** Where the i-th point of a series is to be labelled: its own height, or the middle of its band. */
export function labelledY(axis: Axis, series: Series, i: number): number | null {
  const y = plottedY(axis, series, i);
  const interval = y === null ? plottedInterval(axis, series, i) : null;
  if (interval === null) return y;
  return Number.isFinite(interval[0]) ? (interval[0] + interval[1]) / 2 : interval[1];
}

/** Ends of the horizontal axis: the chosen ones, else those of the data and the references. */
export function xEnds(figure: Figure): Ends {
  const chosen = chosenEnds(figure.x);
  if (chosen) return chosen;
  const values: number[] = [];
  for (const series of figure.series) for (const x of series.x) push(values, plotted(figure.x, x));
  for (const vertical of figure.verticals ?? []) push(values, plotted(figure.x, vertical.x));
  return widened(values);
}

/** Ends of the vertical axis: the chosen ones, else those of the data, their bands and the levels; from 0 where that is natural. */
export function yEnds(figure: Figure): Ends {
  const chosen = chosenEnds(figure.y);
  if (chosen) return chosen;
  const values: number[] = [];
  const x = xEnds(figure);
  for (const series of figure.series) {
    for (let i = 0; i < series.x.length; i += 1) {
      const at = plotted(figure.x, series.x[i] ?? null);
      if (at === null || at < x.low || at > x.high) continue;
      push(values, plottedY(figure.y, series, i));
      for (const end of plottedInterval(figure.y, series, i) ?? []) push(values, end);
    }
  }
  for (const level of figure.levels) push(values, plotted(figure.y, level.y));
  if (figure.y.scale === "linear") {
    const smallest = minimum(values);
    const stems = figure.series.some((series) => series.mark === "stems");
    if (smallest > 0 && (stems || smallest < SHARE_FROM_ZERO * maximum(values))) values.push(0);
  }
  return widened(values);
}

/** Whether a place in plotted coordinates belongs to an axis. */
export const isWithin = (at: number | null, { low, high }: Ends): at is number =>
  at !== null && at >= low && at <= high;

function chosenEnds(axis: Axis): Ends | null {
  if (!axis.range) return null;
  const [a, b] = axis.range.map((value) => plotted(axis, value));
  return a !== null && b !== null && a !== undefined && b !== undefined && areApart(a, b) ? { low: a, high: b } : null;
}

/** A single value, or none, still gets an axis with room around it. */
function widened(values: readonly number[]): Ends {
  if (values.length === 0) return { low: 0, high: 1 };
  const low = minimum(values);
  const high = maximum(values);
  if (areApart(low, high)) return { low, high };
  const room = low === 0 ? 1 : Math.abs(low) * 0.1;
  return { low: low - room, high: high + room };
}

const areApart = (low: number, high: number): boolean => high - low > SAME * Math.max(Math.abs(low), Math.abs(high));

function push(values: number[], value: number | null): void {
  if (value !== null && Number.isFinite(value)) values.push(value);
}

const minimum = (values: readonly number[]) => values.reduce((a, b) => Math.min(a, b), Number.POSITIVE_INFINITY);
const maximum = (values: readonly number[]) => values.reduce((a, b) => Math.max(a, b), Number.NEGATIVE_INFINITY);

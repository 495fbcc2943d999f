import { isWithin, plotted, plottedY, xEnds } from "./range.ts";
import type { Figure, Series } from "./types.ts";

/** A place where one curve passes another, and which lies above from there on. */
export interface Crossing {
  readonly x: number;
  /** The points between which it lies: what is known where there is nothing in between. */
  readonly between: readonly [number, number];
  /** The first of the two lies above after it. */
  readonly firstAbove: boolean;
}

/** A point of two curves over one abscissa, in plotted coordinates. */
interface Pair {
  readonly x: number;
  /** Height of the first above the second. */
  readonly apart: number;
  /** Half-widths of both added: heights nearer than this are not told apart. */
  readonly error: number;
}

/**
 * Where two series of a figure cross, on the abscissas they share; by linear interpolation in plotted coordinates. Where
 * they lie within their errors or intervals of one another neither is above.
 */
export function crossings(figure: Figure, a: Series, b: Series): readonly Crossing[] {
  const pairs = commonPoints(figure, a, b);
  const found: Crossing[] = [];
  let before: Pair | null = null;
  for (const pair of pairs) {
    if (Math.abs(pair.apart) <= pair.error) continue;
    if (before && Math.sign(before.apart) !== Math.sign(pair.apart)) {
      const share = before.apart / (before.apart - pair.apart);
      const at = before.x + share * (pair.x - before.x);
      const value = (x: number) => (figure.x.scale === "log" ? 10 ** x : x);
      found.push({ x: value(at), between: [value(before.x), value(pair.x)], firstAbove: pair.apart > 0 });
    }
    before = pair;
  }
  return found;
}

/** Where a series passes a level. */
export function levelCrossings(figure: Figure, series: Series, level: number): readonly Crossing[] {
  const flat: Series = { ...series, y: series.x.map(() => level), log10y: undefined, low: undefined, high: undefined };
  return crossings(figure, series, { ...flat, log10low: undefined, log10high: undefined });
}

function commonPoints(figure: Figure, a: Series, b: Series): readonly Pair[] {
  if (a.parametric === true || b.parametric === true) return [];
  const inB = new Map(b.x.map((x, i) => [x, i]));
  const ends = xEnds(figure);
  return a.x.flatMap((value, i): Pair[] => {
    const j = inB.get(value);
    const x = plotted(figure.x, value);
    const ya = plottedY(figure.y, a, i);
    const yb = j === undefined ? null : plottedY(figure.y, b, j);
    if (j === undefined || !isWithin(x, ends) || ya === null || yb === null) return [];
    return [{ x, apart: ya - yb, error: halfWidth(figure, a, i, ya) + halfWidth(figure, b, j, yb) }];
  });
}

function halfWidth(figure: Figure, series: Series, i: number, y: number): number {
  const high = plotted(figure.y, series.high?.[i] ?? null, series.log10high?.[i]);
  return high === null ? 0 : Math.abs(high - y);
}

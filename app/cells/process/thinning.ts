/** Above so many stems a figure is a grey wall. */
const MOST_PLOTTED = 240;
/** Rows 0 to here are all tabulated. */
const ALL_ROWS_TO = 10;

/** Which n of 0 … upTo a figure draws: all, or evenly spaced ones with both ends. */
export function plottedCounts(upTo: number): number[] {
  if (upTo < MOST_PLOTTED) return Array.from({ length: upTo + 1 }, (_, n) => n);
  const drawn = Array.from({ length: MOST_PLOTTED }, (_, index) => Math.round((index * upTo) / (MOST_PLOTTED - 1)));
  return [...new Set(drawn)];
}

/** Which n a table lists: 0 to 10, then 20, 50, 100, 200, 500, … and upTo. */
export function tabulatedCounts(upTo: number): number[] {
  const rows = Array.from({ length: Math.min(upTo, ALL_ROWS_TO) + 1 }, (_, n) => n);
  for (let decade = 10; decade <= upTo; decade *= 10) {
    for (const step of [2, 5, 10]) if (decade * step < upTo) rows.push(decade * step);
  }
  if (upTo > ALL_ROWS_TO) rows.push(upTo);
  return rows;
}

/** Which n from 1 a comparison with an asymptotic law takes: evenly spaced in log n, the tabulated ones among them. */
export function comparedCounts(upTo: number): number[] {
  const perDecade = 24;
  const compared = new Set(tabulatedCounts(upTo).filter((n) => n >= 1));
  const steps = Math.ceil(perDecade * Math.log10(upTo));
  for (let step = 0; step <= steps; step += 1) compared.add(Math.round(upTo ** (step / Math.max(1, steps))));
  return [...compared].sort((a, b) => a - b);
}

import type { Frame } from "./curve.ts";
import { type LabelRun, labelRuns } from "./label.ts";
import type { PlacedLabel } from "./labels.ts";
import { runsWidth } from "./measure.ts";
import type { Tick } from "./ticks.ts";

export const TICK_LENGTH = 5;

export interface PlacedTick {
  readonly position: number;
  readonly at: number;
  readonly runs: readonly LabelRun[];
  readonly tex: string;
  /** False where the number would run into the axis' variable. */
  readonly shown: boolean;
}

export interface PlacedXLabel {
  readonly label: PlacedLabel;
  readonly from: number;
}

/** The variable stands at the end of its axis: beyond it where there is room, else in place of the last number. */
export function placeXLabel(
  runs: readonly LabelRun[],
  tex: string,
  ticks: readonly Tick[],
  frame: Frame,
  toX: (at: number) => number,
  width: number,
  fontSize: number,
): PlacedXLabel | null {
  if (runs.length === 0) return null;
  const own = runsWidth(runs, fontSize * 1.2);
  const last = ticks.at(-1);
  const lastEnd = last ? toX(last.at) + runsWidth(last.runs, fontSize) / 2 : frame.left;
  const beyond = lastEnd + fontSize * 0.8;
  const fits = beyond + own <= width && lastEnd > frame.right - own;
  const x = fits ? beyond : frame.right;
  const label: PlacedLabel = {
    runs,
    tex,
    colour: "ink",
    x,
    y: frame.bottom + TICK_LENGTH + fontSize * 1.05,
    anchor: fits ? "start" : "end",
    leader: null,
  };
  return { label, from: fits ? Number.POSITIVE_INFINITY : frame.right - own };
}

/**
 * As many ticks of the horizontal axis as were wanted, or so many fewer that their numbers stand apart.
 * @param ticksFor ticks for about so many
 */
export function ticksApart(
  ticksFor: (wanted: number) => readonly Tick[],
  wanted: number,
  toX: (at: number) => number,
  fontSize: number,
): readonly Tick[] {
  for (let count = wanted; count > 2; count -= 1) {
    const ticks = ticksFor(count);
    if (ticks.every((tick, i) => i === 0 || standApart(ticks[i - 1], tick, toX, fontSize))) return ticks;
  }
  return ticksFor(2);
}

/**
 * Ticks of the horizontal axis at their places; a number gives way to the one before it, to the axis' variable and to the
 * edges of the plate.
 */
export function placedTicks(
  ticks: readonly Tick[],
  toX: (at: number) => number,
  xLabel: PlacedXLabel | null,
  width: number,
  fontSize: number,
): readonly PlacedTick[] {
  let last: Tick | undefined;
  return ticks.map((tick) => {
    const position = toX(tick.at);
    const half = runsWidth(tick.runs, fontSize) / 2;
    const isFree = xLabel === null || position + half + fontSize * 0.3 < xLabel.from;
    const isInside = position - half >= 0 && position + half <= width;
    const shown = isFree && isInside && standApart(last, tick, toX, fontSize);
    if (shown) last = tick;
    return { ...tick, position, shown };
  });
}

function standApart(a: Tick | undefined, b: Tick, toX: (at: number) => number, fontSize: number): boolean {
  if (a === undefined) return true;
  const half = (runsWidth(a.runs, fontSize) + runsWidth(b.runs, fontSize)) / 2;
  return toX(b.at) - toX(a.at) >= half + fontSize * 0.4;
}

/** The variable of the vertical axis stands above its numbers. */
export function placeYLabel(
  runs: readonly LabelRun[],
  tex: string,
  left: number,
  width: number,
  fontSize: number,
): PlacedLabel | null {
  if (runs.length === 0) return null;
  const own = runsWidth(runs, fontSize * 1.2);
  const x = Math.max(0, Math.min(left - fontSize * 0.8 - own, width - own));
  return { runs, tex, colour: "ink", x, y: fontSize, anchor: "start", leader: null };
}

/** Height of a row of labels above the plot, in font sizes. */
export const TOP_ROW = 1.35;

/**
 * Labels of vertical references above the plot: in the first row where they overlap nothing. Their `y` are baselines.
 * @param wanted label and place of each, in the order of the figure @param yLabel stands in the first row
 * @returns the labels and how many rows are taken
 */
export function placeTopLabels(
  wanted: readonly { readonly tex: string; readonly at: number }[],
  yLabel: PlacedLabel | null,
  width: number,
  fontSize: number,
): { readonly labels: readonly PlacedLabel[]; readonly rows: number } {
  const gap = fontSize * 0.8;
  const rows: (readonly [number, number])[][] = [];
  if (yLabel) rows.push([[yLabel.x, yLabel.x + runsWidth(yLabel.runs, fontSize * 1.2)]]);
  const labels = wanted.flatMap(({ tex, at }): PlacedLabel[] => {
    const runs = labelRuns(tex);
    if (runs.length === 0) return [];
    const own = runsWidth(runs, fontSize);
    const left = Math.max(0, Math.min(width - own, at - own / 2));
    const isFree = (row: (readonly [number, number])[]) =>
      row.every(([from, to]) => left + own + gap < from || left > to + gap);
    const free = rows.findIndex(isFree);
    const row = free < 0 ? rows.length : free;
    rows[row] = [...(rows[row] ?? []), [left, left + own]];
    return [{ runs, tex, colour: "quiet", x: left, y: fontSize * (1 + TOP_ROW * row), anchor: "start", leader: null }];
  });
  return { labels, rows: rows.length };
}

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

/** A tick of the horizontal axis at its place; its number gives way to the axis' variable. */
export function placedTick(tick: Tick, position: number, xLabel: PlacedXLabel | null, fontSize: number): PlacedTick {
  const end = position + runsWidth(tick.runs, fontSize) / 2 + fontSize * 0.3;
  return { ...tick, position, shown: xLabel === null || end < xLabel.from };
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

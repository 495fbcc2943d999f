import type { Frame } from "./curve.ts";
import { labelsOfDots, placeDotLabels } from "./dot-labels.ts";
import { labelBox, seriesInk } from "./ink.ts";
import { type LabelRun, labelRuns } from "./label.ts";
import { placeLabels } from "./labels.ts";
import { placedTicks, placeTopLabels, placeXLabel, placeYLabel, TOP_ROW, ticksApart } from "./layout-axes.ts";
import { isRing, placeSeries } from "./layout-series.ts";
import { runsWidth } from "./measure.ts";
import { seriesColours } from "./palette.ts";
import type { PlacedLine, PlateSize, PlotLayout } from "./plot-layout.ts";
import { type Ends, isWithin, plotted, xEnds, yEnds } from "./range.ts";
import { fittingLabels, sideRoom, startLabelsGiveScale, wantedLabels } from "./side-labels.ts";
import { linearTicks, logTicks, type Tick } from "./ticks.ts";
import type { Axis, Figure, Level, Series } from "./types.ts";

export const FONT_SIZE = 12.5;
/** Lengths of axis, in font sizes, for one tick. */
const X_TICK_ROOM = 6.5;
const Y_TICK_ROOM = 3.4;
/** Numbers of the vertical axis stand at least this many font sizes apart. */
const Y_TICK_GAP = 1.4;

/** Share of the width that numbers and labels may take at either side. */
const MOST_BESIDE = 0.42;

/** Lays out one pair of axes: axis ends, ticks, paths and labels. Insets and panels are not its business. */
export function layoutPlot(figure: Figure, size: PlateSize): PlotLayout {
  const fontSize = size.fontSize ?? FONT_SIZE;
  const unit = fontSize / FONT_SIZE;
  const x = xEnds(figure);
  const y = yEnds(figure);
  const labelsAreTicks = startLabelsGiveScale(figure, x);
  const all = wantedLabels(figure, x, y, labelsAreTicks);
  const height =
    size.height ?? naturalHeight(size.width, fontSize, Math.max(all.left.length, all.right.length), !labelsAreTicks);
  const yTicksWanted = labelsAreTicks
    ? []
    : ticksOf(figure.y, y, Math.max(2, Math.round((height - 4 * fontSize) / (Y_TICK_ROOM * fontSize))));
  const yLabelRuns = labelsAreTicks ? [] : labelRuns(figure.y.label);
  const tickWidth = widest(
    yTicksWanted.map((tick) => tick.runs),
    fontSize,
  );
  const room = size.width * MOST_BESIDE;
  const ticksRoom = tickWidth > 0 ? tickWidth + 12 * unit : 4 * unit;
  const wanted = labelsAreTicks ? all : fittingLabels(all, room - ticksRoom, room, fontSize);
  const startRoom = sideRoom(wanted.left, x, "start", size.width, fontSize);
  const left = Math.min(room, ticksRoom + startRoom);
  const right = size.width - Math.min(room, Math.max(6 * unit, sideRoom(wanted.right, x, "end", size.width, fontSize)));
  const toX = (at: number) => left + ((at - x.low) / (x.high - x.low)) * (right - left);
  const yLabel = placeYLabel(yLabelRuns, figure.y.label, left, size.width, fontSize);
  const verticals = (figure.verticals ?? []).flatMap(({ label, line, x: value }) => {
    const at = plotted(figure.x, value);
    return isWithin(at, x) ? [{ tex: label, at: toX(at), fine: line === "fine", start: false }] : [];
  });
  const top = placeTopLabels(verticals, yLabel, size.width, fontSize);
  const frame: Frame = {
    left,
    right,
    top: top.rows > 0 ? 15 * unit + top.rows * TOP_ROW * fontSize : 12 * unit,
    bottom: height - 30 * unit,
  };
  const fromFoot = figure.y.scale === "linear" && y.low === 0 && hasStems(figure);
  const inner: Frame = { ...frame, bottom: frame.bottom - (fromFoot ? 0 : 8 * unit) };
  const toY = (at: number) => inner.bottom - ((at - y.low) / (y.high - y.low)) * (inner.bottom - inner.top);

  const colours = seriesColours(figure);
  const placing = { toX, toY, inner, unit, labelsAreTicks };
  const shares = markShares(figure);
  const series = figure.series.map((one, i) =>
    placeSeries(one, colours[i] ?? "ink", figure, { ...placing, share: shares[i] ?? 1 }),
  );
  const xTicksWanted = Math.max(2, Math.round((right - left) / (X_TICK_ROOM * fontSize)));
  const xTicks = ticksApart((count) => ticksOf(figure.x, x, count), xTicksWanted, toX, fontSize);
  const xLabel = placeXLabel(labelRuns(figure.x.label), figure.x.label, xTicks, frame, toX, size.width, fontSize);
  const labels = placeLabels(wanted, { frame, inner, toX, toY, unit, fontSize, tickWidth });
  const levels = figure.levels.flatMap((level) => placedLevel(level, figure.y, y, toY, labelsAreTicks));
  const drawn = series.map(seriesInk);
  const dotLabels = placeDotLabels(
    [
      ...wanted.within.map((label) => ({ ...label, x: toX(label.x), y: toY(label.y) })),
      ...series.flatMap(labelsOfDots),
    ],
    {
      bounds: { left: 0, right: size.width, top: frame.top - fontSize, bottom: frame.bottom - 2 * unit },
      ink: {
        segments: [
          ...drawn.flatMap(({ segments }) => segments),
          ...levels.map(
            ({ at }) =>
              [
                { x: left, y: at },
                { x: right, y: at },
              ] as const,
          ),
          ...verticals.map(
            ({ at }) =>
              [
                { x: at, y: frame.bottom },
                { x: at, y: frame.top },
              ] as const,
          ),
        ],
        boxes: drawn.flatMap(({ boxes }) => boxes),
      },
      taken: [
        ...labels.map((label) => labelBox(label, fontSize, "middle")),
        ...top.labels.map((label) => labelBox(label, fontSize, "baseline")),
        { left: 0, right: left, top: 0, bottom: height },
      ],
      unit,
      fontSize,
    },
  );
  return {
    width: size.width,
    height,
    fontSize,
    frame,
    inner,
    x,
    y,
    xTicks: placedTicks(xTicks, toX, xLabel, size.width, fontSize),
    yTicks: thinned(yTicksWanted, toY, Y_TICK_GAP * fontSize).map((tick) => ({
      ...tick,
      position: toY(tick.at),
      shown: true,
    })),
    tickEnd: startRoom > 0 ? tickWidth + 2 * unit : left - 10 * unit,
    xLabel: xLabel?.label ?? null,
    yLabel,
    series,
    levels,
    verticals,
    labels,
    dotLabels,
    topLabels: top.labels,
  };
}

/** A plot is about half as high as wide; higher where many labels have to stand one above the other. */
function naturalHeight(width: number, fontSize: number, labels: number, hasScale: boolean): number {
  const natural = Math.min(Math.max(width * (hasScale ? 0.5 : 0.46), 15 * fontSize), 30 * fontSize);
  return Math.round(Math.max(natural, labels * fontSize * 1.3 + 6 * fontSize));
}

const SMALLER = 0.5;

/** A ring that goes round other series' marks, which are seen within it. */
const ROUND = 1.5;

/** Of the size of marks, the share that each series takes: one that would hide another is smaller, a ring goes round it. */
function markShares(figure: Figure): readonly number[] {
  const isRound = (series: Series) =>
    isRing(series) && figure.series.some((other) => other.mark !== "line" && other.mark !== "band" && !isRing(other));
  let smaller = 0;
  return figure.series.map((series) => {
    if (isRound(series)) return ROUND;
    if (series.mark !== "points" || series.role === "principal") return 1;
    smaller += 1;
    return Math.max(0.3, SMALLER ** (smaller - 1));
  });
}

const hasStems = (figure: Figure) => figure.series.some((series) => series.mark === "stems");

/** About as many ticks as wanted; two at least, since one alone gives no scale. */
function ticksOf(axis: Axis, { low, high }: Ends, wanted: number): readonly Tick[] {
  const ticks = (count: number) => (axis.scale === "log" ? logTicks(low, high, count) : linearTicks(low, high, count));
  const first = ticks(wanted);
  return first.length > 1 ? first : ticks(wanted + 2);
}

const widest = (labels: readonly (readonly LabelRun[])[], fontSize: number) =>
  labels.reduce((width, runs) => Math.max(width, runsWidth(runs, fontSize)), 0);

function placedLevel(
  level: Level,
  axis: Axis,
  ends: Ends,
  toY: (at: number) => number,
  labelsAreTicks: boolean,
): PlacedLine[] {
  const at = plotted(axis, level.y);
  if (!isWithin(at, ends)) return [];
  return [{ at: toY(at), fine: level.line === "fine", start: labelsAreTicks && level.label !== "" }];
}

function thinned(ticks: readonly Tick[], toY: (at: number) => number, gap: number): readonly Tick[] {
  const kept: Tick[] = [];
  for (const tick of ticks) {
    const last = kept.at(-1);
    if (!last || Math.abs(toY(last.at) - toY(tick.at)) >= gap) kept.push(tick);
  }
  return kept;
}

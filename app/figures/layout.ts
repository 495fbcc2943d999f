import type { Frame, Point } from "./curve.ts";
import { type LabelRun, labelRuns } from "./label.ts";
import { type PlacedLabel, placeLabels, type SideLabel } from "./labels.ts";
import { type PlacedTick, placedTick, placeXLabel, placeYLabel } from "./layout-axes.ts";
import { type PlacedSeries, placeSeries } from "./layout-series.ts";
import { runsWidth } from "./measure.ts";
import { seriesColours } from "./palette.ts";
import { type Ends, plotted, plottedY, xEnds, yEnds } from "./range.ts";
import { linearTicks, logTicks, type Tick } from "./ticks.ts";
import type { Axis, Figure, Series } from "./types.ts";

/** Size of a plate. All lengths in one unit: CSS pixels on the page, points in print. */
export interface PlateSize {
  readonly width: number;
  /** Chosen from the width and the labels when left out. */
  readonly height?: number;
  /** 12.5 when left out. */
  readonly fontSize?: number;
}

export interface PlacedLevel {
  readonly y: number;
  readonly start: boolean;
}

/** A plate laid out: everything that is drawn, in the unit of its size. */
export interface FigureLayout {
  readonly width: number;
  readonly height: number;
  readonly fontSize: number;
  /** Between the axes. */
  readonly frame: Frame;
  /** The frame without the room left below the lowest value: `y` spans it. */
  readonly inner: Frame;
  readonly x: Ends;
  readonly y: Ends;
  readonly xTicks: readonly PlacedTick[];
  readonly yTicks: readonly PlacedTick[];
  /** Where the numbers of the vertical axis end: left of the labels that stand at the start of curves. */
  readonly tickEnd: number;
  readonly xLabel: PlacedLabel | null;
  readonly yLabel: PlacedLabel | null;
  readonly series: readonly PlacedSeries[];
  readonly levels: readonly PlacedLevel[];
  readonly labels: readonly PlacedLabel[];
  /** What the caption has to add: bands that could not be seen. */
  readonly remarks: readonly string[];
}

const FONT_SIZE = 12.5;
/** Lengths of axis, in font sizes, for one tick. */
const X_TICK_ROOM = 6.5;
const Y_TICK_ROOM = 3.4;
/** Numbers of the vertical axis stand at least this many font sizes apart. */
const Y_TICK_GAP = 1.4;

/**
 * Lays out a figure: axis ends, ticks, paths and labels. Pure, and the same for the page, print and the server.
 * @param figure the description
 * @param size width, and height and font size where they are fixed
 */
export function layoutFigure(figure: Figure, size: PlateSize): FigureLayout {
  const fontSize = size.fontSize ?? FONT_SIZE;
  const unit = fontSize / FONT_SIZE;
  const x = xEnds(figure);
  const y = yEnds(figure);
  const labelsAreTicks = startLabelsGiveScale(figure, x);
  const sides = sideLabels(figure, x, labelsAreTicks);
  const height =
    size.height ?? chosenHeight(size.width, fontSize, Math.max(sides.left.length, sides.right.length), !labelsAreTicks);
  const yTicksWanted = labelsAreTicks
    ? []
    : ticksOf(figure.y, y, Math.max(2, Math.round((height - 4 * fontSize) / (Y_TICK_ROOM * fontSize))));
  const yLabelRuns = labelsAreTicks ? [] : labelRuns(figure.y.label);
  const tickWidth = widest(
    yTicksWanted.map((tick) => tick.runs),
    fontSize,
  );
  const startRoom = sideRoom(sides.left, x, "start", size.width, fontSize);
  const endRoom = sideRoom(sides.right, x, "end", size.width, fontSize);
  const room = size.width * 0.42;
  const frame: Frame = {
    left: Math.min(room, (tickWidth > 0 ? tickWidth + 12 * unit : 4 * unit) + startRoom),
    right: size.width - Math.min(room, Math.max(6 * unit, endRoom)),
    top: yLabelRuns.length > 0 ? 32 * unit : 12 * unit,
    bottom: height - 30 * unit,
  };
  const inner: Frame = {
    ...frame,
    bottom: frame.bottom - (figure.y.scale === "linear" && y.low === 0 && hasStems(figure) ? 0 : 8 * unit),
  };
  const toX = (at: number) => frame.left + ((at - x.low) / (x.high - x.low)) * (frame.right - frame.left);
  const toY = (at: number) => inner.bottom - ((at - y.low) / (y.high - y.low)) * (inner.bottom - inner.top);

  const colours = seriesColours(figure);
  const remarks: string[] = [];
  const series = figure.series.map((one, i) =>
    placeSeries(one, colours[i] ?? "ink", figure, { toX, toY, inner, unit, labelsAreTicks, remarks }),
  );
  const levels = figure.levels.flatMap((level) => {
    const at = plotted(figure.y, level.y);
    return at !== null && at >= y.low && at <= y.high
      ? [{ y: toY(at), start: labelsAreTicks && level.label !== "" }]
      : [];
  });

  const xTicksWanted = ticksOf(
    figure.x,
    x,
    Math.max(2, Math.round((frame.right - frame.left) / (X_TICK_ROOM * fontSize))),
  );
  const xLabel = placeXLabel(labelRuns(figure.x.label), figure.x.label, xTicksWanted, frame, toX, size.width, fontSize);
  return {
    width: size.width,
    height,
    fontSize,
    frame,
    inner,
    x,
    y,
    xTicks: xTicksWanted.map((tick) => placedTick(tick, toX(tick.at), xLabel, fontSize)),
    yTicks: thinned(yTicksWanted, toY, Y_TICK_GAP * fontSize).map((tick) => ({
      ...tick,
      position: toY(tick.at),
      shown: true,
    })),
    tickEnd: startRoom > 0 ? tickWidth + 2 * unit : frame.left - 10 * unit,
    xLabel: xLabel?.label ?? null,
    yLabel: placeYLabel(yLabelRuns, figure.y.label, frame, fontSize),
    series,
    levels,
    labels: placeLabels(sides, { frame, inner, toX, toY, unit, fontSize, tickWidth }),
    remarks,
  };
}

const hasStems = (figure: Figure) => figure.series.some((series) => series.mark === "stems");

function ticksOf(axis: Axis, ends: Ends, wanted: number): readonly Tick[] {
  return axis.scale === "log" ? logTicks(ends.low, ends.high, wanted) : linearTicks(ends.low, ends.high, wanted);
}

/** A plate is about half as high as wide; higher where many labels have to stand one above the other. */
function chosenHeight(width: number, fontSize: number, labels: number, hasScale: boolean): number {
  const natural = Math.min(Math.max(width * (hasScale ? 0.5 : 0.46), 15 * fontSize), 30 * fontSize);
  return Math.round(Math.max(natural, labels * fontSize * 1.3 + 6 * fontSize));
}

const widest = (labels: readonly (readonly LabelRun[])[], fontSize: number) =>
  labels.reduce((width, runs) => Math.max(width, runsWidth(runs, fontSize)), 0);

/** Between the plot and the text beside it. */
const LABEL_DISTANCE = 1.5;

/** Room beside the plot for labels of curves; one whose curve begins or ends within the plot stands there and needs less. */
function sideRoom(
  labels: readonly SideLabel[],
  x: Ends,
  side: "start" | "end",
  width: number,
  fontSize: number,
): number {
  return labels.reduce((room, label) => {
    const inward = (side === "start" ? label.x - x.low : x.high - label.x) / (x.high - x.low);
    return Math.max(room, runsWidth(label.runs, fontSize) + LABEL_DISTANCE * fontSize - inward * 0.6 * width);
  }, 0);
}

/**
 * Labels at the start of curves are the ticks of the vertical axis when every curve starts there and its label ends in the
 * very number at which it starts: "s = 0", "1/2", "4". Then a second scale would only repeat them.
 */
function startLabelsGiveScale(figure: Figure, x: Ends): boolean {
  const labelled = figure.series.filter((series) => series.label !== "" && series.role !== "reference");
  if (labelled.length === 0) return false;
  return labelled.every((series) => {
    const first = plotted(figure.x, series.x[0] ?? null);
    const value = series.y[0];
    if (series.labelAt !== "start" || first === null || value === null || value === undefined) return false;
    if (Math.abs(first - x.low) > 0.01 * (x.high - x.low)) return false;
    const said = labelledNumber(series.label);
    return said !== null && Math.abs(said - value) <= 0.02 * Math.max(Math.abs(value), 0.01);
  });
}

function labelledNumber(label: string): number | null {
  const last = label.split("=").at(-1)?.trim() ?? "";
  const fraction = /^\\?[tdf]*(?:frac)?\{?(-?\d+)\}?\s*[/{]\s*(\d+)\}?$/.exec(last);
  if (fraction) return Number(fraction[1]) / Number(fraction[2]);
  return /^-?\d+(?:\.\d+)?$/.test(last) ? Number(last) : null;
}

function sideLabels(
  figure: Figure,
  x: Ends,
  labelsAreTicks: boolean,
): { left: readonly SideLabel[]; right: readonly SideLabel[] } {
  const left: SideLabel[] = [];
  const right: SideLabel[] = [];
  const colours = seriesColours(figure);
  figure.series.forEach((series, i) => {
    const end = labelledPoint(figure, series, x);
    if (series.label === "" || !end) return;
    const label: SideLabel = {
      tex: series.label,
      runs: labelRuns(series.label),
      colour: colours[i] === "edge" ? "quiet" : (colours[i] ?? "ink"),
      ...end,
    };
    (series.labelAt === "start" ? left : right).push(label);
  });
  for (const level of figure.levels) {
    const at = plotted(figure.y, level.y);
    if (level.label === "" || at === null) continue;
    const label: SideLabel = {
      tex: level.label,
      runs: labelRuns(level.label),
      colour: "quiet",
      x: labelsAreTicks ? x.low : x.high,
      y: at,
    };
    (labelsAreTicks ? left : right).push(label);
  }
  return { left, right };
}

/** The first or last point of a series within the axis, in plotted coordinates. */
function labelledPoint(figure: Figure, series: Series, x: Ends): Point | null {
  const indices = series.x.map((_, i) => i);
  for (const i of series.labelAt === "start" ? indices : indices.reverse()) {
    const px = plotted(figure.x, series.x[i] ?? null);
    const py = plottedY(figure.y, series, i);
    if (px !== null && py !== null && px >= x.low && px <= x.high) return { x: px, y: py };
  }
  return null;
}

function thinned(ticks: readonly Tick[], toY: (at: number) => number, gap: number): readonly Tick[] {
  const kept: Tick[] = [];
  for (const tick of ticks) {
    const last = kept.at(-1);
    if (!last || Math.abs(toY(last.at) - toY(tick.at)) >= gap) kept.push(tick);
  }
  return kept;
}

import type { Point } from "./curve.ts";
import { labelRuns } from "./label.ts";
import type { Side, SideLabel } from "./labels.ts";
import { runsWidth } from "./measure.ts";
import { seriesColours } from "./palette.ts";
import { type Ends, isWithin, labelledY, plotted } from "./range.ts";
import type { Figure, Series } from "./types.ts";

/** Between the plot and the text beside it. */
const LABEL_DISTANCE = 1.5;

/**
 * Labels at the start of curves are the ticks of the vertical axis when every curve starts there and its label ends in the
 * very number at which it starts: "s = 0", "1/2", "4". Then a second scale would only repeat them.
 */
export function startLabelsGiveScale(figure: Figure, x: Ends): boolean {
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

export interface WantedLabels extends Side {
  readonly within: readonly SideLabel[];
}

/** A curve that ends this far inside, as a share of the axis, is labelled at its end within the plot. */
const INSIDE = 0.08;

/** The labels of curves and levels, each where it is to stand: beside the plot, or at the end of a curve within it. */
export function wantedLabels(figure: Figure, x: Ends, y: Ends, labelsAreTicks: boolean): WantedLabels {
  const left: SideLabel[] = [];
  const right: SideLabel[] = [];
  const within: SideLabel[] = [];
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
    const inward = (series.labelAt === "start" ? end.x - x.low : x.high - end.x) / (x.high - x.low);
    if (series.parametric === true || inward > INSIDE) within.push(label);
    else (series.labelAt === "start" ? left : right).push(label);
  });
  for (const level of figure.levels) {
    const at = plotted(figure.y, level.y);
    if (level.label === "" || !isWithin(at, y)) continue;
    const label: SideLabel = {
      tex: level.label,
      runs: labelRuns(level.label),
      colour: "quiet",
      x: labelsAreTicks ? x.low : x.high,
      y: at,
    };
    (labelsAreTicks ? left : right).push(label);
  }
  return { left, right, within };
}

/** The first or last point of a series within the axis, in plotted coordinates. */
function labelledPoint(figure: Figure, series: Series, x: Ends): Point | null {
  const indices = series.x.map((_, i) => i);
  for (const i of series.labelAt === "start" ? indices : indices.reverse()) {
    const px = plotted(figure.x, series.x[i] ?? null);
    const py = labelledY(figure.y, series, i);
    if (py !== null && isWithin(px, x)) return { x: px, y: py };
  }
  return null;
}

/** Labels too wide for the room at their side stand within the plot, as those of curves that end there. */
export function fittingLabels(
  { left, right, within }: WantedLabels,
  leftRoom: number,
  rightRoom: number,
  fontSize: number,
): WantedLabels {
  const fits = (room: number) => (label: SideLabel) =>
    runsWidth(label.runs, fontSize) + LABEL_DISTANCE * fontSize <= room;
  const [fitsLeft, fitsRight] = [fits(leftRoom), fits(rightRoom)];
  return {
    left: left.filter(fitsLeft),
    right: right.filter(fitsRight),
    within: [...within, ...left.filter((one) => !fitsLeft(one)), ...right.filter((one) => !fitsRight(one))],
  };
}

/** Room beside the plot for labels of curves; one whose curve begins or ends within the plot stands there and needs less. */
export function sideRoom(
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

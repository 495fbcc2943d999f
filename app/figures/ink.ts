import { clipSegment, type Frame, type Point } from "./curve.ts";
import type { LabelRun } from "./label.ts";
import type { PlacedLabel } from "./labels.ts";
import type { PlacedSeries } from "./layout-series.ts";
import { runsWidth } from "./measure.ts";
import type { PlacedLine, PlotLayout } from "./plot-layout.ts";

/** What is drawn on a plate, coarsely: where a label or an inset must not stand. */
export interface Ink {
  readonly segments: readonly (readonly [Point, Point])[];
  readonly boxes: readonly Frame[];
}

/** How much ink lies in a rectangle: length of lines there, and the area of boxes over the height of a line of text. */
export function inkWithin(frame: Frame, { segments, boxes }: Ink): number {
  let sum = 0;
  for (const [from, to] of segments) {
    const cut = clipSegment(from, to, frame);
    if (cut) sum += Math.max(1, Math.hypot(cut[1].x - cut[0].x, cut[1].y - cut[0].y));
  }
  for (const box of boxes) sum += overlap(frame, box);
  return sum;
}

/** Area that two rectangles share. */
export function overlap(a: Frame, b: Frame): number {
  const width = Math.min(a.right, b.right) - Math.max(a.left, b.left);
  const height = Math.min(a.bottom, b.bottom) - Math.max(a.top, b.top);
  return width > 0 && height > 0 ? width * height : 0;
}

/** The rectangle that a label covers. `middle`: its y is the middle of its height, else its baseline. */
export function labelBox(label: PlacedLabel, fontSize: number, at: "middle" | "baseline"): Frame {
  return textBox(label.runs, label.x, at === "middle" ? label.y : label.y - fontSize * 0.36, label.anchor, fontSize);
}

/** The rectangle of text whose height is centred at y. */
export function textBox(
  runs: readonly LabelRun[],
  x: number,
  y: number,
  anchor: PlacedLabel["anchor"],
  fontSize: number,
): Frame {
  const width = runsWidth(runs, fontSize);
  const left = anchor === "start" ? x : anchor === "end" ? x - width : x - width / 2;
  return { left, right: left + width, top: y - fontSize * 0.56, bottom: y + fontSize * 0.56 };
}

/** Curves, marks, stems, bars and bands of a series. */
export function seriesInk({ pieces, marks, foot, radius, bandPoints, dots }: PlacedSeries): Ink {
  const lines = pieces.flatMap((piece) => pairs(piece));
  const stems = foot === null ? [] : marks.flatMap(({ x, y }) => (y === null ? [] : [vertical(x, foot, y)]));
  const bars = marks.flatMap(({ x, bar }) => (bar ? [vertical(x, bar[0], bar[1])] : []));
  const band = bandPoints.flatMap((point) => (point ? [vertical(point.x, point.low, point.high)] : []));
  const heads = marks.flatMap(({ x, y }) => (y === null ? [] : [around(x, y, radius)]));
  return {
    segments: [...lines, ...stems, ...bars, ...band],
    boxes: [...heads, ...dots.map(({ x, y }) => around(x, y, radius + 3))],
  };
}

/** All that is drawn between the axes of a plot, and its labels. */
export function plotInk(plot: PlotLayout): Ink {
  const { frame, fontSize } = plot;
  const drawn = plot.series.map(seriesInk);
  const level = ({ at }: PlacedLine): readonly [Point, Point] => [
    { x: frame.left, y: at },
    { x: frame.right, y: at },
  ];
  return {
    segments: [
      ...drawn.flatMap(({ segments }) => segments),
      ...plot.levels.map(level),
      ...plot.verticals.map(({ at }) => vertical(at, frame.bottom, frame.top)),
    ],
    boxes: [
      ...drawn.flatMap(({ boxes }) => boxes),
      ...[...plot.labels, ...plot.dotLabels].map((label) => labelBox(label, fontSize, "middle")),
    ],
  };
}

function pairs(piece: readonly Point[]): (readonly [Point, Point])[] {
  return piece.flatMap((point, i) => {
    const before = piece[i - 1];
    return before ? [[before, point] as const] : [];
  });
}

const vertical = (x: number, from: number, to: number): readonly [Point, Point] => [
  { x, y: from },
  { x, y: to },
];

const around = (x: number, y: number, radius: number): Frame => ({
  left: x - radius,
  right: x + radius,
  top: y - radius,
  bottom: y + radius,
});

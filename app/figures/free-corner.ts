import type { Frame } from "./curve.ts";
import { inkWithin, plotInk } from "./ink.ts";
import type { PlotLayout } from "./plot-layout.ts";
import type { Corner } from "./types.ts";

const CORNERS: readonly Corner[] = ["top right", "top left", "bottom right", "bottom left"];
/** Shares of the plot's width and height that an inset may take, the largest first. */
const SHARES: readonly (readonly [number, number])[] = [
  [0.52, 0.58],
  [0.46, 0.55],
  [0.46, 0.5],
  [0.42, 0.46],
  [0.38, 0.42],
  [0.34, 0.38],
];
/** An inset smaller than this, in font sizes, cannot be read. */
const LEAST_WIDTH = 14;
const LEAST_HEIGHT = 8.5;

/**
 * Where an inset stands in a plot: in the corner, and at the largest size, where nothing is drawn.
 * @param corner the one that the author chose; there it stands even over curves, where it covers least
 * @returns null where it would be too small, or no corner is free: then it belongs under the plot
 */
export function freeCorner(plot: PlotLayout, corner: Corner | null): Frame | null {
  const ink = plotInk(plot);
  const possible = SHARES.flatMap(([width, height]) =>
    (corner === null ? CORNERS : [corner]).map((one) => cornerFrame(plot, one, width, height)),
  ).filter((frame) => isReadable(frame, plot.fontSize));
  const free = possible.find((frame) => inkWithin(frame, ink) === 0);
  if (free || corner === null) return free ?? null;
  const covered = possible.map((frame) => inkWithin(frame, ink));
  return possible[covered.indexOf(Math.min(...covered))] ?? null;
}

const isReadable = (frame: Frame, fontSize: number) =>
  frame.right - frame.left >= LEAST_WIDTH * fontSize && frame.bottom - frame.top >= LEAST_HEIGHT * fontSize;

function cornerFrame({ inner, frame, fontSize }: PlotLayout, corner: Corner, width: number, height: number): Frame {
  const w = (frame.right - frame.left) * width;
  const h = (frame.bottom - frame.top) * height;
  const left = corner.endsWith("left") ? frame.left + 0.8 * fontSize : frame.right - w;
  const top = corner.startsWith("top") ? frame.top : inner.bottom - 0.4 * fontSize - h;
  return { left, right: left + w, top, bottom: top + h };
}

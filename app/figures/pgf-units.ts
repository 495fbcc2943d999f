import type { PlotLayout } from "./plot-layout.ts";

/** A length or share, as TeX reads it. */
export const number = (value: number) => String(Number(value.toFixed(4)));

/** A value on an axis. */
export const axisNumber = (value: number) => String(Number(value.toPrecision(10)));

/** Value on the vertical axis at a height of the plot, which leaves some room below the lowest value. */
export function yAt({ inner, y }: PlotLayout, height: number): number {
  return y.low + ((inner.bottom - height) / (inner.bottom - inner.top)) * (y.high - y.low);
}

/** Value on the horizontal axis at a place of the plot. */
export function xAt({ frame, x }: PlotLayout, at: number): number {
  return x.low + ((at - frame.left) / (frame.right - frame.left)) * (x.high - x.low);
}

/** Coordinates relative to the frame: (0,0) its lower left corner, (1,1) its upper right one. */
export function place(x: number, y: number, { frame }: PlotLayout): string {
  return `axis description cs:${number((x - frame.left) / (frame.right - frame.left))},${number((frame.bottom - y) / (frame.bottom - frame.top))}`;
}

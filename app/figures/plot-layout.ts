import type { Frame } from "./curve.ts";
import type { PlacedLabel } from "./labels.ts";
import type { PlacedTick } from "./layout-axes.ts";
import type { PlacedSeries } from "./layout-series.ts";
import type { Ends } from "./range.ts";

/** Size of a plate. All lengths in one unit: CSS pixels on the page, points in print. */
export interface PlateSize {
  readonly width: number;
  /** Chosen from the width and the labels when left out. */
  readonly height?: number;
  /** 12.5 when left out. */
  readonly fontSize?: number;
}

/** A reference line of the plot: its height, or its place along the horizontal axis. */
export interface PlacedLine {
  readonly at: number;
  readonly fine: boolean;
  /** A dot on the vertical axis, where labels there are its ticks. */
  readonly start: boolean;
}

/** One pair of axes laid out: everything that is drawn, in the unit of its size. */
export interface PlotLayout {
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
  readonly levels: readonly PlacedLine[];
  readonly verticals: readonly PlacedLine[];
  /** Beside the plot: of curves and levels. */
  readonly labels: readonly PlacedLabel[];
  /** Within the plot: of dots, and of curves that end there. */
  readonly dotLabels: readonly PlacedLabel[];
  /** Above the plot: of vertical references; `y` is their baseline. */
  readonly topLabels: readonly PlacedLabel[];
}

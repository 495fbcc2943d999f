import type { Figure } from "../../figures/index.ts";

/** How an axis is to be: a range in its own units, null for the computed one, and its scale. */
export interface AxisTried {
  readonly range: readonly [number, number] | null;
  readonly scale: "linear" | "log";
}

/** Axes tried on a figure of a cell. */
export interface AxesTried {
  readonly slot: string;
  readonly figure: Figure;
  readonly x: AxisTried;
  readonly y: AxisTried;
}

/** Something that was to be copied and is offered as a file. */
export interface FileOffered {
  readonly slot: string;
  /** "Figure 1 as PNG" */
  readonly what: string;
  readonly name: string;
  /** An object address, given back when the offer ends. */
  readonly address: string;
}

/** What becomes of the plates on this page alone: nothing of it is in the paper. */
export interface PlatesView {
  /** The cell whose figure is read by the keys. */
  readonly read: string | null;
  /** The cell whose axes are being set, and how they are tried. */
  readonly axesOf: string | null;
  readonly tried: AxesTried | null;
  readonly offered: FileOffered | null;
}

export const PLATES_AT_REST: PlatesView = { read: null, axesOf: null, tried: null, offered: null };

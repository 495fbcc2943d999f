/**
 * One description of a figure, from which the page's SVG, the print's pgfplots and the CSV are made.
 * Plain JSON. Lengths are in data units; `null` in a series is a gap.
 */
export interface Figure {
  /** States the finding, for those who do not see the plate. */
  readonly alternative: string;
  readonly x: Axis;
  readonly y: Axis;
  readonly series: readonly Series[];
  /** Horizontal references, e.g. the level 1. */
  readonly levels: readonly Level[];
  /** Vertical references, e.g. the critical drift. */
  readonly verticals?: readonly Vertical[];
  /** Said in the caption: gaps and why, bands thinner than the line. */
  readonly remarks: readonly string[];
  /** A smaller figure in a corner that the curves leave free; under the figure where the plate is too narrow for it. */
  readonly inset?: Inset;
  /** Figures side by side, lettered (a), (b), …, one under the other on a narrow plate. The figure itself then draws nothing of its own. */
  readonly panels?: readonly Panel[];
}

export interface Axis {
  /** TeX of the variable, set at the axis end: "x", "n", "\\mu". */
  readonly label: string;
  readonly scale: "linear" | "log";
  /** Chosen range; null: from the data. */
  readonly range: readonly [number, number] | null;
  /** Scale and range as they are without the paper's own choice; left out where it made none. */
  readonly otherwise?: Pick<Axis, "scale" | "range">;
}

export interface Series {
  /** Unique in the figure; column head in the table and CSV. */
  readonly name: string;
  /** TeX, set at the series' end or start in its own colour: "s_0=5.437". */
  readonly label: string;
  readonly labelAt: "start" | "end";
  /** `band`: the area between `low` and `high` without a line; its `y` may be all null. */
  readonly mark: "line" | "points" | "stems" | "band";
  /**
   * "principal" is drawn in ink, 2.4 wide; "reference" dotted; "thin" fine and grey (further orbits of a portrait); others
   * take the colours in order.
   */
  readonly role: "ordinary" | "principal" | "reference" | "thin";
  /** Takes the colour of the series of this name: points that belong to a curve. */
  readonly colourOf?: string;
  /** Increasing, unless `parametric`. */
  readonly x: readonly number[];
  readonly y: readonly (number | null)[];
  /** Where |y| passes below the double's range: log10 of y, used on a log axis. */
  readonly log10y?: readonly (number | null)[];
  /**
   * Band or bars: numerical error or interval, same length as y. Points that have these are rings, those whose ends are null
   * too (no interval is to be had). On a log axis a bar from 0 reaches down to the frame.
   */
  readonly low?: readonly (number | null)[];
  readonly high?: readonly (number | null)[];
  readonly log10low?: readonly (number | null)[];
  readonly log10high?: readonly (number | null)[];
  /** A curve in the plane: x need not increase, and the table and CSV give it an x of its own. */
  readonly parametric?: boolean;
  /** An arrowhead half-way along the curve shows where it goes. */
  readonly arrow?: boolean;
  /** Points of the series that bear a dot, or a label of their own. */
  readonly dots?: readonly Dot[];
  /** The formula of a point's height, # for its place along the axis: "K(#)"; or one for each point, "" for none. */
  readonly quote?: string | readonly string[];
}

/** A single point of a series, set apart: the end of a curve at a jump, a fixed point. */
export interface Dot {
  /** Index into the series. */
  readonly at: number;
  /** TeX or words, set beside the point where room is; "" for none. */
  readonly label: string;
  /** A ring: the value is not attained there. */
  readonly hollow: boolean;
}

export interface Level {
  readonly label: string;
  readonly y: number;
  /** Dotted when left out; `fine`: a thin whole line, an axis through a portrait. */
  readonly line?: "dotted" | "fine";
}

export interface Vertical {
  readonly label: string;
  readonly x: number;
  readonly line?: "dotted" | "fine";
}

export type Corner = "top left" | "top right" | "bottom left" | "bottom right";

export interface Inset {
  readonly figure: Figure;
  /** null: the corner that is freest. */
  readonly corner: Corner | null;
}

export interface Panel {
  /** Stands beside its letter: words or TeX; "" for the letter alone. */
  readonly title: string;
  readonly figure: Figure;
}

/** What the points of a curve say when they are asked: only digits that their errors support. */
export interface CurveReadings {
  /** Of the series, as the figure names it, with the letter of its panel. */
  readonly name: string;
  /** By index into the series: "x = 0.24, w = 4.487"; "" for a gap. */
  readonly texts: readonly string[];
}

/** A table of results: each cell is a printed number or text. */
export interface TableData {
  readonly columns: readonly TableColumn[];
  readonly rows: readonly (readonly TableEntry[])[];
  readonly remarks: readonly string[];
}

export interface TableColumn {
  readonly name: string;
  /** Markdown-free TeX or plain words for the head; `tex` says which. */
  readonly head: string;
  readonly tex: boolean;
}

export interface TableEntry {
  /** As printed; "" for a gap. */
  readonly text: string;
  readonly tex: string;
  /** Digits shown grey on the sheet, not printed. */
  readonly unsupported: string;
  /** For CSV and JSON: mantissa·10^e as decimal text at full precision, or the text. */
  readonly full: string;
  readonly error: string;
  /** The formula by which a sentence quotes it: "K(3)". */
  readonly quote?: string;
}

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
  /** Dotted horizontal references, e.g. the level 1. */
  readonly levels: readonly Level[];
  /** Said in the caption: gaps and why, bands thinner than the line. */
  readonly remarks: readonly string[];
}

export interface Axis {
  /** TeX of the variable, set at the axis end: "x", "n", "\\mu". */
  readonly label: string;
  readonly scale: "linear" | "log";
  /** Chosen range; null: from the data. */
  readonly range: readonly [number, number] | null;
}

export interface Series {
  /** Unique in the figure; column head in the table and CSV. */
  readonly name: string;
  /** TeX, set at the series' end or start in its own colour: "s_0=5.437". */
  readonly label: string;
  readonly labelAt: "start" | "end";
  readonly mark: "line" | "points" | "stems";
  /** "principal" is drawn in ink, 2.4 wide; "reference" dotted; others take the colours in order. */
  readonly role: "ordinary" | "principal" | "reference";
  readonly x: readonly number[];
  readonly y: readonly (number | null)[];
  /** Where |y| passes below the double's range: log10 of y, used on a log axis. */
  readonly log10y?: readonly (number | null)[];
  /** Band or bars: numerical error or interval, same length as y. */
  readonly low?: readonly (number | null)[];
  readonly high?: readonly (number | null)[];
}

export interface Level {
  readonly label: string;
  readonly y: number;
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
}

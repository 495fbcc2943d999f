import { freeCorner } from "./free-corner.ts";
import { type LabelRun, labelRuns } from "./label.ts";
import { FONT_SIZE, layoutPlot } from "./layout-plot.ts";
import type { PlateSize, PlotLayout } from "./plot-layout.ts";
import type { Figure, Inset, Panel } from "./types.ts";

/** What stands over a panel: its letter, and its title where it has one. */
export interface PanelHead {
  /** "(a)" */
  readonly letter: string;
  readonly tex: string;
  readonly runs: readonly LabelRun[];
  readonly x: number;
  /** Baseline. */
  readonly y: number;
}

/** One pair of axes at its place on the plate. */
export interface PlacedPlot {
  readonly figure: Figure;
  readonly plot: PlotLayout;
  readonly left: number;
  readonly top: number;
  readonly head: PanelHead | null;
}

/** A plate laid out: one pair of axes, or several with an inset or panels. */
export interface FigureLayout {
  readonly width: number;
  readonly height: number;
  readonly fontSize: number;
  readonly plots: readonly PlacedPlot[];
}

/** A panel is at least this many font sizes wide. */
const LEAST_PANEL = 19;
/** Between panels, and between a plot and an inset that stands under it; in font sizes. */
const PANEL_GAP = 2;
const HEAD_HEIGHT = 1.8;
/** Between the axes of an inset. */
const LEAST_HEIGHT = 4;
/** A plot with an inset is higher, to make room for it. */
const HEIGHT_WITH_INSET = 1.2;

/**
 * Lays out a figure. Pure, and the same for the page, print and the server.
 * @param figure the description
 * @param size width, and height and font size where they are fixed
 */
export function layoutFigure(figure: Figure, size: PlateSize): FigureLayout {
  if (figure.panels && figure.panels.length > 0) return layoutPanels(figure.panels, size);
  if (figure.inset) return layoutWithInset(figure, figure.inset, size);
  const plot = layoutPlot(figure, size);
  return {
    width: plot.width,
    height: plot.height,
    fontSize: plot.fontSize,
    plots: [{ figure, plot, left: 0, top: 0, head: null }],
  };
}

/** A wide plate, shown alone, has larger text [px]. */
const WIDE = 800;
const WIDE_FONT_SIZE = 14;

/** Lays out a figure as the page shows it: widths and heights in CSS pixels. */
export function layoutOnPage(figure: Figure, size: Omit<PlateSize, "fontSize">): FigureLayout {
  return layoutFigure(figure, { ...size, fontSize: size.width > WIDE ? WIDE_FONT_SIZE : FONT_SIZE });
}

function layoutWithInset(figure: Figure, inset: Inset, size: PlateSize): FigureLayout {
  const fontSize = size.fontSize ?? FONT_SIZE;
  const height =
    size.height ?? Math.round(layoutPlot(figure, { width: size.width, fontSize }).height * HEIGHT_WITH_INSET);
  const roomy = layoutPlot(figure, { ...size, height });
  const corner = freeCorner(roomy, inset.corner);
  const within =
    corner &&
    layoutFigure(inset.figure, { width: corner.right - corner.left, height: corner.bottom - corner.top, fontSize });
  if (corner && within?.plots.every(({ plot }) => isLegible(plot))) {
    return {
      width: size.width,
      height,
      fontSize,
      plots: [{ figure, plot: roomy, left: 0, top: 0, head: null }, ...moved(within.plots, corner.left, corner.top)],
    };
  }
  const main = layoutPlot(figure, { width: size.width, fontSize });
  const below = layoutFigure(inset.figure, { width: size.width, fontSize });
  const top = main.height + PANEL_GAP * 0.5 * fontSize;
  return {
    width: size.width,
    height: top + below.height,
    fontSize,
    plots: [{ figure, plot: main, left: 0, top: 0, head: null }, ...moved(below.plots, 0, top)],
  };
}

/** Whether a plot of a given height has room for its labels one above the other, and for its curves. */
function isLegible({ frame, labels, fontSize }: PlotLayout): boolean {
  const height = frame.bottom - frame.top;
  return height >= Math.max(LEAST_HEIGHT, labels.length * 1.2) * fontSize;
}

function layoutPanels(panels: readonly Panel[], size: PlateSize): FigureLayout {
  const fontSize = size.fontSize ?? FONT_SIZE;
  const gap = PANEL_GAP * fontSize;
  const fitting = Math.max(1, Math.floor((size.width + gap) / (LEAST_PANEL * fontSize + gap)));
  const rows = Math.ceil(panels.length / fitting);
  const columns = Math.ceil(panels.length / rows);
  const width = (size.width - (columns - 1) * gap) / columns;
  const headHeight = HEAD_HEIGHT * fontSize;
  const given = size.height === undefined ? undefined : (size.height - (rows - 1) * gap) / rows - headHeight;
  const plots: PlacedPlot[] = [];
  let top = 0;
  for (let row = 0; row < rows; row += 1) {
    const inRow = panels.slice(row * columns, (row + 1) * columns);
    const natural = inRow.map((panel) => layoutFigure(panel.figure, { width, fontSize }));
    // Panels of one plot are of one height, so that their axes lie on one line; one with its inset beneath keeps its own.
    const common = Math.max(0, ...natural.map(({ plots: own, height }) => (own.length === 1 ? height : 0)));
    const heights = natural.map(({ plots: own, height }) => given ?? (own.length === 1 ? common : height));
    inRow.forEach((panel, column) => {
      const left = column * (width + gap);
      const height = heights[column];
      const placed = layoutFigure(panel.figure, { width, height, fontSize });
      const head = panelHead(panel, row * columns + column, left, top + fontSize);
      const [first, ...others] = moved(placed.plots, left, top + headHeight);
      if (first) plots.push({ ...first, head }, ...others);
    });
    top += headHeight + Math.max(...heights) + gap;
  }
  return { width: size.width, height: Math.max(0, top - gap), fontSize, plots };
}

/** "(a)", "(b)", …; after the alphabet "(aa)". */
export function panelLetter(index: number): string {
  const letter = String.fromCharCode(97 + (index % 26));
  return `(${letter.repeat(1 + Math.floor(index / 26))})`;
}

const panelHead = ({ title }: Panel, index: number, x: number, y: number): PanelHead => ({
  letter: panelLetter(index),
  tex: title,
  runs: labelRuns(title),
  x,
  y,
});

const moved = (plots: readonly PlacedPlot[], left: number, top: number): readonly PlacedPlot[] =>
  plots.map((placed) => ({
    ...placed,
    left: placed.left + left,
    top: placed.top + top,
    head: placed.head && { ...placed.head, x: placed.head.x + left, y: placed.head.y + top },
  }));

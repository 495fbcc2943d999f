import { type FigureLayout, layoutFigure, type PanelHead } from "./layout.ts";
import { type Colour, PALETTES } from "./palette.ts";
import { dataTable } from "./pgf-data.ts";
import { axisLines, type LabelSetting, PRINT_FONT, setLabel } from "./pgf-plot.ts";
import { number, yAt } from "./pgf-units.ts";
import type { Figure } from "./types.ts";

export interface PgfplotsOptions extends LabelSetting {
  /** Name of the data file as the document will find it; letters, digits, `-`, `_`, `.` and `/` only. */
  readonly dataFile: string;
  /** Width of the plate in millimetres: 120 or 76. */
  readonly widthMm: number;
}

export interface PgfplotsFigure {
  /** A `tikzpicture` that reads its points from the data file. */
  readonly tex: string;
  readonly data: string;
}

const POINTS_PER_MM = 72.27 / 25.4;
/** Text of plates in print. */
const PRINT_FONT_PT = 8;

/**
 * A figure for print: vector, its points in a file of their own, the same ticks and labels as on the page.
 * On logarithmic axes the file holds decimal logarithms, so that values far below the double's range are drawn too; the
 * values themselves stand beside them.
 * @throws RangeError when the name of the data file could break out of the TeX
 */
export function figureToPgfplots(figure: Figure, options: PgfplotsOptions): PgfplotsFigure {
  const { dataFile } = options;
  if (!/^[\w./-]+$/.test(dataFile))
    throw new RangeError(`"${dataFile}" cannot name a data file: letters, digits, ".", "-", "_" and "/" only.`);
  const layout = layoutFigure(figure, { width: options.widthMm * POINTS_PER_MM, fontSize: PRINT_FONT_PT });
  const table = dataTable(
    layout.plots.map(({ figure: own, plot }) => ({
      figure: own,
      feet: plot.series.map(({ foot }) => (foot === null ? null : yAt(plot, foot))),
    })),
  );
  const axes = layout.plots.flatMap(({ figure: own, plot, left, top }, i) => {
    const at =
      layout.plots.length === 1 ? null : ([left + plot.frame.left, layout.height - top - plot.frame.bottom] as const);
    return axisLines(own, plot, table.columns[i] ?? [], dataFile, at, options);
  });
  const tex = [
    "\\begin{tikzpicture}",
    ...colourDefinitions(layout),
    ...axes,
    ...layout.plots.flatMap(({ head }) => (head ? [headNode(head, layout.height, options)] : [])),
    "\\end{tikzpicture}",
  ].join("\n");
  return { tex, data: table.text };
}

function colourDefinitions({ plots }: FigureLayout): string[] {
  const used = new Set<Colour>(plots.flatMap(({ plot }) => plot.series.map((series) => series.colour)));
  used.add("edge");
  return [...used].map(
    (colour) => `\\definecolor{plate-${colour}}{HTML}{${PALETTES.print.series[colour].slice(1).toUpperCase()}}`,
  );
}

/** The letter of a panel and its title. */
function headNode({ letter, tex, x, y }: PanelHead, height: number, setting: LabelSetting): string {
  const title = tex === "" ? "" : `~${setLabel(tex, setting)}`;
  return `\\node[anchor=base west, inner sep=0pt, font=${PRINT_FONT}] at (${number(x)}pt,${number(height - y)}pt) {\\textbf{${letter}}${title}};`;
}

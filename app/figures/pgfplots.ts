import { isWords } from "./label.ts";
import type { PlacedLabel } from "./labels.ts";
import { type FigureLayout, layoutFigure } from "./layout.ts";
import { type Colour, DASHES, PALETTES, seriesDashes } from "./palette.ts";
import { type Columns, dataTable } from "./pgf-data.ts";
import { type Ends, plotted, plottedY } from "./range.ts";
import type { Figure, Series } from "./types.ts";

export interface PgfplotsOptions {
  /** Name of the data file as the document will find it; letters, digits, `-`, `_`, `.` and `/` only. */
  readonly dataFile: string;
  /** Width of the plate in millimetres: 120 or 76. */
  readonly widthMm: number;
  /** How the document sets labels: it vouches that what comes back is safe TeX, in math mode and in text mode. */
  readonly setMath: (tex: string) => string;
  readonly setText: (text: string) => string;
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
  if (!/^[\w./-]+$/.test(options.dataFile))
    throw new RangeError(`"${options.dataFile}" cannot name a data file: letters, digits, ".", "-", "_" and "/" only.`);
  const layout = layoutFigure(figure, { width: options.widthMm * POINTS_PER_MM, fontSize: PRINT_FONT_PT });
  const table = dataTable(
    figure,
    layout.series.map((series) => (series.foot === null ? null : yAt(layout, series.foot))),
  );
  const plots = layout.series.flatMap((placed, i) => {
    const columns = table.columns[i];
    return columns ? plotLines(placed.series, columns, figure, layout, i, options.dataFile) : [];
  });
  const tex = [
    "\\begin{tikzpicture}",
    ...colourDefinitions(layout),
    `\\begin{axis}[${axisOptions(figure, layout)}]`,
    ...levelLines(layout, figure),
    ...plots,
    ...layout.yTicks.map((tick) => tickNode(tick.tex, tick.position, layout)),
    ...layout.labels.flatMap((label) => labelLines(label, layout, options)),
    ...[layout.xLabel, layout.yLabel].flatMap((label) => (label ? [node(label, layout, options, "base")] : [])),
    "\\end{axis}",
    "\\end{tikzpicture}",
  ].join("\n");
  return { tex, data: table.text };
}

const number = (value: number) => String(Number(value.toFixed(4)));

function axisOptions(figure: Figure, layout: FigureLayout): string {
  const { frame } = layout;
  const shown = layout.xTicks.filter((tick) => tick.shown);
  const blank = layout.xTicks.filter((tick) => !tick.shown);
  const xs = [...shown, ...blank];
  const list = (values: readonly string[]) => `{${values.join(",")}}`;
  return [
    "scale only axis",
    `width=${number(frame.right - frame.left)}pt`,
    `height=${number(frame.bottom - frame.top)}pt`,
    `xmin=${layout.x.low}, xmax=${layout.x.high}`,
    `ymin=${number0(yAt(layout, frame.bottom))}, ymax=${number0(yAt(layout, frame.top))}`,
    `enlargelimits=false, ${exceedsAxes(figure, layout) ? "clip mode=individual" : "clip=false"}`,
    "axis x line*=bottom, axis y line=none",
    "tick align=outside, tick style={black, line width=0.5pt}, major tick length=2.6pt",
    "axis line style={black, line width=0.5pt}",
    "ticklabel style={font=\\fontsize{8}{9.6}\\selectfont}",
    `xtick=${list(xs.map((tick) => number0(tick.at)))}`,
    `xticklabels=${list([...shown.map((tick) => `{$${tick.tex}$}`), ...blank.map(() => "{}")])}`,
    "scaled ticks=false, unbounded coords=jump",
  ].join(",\n  ");
}

function exceedsAxes(figure: Figure, layout: FigureLayout): boolean {
  const beyond = (at: number | null, { low, high }: Ends) => at !== null && (at < low || at > high);
  return figure.series.some((series) =>
    series.x.some((x, i) => beyond(plotted(figure.x, x), layout.x) || beyond(plottedY(figure.y, series, i), layout.y)),
  );
}

const number0 = (value: number) => String(Number(value.toPrecision(10)));

/** Value on the vertical axis at a height of the plate; the plot leaves some room below the lowest value. */
function yAt(layout: FigureLayout, height: number): number {
  const { inner } = layout;
  return layout.y.low + ((inner.bottom - height) / (inner.bottom - inner.top)) * (layout.y.high - layout.y.low);
}

function colourDefinitions(layout: FigureLayout): string[] {
  const used = new Set<Colour>(layout.series.map((series) => series.colour));
  used.add("edge");
  return [...used].map(
    (colour) => `\\definecolor{plate-${colour}}{HTML}{${PALETTES.print.series[colour].slice(1).toUpperCase()}}`,
  );
}

function levelLines(layout: FigureLayout, figure: Figure): string[] {
  return figure.levels.flatMap((level) => {
    const at = plotted(figure.y, level.y);
    if (at === null || at < layout.y.low || at > layout.y.high) return [];
    return [
      `\\addplot[plate-edge, line width=0.5pt, dash pattern=on 0.5pt off 1.5pt, line cap=round, forget plot] coordinates {(${layout.x.low},${at}) (${layout.x.high},${at})};`,
    ];
  });
}

function plotLines(
  series: Series,
  columns: Columns,
  figure: Figure,
  layout: FigureLayout,
  index: number,
  dataFile: string,
): string[] {
  const placed = layout.series[index];
  if (!placed) return [];
  const colour = `plate-${placed.colour}`;
  const table = (y: string) => `table[x=${columns.x}, y=${y}] {${dataFile}};`;
  const lines: string[] = [];
  if (placed.band !== "" && columns.band) {
    const { x, y } = columns.band;
    lines.push(
      `\\addplot[draw=none, fill=${colour}, fill opacity=0.16, forget plot] table[x=${x}, y=${y}] {${dataFile}};`,
    );
  }
  if (series.mark === "line") {
    const dash = dashPattern(placed.reference ? [1, 3] : (DASHES[seriesDashes(figure)[index] ?? 0] ?? []));
    lines.push(
      `\\addplot[${colour}, line width=${placed.principal ? "1.1pt" : "0.7pt"}${dash}, line join=round, no marks] ${table(columns.y)}`,
    );
    if (placed.start)
      lines.push(
        `\\addplot[${colour}, only marks, mark=*, mark size=1.3pt] coordinates {(${layout.x.low},${number0(yAt(layout, placed.start.y))})};`,
      );
    return lines;
  }
  const radius = `mark size=${number(placed.radius * 0.95)}pt`;
  const filled = placed.ring ? "mark options={fill=white, line width=0.7pt}" : "mark options={solid}";
  for (const mark of placed.marks) {
    if (!mark.bar) continue;
    const x = number0(xAt(layout, mark.x));
    lines.push(
      `\\addplot[${colour}, line width=0.7pt, no marks, forget plot] coordinates {(${x},${number0(yAt(layout, mark.bar[0]))}) (${x},${number0(yAt(layout, mark.bar[1]))})};`,
    );
  }
  if (columns.stems) {
    const { x, y } = columns.stems;
    lines.push(
      `\\addplot[${colour}, draw opacity=0.55, line width=0.5pt, no marks, forget plot] table[x=${x}, y=${y}] {${dataFile}};`,
    );
  }
  lines.push(`\\addplot[${colour}, only marks, mark=*, ${radius}, ${filled}, ${restrict(layout)}] ${table(columns.y)}`);
  return lines;
}

const xAt = (layout: FigureLayout, at: number) =>
  layout.x.low + ((at - layout.frame.left) / (layout.frame.right - layout.frame.left)) * (layout.x.high - layout.x.low);

/** Marks beyond the axes are left out; lines are cut at the frame (`clip mode` in the axis' options). */
function restrict(layout: FigureLayout): string {
  const domain = ({ low, high }: Ends) =>
    `${number0(low - 1e-9 * (high - low))}:${number0(high + 1e-9 * (high - low))}`;
  return `restrict x to domain=${domain(layout.x)}, restrict y to domain=${domain(layout.y)}`;
}

function dashPattern(pattern: readonly number[]): string {
  if (pattern.length === 0) return "";
  return `, dash pattern=${pattern.map((length, i) => `${i % 2 === 0 ? "on" : "off"} ${number(length * 0.7)}pt`).join(" ")}`;
}

function labelLines(label: PlacedLabel, layout: FigureLayout, options: PgfplotsOptions): string[] {
  const leader = label.leader ? /^M(\S+) (\S+)L(\S+) (\S+)$/.exec(label.leader) : null;
  const lines: string[] = [];
  if (leader) {
    const [from, to] = [
      place(Number(leader[1]), Number(leader[2]), layout),
      place(Number(leader[3]), Number(leader[4]), layout),
    ];
    lines.push(
      `\\draw[${colourName(label)}, line width=0.4pt] (axis description cs:${from}) -- (axis description cs:${to});`,
    );
  }
  lines.push(node(label, layout, options, "mid"));
  return lines;
}

const colourName = (label: PlacedLabel) =>
  label.colour === "quiet" ? "black" : label.colour === "ink" ? "black" : `plate-${label.colour}`;

function node(label: PlacedLabel, layout: FigureLayout, options: PgfplotsOptions, height: "mid" | "base"): string {
  const side = label.anchor === "end" ? "east" : "west";
  const anchor = height === "mid" ? side : `base ${side}`;
  const set = isWords(label.tex) ? options.setText(label.tex) : `$${options.setMath(label.tex)}$`;
  return `\\node[anchor=${anchor}, inner sep=0pt, text=${colourName(label)}, font=\\fontsize{8}{9.6}\\selectfont] at (axis description cs:${place(label.x, label.y, layout)}) {${set}};`;
}

/** A number of the vertical axis, which has no line of its own. */
function tickNode(tex: string, height: number, layout: FigureLayout): string {
  return `\\node[anchor=east, inner sep=0pt, font=\\fontsize{8}{9.6}\\selectfont] at (axis description cs:${place(layout.tickEnd, height, layout)}) {$${tex}$};`;
}

/** Coordinates relative to the frame: (0,0) its lower left corner, (1,1) its upper right one. */
function place(x: number, y: number, layout: FigureLayout): string {
  const { frame } = layout;
  return `${number((x - frame.left) / (frame.right - frame.left))},${number((frame.bottom - y) / (frame.bottom - frame.top))}`;
}

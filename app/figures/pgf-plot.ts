import { isWords } from "./label.ts";
import type { PlacedLabel } from "./labels.ts";
import { weight } from "./layout-series.ts";
import type { Columns } from "./pgf-data.ts";
import { seriesLines } from "./pgf-series.ts";
import { axisNumber, number, place, xAt, yAt } from "./pgf-units.ts";
import type { PlacedLine, PlotLayout } from "./plot-layout.ts";
import { type Ends, isWithin, plotted, plottedY } from "./range.ts";
import type { Figure } from "./types.ts";

/** How the document sets labels: it vouches that what comes back is safe TeX, in math mode and in text mode. */
export interface LabelSetting {
  readonly setMath: (tex: string) => string;
  readonly setText: (text: string) => string;
}

/** Text of plates in print. */
export const PRINT_FONT = "\\fontsize{8}{9.6}\\selectfont";

/** A label as the document sets it. */
export const setLabel = (tex: string, { setMath, setText }: LabelSetting): string =>
  isWords(tex) ? setText(tex) : `$${setMath(tex)}$`;

/**
 * One pair of axes as an `axis` of pgfplots.
 * @param at where its lower left corner stands in the picture, in points; null where the picture holds nothing else
 */
export function axisLines(
  figure: Figure,
  plot: PlotLayout,
  columns: readonly Columns[],
  dataFile: string,
  at: readonly [number, number] | null,
  setting: LabelSetting,
): readonly string[] {
  const drawn = [...plot.series.entries()]
    .sort(([, a], [, b]) => weight(a) - weight(b))
    .flatMap(([i, placed]) => {
      const own = columns[i];
      return own ? seriesLines(placed, i, own, figure, plot, dataFile) : [];
    });
  return [
    `\\begin{axis}[${axisOptions(figure, plot, at)}]`,
    ...plot.levels.map((line) => {
      const y = yAt(plot, line.at);
      return referenceLine(line, [plot.x.low, y], [plot.x.high, y]);
    }),
    ...plot.verticals.map((line) => {
      const x = xAt(plot, line.at);
      return referenceLine(line, [x, yAt(plot, plot.frame.bottom)], [x, yAt(plot, plot.frame.top)]);
    }),
    ...drawn,
    ...plot.yTicks.map((tick) => tickNode(tick.tex, tick.position, plot)),
    ...plot.labels.flatMap((label) => labelLines(label, plot, setting, "")),
    ...plot.dotLabels.flatMap((label) => labelLines(label, plot, setting, PAPER_BEHIND)),
    ...[...plot.topLabels, plot.xLabel, plot.yLabel].flatMap((label) =>
      label ? [node(label, plot, setting, "base")] : [],
    ),
    "\\end{axis}",
  ];
}

function axisOptions(figure: Figure, plot: PlotLayout, at: readonly [number, number] | null): string {
  const { frame } = plot;
  const shown = plot.xTicks.filter((tick) => tick.shown);
  const blank = plot.xTicks.filter((tick) => !tick.shown);
  const xs = [...shown, ...blank];
  const list = (values: readonly string[]) => `{${values.join(",")}}`;
  return [
    ...(at ? [`at={(${number(at[0])}pt,${number(at[1])}pt)}, anchor=south west`] : []),
    "scale only axis",
    `width=${number(frame.right - frame.left)}pt`,
    `height=${number(frame.bottom - frame.top)}pt`,
    `xmin=${plot.x.low}, xmax=${plot.x.high}`,
    `ymin=${axisNumber(yAt(plot, frame.bottom))}, ymax=${axisNumber(yAt(plot, frame.top))}`,
    `enlargelimits=false, ${exceedsAxes(figure, plot) ? "clip mode=individual" : "clip=false"}`,
    "axis x line*=bottom, axis y line=none",
    "tick align=outside, tick style={black, line width=0.5pt}, major tick length=2.6pt",
    "axis line style={black, line width=0.5pt}",
    `ticklabel style={font=${PRINT_FONT}}`,
    `xtick=${list(xs.map((tick) => axisNumber(tick.at)))}`,
    `xticklabels=${list([...shown.map((tick) => `{$${tick.tex}$}`), ...blank.map(() => "{}")])}`,
    "scaled ticks=false, unbounded coords=jump",
  ].join(",\n  ");
}

function exceedsAxes(figure: Figure, plot: PlotLayout): boolean {
  const beyond = (at: number | null, ends: Ends) => at !== null && !isWithin(at, ends);
  return figure.series.some((series) =>
    series.x.some((x, i) => beyond(plotted(figure.x, x), plot.x) || beyond(plottedY(figure.y, series, i), plot.y)),
  );
}

function referenceLine({ fine }: PlacedLine, ...ends: readonly (readonly [number, number])[]): string {
  const look = fine ? "line width=0.5pt" : "line width=0.5pt, dash pattern=on 0.5pt off 1.5pt, line cap=round";
  const points = ends.map(([x, y]) => `(${axisNumber(x)},${axisNumber(y)})`);
  return `\\addplot[plate-edge, ${look}, forget plot] coordinates {${points.join(" ")}};`;
}

/** Within the plot paper keeps a label apart from lines that pass behind it. */
const PAPER_BEHIND = "fill=white, fill opacity=0.75, text opacity=1, ";

function labelLines(label: PlacedLabel, plot: PlotLayout, setting: LabelSetting, behind: string): string[] {
  const leader = label.leader ? /^M(\S+) (\S+)L(\S+) (\S+)$/.exec(label.leader) : null;
  const lines: string[] = [];
  if (leader) {
    const [from, to] = [
      place(Number(leader[1]), Number(leader[2]), plot),
      place(Number(leader[3]), Number(leader[4]), plot),
    ];
    lines.push(`\\draw[${colourName(label)}, line width=0.4pt] (${from}) -- (${to});`);
  }
  lines.push(node(label, plot, setting, "mid", behind));
  return lines;
}

const colourName = (label: PlacedLabel) =>
  label.colour === "quiet" || label.colour === "ink" ? "black" : `plate-${label.colour}`;

const SIDES = { start: "west", middle: "", end: "east" } as const;

function node(
  label: PlacedLabel,
  plot: PlotLayout,
  setting: LabelSetting,
  height: "mid" | "base",
  behind = "",
): string {
  const side = SIDES[label.anchor];
  const anchor = height === "mid" ? side || "center" : `base ${side}`.trim();
  return `\\node[anchor=${anchor}, inner sep=0pt, ${behind}text=${colourName(label)}, font=${PRINT_FONT}] at (${place(label.x, label.y, plot)}) {${setLabel(label.tex, setting)}};`;
}

/** A number of the vertical axis, which has no line of its own. */
function tickNode(tex: string, height: number, plot: PlotLayout): string {
  return `\\node[anchor=east, inner sep=0pt, font=${PRINT_FONT}] at (${place(plot.tickEnd, height, plot)}) {$${tex}$};`;
}

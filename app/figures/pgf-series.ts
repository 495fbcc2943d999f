import type { Mark, PlacedSeries } from "./layout-series.ts";
import { DASHES, seriesDashes } from "./palette.ts";
import type { Columns } from "./pgf-data.ts";
import { axisNumber, number, place, xAt, yAt } from "./pgf-units.ts";
import type { PlotLayout } from "./plot-layout.ts";
import type { Ends } from "./range.ts";
import type { Figure } from "./types.ts";

const FINE = "line width=0.5pt";
const ORDINARY = "line width=0.7pt";
const PRINCIPAL = "line width=1.1pt";

/** The plots of one series: its band, its line or marks with their bars and stems, its dots and arrowhead. */
export function seriesLines(
  placed: PlacedSeries,
  index: number,
  columns: Columns,
  figure: Figure,
  plot: PlotLayout,
  dataFile: string,
): readonly string[] {
  const colour = `plate-${placed.colour}`;
  const fromFile = (x: string, y: string) => `table[x=${x}, y=${y}] {${dataFile}};`;
  const lines: string[] = [];
  if (placed.band !== "" && columns.band) {
    const { x, y } = columns.band;
    lines.push(`\\addplot[draw=none, fill=${colour}, fill opacity=0.16, forget plot] ${fromFile(x, y)}`);
  }
  if (placed.series.mark === "line") {
    const dash = dashPattern(placed.reference ? [1, 3] : (DASHES[seriesDashes(figure)[index] ?? 0] ?? []));
    const width = placed.principal ? PRINCIPAL : placed.thin ? FINE : ORDINARY;
    lines.push(`\\addplot[${colour}, ${width}${dash}, line join=round, no marks] ${fromFile(columns.x, columns.y)}`);
    if (placed.start)
      lines.push(
        `\\addplot[${colour}, only marks, mark=*, mark size=1.3pt] coordinates {(${plot.x.low},${axisNumber(yAt(plot, placed.start.y))})};`,
      );
  } else if (placed.series.mark !== "band") {
    lines.push(...placed.marks.flatMap((mark) => barLine(mark, colour, plot)));
    if (columns.stems) {
      const { x, y } = columns.stems;
      lines.push(`\\addplot[${colour}, draw opacity=0.55, ${FINE}, no marks, forget plot] ${fromFile(x, y)}`);
    }
    const filled =
      placed.ring === null
        ? "mark=*, mark options={solid}"
        : placed.ring === "open"
          ? `mark=o, mark options={${ORDINARY}}`
          : `mark=*, mark options={fill=white, ${ORDINARY}}`;
    lines.push(
      `\\addplot[${colour}, only marks, mark size=${number(placed.radius * 0.95)}pt, ${filled}, ${restrict(plot)}] ${fromFile(columns.x, columns.y)}`,
    );
  }
  return [...lines, ...dotLines(placed, colour, plot), ...arrowLine(placed, colour, plot)];
}

function barLine({ x, bar }: Mark, colour: string, plot: PlotLayout): readonly string[] {
  if (!bar) return [];
  const at = axisNumber(xAt(plot, x));
  const ends = bar.map((end) => `(${at},${axisNumber(yAt(plot, end))})`).join(" ");
  return [`\\addplot[${colour}, ${ORDINARY}, no marks, forget plot] coordinates {${ends}};`];
}

function dotLines({ dots }: PlacedSeries, colour: string, plot: PlotLayout): readonly string[] {
  return dots.map(({ x, y, hollow }) => {
    const filled = hollow ? `mark options={fill=white, ${ORDINARY}}` : "mark options={solid}";
    return `\\addplot[${colour}, only marks, mark=*, mark size=1.6pt, ${filled}, forget plot] coordinates {(${axisNumber(xAt(plot, x))},${axisNumber(yAt(plot, y))})};`;
  });
}

function arrowLine({ arrow }: PlacedSeries, colour: string, plot: PlotLayout): readonly string[] {
  if (!arrow) return [];
  return [`\\fill[${colour}] ${arrow.map(({ x, y }) => `(${place(x, y, plot)})`).join(" -- ")} -- cycle;`];
}

/** Marks beyond the axes are left out; lines are cut at the frame (`clip mode` in the axis' options). */
function restrict(plot: PlotLayout): string {
  const domain = ({ low, high }: Ends) =>
    `${axisNumber(low - 1e-9 * (high - low))}:${axisNumber(high + 1e-9 * (high - low))}`;
  return `restrict x to domain=${domain(plot.x)}, restrict y to domain=${domain(plot.y)}`;
}

function dashPattern(pattern: readonly number[]): string {
  if (pattern.length === 0) return "";
  return `, dash pattern=${pattern.map((length, i) => `${i % 2 === 0 ? "on" : "off"} ${number(length * 0.7)}pt`).join(" ")}`;
}

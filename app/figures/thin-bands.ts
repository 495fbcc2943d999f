import { ORDINARY_WIDTH } from "./layout-series.ts";
import { type Ends, plottedInterval, yEnds } from "./range.ts";
import type { Figure, Series } from "./types.ts";

/** Height between the axes of a plate as wide as the text: what is thinner than the line there is thinner everywhere in print. */
const NOMINAL_HEIGHT = 210;

/** What the caption says of bands that are thinner than their line, and are therefore not drawn; null where there are none. */
export function thinBandRemark(figure: Figure): string | null {
  const plots = figure.panels?.length ? figure.panels.map((panel) => panel.figure) : [figure];
  const banded = plots.flatMap((plot) => {
    const ends = yEnds(plot);
    const lines = plot.series.filter(({ mark }) => mark === "line");
    return lines
      .map((series) => ({ name: series.name, thick: thickness(series, plot), ends }))
      .filter(({ thick }) => thick > 0);
  });
  const thin = banded.filter(({ thick, ends }) => isThin(thick, ends)).map(({ name }) => name);
  const [first, ...others] = thin;
  if (first === undefined) return null;
  if (others.length === 0) return `The error of ${first} is thinner than its line.`;
  if (thin.length === banded.length) return "Errors are thinner than the lines.";
  const last = others.at(-1) ?? "";
  return `The errors of ${[first, ...others.slice(0, -1)].join(", ")} and ${last} are thinner than their lines.`;
}

const isThin = (thick: number, { low, high }: Ends) => (thick / (high - low)) * NOMINAL_HEIGHT <= ORDINARY_WIDTH;

/** The largest width of a series' band, in plotted coordinates; 0 where it has none. */
function thickness(series: Series, figure: Figure): number {
  if (!series.low || !series.high) return 0;
  return series.x.reduce((most, _, i) => {
    const interval = plottedInterval(figure.y, series, i);
    return interval && Number.isFinite(interval[0]) ? Math.max(most, interval[1] - interval[0]) : most;
  }, 0);
}

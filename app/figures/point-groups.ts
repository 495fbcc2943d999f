import { panelLetter } from "./layout.ts";
import type { Figure, Series } from "./types.ts";

/** Series over common abscissas: the columns of a table of points that belong together. */
export interface PointGroup {
  /** Before the name of each column: "" for the figure itself, "(a) " for a panel, "inset " for an inset. */
  readonly prefix: string;
  /** Name of the abscissa, as plain text. */
  readonly xName: string;
  readonly x: readonly number[];
  readonly columns: readonly PointColumn[];
}

export interface PointColumn {
  readonly series: Series;
  /** Index into the series for each abscissa of the group; null where it has no point there. */
  readonly at: readonly (number | null)[];
}

/**
 * The points of a figure in groups. Curves over one variable share its abscissas; a curve in the plane, each panel and an
 * inset have their own.
 */
export function pointGroups(figure: Figure, prefix = ""): readonly PointGroup[] {
  const shared = figure.series.filter((series) => series.parametric !== true);
  const alone = figure.series.filter((series) => series.parametric === true);
  const panels = figure.panels ?? [];
  return [
    ...(shared.length > 0 || (alone.length === 0 && panels.length === 0) ? [sharedGroup(shared, figure, prefix)] : []),
    ...alone.map((series) => ownGroup(series, figure, prefix)),
    ...panels.flatMap((panel, i) => pointGroups(panel.figure, `${prefix}${panelLetter(i)} `)),
    ...(figure.inset ? pointGroups(figure.inset.figure, `${prefix}inset `) : []),
  ];
}

function sharedGroup(series: readonly Series[], figure: Figure, prefix: string): PointGroup {
  const x = [...new Set(series.flatMap((one) => one.x))].sort((a, b) => a - b);
  const columns = series.map((one) => {
    const indices = new Map(one.x.map((value, i) => [value, i]));
    return { series: one, at: x.map((value) => indices.get(value) ?? null) };
  });
  return { prefix, xName: abscissaName(figure), x, columns };
}

function ownGroup(series: Series, figure: Figure, prefix: string): PointGroup {
  return {
    prefix,
    xName: `${series.name} ${abscissaName(figure)}`,
    x: series.x,
    columns: [{ series, at: series.x.map((_, i) => i) }],
  };
}

const abscissaName = ({ x }: Figure): string => x.label.replace(/^\\/, "").replace(/[{}$]/g, "") || "x";

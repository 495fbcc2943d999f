import { decimalText } from "./csv.ts";
import { type Ends, plotted, plottedInterval, plottedY, yEnds } from "./range.ts";
import type { Axis, Figure, Series } from "./types.ts";

/** Heads of the columns that hold one series. */
export interface Columns {
  readonly x: string;
  readonly y: string;
  /** Outline of the band: along its lower edge and back along the upper one. */
  readonly band: { readonly x: string; readonly y: string } | null;
  /** From the foot to each point and a gap; null when the series has no stems. */
  readonly stems: { readonly x: string; readonly y: string } | null;
}

/** One pair of axes, and where the stems of each of its series stand, in plotted coordinates; null for one without. */
export interface PlottedFigure {
  readonly figure: Figure;
  readonly feet: readonly (number | null)[];
}

export interface DataTable {
  readonly text: string;
  /** For each pair of axes, in the order of its series. */
  readonly columns: readonly (readonly Columns[])[];
}

/** Columns of one table as they are found. */
interface Table {
  readonly heads: string[];
  readonly bodies: (readonly string[])[];
}

/**
 * The points of a plate as a table for pgfplots: columns of all series side by side, shorter ones filled up with `nan`,
 * which is also a gap. On logarithmic axes the plotted columns are decimal logarithms, and `valueK` holds the values. Where
 * the plate has several pairs of axes, the columns of each begin with its letter.
 */
export function dataTable(plots: readonly PlottedFigure[]): DataTable {
  const table: Table = { heads: [], bodies: [] };
  const prefixes = plots.map((_, i) => (plots.length === 1 ? "" : `${letterOf(i)}_`));
  const columns = plots.map((plot, i) => plotColumns(plot, prefixes[i] ?? "", table));
  const length = table.bodies.reduce((most, body) => Math.max(most, body.length), 0);
  const comments = plots.flatMap(({ figure }, i) =>
    figure.series.map((series, k) => `# ${prefixes[i]}${k + 1}: ${series.name.replace(/[^\x20-\x7e]/g, "?")}`),
  );
  const rows = Array.from({ length }, (_, i) => table.bodies.map((body) => body[i] ?? "nan").join(" "));
  return { text: `${[...comments, table.heads.join(" "), ...rows].join("\n")}\n`, columns };
}

const letterOf = (index: number): string => (index < 26 ? String.fromCharCode(97 + index) : `p${index}`);

function plotColumns({ figure, feet }: PlottedFigure, prefix: string, table: Table): Columns[] {
  const add = (head: string, body: readonly string[]) => {
    table.heads.push(prefix + head);
    table.bodies.push(body);
    return prefix + head;
  };
  const ends = yEnds(figure);
  return figure.series.map((series, k): Columns => {
    const columnName = (axis: Axis, name: string) => `${axis.scale === "log" ? "log10_" : ""}${name}${k + 1}`;
    const indices = series.x.map((_, i) => i);
    if (figure.y.scale === "log") {
      add(
        `value${k + 1}`,
        indices.map((i) => decimalText(series.y[i] ?? null, series.log10y?.[i] ?? null) || "nan"),
      );
    }
    const x = add(
      columnName(figure.x, "x"),
      indices.map((i) => text(plotted(figure.x, series.x[i] ?? null))),
    );
    const y = add(
      columnName(figure.y, "y"),
      indices.map((i) => text(plottedY(figure.y, series, i))),
    );
    const pair = (name: string, points: readonly OutlinePoint[]) =>
      points.length === 0
        ? null
        : {
            x: add(
              `${name}x${k + 1}`,
              points.map((point) => text(point?.[0] ?? null)),
            ),
            y: add(
              columnName(figure.y, name),
              points.map((point) => text(point?.[1] ?? null)),
            ),
          };
    return {
      x,
      y,
      band: pair("band", bandOutline(figure, series, ends)),
      stems: pair("stem", stems(figure, series, feet[k] ?? null)),
    };
  });
}

const text = (value: number | null) => (value === null ? "nan" : String(value));

type OutlinePoint = readonly [x: number, y: number] | null;

/** One closed outline for each stretch without a gap, `null` between them; heights beyond the axis are put on its end. */
function bandOutline(figure: Figure, series: Series, ends: Ends): readonly OutlinePoint[] {
  if (!series.low || !series.high || series.mark === "points" || series.mark === "stems") return [];
  const outline: OutlinePoint[] = [];
  let lower: OutlinePoint[] = [];
  let upper: OutlinePoint[] = [];
  const finish = () => {
    if (lower.length > 1) outline.push(...lower, ...upper.reverse(), lower[0] ?? null, null);
    lower = [];
    upper = [];
  };
  const within = (at: number) => Math.min(ends.high, Math.max(ends.low, at));
  series.x.forEach((value, i) => {
    const x = plotted(figure.x, value);
    const interval = plottedInterval(figure.y, series, i);
    if (x === null || interval === null) {
      finish();
      return;
    }
    lower.push([x, within(interval[0])]);
    upper.push([x, within(interval[1])]);
  });
  finish();
  return outline.slice(0, -1);
}

function stems(figure: Figure, series: Series, foot: number | null): readonly OutlinePoint[] {
  if (foot === null) return [];
  return series.x.flatMap((value, i): OutlinePoint[] => {
    const x = plotted(figure.x, value);
    const y = plottedY(figure.y, series, i);
    return x === null || y === null ? [] : [[x, foot], [x, y], null];
  });
}

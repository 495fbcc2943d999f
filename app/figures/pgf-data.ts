import { decimalText } from "./csv.ts";
import { type Ends, plotted, plottedY, yEnds } from "./range.ts";
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

export interface DataTable {
  readonly text: string;
  /** In the order of the figure's series. */
  readonly columns: readonly Columns[];
}

/**
 * The points of a figure as a table for pgfplots: columns of all series side by side, shorter ones filled up with `nan`,
 * which is also a gap. On logarithmic axes the plotted columns are decimal logarithms, and `valueK` holds the values.
 * @param feet where the stems of each series stand, in plotted coordinates; null for one without stems
 */
export function dataTable(figure: Figure, feet: readonly (number | null)[]): DataTable {
  const heads: string[] = [];
  const bodies: (readonly string[])[] = [];
  const add = (head: string, body: readonly string[]) => {
    heads.push(head);
    bodies.push(body);
    return head;
  };
  const ends = yEnds(figure);
  const columns = figure.series.map((series, k): Columns => {
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
  const length = bodies.reduce((most, body) => Math.max(most, body.length), 0);
  const comments = figure.series.map((series, k) => `# ${k + 1}: ${series.name.replace(/[^\x20-\x7e]/g, "?")}`);
  const rows = Array.from({ length }, (_, i) => bodies.map((body) => body[i] ?? "nan").join(" "));
  return { text: `${[...comments, heads.join(" "), ...rows].join("\n")}\n`, columns };
}

const text = (value: number | null) => (value === null ? "nan" : String(value));

type OutlinePoint = readonly [x: number, y: number] | null;

/** One closed outline for each stretch without a gap, `null` between them; heights beyond the axis are put on its end. */
function bandOutline(figure: Figure, series: Series, ends: Ends): readonly OutlinePoint[] {
  if (!series.low || !series.high) return [];
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
    const low = plotted(figure.y, series.low?.[i] ?? null);
    const high = plotted(figure.y, series.high?.[i] ?? null);
    if (x === null || low === null || high === null) {
      finish();
      return;
    }
    lower.push([x, within(low)]);
    upper.push([x, within(high)]);
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

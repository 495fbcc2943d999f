import type { Series } from "../../figures/index.ts";
import type { DrawnView, Presentation } from "../presentation.ts";
import { sweepSeries } from "../sweep/series.ts";
import { bodyNode, labelOf } from "./labels.ts";
import type { FigureData } from "./model.ts";
import type { Sample } from "./sample.ts";
import { bandEnd } from "./sample.ts";

/** What a figure draws, by the author's names in the order of the body. */
export interface Drawing {
  readonly curves: readonly string[];
  readonly bands: readonly string[];
  /** Of the curves that are cells. */
  readonly views: ReadonlyMap<string, DrawnView>;
}

/** The curves and bands of a figure; the band of a curve belongs to it. */
export function figureSeries(
  data: FigureData,
  { curves, bands, views }: Drawing,
  presentation: Presentation,
): readonly Series[] {
  const drawn = curves.flatMap((name) => {
    const view = views.get(name);
    return view === undefined ? formulaSeries(data, name, presentation) : cellSeries(name, view, presentation);
  });
  const alone = bands.filter((name) => !belongsToCurve(data, name));
  return [...drawn, ...alone.flatMap((name) => bandSeries(data, name, curves, presentation))];
}

function formulaSeries(data: FigureData, name: string, presentation: Presentation): readonly Series[] {
  const series = foundSeries(sampleWith(data, name), name, presentation);
  if (series === null) return [];
  const ends = belongsToCurve(data, name) ? bandEnds(data, name, presentation) : null;
  const quote = quoteAt(data, name, presentation);
  const quoted = quote === null ? {} : { quote };
  return [{ ...series, name, label: labelOf(name, presentation), ...(ends ?? {}), ...quoted }];
}

/** A curve's formula with # for its variable; null where it varies a parameter, and no formula gives one point. */
function quoteAt({ over }: FigureData, name: string, presentation: Presentation): string | null {
  const node = bodyNode(presentation, "curves", name);
  if (over === null || node?.yaml !== "scalar" || presentation.isParameter(over)) return null;
  return node.text.trim().replace(new RegExp(`(?<![\\w.])${over}(?!\\w)`, "g"), "#");
}

/** A cell's own curves: under the curve's name where it is one, under their own behind it where they are several. */
function cellSeries(name: string, { series }: DrawnView, presentation: Presentation): readonly Series[] {
  const [only, ...others] = series;
  if (only !== undefined && others.length === 0)
    return [{ ...amongOthers(only), name, label: labelOf(name, presentation) }];
  const own = new Map(series.map((one) => [one.name, `${name}: ${one.name}`]));
  return series.map((one) => ({
    ...amongOthers(one),
    name: own.get(one.name) ?? one.name,
    ...(one.colourOf === undefined ? {} : { colourOf: own.get(one.colourOf) ?? one.colourOf }),
  }));
}

/** Among other curves stems are points, and the numerical error of a law's numbers could not be seen. */
function amongOthers(series: Series): Series {
  if (series.mark !== "stems") return series;
  const { low: _low, high: _high, ...points } = series;
  return { ...points, mark: "points" };
}

/** A band of its own; at single points bars. It takes the colour of the cell that is drawn under its name. */
function bandSeries(
  data: FigureData,
  name: string,
  curves: readonly string[],
  presentation: Presentation,
): readonly Series[] {
  const low = foundSeries(sampleWith(data, bandEnd(name, "low")), bandEnd(name, "low"), presentation);
  const ends = bandEnds(data, name, presentation);
  if (low === null || ends === null) return [];
  const isNamedTwice = curves.includes(name);
  return [
    {
      ...low,
      ...ends,
      name: isNamedTwice ? `${name}, band` : name,
      label: isNamedTwice ? "" : labelOf(name, presentation),
      mark: low.mark === "points" ? "points" : "band",
      y: low.x.map(() => null),
      log10y: undefined,
      dots: [],
      ...(isNamedTwice ? { colourOf: name } : {}),
    },
  ];
}

function bandEnds(
  data: FigureData,
  name: string,
  presentation: Presentation,
): Pick<Series, "low" | "high" | "log10low" | "log10high"> | null {
  const [low, high] = (["low", "high"] as const).map((end) =>
    foundSeries(sampleWith(data, bandEnd(name, end)), bandEnd(name, end), presentation),
  );
  if (!low || !high || low.x.length !== high.x.length) return null;
  return { low: low.y, high: high.y, log10low: low.log10y, log10high: high.log10y };
}

/** A band belongs to the curve of its name where both were found at the same places. */
function belongsToCurve(data: FigureData, name: string): boolean {
  const sample = sampleWith(data, name);
  return sample !== undefined && data.bands.includes(name) && sample === sampleWith(data, bandEnd(name, "low"));
}

const sampleWith = ({ samples }: FigureData, name: string): Sample | undefined =>
  samples.find(({ data }) => data.record.includes(name));

function foundSeries(sample: Sample | undefined, name: string, presentation: Presentation): Series | null {
  const [curve] = sample?.data.curves ?? [];
  return sample === undefined || curve === undefined ? null : sweepSeries(sample.data, curve, name, 0, presentation);
}

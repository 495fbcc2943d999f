import type { Figure, TableData, Vertical } from "../../figures/index.ts";
import { labelledAxis } from "../figure-parts.ts";
import type { Presentation } from "../presentation.ts";
import { tableEntry } from "../table-parts.ts";
import type { CellView } from "../types.ts";
import { exactValue, shortTex } from "../values.ts";
import { alternativeOf } from "./alternative.ts";
import { drawnInLogs } from "./heights.ts";
import type { SweepData } from "./model.ts";
import { sweepRemarks } from "./remarks.ts";
import { sweepQuotes, sweepSeries } from "./series.ts";

/** More jumps than these are told in the caption only. */
const MOST_VERTICALS = 4;

/** A plate for what is recorded, one panel for each quantity where there are several; every curve breaks where it jumps. */
export function viewSweep(data: SweepData, presentation: Presentation): CellView {
  const points = pointsOf(data, presentation);
  const drawn = data.record.filter((name) =>
    data.curves.some(({ recorded }) => recorded.some((all) => all[name]?.type === "number")),
  );
  const figures = drawn.map((name) => figureOf(data, name, presentation, drawn.length > 1));
  const [first] = figures;
  if (first === undefined) return { figure: null, table: null, points };
  const remarks = sweepRemarks(data, presentation);
  if (figures.length === 1) return { figure: { ...first, remarks }, table: null, points };
  const figure: Figure = {
    alternative: figures.map(({ alternative }) => alternative).join(" "),
    x: first.x,
    y: first.y,
    series: [],
    levels: [],
    remarks,
    panels: figures.map((panel, index) => ({ title: presentation.symbolOf(drawn[index] ?? ""), figure: panel })),
  };
  return { figure, table: null, points };
}

/** A panel's title names its quantity, so that its axis need not. */
function figureOf(data: SweepData, name: string, presentation: Presentation, isPanel: boolean): Figure {
  const inLogs = drawnInLogs(data.curves.flatMap(({ recorded }) => recorded.flatMap((all) => all[name] ?? [])));
  const symbol = presentation.symbolOf(data.over);
  const y = isPanel ? { ...presentation.y, label: "" } : presentation.y;
  return {
    alternative: alternativeOf(data, name, presentation),
    x: labelledAxis(symbol, data.scale === "log" ? "log" : "linear", presentation.x),
    y: labelledAxis(presentation.symbolOf(name), inLogs ? "log" : "linear", y),
    series: data.curves.map((curve, index) => ({
      ...sweepSeries(data, curve, name, index, presentation),
      ...(presentation.name === null ? {} : { quote: sweepQuotes(data, curve, name, presentation.name) }),
    })),
    levels: [],
    verticals: jumpVerticals(data, symbol),
    remarks: [],
  };
}

function jumpVerticals(data: SweepData, symbol: string): Vertical[] {
  const places = [...new Set(data.curves.flatMap(({ jumps }) => jumps.map(({ above }) => above)))];
  if (places.length > MOST_VERTICALS) return [];
  return places.map((x) => ({ label: `${symbol}=${shortTex(x)}`, x }));
}

/** Every point of every curve, as it was found. */
function pointsOf(data: SweepData, presentation: Presentation): TableData {
  const { over, vary, record } = data;
  const names = [...(vary === null ? [] : [vary]), over, ...record];
  const cell = presentation.name;
  const all = data.curves.flatMap(({ at, x, recorded }) => x.map((place, i) => ({ at, place, recorded: recorded[i] })));
  const rows = all.map(({ at, place, recorded }, i) => {
    const quote = (name: string) => (cell === null ? "" : `${cell}.${name}(${i + 1})`);
    return [
      ...(vary === null || at === null ? [] : [tableEntry(exactValue(at))]),
      tableEntry(exactValue(place)),
      ...record.map((name) => tableEntry(recorded?.[name] ?? { type: "none" }, {}, quote(name))),
    ];
  });
  return {
    columns: names.map((name) => ({ name, head: presentation.symbolOf(name), tex: true })),
    rows,
    remarks: sweepRemarks(data, presentation),
  };
}

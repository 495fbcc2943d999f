import type { Figure, Inset, Level, Vertical } from "../../figures/index.ts";
import { labelText, panelLetter } from "../../figures/index.ts";
import type { Value } from "../../formulas/index.ts";
import { toDouble } from "../../formulas/index.ts";
import { labelledAxis } from "../figure-parts.ts";
import type { DrawnView, Presentation } from "../presentation.ts";
import { drawnInLogs } from "../sweep/heights.ts";
import { pointsTable } from "../table-parts.ts";
import type { CellView } from "../types.ts";
import { shortTex } from "../values.ts";
import { alternativeOf } from "./alternative.ts";
import { bodyNode, cellNamed, levelLabel, namesInOrder } from "./labels.ts";
import type { FigureData } from "./model.ts";
import { cornerOf } from "./read.ts";
import { figureRemarks } from "./remarks.ts";
import { figureSeries } from "./series.ts";

/** The plate of a figure, with the names, labels and axes of its body as it is now. */
export function viewFigure(data: FigureData, presentation: Presentation): CellView {
  const figure = data.panels.length > 0 ? panelFigure(data, presentation) : ownFigure(data, presentation);
  return {
    figure,
    table: null,
    // Made when asked for: a figure within another one is drawn without it.
    get points() {
      return pointsTable(figure.x.label, figure);
    },
  };
}

function ownFigure(data: FigureData, presentation: Presentation): Figure {
  const formulas = data.samples.flatMap((sample) => sample.data.record).filter((name) => !name.includes(" "));
  const curves = namesInOrder("curves", [...formulas, ...Object.keys(data.drawn)], presentation);
  const bands = namesInOrder("bands", data.bands, presentation);
  const views = new Map(
    Object.entries(data.drawn).map(([name, { kind, data: own }]) => [
      name,
      presentation.viewOf(cellNamed(bodyNode(presentation, "curves", name)) || name, kind, own),
    ]),
  );
  const cells = [...views.values()];
  const series = figureSeries(data, { curves, bands, views }, presentation);
  const isAlone = series.length === 1;
  const figure: Figure = {
    alternative: "",
    x: xAxis(data, cells, presentation),
    y: labelledAxis(
      isAlone ? (series[0]?.label ?? "") : commonLabel(formulas, cells),
      isLogarithmic(data, cells) ? "log" : "linear",
      presentation.y,
    ),
    series: isAlone ? series.map((one) => ({ ...one, label: "" })) : series,
    levels: levelsOf(data, presentation),
    verticals: jumpsOf(data, presentation),
    remarks: figureRemarks(data, cells, presentation),
    ...(data.inset ? { inset: insetOf(data.inset, presentation) } : {}),
  };
  return { ...figure, alternative: alternativeOf({ ...figure, series }) };
}

function xAxis(
  { over, interval }: FigureData,
  cells: readonly DrawnView[],
  { x, symbolOf }: Presentation,
): Figure["x"] {
  const axes = cells.flatMap((cell) => cell.axes?.x ?? []);
  const scale = over === null && axes.length > 0 && axes.every((axis) => axis.scale === "log") ? "log" : "linear";
  const label = over === null ? (axes[0]?.label ?? "") : symbolOf(over);
  return labelledAxis(label, scale, x, interval);
}

/** The vertical label that all cells drawn share; curves of formulas are named at their ends. */
function commonLabel(formulas: readonly string[], cells: readonly DrawnView[]): string {
  const labels = new Set(cells.flatMap(({ axes }) => axes?.y.label ?? []));
  const [only] = labels;
  return formulas.length === 0 && labels.size === 1 ? (only ?? "") : "";
}

/** Logarithmic where a cell drawn is, or where the formulas' numbers span decades; not where some are not positive. */
function isLogarithmic({ samples }: FigureData, cells: readonly DrawnView[]): boolean {
  const values = samples.flatMap(({ data }) =>
    data.curves.flatMap(({ recorded }) => recorded.flatMap(Object.values<Value>)),
  );
  const isPositive = values.every((value) => value.type !== "number" || value.quantity.mantissa > 0);
  return isPositive && (drawnInLogs(values) || cells.some(({ axes }) => axes?.y.scale === "log"));
}

function levelsOf({ levels }: FigureData, presentation: Presentation): readonly Level[] {
  return Object.entries(levels).flatMap(([name, value]) =>
    value.type === "number" ? [{ label: levelLabel(name, value, presentation), y: toDouble(value.quantity) }] : [],
  );
}

/** More jumps than these are told in the caption only. */
const MOST_VERTICALS = 4;

/** Where curves jump. */
function jumpsOf({ over, samples }: FigureData, presentation: Presentation): readonly Vertical[] {
  const curves = samples.flatMap(({ data }) => data.curves);
  const places = [...new Set(curves.flatMap(({ jumps }) => jumps.map(({ above }) => above)))];
  if (over === null || places.length > MOST_VERTICALS) return [];
  return places.map((x) => ({ label: `${presentation.symbolOf(over)}=${shortTex(x)}`, x }));
}

function insetOf({ kind, data }: NonNullable<FigureData["inset"]>, presentation: Presentation): Inset | undefined {
  const node = bodyNode(presentation, "inset");
  const id = cellNamed(node?.yaml === "map" ? bodyNode(presentation, "inset", "cell") : node);
  const { figure } = presentation.viewOf(id, kind, data);
  const at = bodyNode(presentation, "inset", "at");
  return figure === null ? undefined : { figure, corner: at === undefined ? null : cornerOf(at) };
}

/** Other cells' figures side by side, each with its own axes; `labels` may title them by the cells' names. */
function panelFigure(data: FigureData, presentation: Presentation): Figure {
  const node = bodyNode(presentation, "panels");
  const items = node?.yaml === "list" ? node.items : node === undefined ? [] : [node];
  const panels = data.panels.flatMap(({ kind, data: own }, index) => {
    const id = cellNamed(items[index]);
    const { figure } = presentation.viewOf(id, kind, own);
    return figure === null ? [] : [{ title: presentation.labels.get(id) ?? "", figure }];
  });
  const remarks = panels.flatMap(({ figure }, index) =>
    figure.remarks.map((remark) => `${panelLetter(index)} ${remark}`),
  );
  const words = panels.map(({ title, figure }, index) =>
    [panelLetter(index), title === "" ? "" : `${labelText(title)}:`, figure.alternative]
      .filter((part) => part !== "")
      .join(" "),
  );
  return {
    alternative: words.join(" "),
    x: labelledAxis("x", "linear", presentation.x),
    y: labelledAxis("", "linear", presentation.y),
    series: [],
    levels: [],
    remarks,
    panels,
  };
}

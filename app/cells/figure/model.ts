import type { Value } from "../../formulas/index.ts";
import type { Body, CellReference } from "../body.ts";
import type { ComputeContext } from "../context.ts";
import type { KindOf } from "../kind.ts";
import { costOf, isQuick, recomputedWords } from "../varying.ts";
import { FIGURE_DOCUMENTATION } from "./documentation.ts";
import type { FigureCell } from "./read.ts";
import { isCell, readFigure } from "./read.ts";
import type { Sample } from "./sample.ts";
import { LIMITS, pointsOf, sample, samplingOf } from "./sample.ts";
import { viewFigure } from "./view.ts";

/** Another cell's result, kept whole: what is drawn of it is what it was when the figure was made. */
export interface DrawnCell {
  readonly kind: string;
  readonly data: unknown;
}

export interface FigureData {
  readonly over: string | null;
  /** Ends of the interval that `over` gives; null for a list, or none. */
  readonly interval: readonly [number, number] | null;
  readonly samples: readonly Sample[];
  /** Curves that are cells, by the curve's name. */
  readonly drawn: Readonly<Record<string, DrawnCell>>;
  readonly bands: readonly string[];
  /** By name; those of a list by their place. */
  readonly levels: Readonly<Record<string, Value>>;
  readonly inset: DrawnCell | null;
  readonly panels: readonly DrawnCell[];
}

export const FIGURE: KindOf<FigureCell, FigureData> = {
  documentation: FIGURE_DOCUMENTATION,
  solver: "figure 1",
  knownAtPlanning: false,

  read: (body: Body) => readFigure(body),

  members: () => ({ values: [], callables: [] }),

  inspect(model, context) {
    const sampling = samplingOf(model, context);
    return sampling === null || isQuick(pointsOf(sampling), context);
  },

  cost(model, context) {
    const sampling = samplingOf(model, context);
    return sampling === null ? null : costOf(pointsOf(sampling), context, LIMITS);
  },

  compute(model, context) {
    const sampling = samplingOf(model, context);
    const samples = sampling === null ? [] : sample(sampling, context);
    const drawn = Object.entries(model.curves).flatMap(([name, curve]) =>
      isCell(curve) ? [[name, drawnCell(curve, `curves.${name}`, context)] as const] : [],
    );
    const data: FigureData = {
      over: sampling?.over ?? null,
      interval: sampling?.interval ?? null,
      samples,
      drawn: Object.fromEntries(drawn),
      bands: Object.keys(model.bands),
      levels: Object.fromEntries(Object.entries(model.levels).map(([name, formula]) => [name, context.value(formula)])),
      inset: model.inset && drawnCell(model.inset, "inset", context),
      panels: model.panels.map((panel, index) => drawnCell(panel, `panels.${index}`, context)),
    };
    return { values: {}, data, method: methodOf(data, context) };
  },

  call: () => undefined,
  view: viewFigure,
};

function drawnCell(reference: CellReference, path: string, context: ComputeContext): DrawnCell {
  const { kind, data } = context.result(reference, path);
  return { kind, data };
}

function methodOf({ samples, panels }: FigureData, context: ComputeContext): string {
  if (panels.length > 0) return "Figures of other cells";
  const points = samples.reduce((most, { data }) => Math.max(most, data.curves[0]?.x.length ?? 0), 0);
  if (points === 0) return "Curves of other cells";
  const how = samples.some(({ data }) => data.scale === "adapted") ? ", closer where the curves bend" : "";
  return `${points} points${how}${recomputedWords("point", context)}`;
}

import type { Formula, Quantity } from "../../formulas/index.ts";
import type { Branches } from "../borders.ts";
import type { ComputeContext } from "../context.ts";
import { exactValue } from "../values.ts";
import type { Point, VariedValues, VaryingLimits } from "../varying.ts";
import { checkCost, contextAt, numbersInSteps } from "../varying.ts";
import type { Probe, Range, SweepScale } from "./points.ts";
import { countOf, rangeOf } from "./points.ts";

export interface SweepCell {
  readonly over: Readonly<Record<string, VariedValues>>;
  readonly vary: Readonly<Record<string, VariedValues>>;
  readonly points: Formula;
  readonly scale: SweepScale;
  readonly record: Readonly<Record<string, Formula>>;
}

/** Which points a sweep has, by numbers. */
export interface SweepLayout {
  readonly over: string;
  readonly vary: string | null;
  readonly range: Range;
  /** Values of the second name, one a curve; a null alone where there is none. */
  readonly curves: readonly (number | null)[];
}

export const LIMITS: VaryingLimits = { noun: "point", most: 2_000, mostRecomputed: 10_000 };
const CURVES: VaryingLimits = { noun: "curve", most: 12, mostRecomputed: LIMITS.mostRecomputed };

/** @throws CellFault when values are no numbers or out of range, or points too many. */
export function layOut(model: SweepCell, context: ComputeContext): SweepLayout {
  const [over = "", values] = Object.entries(model.over)[0] ?? [];
  const [vary = null, second] = Object.entries(model.vary)[0] ?? [];
  const count = context.number(model.points, "points", { least: 2, most: LIMITS.most, whole: true });
  const range = rangeOf(values ?? { list: [] }, `over.${over}`, { count, scale: model.scale }, context);
  const curves = second === undefined ? [null] : curvesOf(second, `vary.${vary}`, context);
  const layout = { over, vary, range, curves };
  checkCost(countOf(range) * curves.length, "over", context, LIMITS);
  return layout;
}

function curvesOf(values: VariedValues, path: string, context: ComputeContext): readonly number[] {
  const curves = numbersInSteps(values, path, context, CURVES);
  checkCost(curves.length, path, context, CURVES);
  return curves;
}

/** How many times the cells are computed again: at each point, or once a curve where only the second name is a parameter. */
export function recomputedPoints({ over, range, curves }: SweepLayout, context: ComputeContext): number {
  return context.varied.includes(over) ? countOf(range) * curves.length : curves.length;
}

/** How the points of one curve are found. */
export function probeOf(model: SweepCell, layout: SweepLayout, at: number | null, context: ComputeContext): Probe {
  const { over, vary } = layout;
  const fixed: Point = vary === null || at === null ? {} : { [vary]: exactValue(at) };
  const here = (x: number): Point => ({ ...fixed, [over]: exactValue(x) });
  const variesOver = context.varied.includes(over);
  // Where `over` is a dummy, what the second name changes is computed again once for the whole curve.
  const around = variesOver ? context : contextAt(fixed, "vary", context);
  return {
    recordAt(x) {
      const point = here(x);
      const inside = variesOver ? contextAt(point, "over", context) : around;
      return Object.fromEntries(
        Object.entries(model.record).map(([name, formula]) => [name, inside.value(formula, point)]),
      );
    },
    branchesAt: (x) => (variesOver ? context.branches(quantitiesAt(here(x), context)) : NO_BRANCHES),
  };
}

const NO_BRANCHES: Branches = new Map();

function quantitiesAt(point: Point, { varied }: ComputeContext): Record<string, Quantity> {
  return Object.fromEntries(
    Object.entries(point).flatMap(([name, value]) =>
      varied.includes(name) && value.type === "number" ? [[name, value.quantity]] : [],
    ),
  );
}

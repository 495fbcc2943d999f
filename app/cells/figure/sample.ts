import type { Formula, Quantity } from "../../formulas/index.ts";
import type { Branches } from "../borders.ts";
import type { ComputeContext } from "../context.ts";
import type { SweepData } from "../sweep/model.ts";
import type { Probe, Range } from "../sweep/points.ts";
import { countOf, curveOver, rangeOf } from "../sweep/points.ts";
import { exactValue } from "../values.ts";
import type { VaryingLimits } from "../varying.ts";
import { checkCost, contextAt } from "../varying.ts";
import type { FigureCell } from "./read.ts";
import { isCell } from "./read.ts";

/** Formulas found along one variable: those on one set of places. Its shape is that of a sweep with one curve. */
export interface Sample {
  readonly data: SweepData;
  /** Of so many whole numbers only some were taken; null where all were, or they are not whole numbers. */
  readonly thinnedFrom: number | null;
}

/** The formulas to be found, and where. */
export interface Sampling {
  readonly over: string;
  readonly formulas: Readonly<Record<string, Formula>>;
  readonly range: Range;
  /** Ends of the interval; null for a list. */
  readonly interval: readonly [number, number] | null;
}

export const LIMITS: VaryingLimits = { noun: "point", most: 2_000, mostRecomputed: 2_000 };
const DEFAULT_POINTS = 121;
const DEFAULT_RECOMPUTED_POINTS = 40;
/** Whether a formula exists at whole numbers only is asked at so many places of either sort. */
const PROBES = 4;
/** From so many times its beginning on, an interval may be drawn on a logarithmic axis. */
const WIDE_RATIO = 50;

/** A band's ends among the formulas, which are named as the curves are. */
export const bandEnd = (name: string, end: "low" | "high"): string => `${name} ${end}`;

/** All formulas of a figure: of its curves, and both ends of its bands. */
export function formulasOf({ curves, bands }: FigureCell): Record<string, Formula> {
  return Object.fromEntries([
    ...Object.entries(curves).flatMap(([name, curve]) => (isCell(curve) ? [] : [[name, curve] as const])),
    ...Object.entries(bands).flatMap(([name, { low, high }]) => [
      [bandEnd(name, "low"), low] as const,
      [bandEnd(name, "high"), high] as const,
    ]),
  ]);
}

/** What is to be found where; null where a figure has no `over`. @throws CellFault when values are out of range, or too many. */
export function samplingOf(model: FigureCell, context: ComputeContext): Sampling | null {
  const [over, values] = Object.entries(model.over)[0] ?? [];
  if (over === undefined || values === undefined) return null;
  const fallback = context.varied.length > 0 ? DEFAULT_RECOMPUTED_POINTS : DEFAULT_POINTS;
  const count =
    model.points === null
      ? fallback
      : context.number(model.points, "points", { least: 2, most: LIMITS.most, whole: true });
  const range = rangeOf(values, `over.${over}`, { count, scale: "adapted" }, context);
  const formulas = formulasOf(model);
  const sampling = { over, formulas, range, interval: "places" in range ? null : ([range.from, range.to] as const) };
  checkCost(pointsOf(sampling), `over.${over}`, context, LIMITS);
  return sampling;
}

/** How many points are found; none where all curves are cells. */
export function pointsOf({ formulas, range }: Sampling): number {
  return Object.keys(formulas).length === 0 ? 0 : countOf(range);
}

/**
 * Finds the formulas along their variable: where they bend on an interval, at each value of a list. A formula that is
 * refused at every other number and exists at whole numbers is found at these alone.
 */
export function sample(sampling: Sampling, context: ComputeContext): readonly Sample[] {
  const { formulas, range, over } = sampling;
  if (Object.keys(formulas).length === 0) return [];
  const probe = probeOf(sampling, formulas, context);
  if ("places" in range)
    return [sampleOf(sampling, formulas, "listed", curveOver(range, probe, progress(range, context)))];
  if (context.varied.includes(over))
    return [sampleOf(sampling, formulas, "adapted", curveOver(range, probe, progress(range, context)))];
  const whole = namesAtWholeNumbers(sampling, probe, range);
  const [counted, smooth] = [whole, Object.keys(formulas).filter((name) => !whole.includes(name))].map((names) =>
    Object.fromEntries(names.flatMap((name) => (formulas[name] === undefined ? [] : [[name, formulas[name]]]))),
  );
  return [
    ...(smooth && Object.keys(smooth).length > 0 ? [smoothSample(sampling, smooth, range, context)] : []),
    ...(counted && Object.keys(counted).length > 0 ? [countedSample(sampling, counted, range, context)] : []),
  ];
}

type Interval = Exclude<Range, { readonly places: readonly number[] }>;

/** Where the curves bend; on a wide interval also evenly in the logarithm, since its axis may be logarithmic. */
function smoothSample(
  sampling: Sampling,
  formulas: Sampling["formulas"],
  range: Interval,
  context: ComputeContext,
): Sample {
  const probe = probeOf(sampling, formulas, context);
  const isWide = range.from > 0 && range.to / range.from >= WIDE_RATIO;
  if (!isWide) return sampleOf(sampling, formulas, "adapted", curveOver(range, probe, progress(range, context)));
  const half = { ...range, count: Math.ceil(range.count / 2) };
  const [bends, decades] = [half, { ...half, scale: "log" as const }].map((part) =>
    curveOver(part, probe, progress(half, context)),
  );
  const found = new Map(
    [bends, decades].flatMap((curve) => curve?.x.map((x, i) => [x, curve.recorded[i] ?? {}]) ?? []),
  );
  const x = [...found.keys()].sort((a, b) => a - b);
  const merged = { x, piece: x.map(() => 0), recorded: x.map((at) => found.get(at) ?? {}), jumps: [] };
  return sampleOf(sampling, formulas, "adapted", merged);
}

/** At the whole numbers of the interval: all of them, or evenly spaced ones where there are more than points asked for. */
function countedSample(
  sampling: Sampling,
  formulas: Sampling["formulas"],
  { from, to, count }: Interval,
  context: ComputeContext,
): Sample {
  const [first, last] = [Math.ceil(from), Math.floor(to)];
  const all = last - first + 1;
  const most = Math.min(all, count);
  const share = (i: number) => (most === 1 ? 0 : i / (most - 1));
  const places = Array.from({ length: most }, (_, i) => Math.round(first + (last - first) * share(i)));
  const range = { places };
  const curve = curveOver(range, probeOf(sampling, formulas, context), progress(range, context));
  const thinnedFrom = all > most ? all : null;
  return { ...sampleOf(sampling, formulas, "listed", curve), thinnedFrom };
}

function sampleOf(
  { over }: Sampling,
  formulas: Sampling["formulas"],
  scale: SweepData["scale"],
  curve: ReturnType<typeof curveOver>,
): Sample {
  const data = { over, vary: null, scale, record: Object.keys(formulas), curves: [{ ...curve, at: null }] };
  return { data, thinnedFrom: null };
}

/** Formulas that have a number at some whole number of the interval, and at none of the places between that are tried. */
function namesAtWholeNumbers({ formulas }: Sampling, probe: Probe, { from, to }: Interval): readonly string[] {
  const [first, last] = [Math.ceil(from), Math.floor(to)];
  if (last < first) return [];
  const whole = Array.from({ length: PROBES }, (_, i) => Math.round(first + ((last - first) * i) / (PROBES - 1)));
  const between = Array.from({ length: PROBES }, (_, i) => from + (to - from) * ((i + 0.618) / PROBES)).filter(
    (x) => !Number.isInteger(x),
  );
  const names = (places: readonly number[]) => {
    const found = places.map((x) => probe.recordAt(x));
    return Object.keys(formulas).filter((name) => found.some((recorded) => recorded[name]?.type === "number"));
  };
  const somewhereBetween = names(between);
  return names(whole).filter((name) => !somewhereBetween.includes(name));
}

function probeOf({ over }: Sampling, formulas: Sampling["formulas"], context: ComputeContext): Probe {
  const varies = context.varied.includes(over);
  return {
    recordAt(x) {
      const point = { [over]: exactValue(x) };
      const inside = contextAt(point, "over", context);
      return Object.fromEntries(
        Object.entries(formulas).map(([name, formula]) => [name, inside.value(formula, point)]),
      );
    },
    branchesAt: (x) => (varies ? context.branches({ [over]: quantity(x) }) : NO_BRANCHES),
  };
}

const NO_BRANCHES: Branches = new Map();
const quantity = (x: number): Quantity => ({ mantissa: x, exponent: 0, error: 0, se: 0 });

function progress(range: Range, context: ComputeContext): () => void {
  const total = countOf(range);
  let done = 0;
  return () => {
    done += 1;
    context.progress(done, total);
  };
}

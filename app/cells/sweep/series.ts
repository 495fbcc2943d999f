import type { Dot, Series } from "../../figures/index.ts";
import type { Value } from "../../formulas/index.ts";
import { log10Of, toDouble } from "../../formulas/index.ts";
import type { Presentation } from "../presentation.ts";
import { shortNumber, shortTex } from "../values.ts";
import type { SweepCurve, SweepData } from "./model.ts";

/** Half-width of a 95 % interval of a normal estimate, in standard errors. */
const NORMAL_95 = 1.96;
/** Errors of single points below this share of the value could not be seen. */
const VISIBLE_SHARE = 1e-3;

/** A point to be drawn, or a gap between two pieces. */
interface Drawn {
  readonly x: number;
  readonly value: Value | null;
  /** Of the point in its curve, as it was found; null for a gap. */
  readonly index: number | null;
}

/** One curve of one quantity, in order of x, broken between its pieces, its ends at a jump dotted: a ring where not attained. */
export function sweepSeries(
  data: SweepData,
  curve: SweepCurve,
  name: string,
  index: number,
  presentation: Presentation,
): Series {
  const drawn = inOrder(curve, name);
  const values = drawn.map(({ value }) => value);
  const bound = (sign: 1 | -1) => values.map((value) => boundOf(value, sign));
  const label = data.vary === null || curve.at === null ? "" : shortTex(curve.at);
  const wantsBounds = data.scale !== "listed" || values.some(hasVisibleError);
  return {
    name: curve.at === null ? name : `${name}, ${data.vary} = ${shortNumber(curve.at)}`,
    label: index === 0 && label !== "" ? `${presentation.symbolOf(data.vary ?? "")}=${label}` : label,
    labelAt: "end",
    mark: data.scale === "listed" ? "points" : "line",
    role: "ordinary",
    x: drawn.map(({ x }) => x),
    y: values.map((value) => (value?.type === "number" ? finite(toDouble(value.quantity)) : null)),
    ...(values.some(isBeyondDoubles) ? { log10y: values.map(log10Height) } : {}),
    ...(wantsBounds ? { low: bound(-1), high: bound(1) } : {}),
    dots: data.scale === "adapted" ? jumpDots(curve, drawn) : [],
  };
}

/** What a sentence quotes each point of a drawn curve by: points are counted over all curves, as they were found. */
export function sweepQuotes(data: SweepData, curve: SweepCurve, name: string, cell: string): readonly string[] {
  const before = data.curves.slice(0, data.curves.indexOf(curve)).reduce((sum, { x }) => sum + x.length, 0);
  return inOrder(curve, name).map(({ index }) => (index === null ? "" : `${cell}.${name}(${before + index + 1})`));
}

function inOrder(curve: SweepCurve, name: string): Drawn[] {
  const order = [...curve.x.keys()].sort((a, b) => (curve.x[a] ?? 0) - (curve.x[b] ?? 0));
  return order.flatMap((index, place): Drawn[] => {
    const x = curve.x[index] ?? Number.NaN;
    const here: Drawn = { x, value: curve.recorded[index]?.[name] ?? null, index };
    const next = order[place + 1];
    if (next === undefined || curve.piece[next] === curve.piece[index]) return [here];
    const nextX = curve.x[next] ?? x;
    return [here, { x: x + (nextX - x) / 2, value: null, index: null }];
  });
}

function jumpDots(curve: SweepCurve, drawn: readonly Drawn[]): Dot[] {
  const ends = curve.jumps.flatMap(({ below, above, open }) => [
    { x: below, hollow: open === "below" },
    { x: above, hollow: open === "above" },
  ]);
  return ends.flatMap(({ x, hollow }) => {
    const at = drawn.findIndex((point) => point.x === x && point.value?.type === "number");
    return at < 0 ? [] : [{ at, label: "", hollow }];
  });
}

/** An end of the interval in which a number is known; null where it has none, or lies beyond the range of doubles. */
function boundOf(value: Value | null, sign: 1 | -1): number | null {
  if (value?.type !== "number" || isBeyondDoubles(value)) return null;
  const { quantity } = value;
  const width = Math.max(quantity.error, NORMAL_95 * quantity.se) * 2 ** quantity.exponent;
  return finite(toDouble(quantity) + sign * width);
}

function hasVisibleError(value: Value | null): boolean {
  if (value?.type !== "number") return false;
  const { mantissa, error, se } = value.quantity;
  return Math.max(error, se) > VISIBLE_SHARE * Math.abs(mantissa);
}

function isBeyondDoubles(value: Value | null): boolean {
  return value?.type === "number" && value.quantity.mantissa !== 0 && Math.abs(log10Of(value.quantity)) > SAFE_DECADES;
}

/** Within so many decades of 1 a double keeps all its digits. */
const SAFE_DECADES = 300;

function log10Height(value: Value | null): number | null {
  return value?.type === "number" && value.quantity.mantissa > 0 ? log10Of(value.quantity) : null;
}

function finite(x: number): number | null {
  return Number.isFinite(x) ? x : null;
}

import type { Formula, Quantity, Value } from "../formulas/index.ts";
import { exact, toDouble } from "../formulas/index.ts";
import type { Body } from "./body.ts";
import type { ComputeContext } from "./context.ts";
import { CellFault } from "./context.ts";
import type { Cost } from "./kind.ts";
import { exactValue } from "./values.ts";

/**
 * Varying: a key that takes a name and its values. A name that is a parameter varies that parameter, and every cell that
 * reads it is computed again for each value; any other name is a dummy variable. See the paper language, section 4.
 */

/** Values of one name as written: listed, or from one number to another. */
export type VariedValues = { readonly list: readonly Formula[] } | Interval;

export interface Interval {
  readonly from: Formula;
  readonly to: Formula;
}

/** Values that names have at one point: of a row, of a curve's position. */
export type Point = Readonly<Record<string, Value>>;

/** What a kind asks of the names it varies. */
export interface VaryingLimits {
  /** What one point is called in messages: "row", "point". */
  readonly noun: string;
  readonly most: number;
  /** Points times cells computed again at each: keeps a computation to seconds. */
  readonly mostRecomputed: number;
}

/** So many computations of cells take a moment only. */
const QUICK_RECOMPUTED = 20;

/** Reads the names under a key with their values. Notes every problem; a missing key is an empty map. */
export function readVarying(body: Body, key: string, example: string): Record<string, VariedValues> {
  const node = body.node(key);
  const entries = node === null ? null : body.mapAt(node, `a name and its values such as ${example}`);
  const names: Record<string, VariedValues> = {};
  for (const entry of entries ?? []) {
    const path = `${key}.${entry.key}`;
    body.introduce(entry, path, true);
    names[entry.key] = body.intervalAt(entry.value, path) ?? { list: body.listAt(entry.value, path) };
  }
  if (entries?.length === 0)
    body.problem(body.opening, `\`${key}\` is empty; it takes a name and its values: ${example}.`);
  return names;
}

/** The values of a list; those of an interval in steps of 1: from, from + 1, … up to `to`. @throws CellFault when they are too many. */
export function valuesInSteps(
  values: VariedValues,
  path: string,
  context: ComputeContext,
  limits: VaryingLimits,
): readonly Value[] {
  if ("list" in values) return values.list.map((formula) => context.value(formula));
  return steps(values, path, context, limits).map(exactValue);
}

/** The same as numbers. @throws CellFault also when one of a list is no number. */
export function numbersInSteps(
  values: VariedValues,
  path: string,
  context: ComputeContext,
  limits: VaryingLimits,
): readonly number[] {
  if ("list" in values) return values.list.map((formula, index) => context.number(formula, `${path}.${index}`, {}));
  return steps(values, path, context, limits);
}

function steps(interval: Interval, path: string, context: ComputeContext, { noun, most }: VaryingLimits): number[] {
  const [from, to] = endsOf(interval, path, context);
  if (to - from >= most) {
    throw new CellFault(
      path,
      `From ${from} to ${to} in steps of 1 are more than ${most} ${noun}s; a list [a, b, c] may leave some out.`,
    );
  }
  return Array.from({ length: Math.floor(to - from) + 1 }, (_, index) => from + index);
}

/** Both ends of an interval. @throws CellFault when they are no numbers or run backwards. */
export function endsOf(interval: Interval, path: string, context: ComputeContext): readonly [number, number] {
  const from = context.number(interval.from, path, {});
  const to = context.number(interval.to, path, {});
  if (to >= from) return [from, to];
  throw new CellFault(path, `\`${path}\` goes from ${from} to ${to}; the second end must be the larger one.`);
}

/** @throws CellFault when points, or computations of cells at them, are too many. */
export function checkCost(points: number, path: string, context: ComputeContext, limits: VaryingLimits): void {
  const { noun, most, mostRecomputed } = limits;
  if (points > most) throw new CellFault(path, `There are ${points} ${noun}s here; there may be at most ${most}.`);
  const recomputed = recomputations(points, context);
  if (recomputed > mostRecomputed) {
    throw new CellFault(
      path,
      `${points} ${noun}s that compute ${context.recomputedCells} cells again each are ${recomputed} computations; there may be at most ${mostRecomputed}. Fewer ${noun}s would do.`,
    );
  }
}

/** How many computations of cells so many points take. */
function recomputations(points: number, context: ComputeContext): number {
  return context.varied.length === 0 ? 0 : points * context.recomputedCells;
}

/** What so many points cost; null where nothing is computed again. */
export function costOf(points: number, context: ComputeContext, { noun }: VaryingLimits): Cost | null {
  return recomputations(points, context) === 0 ? null : { noun, points, cells: context.recomputedCells };
}

/** "It takes 120 computations: 3 cells at each of 40 points." */
export function costWords({ noun, points, cells }: Cost): string {
  const each = points === 1 ? `1 ${noun}` : `each of ${points} ${noun}s`;
  return `It takes ${points * cells} ${points * cells === 1 ? "computation" : "computations"}: ${cells} ${cells === 1 ? "cell" : "cells"} at ${each}.`;
}

/** Whether so many points take a moment only. */
export function isQuick(points: number, context: ComputeContext): boolean {
  return recomputations(points, context) <= QUICK_RECOMPUTED;
}

/**
 * The context in which formulas are evaluated at a point: varied parameters set, what reads them computed again. A cell
 * that refuses there gives its reason to whatever formula reads it.
 * @param key of the body where the names stand, for faults. @throws CellFault when a varied parameter's value is no number.
 */
export function contextAt(point: Point, key: string, context: ComputeContext): ComputeContext {
  const here = context.varied.filter((name) => Object.hasOwn(point, name));
  if (here.length === 0) return context;
  return context.with(Object.fromEntries(here.map((name) => [name, inputOf(name, point[name], `${key}.${name}`)])));
}

/** A parameter's value at a point; its error is left behind, as that of any input. */
function inputOf(name: string, value: Value | undefined, path: string): Quantity {
  if (value?.type === "number") return exact(toDouble(value.quantity));
  const why = value?.type === "refused" ? `: ${value.reason}` : ".";
  throw new CellFault(path, `A value of \`${name}\` is not a number${why}`);
}

/** " ; 3 cells computed for each row", for the method of what varies a parameter; nothing otherwise. */
export function recomputedWords(noun: string, context: ComputeContext): string {
  if (context.varied.length === 0) return "";
  const { recomputedCells } = context;
  return `; ${recomputedCells} ${recomputedCells === 1 ? "cell" : "cells"} computed for each ${noun}`;
}

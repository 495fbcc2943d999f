import type { Formula, Quantity, Value } from "../../formulas/index.ts";
import { toDouble } from "../../formulas/index.ts";
import type { Body } from "../body.ts";
import type { KindOf } from "../kind.ts";
import { listOfNames } from "../names.ts";
import { exactValue, refusedValue } from "../values.ts";
import type { VariedValues } from "../varying.ts";
import { costOf, isQuick, readVarying, recomputedWords } from "../varying.ts";
import { SWEEP_DOCUMENTATION } from "./documentation.ts";
import type { SweepCell } from "./layout.ts";
import { LIMITS, layOut, probeOf, recomputedPoints } from "./layout.ts";
import type { Curve, Range, SweepScale } from "./points.ts";
import { countOf, curveOver, SCALES } from "./points.ts";
import { viewSweep } from "./view.ts";

/** One curve for each value `at` of the second name; one alone, at null, where there is no second name. */
export interface SweepCurve extends Curve {
  readonly at: number | null;
}

export interface SweepData {
  readonly over: string;
  readonly vary: string | null;
  /** How the points lie; `listed`: each was given for itself. */
  readonly scale: SweepScale | "listed";
  readonly record: readonly string[];
  readonly curves: readonly SweepCurve[];
}

const DEFAULT_POINTS = "40";
const MOST_RECORDED = 6;

export const SWEEP: KindOf<SweepCell, SweepData> = {
  documentation: SWEEP_DOCUMENTATION,
  solver: "sweep 1",
  knownAtPlanning: false,

  read(body: Body): SweepCell {
    const over = readVarying(body, "over", "{mu: 1.5 to 4}");
    const vary = readVarying(body, "vary", "{beta: [1, 2]}");
    checkOneName(body, "over", over);
    checkOneName(body, "vary", vary);
    if (Object.values(over).some((values) => "list" in values)) refuseIntervalKeys(body);
    return {
      over,
      vary,
      points: body.formula("points", DEFAULT_POINTS),
      scale: SCALES.find((scale) => scale === body.choice("scale", SCALES, "linear")) ?? "linear",
      record: readRecord(body, [...Object.keys(over), ...Object.keys(vary)]),
    };
  },

  members({ over, vary, record }) {
    const names = [over, vary, record].flatMap((named) => Object.keys(named));
    const most = Object.keys(vary).length === 0 ? 1 : 2;
    return { values: ["points"], callables: names.map((member) => ({ member, least: 1, most })) };
  },

  inspect: (model, context) => isQuick(recomputedPoints(layOut(model, context), context), context),

  cost: (model, context) => costOf(recomputedPoints(layOut(model, context), context), context, LIMITS),

  compute(model, context) {
    const layout = layOut(model, context);
    const { over, vary, range } = layout;
    const total = countOf(range) * layout.curves.length;
    let done = 0;
    const curves = layout.curves.map((at): SweepCurve => {
      const curve = curveOver(range, probeOf(model, layout, at, context), () => {
        done += 1;
        context.progress(done, total);
      });
      return { ...curve, at };
    });
    return {
      values: { points: exactValue(curves.reduce((sum, curve) => sum + curve.x.length, 0)) },
      data: {
        over,
        vary,
        scale: "places" in range ? "listed" : range.scale,
        record: Object.keys(model.record),
        curves,
      },
      method: `${rangeWords(range)}${recomputedWords("point", context)}`,
    };
  },

  call: recordedAt,
  view: viewSweep,
};

function checkOneName(body: Body, key: "over" | "vary", names: Readonly<Record<string, VariedValues>>): void {
  const given = Object.keys(names);
  const node = body.node(key);
  if (node !== null && given.length > 1)
    body.problem(node, `\`${key}\` takes one name and its values; here are ${listOfNames(given)}.`);
}

function refuseIntervalKeys(body: Body): void {
  for (const key of ["points", "scale"]) {
    const place = body.places[key];
    if (place !== undefined)
      body.problem(
        place,
        `\`${key}\` goes with an interval, {mu: 1.5 to 4}; here \`over\` lists the points themselves.`,
      );
  }
}

function readRecord(body: Body, locals: readonly string[]): Record<string, Formula> {
  const node = body.node("record");
  const entries = node === null ? null : body.mapAt(node, "a map of names to formulas");
  const record: Record<string, Formula> = {};
  for (const entry of entries ?? []) {
    const path = `record.${entry.key}`;
    body.introduce(entry, path, false);
    record[entry.key] = body.formulaAt(entry.value, path, locals);
  }
  if (node !== null && entries?.length === 0)
    body.problem(node, "`record` is empty; it takes names and their formulas.");
  if (node !== null && (entries?.length ?? 0) > MOST_RECORDED)
    body.problem(node, `${entries?.length} formulas are recorded; a sweep has at most ${MOST_RECORDED}.`);
  return record;
}

/** `sw.s0(i)` along the only curve, or over all curves in turn; `sw.s0(i, j)` at point i of curve j. */
function recordedAt(data: SweepData, member: string, args: readonly Quantity[]): Value | undefined {
  const isAxis = member === data.over || member === data.vary;
  if (!isAxis && !data.record.includes(member)) return undefined;
  const [point, curve] = args.map(toDouble);
  const chosen = curve === undefined ? data.curves : data.curves.slice(curve - 1, curve);
  if (point === undefined || (curve !== undefined && (chosen.length !== 1 || !Number.isInteger(curve))))
    return refusedValue(`There is no curve ${curve}: they are counted from 1 to ${data.curves.length}.`);
  const values = chosen.flatMap(({ at, x, recorded }) =>
    x.map((place, index): Value => {
      if (member === data.over) return exactValue(place);
      if (member === data.vary) return exactValue(at ?? Number.NaN);
      return recorded[index]?.[member] ?? refusedValue(`\`${member}\` was not recorded.`);
    }),
  );
  return values[point - 1] ?? refusedValue(`There is no point ${point}: they are counted from 1 to ${values.length}.`);
}

function rangeWords(range: Range): string {
  if ("places" in range) return "At the points listed";
  const { scale } = range;
  if (scale === "adapted") return "Points by bisection where the curves bend";
  return scale === "log" ? "Points even in the logarithm" : "Evenly spaced points";
}

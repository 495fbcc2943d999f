import type { Formula, Quantity, Value } from "../../formulas/index.ts";
import { approximate, isTruth, toDouble } from "../../formulas/index.ts";
import type { Answer, NoRoot, Root, ScaledEstimate } from "../../solvers/index.ts";
import { findRoot, SOLVER_VERSIONS } from "../../solvers/index.ts";
import type { Body } from "../body.ts";
import type { ComputeContext } from "../context.ts";
import { CellFault } from "../context.ts";
import type { KindOf } from "../kind.ts";
import { documentedMembers } from "../kind.ts";
import { exactValue, numberValue } from "../values.ts";
import type { Interval, VaryingLimits } from "../varying.ts";
import { checkCost, contextAt, costOf, endsOf, isQuick, recomputedWords } from "../varying.ts";
import { SOLVE_DOCUMENTATION } from "./documentation.ts";
import { whyNoRoot, withoutValuesWords } from "./words.ts";

export interface SolveCell {
  readonly vary: string;
  readonly between: Interval;
  readonly where: Formula;
}

/** What there is to say beside the values; null where the formula has a value everywhere. */
export interface SolveData {
  readonly unanswered: string | null;
}

/** Steps that a search usually takes, for its cost and its progress. */
const USUAL_STEPS = 16;
const LIMITS: VaryingLimits = { noun: "step", most: 1_000, mostRecomputed: 2_000 };
/** Distance from the root, in its errors and relative to it, over which the slope is taken where chance enters. */
const ERRORS_APART = 64;
const SHARE_APART = 2 ** -20;

export const SOLVE: KindOf<SolveCell, SolveData> = {
  documentation: SOLVE_DOCUMENTATION,
  solver: `root ${SOLVER_VERSIONS.root}`,
  knownAtPlanning: false,

  read(body: Body): SolveCell {
    const vary = body.variedName("vary");
    return { vary, between: readBetween(body), where: readWhere(body, vary) };
  },

  members: () => documentedMembers(SOLVE_DOCUMENTATION),

  inspect(model, context) {
    endsAt(model, context);
    checkCost(USUAL_STEPS, "between", context, LIMITS);
    return isQuick(USUAL_STEPS, context);
  },

  cost: (_model, context) => costOf(USUAL_STEPS, context, LIMITS),

  compute(model, context) {
    const [from, to] = endsAt(model, context);
    let steps = 0;
    const found = findRoot(
      (x) => {
        steps += 1;
        context.progress(steps, Math.max(USUAL_STEPS, steps + 1));
        return estimateOf(valueAt(model, x, context));
      },
      from,
      to,
    );
    if ("why" in found) throw new CellFault(faultyKey(found), whyNoRoot(found, model.vary, from, to));
    const values = {
      root: numberValue(rootOf(found, model, context)),
      residual: valueAt(model, found.root.value, context),
    };
    const data = { unanswered: withoutValuesWords(found, model.vary, from, to) };
    return {
      values,
      data,
      method: `Bracketed, ${found.evaluations} steps${recomputedWords("step", context)}`,
    };
  },

  call: () => undefined,
  view: () => ({ figure: null, table: null, points: null }),
  finding: ({ unanswered }) =>
    unanswered === null ? null : { isGrave: false, words: `The formula has ${unanswered}` },
};

function readBetween(body: Body): Interval {
  const node = body.node("between");
  const interval = node === null ? null : body.intervalAt(node, "between");
  if (node !== null && interval === null) body.problem(node, "`between` takes an interval: `between: 1.5 to 4`.");
  return interval ?? { from: ZERO, to: ZERO };
}

const ZERO: Formula = { node: "number", value: 0 };

function readWhere(body: Body, vary: string): Formula {
  const formula = body.formula("where", "0", [vary]);
  const node = body.node("where");
  if (node !== null && isTruth(formula))
    body.problem(
      node,
      "`where` is a comparison, which holds or does not; it takes a formula that becomes 0: `K.s0 - 2` in place of `K.s0 == 2`.",
    );
  return formula;
}

function endsAt(model: SolveCell, context: ComputeContext): readonly [number, number] {
  const [from, to] = endsOf(model.between, "between", context);
  if (from < to) return [from, to];
  throw new CellFault("between", `\`between\` begins and ends at ${from}; the second end must be the larger one.`);
}

/** The formula with the varied name at x, everything that reads it computed again. */
function valueAt({ vary, where }: SolveCell, x: number, context: ComputeContext): Value {
  const point = { [vary]: exactValue(x) };
  return contextAt(point, "vary", context).value(where, point);
}

function estimateOf(value: Value): Answer<ScaledEstimate> {
  if (value.type === "number") return value.quantity;
  return { refused: value.type === "refused" ? value.reason : "`where` gives no number here." };
}

/** The root with its error and, where chance enters the formula, its standard error: that of the formula over its slope. */
function rootOf({ root, answered }: Root, model: SolveCell, context: ComputeContext): Quantity {
  const plain = approximate(root.value, root.error);
  const there = valueAt(model, root.value, context);
  if (there.type !== "number" || there.quantity.se === 0) return plain;
  const apart = Math.max(
    ERRORS_APART * root.error,
    SHARE_APART * Math.abs(root.value),
    SHARE_APART * (answered[1] - answered[0]),
  );
  const [low, high] = [Math.max(root.value - apart, answered[0]), Math.min(root.value + apart, answered[1])];
  const [before, after] = [low, high].map((x) => valueAt(model, x, context));
  if (before?.type !== "number" || after?.type !== "number") return plain;
  const slope = (toDouble(after.quantity) - toDouble(before.quantity)) / (high - low);
  const unit = 2 ** there.quantity.exponent;
  const share = (se: number): number => (-se * unit) / slope;
  const sources = Object.entries(there.quantity.sources ?? {}).map(([name, se]) => [name, share(se)] as const);
  return {
    ...approximate(root.value, root.error, Math.abs(share(there.quantity.se))),
    ...(sources.length === 0 ? {} : { sources: Object.fromEntries(sources) }),
  };
}

function faultyKey(found: NoRoot): string {
  return found.why === "no values" ? "where" : "between";
}

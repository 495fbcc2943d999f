import type { Formula } from "../../formulas/index.ts";
import { exact } from "../../formulas/index.ts";
import type { Trajectory } from "../../solvers/index.ts";
import { absorbedMoments, profileAt, profileConstants } from "../../solvers/index.ts";
import type { Body, CellReference } from "../body.ts";
import type { ComputeContext } from "../context.ts";
import { CellFault } from "../context.ts";
import { shortError } from "../counts/law.ts";
import type { KindOf } from "../kind.ts";
import { documentedMembers } from "../kind.ts";
import { diffusionWords, HALFLINE_SOLVER, trajectoryOf, trajectoryWords } from "../process/model.ts";
import { profileValue } from "../profile/value.ts";
import { estimateValue, shortNumber } from "../values.ts";
import { GENERATING_FUNCTION_DOCUMENTATION } from "./documentation.ts";
import { viewGeneratingFunction } from "./view.ts";

export interface GeneratingFunctionCell {
  readonly of: CellReference;
  readonly start: readonly Formula[];
  /** null: from 0 to s0. */
  readonly s: { readonly from: Formula; readonly to: Formula } | null;
}

/** One curve s ↦ E_x[s^K]: g[i] ± error[i] at s[i]; null where it is refused. */
export interface GeneratingCurve {
  readonly start: number;
  readonly g: readonly (number | null)[];
  readonly error: readonly (number | null)[];
}

export interface GeneratingFunctionData {
  readonly trajectory: Trajectory;
  readonly s: readonly number[];
  readonly curves: readonly GeneratingCurve[];
}

const POINTS = 161;
const MOST_CURVES = 24;
const LEAST_S = -1;

export const GENERATING_FUNCTION: KindOf<GeneratingFunctionCell, GeneratingFunctionData> = {
  documentation: GENERATING_FUNCTION_DOCUMENTATION,
  solver: HALFLINE_SOLVER,
  knownAtPlanning: false,

  read(body: Body): GeneratingFunctionCell {
    const list = body.node("start");
    const start = list === null ? [] : body.listAt(list, "start");
    if (list !== null && start.length > MOST_CURVES)
      body.problem(list, `${start.length} starts are given; a generating_function cell has at most ${MOST_CURVES}.`);
    return { of: body.reference("of", ["process"]), start, s: readRange(body) };
  },

  members: () => documentedMembers(GENERATING_FUNCTION_DOCUMENTATION),

  inspect(model, context) {
    startsOf(model, context);
    return true;
  },

  compute(model, context) {
    const trajectory = trajectoryOf(model.of, context);
    const starts = startsOf(model, context);
    const [from, to] = rangeOf(model.s, trajectory, context);
    const s = denserAtEnd(from, to);
    const curves = starts.map((start, index) => {
      context.progress(index, starts.length);
      return curveOf(trajectory, start, s);
    });
    const first = [{ position: starts[0] ?? 0, particles: 1 }];
    return {
      values: {
        s0: estimateValue(profileConstants(trajectory).s0),
        mean: estimateValue(absorbedMoments(trajectory, first).mean),
      },
      data: { trajectory, s, curves },
      method: `${trajectoryWords(trajectory)}; ${diffusionWords(trajectory.model)}`,
    };
  },

  call(data, member, args) {
    const [s, x] = args;
    if (member !== "" || s === undefined || args.length > 2) return undefined;
    return profileValue(data.trajectory, x ?? exact(data.curves[0]?.start ?? 0), s);
  },

  view: viewGeneratingFunction,
};

function readRange(body: Body): GeneratingFunctionCell["s"] {
  const node = body.node("s");
  if (node === null) return null;
  const range = body.intervalAt(node, "s", ["s0"]);
  if (range === null) body.problem(node, "`s` takes an interval: `s: 0 to s0`.");
  if (range !== null) body.introduceWord("s0", node, "s");
  return range;
}

function startsOf(model: GeneratingFunctionCell, context: ComputeContext): readonly number[] {
  return model.start.map((formula, index) => context.number(formula, `start.${index}`, { least: 0 }));
}

/** Both ends of s. @throws CellFault where they run backwards or beyond s0. */
function rangeOf(
  range: GeneratingFunctionCell["s"],
  trajectory: Trajectory,
  context: ComputeContext,
): readonly [number, number] {
  const { s0 } = profileConstants(trajectory);
  const end = "refused" in s0 ? null : s0.value;
  if (range === null) return [0, end ?? 1];
  const locals = { s0: estimateValue(s0) };
  const from = context.number(range.from, "s", { least: LEAST_S }, locals);
  const to = context.number(range.to, "s", {}, locals);
  if (from >= to) throw new CellFault("s", `\`s\` goes from ${from} to ${to}; the second end must be the larger one.`);
  if (end !== null && to > end)
    throw new CellFault(
      "s",
      `\`s\` goes to ${to}, beyond s0 = ${shortNumber(end)}, where E s^K is infinite; \`s: 0 to s0\` ends there.`,
    );
  return [from, to];
}

/** Points that approach the end as squares, so that a square root there is drawn as smoothly as the rest. */
function denserAtEnd(from: number, to: number): number[] {
  return Array.from({ length: POINTS }, (_, index) => {
    const rest = 1 - index / (POINTS - 1);
    return index === 0 ? from : to - (to - from) * rest * rest;
  });
}

function curveOf(trajectory: Trajectory, start: number, s: readonly number[]): GeneratingCurve {
  const answers = s.map((at) => profileAt(trajectory, start, at));
  return {
    start,
    g: answers.map((answer) => ("refused" in answer ? null : answer.value)),
    error: answers.map((answer) => ("refused" in answer ? null : shortError(answer.error))),
  };
}

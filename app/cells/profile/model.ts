import type { Formula } from "../../formulas/index.ts";
import { freeNames } from "../../formulas/index.ts";
import type { Trajectory } from "../../solvers/index.ts";
import { profileAt, profileConstants } from "../../solvers/index.ts";
import type { Body, CellReference } from "../body.ts";
import type { ComputeContext } from "../context.ts";
import { CellFault } from "../context.ts";
import { shortError } from "../counts/law.ts";
import type { KindOf } from "../kind.ts";
import { documentedMembers } from "../kind.ts";
import { diffusionWords, HALFLINE_SOLVER, trajectoryOf, trajectoryWords } from "../process/model.ts";
import { estimateValue, shortNumber } from "../values.ts";
import { PROFILE_DOCUMENTATION } from "./documentation.ts";
import { profileValue } from "./value.ts";
import { viewProfile } from "./view.ts";

export interface ProfileCell {
  readonly of: CellReference;
  readonly s: readonly Formula[];
  /** null: from 0 to where w is near its limit. */
  readonly x: { readonly from: Formula; readonly to: Formula } | null;
}

/** One curve x ↦ w(x, s), by numbers: w(x[i], s) = w[i] ± error[i]; null where it is refused. */
export interface ProfileCurve {
  readonly s: number;
  /** s is the turning value itself. */
  readonly turning: boolean;
  readonly w: readonly (number | null)[];
  readonly error: readonly (number | null)[];
}

export interface ProfileData {
  readonly trajectory: Trajectory;
  readonly x: readonly number[];
  readonly curves: readonly ProfileCurve[];
  /** Why a value of s has no curve. */
  readonly left: readonly string[];
}

const POINTS = 121;
const MOST_CURVES = 24;
/** How near its limit w is to be at the right end of the default range. */
const NEAR_LIMIT = 1e-3;

export const PROFILE: KindOf<ProfileCell, ProfileData> = {
  documentation: PROFILE_DOCUMENTATION,
  solver: HALFLINE_SOLVER,
  knownAtPlanning: false,

  read(body: Body): ProfileCell {
    const list = body.node("s");
    const s = list === null ? [{ node: "number", value: 0 } as const] : body.listAt(list, "s", ["s0"]);
    if (list !== null && s.length > MOST_CURVES)
      body.problem(list, `${s.length} values of \`s\` are given; a profile has at most ${MOST_CURVES}.`);
    if (list !== null && s.some((formula) => freeNames(formula).names.includes("s0")))
      body.introduceWord("s0", list, "s");
    return { of: body.reference("of", ["process"]), s, x: readRange(body) };
  },

  members: () => documentedMembers(PROFILE_DOCUMENTATION),

  inspect(model, context) {
    if (model.x !== null) rangeOf(model.x, context);
    return true;
  },

  compute(model, context) {
    const trajectory = trajectoryOf(model.of, context);
    const constants = profileConstants(trajectory);
    const s0 = estimateValue(constants.s0);
    const asked = model.s.map((formula, index) => context.number(formula, `s.${index}`, { least: -1 }, { s0 }));
    const { possible, left } = sortOut(asked, "refused" in constants.s0 ? null : constants.s0.value);
    const range = model.x === null ? ([0, farEnough(trajectory, possible)] as const) : rangeOf(model.x, context);
    const x = evenly(range[0], range[1]);
    const curves = possible.map(({ s, turning }, index) => {
      context.progress(index, possible.length);
      return curveOf(trajectory, s, turning, x);
    });
    return {
      values: {
        slope_at_barrier: estimateValue(constants.slopeAtBarrier),
        amplitude: estimateValue(constants.amplitude),
        decay: estimateValue(constants.decay),
        s0,
      },
      data: { trajectory, x, curves, left },
      method: `${trajectoryWords(trajectory)}; ${diffusionWords(trajectory.model)}`,
    };
  },

  call(data, member, args) {
    const [x, s] = args;
    if (member !== "" || x === undefined || args.length > 2) return undefined;
    return profileValue(data.trajectory, x, s ?? null);
  },

  view: viewProfile,
};

function readRange(body: Body): ProfileCell["x"] {
  const node = body.node("x");
  if (node === null) return null;
  const range = body.intervalAt(node, "x");
  if (range === null) body.problem(node, "`x` takes an interval: `x: 0 to 4`.");
  return range;
}

function rangeOf(range: { from: Formula; to: Formula }, context: ComputeContext): readonly [number, number] {
  const from = context.number(range.from, "x", { least: 0 });
  const to = context.number(range.to, "x", { least: 0 });
  if (from < to) return [from, to];
  throw new CellFault("x", `\`x\` goes from ${from} to ${to}; the second end must be the larger one.`);
}

/** Parts the values of s into those that have a curve and the words about those that have none. */
function sortOut(
  asked: readonly number[],
  turning: number | null,
): { possible: { s: number; turning: boolean }[]; left: string[] } {
  const possible = asked.filter((s) => turning === null || s <= turning).map((s) => ({ s, turning: s === turning }));
  const left = asked
    .filter((s) => turning !== null && s > turning)
    .map((s) => `No curve for s = ${shortNumber(s)}, which is beyond s0 = ${shortNumber(turning ?? Number.NaN)}.`);
  return { possible, left };
}

/** The least x, rounded up to two digits, from which every curve is within NEAR_LIMIT of its limit. */
function farEnough(trajectory: Trajectory, curves: readonly { s: number }[]): number {
  const limit = profileConstants(trajectory).limit.value;
  // toward the barrier the curve from s0 = 1 stays at 1
  const tending = trajectory.regime === "toward" ? curves.filter(({ s }) => s < 1) : curves;
  const isNear = (x: number): boolean =>
    tending.every(({ s }) => {
      const w = profileAt(trajectory, x, s);
      return "refused" in w || Math.abs(w.value - limit) < NEAR_LIMIT;
    });
  let far = 1 / trajectory.decay[0];
  for (let doublings = 0; !isNear(far) && doublings < 64; doublings += 1) far *= 2;
  let near = 0;
  for (let halvings = 0; halvings < 10; halvings += 1) {
    const middle = (near + far) / 2;
    if (isNear(middle)) far = middle;
    else near = middle;
  }
  const unit = 10 ** (Math.floor(Math.log10(far)) - 1);
  return Number((Math.ceil(far / unit) * unit).toPrecision(2));
}

function evenly(from: number, to: number): number[] {
  return Array.from({ length: POINTS }, (_, index) => from + ((to - from) * index) / (POINTS - 1));
}

function curveOf(trajectory: Trajectory, s: number, turning: boolean, x: readonly number[]): ProfileCurve {
  const w: (number | null)[] = [];
  const error: (number | null)[] = [];
  for (const position of x) {
    const answer = profileAt(trajectory, position, s);
    w.push("refused" in answer ? null : answer.value);
    error.push("refused" in answer ? null : shortError(answer.error));
  }
  return { s, turning, w, error };
}

import type { Formula, Value } from "../../formulas/index.ts";
import type { AbsorbedLaw, ScaledEstimate, Start, Trajectory } from "../../solvers/index.ts";
import { absorbedAbove, absorbedLaw, absorbedMoments, profileConstants } from "../../solvers/index.ts";
import type { Body, CellReference } from "../body.ts";
import type { ComputeContext } from "../context.ts";
import { CellFault } from "../context.ts";
import type { KindOf } from "../kind.ts";
import { documentedMembers } from "../kind.ts";
import { diffusionWords, HALFLINE_SOLVER, trajectoryOf } from "../process/model.ts";
import type { StartModel } from "../process/start.ts";
import { readStart, startsOf } from "../process/start.ts";
import { estimateValue } from "../values.ts";
import { callCounts } from "./callables.ts";
import { COUNTS_DOCUMENTATION } from "./documentation.ts";
import { withShortErrors } from "./law.ts";
import { modeOf, quantileOf } from "./order.ts";
import { viewCounts } from "./view.ts";

export interface CountsCell {
  readonly of: CellReference;
  readonly start: StartModel;
  readonly upTo: Formula;
}

/** The law to `up_to`, and what any other n needs. */
export interface CountsData {
  readonly trajectory: Trajectory;
  readonly starts: readonly Start[];
  readonly law: AbsorbedLaw;
  /** P(K > up_to); null where it is refused. */
  readonly beyond: ScaledEstimate | null;
}

const MOST_COUNTED = 100_000;
/** Laws to here take milliseconds. */
const QUICK_COUNTED = 5_000;

export const COUNTS: KindOf<CountsCell, CountsData> = {
  documentation: COUNTS_DOCUMENTATION,
  solver: HALFLINE_SOLVER,
  knownAtPlanning: false,

  read: (body: Body): CountsCell => ({
    of: body.reference("of", ["process"]),
    start: readStart(body),
    upTo: body.formula("up_to", "100"),
  }),

  members: () => documentedMembers(COUNTS_DOCUMENTATION),

  inspect(model, context) {
    startsOf(model.start, context);
    return upToOf(model.upTo, context) <= QUICK_COUNTED;
  },

  compute(model, context) {
    const trajectory = trajectoryOf(model.of, context);
    const starts = startsOf(model.start, context);
    const law = absorbedLaw(trajectory, starts, upToOf(model.upTo, context));
    if ("refused" in law) throw new CellFault("of", law.refused);
    const beyond = absorbedAbove(trajectory, starts, law.upTo);
    const data: CountsData = {
      trajectory,
      starts,
      law: withShortErrors(law),
      beyond: "refused" in beyond ? null : beyond,
    };
    return { values: countsValues(data), data, method: `${law.method}; ${diffusionWords(trajectory.model)}` };
  },

  call: callCounts,
  view: viewCounts,
};

function countsValues(data: CountsData): Record<string, Value> {
  const moments = absorbedMoments(data.trajectory, data.starts);
  return {
    zero: estimateValue(moments.zero),
    mean: estimateValue(moments.mean),
    variance: estimateValue(moments.variance),
    median: quantileOf(data, 1 / 2),
    mode: modeOf(data),
    s0: estimateValue(profileConstants(data.trajectory).s0),
    infinite: estimateValue(moments.infinite),
  };
}

function upToOf(formula: Formula, context: ComputeContext): number {
  return context.number(formula, "up_to", { least: 1, most: MOST_COUNTED, whole: true });
}

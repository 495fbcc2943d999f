import type { Formula, Value } from "../../formulas/index.ts";
import { toDouble } from "../../formulas/index.ts";
import type { AbsorbedLaw, Answer, ScaledEstimate, TailLaw, Trajectory } from "../../solvers/index.ts";
import {
  absorbedAbove,
  absorbedLaw,
  absorbedMoments,
  absorbedProbability,
  describeProcess,
  tailLaw,
} from "../../solvers/index.ts";
import type { Body, CellReference } from "../body.ts";
import type { ComputeContext } from "../context.ts";
import { CellFault } from "../context.ts";
import { countValue } from "../counts/callables.ts";
import { probabilityAt, withShortErrors } from "../counts/law.ts";
import type { KindOf } from "../kind.ts";
import { documentedMembers } from "../kind.ts";
import { diffusionWords, HALFLINE_SOLVER, trajectoryOf } from "../process/model.ts";
import { estimateValue, exactValue, refusedValue, scaledValue, shortNumber } from "../values.ts";
import { YAGLOM_DOCUMENTATION } from "./documentation.ts";
import { viewYaglom } from "./view.ts";

export interface YaglomCell {
  readonly of: CellReference;
  readonly upTo: Formula;
}

/** The limit law to `up_to`, and what any other n needs. */
export interface YaglomData {
  readonly trajectory: Trajectory;
  readonly law: AbsorbedLaw;
  /** P(Y > up_to); null where it is refused. */
  readonly beyond: ScaledEstimate | null;
  /** The law of large n, or why there is none. */
  readonly tail: Answer<TailLaw>;
}

const MOST_COUNTED = 100_000;
/** Laws to here take milliseconds. */
const QUICK_COUNTED = 5_000;

export const YAGLOM: KindOf<YaglomCell, YaglomData> = {
  documentation: YAGLOM_DOCUMENTATION,
  solver: HALFLINE_SOLVER,
  knownAtPlanning: false,

  read: (body: Body): YaglomCell => ({
    of: body.reference("of", ["process"]),
    upTo: body.formula("up_to", "100"),
  }),

  members: () => documentedMembers(YAGLOM_DOCUMENTATION),

  inspect: (model, context) => upToOf(model.upTo, context) <= QUICK_COUNTED,

  compute(model, context) {
    const trajectory = trajectoryOf(model.of, context);
    if (trajectory.regime !== "away") throw new CellFault("of", whyNoLimit(trajectory));
    const law = absorbedLaw(trajectory, "far", upToOf(model.upTo, context));
    if ("refused" in law) throw new CellFault("of", law.refused);
    const beyond = absorbedAbove(trajectory, "far", law.upTo);
    const data: YaglomData = {
      trajectory,
      law: withShortErrors(law),
      beyond: "refused" in beyond ? null : beyond,
      tail: tailLaw(trajectory, "far", 1),
    };
    return { values: valuesOf(data), data, method: `${law.method}; ${diffusionWords(trajectory.model)}` };
  },

  call(data, member, args) {
    const [argument] = args;
    if (argument === undefined || args.length !== 1) return undefined;
    if (member === "") return countValue(toDouble(argument), (n) => probability(data, n));
    if (member === "above") return countValue(toDouble(argument), (n) => above(data, n));
    return undefined;
  },

  view: viewYaglom,
};

function valuesOf(data: YaglomData): Record<string, Value> {
  const moments = absorbedMoments(data.trajectory, "far");
  return {
    one: probability(data, 1),
    mean: estimateValue(moments.mean),
    variance: estimateValue(moments.variance),
    constant: "refused" in data.tail ? refusedValue(data.tail.refused) : estimateValue(data.tail.constant),
  };
}

function probability({ law, trajectory }: YaglomData, n: number): Value {
  if (n < 1) return exactValue(0);
  return scaledValue(probabilityAt(law, n) ?? absorbedProbability(trajectory, "far", n));
}

function above({ trajectory }: YaglomData, n: number): Value {
  return n < 1 ? exactValue(1) : scaledValue(absorbedAbove(trajectory, "far", n));
}

/** Outside the regime `away`, K given K > 0 tends to infinity with the distance of the start. */
function whyNoLimit(trajectory: Trajectory): string {
  const { criticalDrift } = describeProcess(trajectory.model);
  const bound = "refused" in criticalDrift ? "" : `, not below the critical one, ${shortNumber(criticalDrift.value)}`;
  return `With drift ${trajectory.model.drift} the regime is ${trajectory.regime}: particles come to the barrier from however far away, and K given K > 0 grows beyond every bound as the start recedes. There is a limit law where the drift is away from the barrier${bound}.`;
}

function upToOf(formula: Formula, context: ComputeContext): number {
  return context.number(formula, "up_to", { least: 1, most: MOST_COUNTED, whole: true });
}

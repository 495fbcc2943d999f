import type { Formula, Value } from "../../formulas/index.ts";
import type { ScaledEstimate, Start, TailLaw, Trajectory } from "../../solvers/index.ts";
import { absorbedLaw, absorbedProbability, tailLaw, tailProbability } from "../../solvers/index.ts";
import type { Body, CellReference } from "../body.ts";
import type { ComputeContext } from "../context.ts";
import { CellFault } from "../context.ts";
import { probabilityAt } from "../counts/law.ts";
import type { KindOf } from "../kind.ts";
import { documentedMembers } from "../kind.ts";
import { diffusionWords, HALFLINE_SOLVER, trajectoryOf } from "../process/model.ts";
import type { StartModel } from "../process/start.ts";
import { readStart, startsOf } from "../process/start.ts";
import { comparedCounts } from "../process/thinning.ts";
import { estimateValue, exactValue, refusedValue } from "../values.ts";
import { TAIL_DOCUMENTATION } from "./documentation.ts";
import { ratioOf, tailValue } from "./law.ts";
import { drawnTail, viewTail } from "./view.ts";

export interface TailCell {
  readonly of: CellReference;
  readonly start: StartModel;
  readonly upTo: Formula;
  readonly terms: Formula;
}

/** Exact and asymptotic probabilities at one n; exact null where it could not be had. */
export interface Comparison {
  readonly n: number;
  readonly exact: ScaledEstimate | null;
  readonly law: ScaledEstimate;
}

export interface TailData {
  readonly starts: readonly Start[];
  readonly law: TailLaw;
  readonly upTo: number;
  readonly compared: readonly Comparison[];
  /** Why exact probabilities are missing. */
  readonly missing: string | null;
}

const MOST_COUNTED = 100_000;
const MOST_TERMS = 8;
/** To here all exact probabilities together cost less than one by one. */
const TOGETHER_TO = 2_000;

export const TAIL: KindOf<TailCell, TailData> = {
  documentation: TAIL_DOCUMENTATION,
  solver: HALFLINE_SOLVER,
  knownAtPlanning: false,

  read: (body: Body): TailCell => ({
    of: body.reference("of", ["process"]),
    start: readStart(body),
    upTo: body.formula("up_to", "1000"),
    terms: body.formula("terms", "1"),
  }),

  members: () => documentedMembers(TAIL_DOCUMENTATION),

  inspect(model, context) {
    startsOf(model.start, context);
    termsOf(model.terms, context);
    return upToOf(model.upTo, context) <= TOGETHER_TO;
  },

  compute(model, context) {
    const trajectory = trajectoryOf(model.of, context);
    const starts = startsOf(model.start, context);
    const upTo = upToOf(model.upTo, context);
    const terms = termsOf(model.terms, context);
    const law = tailLaw(trajectory, starts, terms);
    if ("refused" in law)
      throw new CellFault(trajectory.regime === "toward" && terms > 1 ? "terms" : "of", law.refused);
    const { compared, missing } = compare(trajectory, starts, law, upTo);
    const data: TailData = { starts, law, upTo, compared, missing };
    const method = `${singularityWords(law)}; ${diffusionWords(trajectory.model)}`;
    return { values: tailValues(data), data, method };
  },

  call(data, member, args) {
    const [n] = args;
    return member !== "" || n === undefined || args.length !== 1 ? undefined : tailValue(data.law, n);
  },

  view: viewTail,
  drawn: drawnTail,
};

function tailValues({ law, upTo, compared, missing }: TailData): Record<string, Value> {
  const last = compared.find(({ n }) => n === upTo);
  return {
    s0: estimateValue(law.s0),
    slope_at_start: estimateValue(law.slopeAtStart),
    constant: estimateValue(law.constant),
    ratio: last === undefined ? refusedValue(missing ?? notReached(law, upTo)) : ratioOf(last, missing),
    omitted: exactValue(tailProbability(law, upTo).omitted),
    exponent: estimateValue(law.exponent),
  };
}

function compare(
  trajectory: Trajectory,
  starts: readonly Start[],
  law: TailLaw,
  upTo: number,
): Pick<TailData, "compared" | "missing"> {
  const together = absorbedLaw(trajectory, starts, Math.min(upTo, TOGETHER_TO));
  let missing: string | null = null;
  const onLattice = comparedCounts(upTo).filter((n) => (n - law.offset) % law.period === 0);
  const compared = onLattice.map((n) => {
    const known = "refused" in together ? undefined : probabilityAt(together, n);
    const exact = known ?? absorbedProbability(trajectory, starts, n);
    if ("refused" in exact) missing = exact.refused;
    return { n, exact: "refused" in exact ? null : exact, law: tailProbability(law, n).probability };
  });
  return { compared, missing };
}

function singularityWords(law: TailLaw): string {
  if (law.kind === "power")
    return "Singularity (1 − s)^d at s = 1, read where the trajectory enters the node; one term";
  if (law.kind === "logarithmic") return "Logarithmic singularity at s = 1, in closed form; one term";
  return `Square-root singularity at s0, ${law.terms === 1 ? "one term" : `${law.terms} terms`}`;
}

function notReached({ period, offset }: TailLaw, n: number): string {
  return period === 1
    ? `No probability was computed at n = ${n}.`
    : `K is ${offset} and a multiple of ${period} more, so that it is never ${n}; \`up_to\` should be such a number.`;
}

function upToOf(formula: Formula, context: ComputeContext): number {
  return context.number(formula, "up_to", { least: 1, most: MOST_COUNTED, whole: true });
}

function termsOf(formula: Formula, context: ComputeContext): number {
  return context.number(formula, "terms", { least: 1, most: MOST_TERMS, whole: true });
}

import type { Formula, Value } from "../../formulas/index.ts";
import type { Answer, Offspring, ProcessModel, Trajectory } from "../../solvers/index.ts";
import { describeProcess, SOLVER_VERSIONS, solveTrajectory } from "../../solvers/index.ts";
import type { Body } from "../body.ts";
import type { ComputeContext } from "../context.ts";
import { CellFault } from "../context.ts";
import type { KindOf } from "../kind.ts";
import { documentedMembers } from "../kind.ts";
import { estimateValue, refusedValue, textValue } from "../values.ts";
import { branchOf } from "./branch.ts";
import { PROCESS_DOCUMENTATION } from "./documentation.ts";
import type { OffspringModel } from "./offspring.ts";
import { offspringOf, readOffspring } from "./offspring.ts";
import { survivalValue } from "./survival.ts";

export interface ProcessCell {
  readonly drift: Formula;
  readonly rate: Formula;
  readonly diffusion: Formula;
  readonly offspring: OffspringModel;
}

/** Kept whole, so that each half-line cell reads one trajectory solved once. */
export interface ProcessData {
  readonly model: ProcessModel;
  readonly trajectory: Answer<Trajectory>;
}

/** Name and version of the half-line solver, for keys and provenance lines. */
export const HALFLINE_SOLVER = `halfline ${SOLVER_VERSIONS.halfline}`;

export const PROCESS: KindOf<ProcessCell, ProcessData> = {
  documentation: PROCESS_DOCUMENTATION,
  solver: HALFLINE_SOLVER,
  knownAtPlanning: false,

  read: (body: Body): ProcessCell => ({
    drift: body.formula("drift", "0"),
    rate: body.formula("rate", "0"),
    diffusion: body.formula("diffusion", "1/2"),
    offspring: readOffspring(body),
  }),

  members: () => documentedMembers(PROCESS_DOCUMENTATION),

  inspect(model, context) {
    processModel(model, context);
    return true;
  },

  branch: (model, context) => branchOf(processModel(model, context)),

  compute(cell, context) {
    const model = processModel(cell, context);
    const description = describeProcess(model);
    const regime = description.regime;
    const values: Record<string, Value> = {
      mean_offspring: estimateValue(description.meanOffspring),
      malthusian: estimateValue(description.malthusian),
      critical_drift: estimateValue(description.criticalDrift),
      regime: typeof regime === "string" ? textValue(regime) : refusedValue(regime.refused),
      decay: estimateValue(description.decay),
      far_decay: estimateValue(description.farDecay),
      limit: estimateValue(description.limit),
      extinction_probability: estimateValue(description.extinctionProbability),
    };
    const trajectory = solveTrajectory(model);
    const how = "refused" in trajectory ? "Closed forms" : trajectoryWords(trajectory);
    return { values, data: { model, trajectory }, method: `${how}; ${diffusionWords(model)}` };
  },

  call(data, member, args) {
    if (member !== "survival" || args.length !== 1 || args[0] === undefined) return undefined;
    return survivalValue(data, args[0]);
  },

  view: () => ({ figure: null, table: null, points: null }),
};

const TRAJECTORY_WORDS = {
  away: "Fast manifold of 1, Taylor steps",
  between: "Stable manifold of q, Taylor steps",
  toward: "Stable manifold of q, Taylor steps into the node 1",
} as const;

/** How a trajectory was found, for provenance lines. */
export function trajectoryWords(trajectory: Trajectory): string {
  return TRAJECTORY_WORDS[trajectory.regime];
}

/** "D = 0.5", for provenance lines. */
export function diffusionWords(model: ProcessModel): string {
  return `D = ${model.diffusion}`;
}

/** The trajectory of the process named under `of`. @throws CellFault where its regime has none, with the solver's reason. */
export function trajectoryOf(reference: { readonly cell: string }, context: ComputeContext): Trajectory {
  const { trajectory } = processData(reference, context);
  if ("refused" in trajectory) throw new CellFault("of", trajectory.refused);
  return trajectory;
}

/** The process named under `of`, whether or not it has a trajectory. */
export function processOf(reference: { readonly cell: string }, context: ComputeContext): ProcessModel {
  return processData(reference, context).model;
}

/** What a `process` cell keeps. Sound because planning lets `of` name process cells only. */
function processData(reference: { readonly cell: string }, context: ComputeContext): ProcessData {
  return context.result(reference, "of").data as ProcessData;
}

function processModel(cell: ProcessCell, context: ComputeContext): ProcessModel {
  const drift = context.number(cell.drift, "drift", {});
  const rate = context.number(cell.rate, "rate", { above: 0 });
  const diffusion = context.number(cell.diffusion, "diffusion", { above: 0 });
  const offspring: Offspring = offspringOf(cell.offspring, context);
  return { drift, rate, diffusion, offspring };
}

import type { Formula } from "../../formulas/index.ts";
import type { SimulatedCounts, SimulationPlan } from "../../solvers/index.ts";
import {
  CHUNK,
  clopperPearson,
  mergeCounts,
  planSimulation,
  SOLVER_VERSIONS,
  simulateChunks,
} from "../../solvers/index.ts";
import type { Body, CellReference } from "../body.ts";
import { canonicalJson, sha256 } from "../canonical.ts";
import type { ComputeContext } from "../context.ts";
import { CellFault, NotKnownYet } from "../context.ts";
import type { Computed, KindOf } from "../kind.ts";
import { computeAllParts, defineParts, documentedMembers } from "../kind.ts";
import { diffusionWords, processOf } from "../process/model.ts";
import type { StartModel } from "../process/start.ts";
import { readStart, startsOf } from "../process/start.ts";
import { shortNumber } from "../values.ts";
import { callSimulate } from "./callables.ts";
import { SIMULATE_DOCUMENTATION } from "./documentation.ts";
import { simulatedValues } from "./values.ts";
import { viewSimulate } from "./view.ts";

export interface SimulateCell {
  readonly of: CellReference;
  readonly start: StartModel;
  readonly replicates: Formula;
  readonly seed: Formula;
  readonly confidence: Formula;
  /** null: chosen */
  readonly cut: Formula | null;
  /** null: none, but where K may be infinite */
  readonly cap: Formula | null;
}

/** How often each n occurred, with the interval for its probability. */
export interface SimulateData {
  readonly plan: SimulationPlan;
  readonly confidence: number;
  /** Values of K that occurred, ascending; the cap stands for K ≥ cap. */
  readonly n: readonly number[];
  readonly hits: readonly number[];
  readonly low: readonly number[];
  readonly high: readonly number[];
  /** Name of these draws among the sources of chance: equal draws, equal name. */
  readonly chance: string;
}

/** What the parts of a simulation share. */
interface Shared {
  readonly plan: SimulationPlan;
  readonly confidence: number;
  readonly chunksInPart: number;
}

const MOST_REPLICATES = 1_000_000_000;
const MOST_CAP = 1_000_000;
const MOST_CONFIDENCE = 1 - 1e-9;
/** Particle steps of a part, as rated: some tenths of a second. Parts are kept under the key: raise the solver's version with it. */
const STEPS_IN_PART = 5e6;

const PARTS = defineParts<SimulateCell, Shared, SimulatedCounts, SimulateData>({
  split(model, context) {
    const plan = planOf(model, context);
    const confidence = confidenceOf(model, context);
    const chunks = Math.ceil(plan.replicates / CHUNK);
    const chunksInPart = Math.max(1, Math.round(STEPS_IN_PART / (plan.steps * CHUNK + 1)));
    return { shared: { plan, confidence, chunksInPart }, count: Math.ceil(chunks / chunksInPart) };
  },

  part({ plan, chunksInPart }, index) {
    const chunks = Math.ceil(plan.replicates / CHUNK);
    return simulateChunks(plan, index * chunksInPart, Math.min(chunks, (index + 1) * chunksInPart));
  },

  merge: ({ plan, confidence }, parts) => simulated(plan, confidence, mergeCounts(parts)),
});

export const SIMULATE: KindOf<SimulateCell, SimulateData> = {
  documentation: SIMULATE_DOCUMENTATION,
  solver: `simulation ${SOLVER_VERSIONS.simulation}`,
  knownAtPlanning: false,

  read: (body: Body): SimulateCell => ({
    of: body.reference("of", ["process"]),
    start: readStart(body),
    replicates: body.formula("replicates", "100000"),
    seed: body.formula("seed", "1"),
    confidence: body.formula("confidence", "0.95"),
    cut: isChosen(body) ? null : body.formula("cut", "0"),
    cap: body.has("cap") ? body.formula("cap", "0") : null,
  }),

  members: () => documentedMembers(SIMULATE_DOCUMENTATION),

  inspect(model, context) {
    try {
      startsOf(model.start, context);
      wishesOf(model, context);
      confidenceOf(model, context);
    } catch (error) {
      if (!(error instanceof NotKnownYet)) throw error;
    }
    // What it costs depends on the process, which is not known yet.
    return false;
  },

  compute: computeAllParts(PARTS),
  parts: PARTS,
  call: callSimulate,
  view: viewSimulate,
};

function planOf(model: SimulateCell, context: ComputeContext): SimulationPlan {
  const plan = planSimulation(processOf(model.of, context), startsOf(model.start, context), wishesOf(model, context));
  if ("refused" in plan) throw new CellFault("of", plan.refused);
  return plan;
}

function wishesOf(model: SimulateCell, context: ComputeContext): Parameters<typeof planSimulation>[2] {
  return {
    replicates: context.number(model.replicates, "replicates", { least: 2, most: MOST_REPLICATES, whole: true }),
    seed: context.number(model.seed, "seed", { least: 0, most: Number.MAX_SAFE_INTEGER, whole: true }),
    cut: model.cut && context.number(model.cut, "cut", { above: 0 }),
    cap: model.cap && context.number(model.cap, "cap", { least: 1, most: MOST_CAP, whole: true }),
  };
}

function confidenceOf(model: SimulateCell, context: ComputeContext): number {
  return context.number(model.confidence, "confidence", { above: 0, most: MOST_CONFIDENCE });
}

/** No `cut`, or the word `chosen`. */
function isChosen(body: Body): boolean {
  const node = body.node("cut");
  return node === null || (node.yaml === "scalar" && node.text === "chosen");
}

function simulated(plan: SimulationPlan, confidence: number, { n, hits }: SimulatedCounts): Computed<SimulateData> {
  const intervals = hits.map((count) => clopperPearson(count, plan.replicates, confidence));
  const data: SimulateData = {
    plan,
    confidence,
    n,
    hits,
    low: intervals.map(({ low }) => low),
    high: intervals.map(({ high }) => high),
    chance: sha256(canonicalJson(plan)).slice(0, CHANCE_DIGITS),
  };
  return { values: simulatedValues(data), data, method: methodWords(plan) };
}

/** Enough to tell the draws of one paper apart. */
const CHANCE_DIGITS = 16;

function methodWords(plan: SimulationPlan): string {
  const ends = [
    plan.cut === null ? "" : `, cut at ${shortNumber(plan.cut)}`,
    plan.cap === null ? "" : `, capped at K = ${plan.cap}`,
  ];
  return `Exact steps, ${plan.replicates} replicates, seed ${plan.seed}${ends.join("")}; ${diffusionWords(plan.model)}`;
}

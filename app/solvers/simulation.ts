import { SolverError } from "./errors.ts";
import { linearise } from "./linear.ts";
import {
  affordableCut,
  cutBias,
  expectedSteps,
  lowestCut,
  type Spread,
  spreadOf,
  varianceAway,
} from "./simulation-cut.ts";
import { Generator, seededState } from "./simulation-generator.ts";
import { Moves } from "./simulation-moves.ts";
import { Trees } from "./simulation-trees.ts";
import { checkStarts } from "./sources.ts";
import type { Answer, ProcessModel, Regime, Start } from "./types.ts";

/** What is to be simulated. Plain JSON; the counts that come of it are a function of it alone. */
export interface SimulationPlan {
  readonly model: ProcessModel;
  readonly starts: readonly Start[];
  readonly regime: Regime;
  readonly replicates: number;
  readonly seed: number;
  /** Particles that branch above this are dropped; null: none is. */
  readonly cut: number | null;
  /** A replicate ends when so many are absorbed; null: it goes on to its end. */
  readonly cap: number | null;
  /** bound on what the cut changes in E K and in every P(K = n) */
  readonly bias: number;
  /** bound on what it changes in Var K */
  readonly varianceBias: number;
  /** d of P(K = n) ~ c n^{−1−d}: moments of order d and more are infinite; null where all are finite, or K itself is not */
  readonly tailIndex: number | null;
  /** expected particle steps of a replicate */
  readonly steps: number;
}

/** What an author may say. */
export interface SimulationWishes {
  readonly replicates: number;
  readonly seed: number;
  readonly cut: number | null;
  readonly cap: number | null;
}

/** How often K was n, n ascending; K = cap stands for K ≥ cap. */
export interface SimulatedCounts {
  readonly n: readonly number[];
  readonly hits: readonly number[];
  /** particle steps taken */
  readonly steps: number;
}

/** Replicates that share a stream of random numbers: the answer does not depend on who computes which. */
export const CHUNK = 1000;
/** Particle steps of a whole simulation: some ten minutes of one core. */
const MOST_STEPS = 2e10;
/** The cut's bias of E K against the standard error of its estimate. */
const BIAS_SHARE = 0.01;
/** Where K may be infinite and the author gives no cap. */
const USUAL_CAP = 1000;
/** Trees of a trial, where the cost cannot be known beforehand, and its particle steps. */
const TRIAL_TREES = 40;
const TRIAL_STEPS = 4e6;

/** Decides where trees are cut or capped, and rates the cost.
 *  `away`: the cut is the lowest whose bias of E K is below 1 % of the expected standard error of its estimate.
 *  Source: many-to-one for the bias (see simulation-cut.ts); P. Maillard, Ann. Inst. H. Poincaré Probab. Statist. 49 (2013)
 *  428–455, for the tail index d = (drift − S)/(drift + S).
 *  @returns a refusal where the simulation would take too long or would not end, with what would do
 *  @throws SolverError "bad_parameter" for a model, start or wish that is none */
export function planSimulation(
  model: ProcessModel,
  starts: readonly Start[],
  wishes: SimulationWishes,
): Answer<SimulationPlan> {
  requireWishes(wishes);
  const { regime } = linearise(model);
  if (typeof regime !== "string") return regime;
  const checked = checkStarts(starts);
  const spread = spreadOf(model);
  const base = { model, starts: checked, regime, replicates: wishes.replicates, seed: wishes.seed };
  if (regime === "away") return planAway(base, spread, wishes);
  if (wishes.cut !== null)
    return {
      refused: `A cut belongs to a drift away from the barrier, where its bias is bounded; here the regime is ${regime}. Leave \`cut\` out.`,
    };
  const uncut = { ...base, cut: null, bias: 0, varianceBias: 0 };
  if (regime === "toward") {
    const { drift } = model;
    const tailIndex = (drift - spread.root) / (drift + spread.root);
    const steps = expectedSteps(spread, checked, null);
    return affordable({ ...uncut, cap: wishes.cap, tailIndex, steps });
  }
  const capped: SimulationPlan = { ...uncut, cap: wishes.cap ?? USUAL_CAP, tailIndex: null, steps: 0 };
  return affordable({ ...capped, steps: triedSteps(capped) });
}

/** Simulates some of the replicates: chunks `from` to `to` − 1 of 1000 each, the last one perhaps smaller. Counts of disjoint chunks add up to those of all.
 *  Source: T. E. Harris, The Theory of Branching Processes (1963), chapter III, for the process; see simulation-trees.ts for the step.
 *  @throws SolverError "not_converged" when the trees are too large to be followed */
export function simulateChunks(plan: SimulationPlan, from: number, to: number): SimulatedCounts {
  const stream = new Generator(seededState(plan.seed));
  for (let chunk = 0; chunk < from; chunk += 1) stream.jump();
  const tally = new Tally();
  let steps = 0;
  for (let chunk = from; chunk < to; chunk += 1) {
    const trees = treesOf(plan, stream, MOST_STEPS - steps);
    const replicates = Math.min(CHUNK, plan.replicates - chunk * CHUNK);
    for (let i = 0; i < replicates; i += 1) tally.add(trees.grow(plan.starts), 1);
    steps += trees.steps;
    stream.jump();
  }
  return { ...tally.sorted(), steps };
}

/** The counts of all chunks from those of some.
 *  Source: addition. */
export function mergeCounts(parts: readonly SimulatedCounts[]): SimulatedCounts {
  const tally = new Tally();
  for (const { n, hits } of parts) for (const [i, value] of n.entries()) tally.add(value, hits[i] ?? 0);
  return { ...tally.sorted(), steps: parts.reduce((sum, part) => sum + part.steps, 0) };
}

function planAway(
  base: Pick<SimulationPlan, "model" | "starts" | "regime" | "replicates" | "seed">,
  spread: Spread,
  { cut: given, cap }: SimulationWishes,
): Answer<SimulationPlan> {
  const { starts, replicates } = base;
  const highest = Math.max(...starts.map(({ position }) => position));
  if (given !== null && given <= highest)
    throw new SolverError(
      "bad_parameter",
      `The cut is at ${given}, not above the start at ${highest}: nothing would be simulated. A cut above ${highest} would do.`,
    );
  const endless = { ...base, cap, tailIndex: null };
  // Below mean 1 every tree ends by itself.
  if (given === null && spread.mean < 1)
    return affordable({ ...endless, cut: null, bias: 0, varianceBias: 0, steps: expectedSteps(spread, starts, null) });
  const target = BIAS_SHARE * Math.sqrt(varianceAway(spread, starts) / replicates);
  const cut = given ?? (highest === 0 ? null : lowestCut(spread, starts, target));
  if (cut === null) return { ...endless, cut, bias: 0, varianceBias: 0, steps: 0 };
  const bias = cutBias(spread, starts, cut);
  const plan = {
    ...endless,
    cut,
    bias: bias.mean,
    varianceBias: bias.variance,
    steps: expectedSteps(spread, starts, cut),
  };
  if (!(plan.steps * replicates > MOST_STEPS) || given !== null) return affordable(plan);
  const lower = affordableCut(spread, starts, MOST_STEPS / replicates / 10);
  const words =
    spread.root === 0
      ? "At the critical drift the bias of a cut L falls only as 1/L"
      : "So near the critical drift the bias of a cut falls slowly";
  return {
    refused: `${words}: one below 1 % of the standard error would be at ${cut} and take ${costWords(plan)}. With \`cut: ${lower}\` the bias of E K would be at most ${cutBias(spread, starts, lower).mean.toPrecision(2)}.`,
  };
}

function affordable(plan: SimulationPlan): Answer<SimulationPlan> {
  if (plan.steps * plan.replicates <= MOST_STEPS) return plan;
  const fewer = Math.floor(MOST_STEPS / plan.steps);
  const otherwise = plan.cut !== null ? ", or a lower `cut`" : plan.regime === "between" ? ", or a smaller `cap`" : "";
  const would =
    fewer >= 1
      ? `At most ${fewer} replicates${otherwise} would do.`
      : `A start nearer to the barrier${otherwise} would do.`;
  return { refused: `The simulation would take ${costWords(plan)}. ${would}` };
}

function costWords(plan: SimulationPlan): string {
  const steps = plan.steps * plan.replicates;
  const words = Number.isFinite(steps) ? `about ${steps.toExponential(0)}` : "more than 1e+308";
  return `${words} particle steps; the most that are taken are ${MOST_STEPS.toExponential(0)}`;
}

/** Mean particle steps of a few trees on a stream of their own; at least those that were taken where one of them does not end. */
function triedSteps(plan: SimulationPlan): number {
  const trees = treesOf(plan, new Generator(seededState(plan.seed).map((word) => ~word)), TRIAL_STEPS);
  let grown = 0;
  try {
    for (; grown < TRIAL_TREES; grown += 1) trees.grow(plan.starts);
  } catch (error) {
    if (!(error instanceof SolverError)) throw error;
    // As many as were begun: one of them is only begun.
    grown += 1;
  }
  return trees.steps / grown;
}

function treesOf(plan: SimulationPlan, stream: Generator, mostSteps: number): Trees {
  const { cut, cap, regime } = plan;
  const ends = { cut, cap, mostSteps, lowestFirst: regime === "between" };
  return new Trees(plan.model.offspring, new Moves(new Generator(stream.state), plan.model), ends);
}

/** Counts of a variable whose values are mostly small. */
class Tally {
  readonly #small = new Float64Array(SMALL);
  readonly #large = new Map<number, number>();

  add(value: number, hits: number): void {
    if (value < SMALL) this.#small[value] = (this.#small[value] as number) + hits;
    else this.#large.set(value, (this.#large.get(value) ?? 0) + hits);
  }

  sorted(): { n: number[]; hits: number[] } {
    const small = [...this.#small].flatMap((hits, n): [number, number][] => (hits > 0 ? [[n, hits]] : []));
    const all = [...small, ...[...this.#large].sort(([a], [b]) => a - b)];
    return { n: all.map(([n]) => n), hits: all.map(([, hits]) => hits) };
  }
}

const SMALL = 1024;

function requireWishes({ replicates, seed, cut, cap }: SimulationWishes): void {
  requireWhole("number of replicates", replicates, 2);
  requireWhole("seed", seed, 0);
  if (cap !== null) requireWhole("cap", cap, 1);
  if (cut !== null && !(Number.isFinite(cut) && cut > 0))
    throw new SolverError("bad_parameter", `The cut is ${cut}; it must be a finite number above 0.`);
}

function requireWhole(name: string, value: number, least: number): void {
  if (!(Number.isSafeInteger(value) && value >= least))
    throw new SolverError("bad_parameter", `The ${name} is ${value}; it must be a whole number, at least ${least}.`);
}

import { HALF_UNIT } from "./input-rounding.ts";
import { linearise } from "./linear.ts";
import { type SurvivalPath, survivalIn, survivalPath } from "./survival-path.ts";
import type { Answer, Estimate, Offspring, ProcessModel } from "./types.ts";

/** Relative change of the inputs from which the spread of the answer is measured. */
const NUDGE = 2 ** -20;
/** What evaluation of the expansions in double precision may lose, in half units of the last place, for each unit of ξ. */
const ROUNDINGS = 8;

interface Family {
  readonly path: SurvivalPath;
  /** The same process with one input nudged, each in turn. */
  readonly nudged: readonly SurvivalPath[];
}

const solved = new WeakMap<ProcessModel, Family>();

/** P_x(the process on the half-line, begun by one particle at x, never dies out), by death or by absorption of all.
 *  Its complement solves D w″ + drift w′ + f(w) = 0 with w(0) = 1 and tends to the smallest root q of G(s) = s.
 *  Source: H. Kesten, Stochastic Process. Appl. 7 (1978) 9–47, for when it is above 0.
 *  @param x distance from the barrier [length], ≥ 0
 *  @returns a probability; exactly 0 at the barrier, where the mean number of children is at most 1, and in the regime `toward`.
 *  @throws SolverError "bad_parameter" on misuse, "not_converged" where it is too near 0 everywhere. */
export function survivalProbability(model: ProcessModel, x: number): Answer<Estimate> {
  if (!(x >= 0)) return { refused: `The half-line begins at 0; there is no start at ${x}.` };
  const { growth, regime } = linearise(model);
  if (growth[0] <= 0 || regime === "toward" || x === 0) return { value: 0, error: 0 };
  const family = familyOf(model);
  const value = at(family.path, x);
  const spread = family.nudged.reduce((sum, path) => sum + Math.abs(at(path, x) - value), 0);
  const rounding = ROUNDINGS * HALF_UNIT * (1 + Math.abs(family.path.barrier));
  return { value, error: (spread / NUDGE) * HALF_UNIT + rounding * value + Number.MIN_VALUE };
}

function at(path: SurvivalPath, x: number): number {
  return survivalIn(path, path.rate * x);
}

function familyOf(model: ProcessModel): Family {
  const known = solved.get(model);
  if (known !== undefined) return known;
  const more = 1 + NUDGE;
  const nudged = [
    { ...model, drift: model.drift * more },
    { ...model, rate: model.rate * more },
    { ...model, diffusion: model.diffusion * more },
    ...nudgedLaws(model.offspring).map((offspring) => ({ ...model, offspring })),
  ];
  const family = { path: survivalPath(model), nudged: nudged.map(survivalPath) };
  solved.set(model, family);
  return family;
}

/** The law with its mean, or its probabilities of more than one child, a little larger. */
function nudgedLaws(offspring: Offspring): Offspring[] {
  if (offspring.law !== "finite") return [{ ...offspring, mean: offspring.mean * (1 + NUDGE) }];
  if (offspring.probabilities.some((p) => p === 1)) return [];
  const lifted = offspring.probabilities.map((p, children) => (children > 1 ? p * (1 + NUDGE) : p));
  const total = lifted.reduce((sum, p) => sum + p, 0);
  return [{ law: "finite", probabilities: lifted.map((p) => p / total) }];
}

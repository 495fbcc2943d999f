import { SolverError } from "./errors.ts";
import type { Offspring } from "./types.ts";

/** A law of the number of children to draw from: k with the least below[k] above a uniform draw. */
export interface ChildrenTable {
  /** P(children ≤ k), k = 0, 1, …; the last one is 1 */
  readonly below: Float64Array;
  /** the number of children where chance has no part in it; otherwise −1 */
  readonly certain: number;
}

/** What uniform draws of 53 bits cannot tell from 0. */
const UNSEEN = 2 ** -53;
const MOST_CHILDREN = 1_000_000;

/** The law's distribution function, up to where what is left is below the resolution of a uniform draw.
 *  @throws SolverError "bad_parameter" for a law that reaches beyond a million children. */
export function childrenTable(offspring: Offspring): ChildrenTable {
  const below = offspring.law === "finite" ? finiteTable(offspring.probabilities) : endlessTable(offspring);
  below[below.length - 1] = 1;
  const certain = below.findIndex((sum) => sum > 0);
  return { below: Float64Array.from(below), certain: below[certain] === 1 ? certain : -1 };
}

function finiteTable(probabilities: readonly number[]): number[] {
  const total = probabilities.reduce((sum, p) => sum + p, 0);
  let sum = 0;
  return probabilities.slice(0, probabilities.findLastIndex((p) => p > 0) + 1).map((p) => {
    sum += p;
    return sum / total;
  });
}

function endlessTable(offspring: Exclude<Offspring, { law: "finite" }>): number[] {
  const { law, mean } = offspring;
  const probability = law === "geometric" ? geometric(mean) : poisson(mean);
  const below: number[] = [];
  let sum = 0;
  for (let k = 0; k <= MOST_CHILDREN; k += 1) {
    const p = probability(k);
    sum += p;
    below.push(sum);
    // Beyond the mean both laws fall at least as fast as a geometric one of that mean.
    if (k > mean && p * (1 + mean) < UNSEEN) return below;
  }
  throw new SolverError(
    "bad_parameter",
    `The ${law} law of mean ${mean} reaches beyond ${MOST_CHILDREN} children, the most that are simulated.`,
  );
}

function geometric(mean: number): (k: number) => number {
  return (k) => Math.exp(-k * Math.log1p(1 / mean)) / (1 + mean);
}

/** log P(k) = k log mean − mean − log k!, with the factorial carried along. */
function poisson(mean: number): (k: number) => number {
  let logFactorial = 0;
  return (k) => {
    if (k > 0) logFactorial += Math.log(k);
    return Math.exp(k * Math.log(mean) - mean - logFactorial);
  };
}

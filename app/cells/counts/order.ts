import type { Value } from "../../formulas/index.ts";
import { absorbedAbove, absorbedMoments } from "../../solvers/index.ts";
import { exactValue, refusedValue, shortNumber } from "../values.ts";
import { doubleProbability, probabilityAt } from "./law.ts";
import type { CountsData } from "./model.ts";

const LARGEST_N = 2 ** 30;

/** The smallest n with P(K ≤ n) ≥ p, found by bisection of P(K > n); refused where the errors leave it open. */
export function quantileOf(data: CountsData, p: number): Value {
  const reaches = (n: number): boolean | string => {
    const above = absorbedAbove(data.trajectory, data.starts, n);
    if ("refused" in above) return above.refused;
    const excess = doubleProbability(above) - (1 - p);
    const error = above.error * 2 ** above.exponent + Number.EPSILON;
    if (Math.abs(excess) <= error && error > 0)
      return `P(K ≤ ${n}) is ${p} within its error; the quantile may be ${n} or ${n + 1}.`;
    return excess <= 0;
  };
  const { infinite } = absorbedMoments(data.trajectory, data.starts);
  if (p > 1 - infinite.value - infinite.error)
    return refusedValue(
      `K is infinite with probability ${shortNumber(infinite.value)}, so that the quantile at ${shortNumber(p)} is infinite.`,
    );
  let low = -1;
  let high = 0;
  for (;;) {
    const answer = reaches(high);
    if (typeof answer === "string") return refusedValue(answer);
    if (answer) break;
    low = high;
    high = 2 * high + 1;
    if (high > LARGEST_N) return refusedValue(`The quantile at ${p} is beyond ${LARGEST_N}.`);
  }
  while (high - low > 1) {
    const middle = Math.floor((low + high) / 2);
    const answer = reaches(middle);
    if (typeof answer === "string") return refusedValue(answer);
    if (answer) high = middle;
    else low = middle;
  }
  return exactValue(high);
}

/** The n of the largest P(K = n), n finite. Refused where two of them differ by less than their errors, or it may lie beyond `up_to`. */
export function modeOf({ law, trajectory, starts }: CountsData): Value {
  let mode = 0;
  let largest = 0;
  let error = 0;
  let second = 0;
  let counted = 0;
  for (let n = 0; n <= law.upTo; n += 1) {
    const probability = probabilityAt(law, n);
    if (probability === undefined) break;
    const p = doubleProbability(probability);
    counted += p;
    if (p > largest) {
      second = largest;
      [mode, largest, error] = [n, p, probability.error * 2 ** probability.exponent];
    } else if (p > second) second = p;
  }
  if (largest - second <= 2 * error)
    return refusedValue("Two values of K are equally probable within the errors; there is no one mode.");
  const { infinite } = absorbedMoments(trajectory, starts);
  if (1 - infinite.value - counted > largest)
    return refusedValue(
      `More probability lies beyond n = ${law.upTo} than at any n up to it; a larger \`up_to\` would settle the mode.`,
    );
  return exactValue(mode);
}

import type { Quantity, Value } from "../../formulas/index.ts";
import { toDouble } from "../../formulas/index.ts";
import { absorbedAbove, absorbedProbability, factorialMoment } from "../../solvers/index.ts";
import { estimateValue, exactValue, refusedValue, scaledValue } from "../values.ts";
import { probabilityAt } from "./law.ts";
import type { CountsData } from "./model.ts";
import { quantileOf } from "./order.ts";

/** Beyond this, 1/n is below the rounding of n ± 1 in the contour's exponent. */
const MOST_N = 1e9;
const MOST_MOMENT = 64;

/** K(n), K.above(n), K.quantile(p), K.moment(j). */
export function callCounts(data: CountsData, member: string, args: readonly Quantity[]): Value | undefined {
  const [argument] = args;
  if (argument === undefined || args.length !== 1) return undefined;
  const x = toDouble(argument);
  if (member === "") return countValue(x, (n) => probability(data, n));
  if (member === "above") return countValue(x, (n) => above(data, n));
  if (member === "quantile") return quantileValue(data, x);
  if (member === "moment") return momentValue(data, x);
  return undefined;
}

function probability(data: CountsData, n: number): Value {
  if (n < 0) return exactValue(0);
  const known = probabilityAt(data.law, n);
  return scaledValue(known ?? absorbedProbability(data.trajectory, data.starts, n));
}

function above(data: CountsData, n: number): Value {
  return n < 0 ? exactValue(1) : scaledValue(absorbedAbove(data.trajectory, data.starts, n));
}

/** What is asked of a count, where n can be one. */
export function countValue(n: number, answer: (n: number) => Value): Value {
  if (!Number.isInteger(n)) return refusedValue(`K counts particles; ${n} is not a whole number.`);
  if (Math.abs(n) > MOST_N) return refusedValue(`${n} is beyond ${MOST_N}, the largest n asked for.`);
  return answer(n);
}

function quantileValue(data: CountsData, p: number): Value {
  if (!(p >= 0 && p <= 1)) return refusedValue(`A quantile is taken at a probability from 0 to 1; ${p} is none.`);
  if (p === 1) return refusedValue("The quantile at 1 is infinite: K has no largest value.");
  return quantileOf(data, p);
}

function momentValue(data: CountsData, j: number): Value {
  if (Number.isInteger(j) && j >= 0 && j <= MOST_MOMENT) {
    return j === 0 ? exactValue(1) : estimateValue(factorialMoment(data.trajectory, data.starts, j));
  }
  return refusedValue(`A factorial moment has a whole order from 0 to ${MOST_MOMENT}; ${j} is none.`);
}

import type { Quantity, Value } from "../../formulas/index.ts";
import { approximate, toDouble } from "../../formulas/index.ts";
import { clopperPearson, INTERVAL_ACCURACY } from "../../solvers/index.ts";
import { exactValue, numberValue, refusedValue } from "../values.ts";
import { shareOf } from "./chance.ts";
import type { SimulateData } from "./model.ts";

/** S(n), S.low(n), S.high(n), S.hits(n). */
export function callSimulate(data: SimulateData, member: string, args: readonly Quantity[]): Value | undefined {
  const [argument] = args;
  if (argument === undefined || args.length !== 1 || !["", "low", "high", "hits"].includes(member)) return undefined;
  const n = toDouble(argument);
  const { cap } = data.plan;
  if (!Number.isInteger(n)) return refusedValue(`K counts particles; ${n} is not a whole number.`);
  if (cap !== null && n >= cap)
    return refusedValue(`A replicate ends when K reaches the cap of ${cap}; how often K was ${n} is not known.`);
  if (member === "hits") return exactValue(hitsOf(data, n));
  if (n < 0) return exactValue(0);
  if (member === "") return numberValue(shareOf(data, n));
  const end = intervalOf(data, n)[member === "low" ? "low" : "high"];
  // What the cut may have changed in the probability counts as its error.
  return numberValue(approximate(end, data.plan.bias + INTERVAL_ACCURACY * end));
}

/** How many replicates had K = n. */
export function hitsOf(data: SimulateData, n: number): number {
  return data.hits[data.n.indexOf(n)] ?? 0;
}

/** The interval for P(K = n). */
export function intervalOf(data: SimulateData, n: number): { readonly low: number; readonly high: number } {
  const at = data.n.indexOf(n);
  const low = data.low[at];
  const high = data.high[at];
  if (low !== undefined && high !== undefined) return { low, high };
  return clopperPearson(0, data.plan.replicates, data.confidence);
}

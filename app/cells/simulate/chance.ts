import type { Quantity } from "../../formulas/index.ts";
import { scaled } from "../../formulas/index.ts";
import type { SimulateData } from "./model.ts";

/**
 * How numbers read off one simulation hang together. The hits h_k of N replicates are multinomial; to first order a number
 * Σ g(k) h_k/N varies as Σ g(k) √(h_k)/N Z_k with independent standard normal Z_k, where Σ g(k) h_k = 0. So each k that occurred is a
 * source of chance, and S(1) + S(0), or S(1) against the mean, have the standard errors that they ought to have.
 */

/** So many k are sources of their own; what lies beyond is one more. */
const MOST_SOURCES = 100;

/** A number read off the hits. @param influence g(k), with mean 0 over the replicates @param error bound on the rest of its error */
export function hangingOn(
  data: SimulateData,
  value: number,
  influence: (n: number) => number,
  error: number,
): Quantity {
  const { n, hits, plan, chance } = data;
  const sources: Record<string, number> = {};
  let rest = 0;
  for (const [i, k] of n.entries()) {
    const share = (influence(k) * Math.sqrt(hits[i] ?? 0)) / plan.replicates;
    if (share === 0) continue;
    if (i < MOST_SOURCES) sources[`${chance} ${k}`] = share;
    else rest = Math.hypot(rest, share);
  }
  if (rest > 0) sources[`${chance} beyond`] = rest;
  return scaled(value, 0, error, Math.hypot(...Object.values(sources)), sources);
}

/** The share of the replicates with K = n. One that never or always occurred has the weight of one replicate for its standard error. */
export function shareOf(data: SimulateData, n: number): Quantity {
  const { hits, plan, chance } = data;
  const count = hits[data.n.indexOf(n)] ?? 0;
  const share = count / plan.replicates;
  if (count === 0 || count === plan.replicates) {
    const weight = 1 / plan.replicates;
    return scaled(share, 0, plan.bias, weight, { [`${chance} one ${n}`]: weight });
  }
  return hangingOn(data, share, (k) => (k === n ? 1 - share : -share), plan.bias);
}

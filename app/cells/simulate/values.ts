import type { Value } from "../../formulas/index.ts";
import { exactValue, numberValue, refusedValue, shortNumber } from "../values.ts";
import { hangingOn, shareOf } from "./chance.ts";
import type { SimulateData } from "./model.ts";

/** Moments of order below the tail index are finite; one within its rounding is not below it. */
const INDEX_TOLERANCE = 1e-9;
/** Rounding of sums over the values that occurred. */
const ROUNDING = 1e-13;

/** The named values, in the order of the documentation. */
export function simulatedValues(data: SimulateData): Record<string, Value> {
  const { plan } = data;
  return {
    ...momentsOf(data),
    replicates: exactValue(plan.replicates),
    bias: exactValue(plan.bias),
    cut: plan.cut === null ? refusedValue(noCut(data)) : exactValue(plan.cut),
  };
}

function momentsOf(data: SimulateData): { mean: Value; zero: Value; variance: Value } {
  const { n, hits, plan } = data;
  const zero = numberValue(shareOf(data, 0));
  // Where K may be infinite, moments are those given K below the cap.
  const counted = (k: number): boolean => plan.regime !== "between" || plan.cap === null || k < plan.cap;
  const total = (g: (k: number) => number): number =>
    n.reduce((sum, k, i) => sum + (counted(k) ? g(k) * (hits[i] ?? 0) : 0), 0);
  const count = total(() => 1);
  const average = total((k) => k) / count;
  const none = noMoments(data, count, average);
  if (none !== null) return { mean: refusedValue(none), zero, variance: refusedValue(none) };

  const share = count / plan.replicates;
  const unbiased = count / (count - 1);
  const central = (power: number): number => total((k) => (k - average) ** power) / count;
  const variance = central(2) * unbiased;
  const mean = hangingOn(
    data,
    average,
    (k) => (counted(k) ? ((k - average) / share) * Math.sqrt(unbiased) : 0),
    plan.bias + ROUNDING * average,
  );
  const spread = hangingOn(
    data,
    variance,
    (k) => (counted(k) ? (((k - average) ** 2 - central(2)) / share) * unbiased : 0),
    plan.varianceBias + ROUNDING * variance,
  );
  return { mean: numberValue(mean), zero, variance: noVariance(data, variance) ?? numberValue(spread) };
}

/** Why there is neither mean nor variance; null where there are. */
function noMoments(data: SimulateData, count: number, average: number): string | null {
  const { plan, n, hits } = data;
  const capped = plan.cap === null ? 0 : (hits[n.indexOf(plan.cap)] ?? 0);
  if (plan.regime !== "between" && capped > 0)
    return `K reached the cap of ${plan.cap} in ${capped} of ${plan.replicates} replicates, so that what it would have been is not known. A larger \`cap\` would do.`;
  if (count < 2) return `Fewer than 2 of ${plan.replicates} replicates ended below the cap of ${plan.cap}.`;
  if (isAtMost(plan.tailIndex, 2))
    return `K has infinite variance: P(K = n) falls as n^(−${shortNumber(1 + (plan.tailIndex ?? 0))}). The average of ${plan.replicates} replicates, ${shortNumber(average)}, has no standard error.`;
  const started = plan.starts.every(({ position }) => position === 0);
  if (n.length === 1 && !started)
    return `K was ${n[0]} in each of ${plan.replicates} replicates, so that nothing is known of its spread. More replicates would do.`;
  return null;
}

function noVariance(data: SimulateData, variance: number): Value | null {
  const { tailIndex, replicates } = data.plan;
  if (!isAtMost(tailIndex, 4)) return null;
  return refusedValue(
    `The fourth moment of K is infinite: P(K = n) falls as n^(−${shortNumber(1 + (tailIndex ?? 0))}). The variance in ${replicates} replicates, ${shortNumber(variance)}, has no standard error.`,
  );
}

/** Whether the moment of that order is infinite. */
export function isAtMost(tailIndex: number | null, order: number): boolean {
  return tailIndex !== null && tailIndex <= order * (1 + INDEX_TOLERANCE);
}

function noCut({ plan }: SimulateData): string {
  if (plan.regime === "toward") return "No particle was dropped: with this drift every line comes to the barrier.";
  if (plan.regime === "between") return "No particle was dropped: a replicate ends at the cap.";
  return "No particle was dropped: every tree ends by itself.";
}

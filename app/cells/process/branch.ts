import type { ProcessModel, Regime } from "../../solvers/index.ts";
import { describeProcess } from "../../solvers/index.ts";
import type { Branch } from "../kind.ts";

const CRITICAL = "the drift is critical";
const BALANCED = "the Malthusian parameter is 0";

/** What holds in each regime, and whether the critical drift belongs to it. */
const REGIMES: Readonly<Record<Regime, { readonly holds: string; readonly closed: boolean }>> = {
  away: { holds: "K is finite", closed: true },
  between: { holds: "K is infinite with positive probability", closed: false },
  toward: { holds: "K is finite, with a power law for its tail", closed: true },
};

/**
 * The regime as the branch of the theory: the law of K jumps at the critical drift.
 * Source: P. Maillard, Ann. Inst. Henri Poincaré Probab. Stat. 49 (2013) 428–455, for the regimes of the drift.
 */
export function branchOf(model: ProcessModel): Branch {
  const { regime, malthusian } = describeProcess(model);
  if (typeof regime !== "string")
    return { name: "none", holds: `there is no answer: ${regime.refused}`, borders: [BALANCED], closed: true };
  // Where the Malthusian parameter is negative every drift is away, and no drift is critical.
  if (malthusian.value <= 0) return { name: regime, holds: "K is finite", borders: [BALANCED], closed: false };
  return { name: regime, ...REGIMES[regime], borders: [CRITICAL, BALANCED] };
}

import { type PreparedLaw, prepareLaw as prepareTurning } from "./prepared.ts";
import { prepareToward } from "./prepared-toward.ts";
import type { Wanted } from "./sums.ts";
import type { Starts, Trajectory } from "./types.ts";

/** Traces the law of K for particles at positions > 0, or of the limit law, by the contour of its regime.
 *  @throws SolverError "not_converged" where no contour passes its tests. */
export function prepareLaw(t: Trajectory, starts: Starts, n: number, wanted: Wanted): PreparedLaw {
  return t.regime === "toward" && starts !== "far"
    ? prepareToward(t, starts, n, wanted)
    : prepareTurning(t, starts, n, wanted);
}

import { SolverError } from "./errors.ts";
import type { Normalised } from "./linear.ts";
import { branches } from "./offspring.ts";
import { add, exponential, logarithm, negate, ONE, pair, subtract, toNumber, ZERO } from "./pairs.ts";
import type { Knot, Pair, Turning } from "./types.ts";
import {
  crossing,
  firstKnot,
  moved,
  type OriginSeries,
  originSeries,
  type PairKnot,
  type WalkSettings,
  walk,
} from "./walk.ts";

/** Both branches of a trajectory, with the constants found on them. */
export interface Path {
  readonly origin: OriginSeries;
  readonly below: Knot[];
  readonly above: Knot[];
  readonly amplitude: Pair;
  /** du/dξ where w = 0 */
  readonly slope: Pair;
  readonly turning: Pick<Turning, "s0" | "excess" | "amplitude"> | null;
}

/** Walks both branches. */
export function follow(n: Normalised, settings: WalkSettings): Path {
  const origin = originSeries(n, settings);
  const start = negate(logarithm(pair(origin.reach)));
  const { knots: below, barrier } = followBelow(n, firstKnot(origin, 1, settings.order, start), settings);
  const shared = { origin, below, amplitude: exponential(negate(barrier.xi)), slope: barrier.slope };
  const first = firstKnot(origin, -1, settings.order, start);
  if (!branches(n.law)) return { ...shared, above: [plain(first)], turning: null };
  const { knots: above, top } = followAbove(n, first, settings);
  const excess = negate(top.u);
  return { ...shared, above, turning: { s0: add(ONE, excess), excess, amplitude: exponential(negate(top.xi)) } };
}

function plain(knot: PairKnot): Knot {
  return { xi: toNumber(knot.xi), u: toNumber(knot.u), slope: toNumber(knot.slope) };
}

/** From w near 1 down past w = −1; |w(x, s)| ≤ w(x, |s|) keeps the trajectory falling until there. */
function followBelow(n: Normalised, first: PairKnot, settings: WalkSettings): { knots: Knot[]; barrier: PairKnot } {
  const knots = [plain(first)];
  let barrier: PairKnot | null = null;
  walk(
    n,
    first,
    settings,
    (knot) => knot.u[0] >= 2,
    (from, c, to) => {
      knots.push(plain(to));
      if (barrier !== null || to.u[0] < 1) return;
      const h = crossing(c, settings.order, toNumber(subtract(from.xi, to.xi)), "value", ONE);
      barrier = moved(from, c, h, settings.order);
    },
  );
  if (barrier === null) throw new SolverError("not_converged", "The trajectory never met w = 0.");
  return { knots, barrier };
}

/** From w near 1 up to the turning point, where the last knot stands. */
function followAbove(n: Normalised, first: PairKnot, settings: WalkSettings): { knots: Knot[]; top: PairKnot } {
  const knots = [plain(first)];
  let top = first;
  walk(
    n,
    first,
    settings,
    (knot) => knot.slope[0] <= 0,
    (from, c, to) => {
      if (to.slope[0] > 0) {
        knots.push(plain(to));
        return;
      }
      const h = crossing(c, settings.order, toNumber(subtract(from.xi, to.xi)), "slope", ZERO);
      const turned = moved(from, c, h, settings.order);
      top = { ...turned, slope: ZERO };
      knots.push({ ...plain(top), slope: 0 });
    },
  );
  return { knots, top };
}

import { SolverError } from "./errors.ts";
import type { Normalised } from "./linear.ts";
import { branches, upperFixedPoint } from "./offspring.ts";
import { add, exponential, logarithm, negate, ONE, pair, subtract, toNumber, ZERO } from "./pairs.ts";
import type { Edge, Knot, Pair, Turning } from "./types.ts";
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
  readonly edge: Edge | null;
}

/** Walks both branches. */
export function follow(n: Normalised, settings: WalkSettings): Path {
  const origin = originSeries(n, settings);
  const start = negate(logarithm(pair(origin.reach)));
  const { knots: below, barrier } = followBelow(n, firstKnot(origin, 1, settings.order, start), settings);
  const shared = { origin, below, amplitude: exponential(negate(barrier.xi)), slope: barrier.slope };
  const first = firstKnot(origin, -1, settings.order, start);
  if (!branches(n.law)) return { ...shared, above: [plain(first)], turning: null, edge: null };
  const edge = edgeOf(n);
  const { knots: above, top } = followAbove(n, first, settings, edge);
  if (top === null) return { ...shared, above, turning: null, edge };
  const excess = negate(top.u);
  const centre = n.law.law === "finite" && n.law.fromZero ? ZERO : ONE;
  return {
    ...shared,
    above,
    turning: { s0: add(centre, excess), excess, amplitude: exponential(negate(top.xi)) },
    edge: null,
  };
}

/** A knot in doubles. */
export function plain(knot: PairKnot): Knot {
  return { xi: toNumber(knot.xi), u: toNumber(knot.u), slope: toNumber(knot.slope) };
}

/** From w near 1 down past w = −1; |w(x, s)| ≤ w(x, |s|) keeps the trajectory falling until there. */
export function followBelow(
  n: Normalised,
  first: PairKnot,
  settings: WalkSettings,
): { knots: Knot[]; barrier: PairKnot } {
  const lowest = n.lowest ?? 2;
  const knots = [plain(first)];
  let barrier: PairKnot | null = null;
  walk(
    n,
    first,
    settings,
    (knot) => knot.u[0] >= lowest,
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

/** What w may tend to without turning, if anything. */
function edgeOf(n: Normalised): Edge | null {
  if (n.law.law === "geometric" && n.law.excess[0] >= 0) return { kind: "pole", s: 1 + 1 / n.law.mean[0] };
  // a negative damping turns the trajectory back before any fixed point
  if (n.law.excess[0] < 0 && 1 + n.ratio[0] < 0 && !n.turns) return { kind: "fixed point", s: upperFixedPoint(n.law) };
  return n.law.law === "geometric" ? { kind: "pole", s: 1 + 1 / n.law.mean[0] } : null;
}

/** Share of the way from 1 to the edge within which it counts as reached: a pole at once, a fixed point only by one who comes to
 *  rest there (a drift not strong enough for that passes it with some slope, and turns back beyond). */
const EDGE_SHARE = { "fixed point": 1e-8, pole: 1e-6 } as const;
const REST_SLOPE = 1e-6;

function reaches(edge: Edge | null, knot: PairKnot): boolean {
  if (edge === null || -knot.u[0] < (edge.s - 1) * (1 - EDGE_SHARE[edge.kind])) return false;
  return edge.kind === "pole" || knot.slope[0] < REST_SLOPE * (edge.s - 1);
}

/** From w near 1 up to the turning point, where the last knot stands, or up to the edge, where there is none. */
function followAbove(
  n: Normalised,
  first: PairKnot,
  settings: WalkSettings,
  edge: Edge | null,
): { knots: Knot[]; top: PairKnot | null } {
  const knots = [plain(first)];
  let top: PairKnot | null = null;
  walk(
    n,
    first,
    settings,
    (knot) => knot.slope[0] <= 0 || reaches(edge, knot),
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

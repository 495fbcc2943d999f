import { type Contour, type Reference, traceContour } from "./contour.ts";
import { SolverError } from "./errors.ts";
import { upperFixedPoint } from "./offspring.ts";
import type { TrajectoryReader } from "./reader.ts";
import { nodeValues } from "./sources.ts";
import { sumRange, sumsOf } from "./sums.ts";
import type { Trajectory } from "./types.ts";

/** Two contours of different width for the same law: their difference measures the error of either. */
export interface ContourPair {
  readonly reference: Reference;
  readonly fine: Contour;
  readonly check: Contour;
}

/** Shapes tried, those with fewest nodes first: a wider arc must not meet another singularity of w(x, ·), and a tilt avoids
 *  those on the slit, where a geometric law has its pole. The tilted one serves as the check, on a narrower arc. */
const WIDTHS = [0.7, 0.3, 0.12, 0.05, 0.02, 0.008];
const PLAIN_TILT = 0;
const POLE_TILT = 0.5;
/** What the check changes. */
const CHECK_SHARE = 0.75;
const CHECK_TILT = 0.25;
/** The arc matters up to n = REACH/width; Gauss–Legendre needs a little more than π/4 nodes for each of these n. */
const REACH = 40;
const NODES_PER_N = 0.8;
const ARC_NODES = 20;
/** Rounds of half as many nodes again before a narrower arc is tried. */
const REFINEMENTS = 2;
const PANEL_NODES = 16;
const CHECK_PANEL_NODES = 18;
/** Relative agreement asked of the two contours, and of their total with 1. */
const ACCEPTED = 1e-13;
const ACCEPTED_UNITS = 64;
/** What ends the search once a width and its refinements are through: a narrower arc takes many more nodes for the last digits. */
const GOOD_ENOUGH = 1e-11;
/** The same where continuation runs along rays: P(K = n) may fall far below the rounding of its sum there, which no contour mends. */
const GOOD_ON_RAYS = 1e-8;
/** What is still accepted from the best attempt, with its error stated. */
const TOLERATED = 1e-6;

const cache = new WeakMap<Trajectory, Map<number, ContourPair>>();

/** The contours for n up to `n`, accepted by three tests on the limit law from far away, whose total and mean are known:
 *  both contours agree at sampled n, the total is 1, and ξ closes with the period of z.
 *  @throws SolverError "not_converged" where no width passes. */
export function contoursFor(t: Trajectory, reader: TrajectoryReader, n: number): ContourPair {
  const level = Math.ceil(Math.log10(Math.max(n, 1000)));
  const known = cache.get(t) ?? new Map<number, ContourPair>();
  cache.set(t, known);
  const found = known.get(level);
  if (found !== undefined) return found;
  const made = searchWidths(t, reader, level);
  known.set(level, made);
  return made;
}

const NOT_FOUND = "No contour passed its tests; the probabilities of this law cannot be vouched for.";

function searchWidths(t: Trajectory, reader: TrajectoryReader, level: number): ContourPair {
  const start = beginning(t, reader, level);
  const { reference } = start;
  const finest = finestScale(start, level);
  const tilt = Number.isFinite(start.next) ? POLE_TILT : PLAIN_TILT;
  // a double short of the obstacle by a share of 1/n has lost that much of its digits
  const accepted = Math.max(ACCEPTED, (ACCEPTED_UNITS * Number.EPSILON) / (start.next / reference.radius[0] - 1));
  const good = reader.rays === null ? GOOD_ENOUGH : GOOD_ON_RAYS;
  let best: ContourPair | null = null;
  let smallest = TOLERATED;
  for (const width of WIDTHS) {
    for (let round = 0, nodes = arcNodes(width); round <= REFINEMENTS; round += 1, nodes = Math.ceil(1.5 * nodes)) {
      const fine = traceContour(reader, reference, { width, tilt, panelNodes: PANEL_NODES, finest, arcNodes: nodes });
      if (fine === null) break;
      const checkWidth = width * CHECK_SHARE;
      const check = traceContour(reader, reference, {
        width: checkWidth,
        tilt: tilt + CHECK_TILT,
        panelNodes: CHECK_PANEL_NODES,
        finest,
        arcNodes: Math.ceil((nodes * arcNodes(checkWidth)) / arcNodes(width)),
      });
      if (check === null) break;
      const pair = { reference, fine, check };
      const disagreement = compare(t, reader, pair, width);
      if (disagreement < accepted) return pair;
      if (disagreement < smallest) {
        smallest = disagreement;
        best = pair;
      }
    }
    if (best !== null && smallest < good) return best;
  }
  if (best !== null) return best;
  throw new SolverError("not_converged", NOT_FOUND);
}

/** Where the leg starts, the next singularity, and the scale on which w(x, ·) varies there. */
interface Beginning {
  readonly reference: Reference;
  readonly next: number;
  readonly variation: number;
}

/** The leg starts at s0, the saddle; or, where the pole of a geometric law or a second fixed point of G is within 1/n of it at the
 *  largest n (or ends the trajectory), short of all by 1/n: s^−n is then at most e times what it is at the first of them, and the
 *  rounding of doubles next to them is not felt. */
function beginning(t: Trajectory, reader: TrajectoryReader, level: number): Beginning {
  const apart = 10 ** -level;
  const pole = reader.law.law === "geometric" ? 1 + 1 / reader.law.mean[0] : Number.POSITIVE_INFINITY;
  const { turning } = reader;
  const { centre } = reader.base;
  // P(K > n) has a pole at s = 1, which the leg must leave behind
  const one = t.regime === "away" ? 1 : 1 / reader.base.scale[0];
  if (turning !== null) {
    const s0 = turning.s0[0];
    const fixed = reader.law.excess[0] < 0 && t.ratio[0] < -1 ? upperFixedPoint(reader.law) : one;
    if (s0 < pole * (1 - apart) && s0 > fixed * (1 + apart))
      return { reference: { radius: turning.s0, excess: turning.excess }, next: pole, variation: s0 - fixed };
  }
  const next = Math.min(pole, turning === null ? (t.edge?.s ?? pole) : turning.s0[0]);
  const radius = Math.max(Math.sqrt(one * next), next * (1 - apart));
  return { reference: { radius: [radius, 0], excess: [radius - centre, 0] }, next, variation: radius - one };
}

/** Widths of the narrowest Gaussian e^{−nτ²} that the innermost panel's nodes resolve to rounding. */
const GAUSSIAN_WIDTHS = 3;

/** The leg must resolve the Gaussian e^{−nτ²}, the variation of w(x, ·) itself, and the distance to the next singularity. */
function finestScale({ reference, next, variation }: Beginning, level: number): number {
  const radius = reference.radius[0];
  const gaussian = GAUSSIAN_WIDTHS / Math.sqrt(10 ** level);
  return Math.min(gaussian, Math.sqrt(variation / radius) / 4, Math.sqrt(next / radius - 1) / 2);
}

function arcNodes(width: number): number {
  return Math.ceil((NODES_PER_N * REACH) / width) + ARC_NODES;
}

/** n at which the two contours are compared. */
const SAMPLES = [0, 1, 2, 3, 5, 8, 13, 21, 34, 55, 89, 144, 233, 377, 610];

/** Largest relative difference of the two contours on the limit law, its total against 1 included. */
function compare(t: Trajectory, reader: TrajectoryReader, pair: ContourPair, width: number): number {
  const u = nodeValues(t, reader, pair.fine, "far");
  const v = nodeValues(t, reader, pair.check, "far");
  if (u === null || v === null) return Number.POSITIVE_INFINITY;
  const { centre, period } = reader.base;
  const lattice = { base: reader.base, offset: 1 };
  const fine = sumsOf(pair.fine, pair.reference, u, lattice, "each");
  const check = sumsOf(pair.check, pair.reference, v, lattice, "each");
  const atTop = u.re[0] as number;
  let worst = 0;
  for (const n of SAMPLES) {
    if (period > 1 && n % period !== 1) continue;
    const a = sumRange(fine, n, n);
    const b = sumRange(check, n, n);
    const value = a.values[0] as number;
    const gap = Math.abs(value - (b.values[0] as number));
    const rounding = (a.rounding[0] as number) + (b.rounding[0] as number);
    // a wide arc may cost digits that a narrower one keeps; beside a pole, or along rays, no contour mends the rounding
    const excused = reader.rays === null && width === WIDTHS[0] ? 0 : rounding;
    worst = Math.max(worst, Math.max(0, gap - excused) / Math.abs(value));
    // at n = 0 the formula gives u(s0) − u(0), and u(0) = 1, or 0 where nobody dies childless
    if (n === 0) worst = Math.max(worst, Math.abs(value - (atTop - centre)) / Math.abs(value) - excused);
  }
  return Number.isFinite(worst) ? worst : Number.POSITIVE_INFINITY;
}

import { SolverError } from "./errors.ts";
import { chartRest, chartValue, type NodeChart } from "./node-chart.ts";
import { add, divide, exponential, multiply, pair, scale, subtract, toNumber, ZERO } from "./pairs.ts";
import type { Pair } from "./types.ts";

/** A point of the trajectory near w = 1: ξ of its own, u = 1 − w and du/d(λ_s x). */
export interface NodeKnot {
  readonly xi: Pair;
  readonly u: Pair;
  readonly slope: Pair;
}

/** Where the trajectory passes in the coordinates of the chart: at `xi`, (ζ, η). */
export interface Passed {
  readonly xi: Pair;
  readonly zeta: Pair;
  readonly eta: Pair;
  /** bound on the relative error of gap·η + resonance·ζ^nearest, to which the singularity at s = 1 is proportional */
  readonly etaError: number;
}

/** What the series may leave out where the trajectory is met, relative to u. */
const REST = 2 ** -84;
const ROUNDS = 12;
/** Relative step of the differences that stand for derivatives, and what the residual must come down to. */
const NUDGE = 2 ** -40;
const SOLVED = 2 ** -92;
/** Errors of the walk, relative to u, at most; and what comparing in doubles leaves. */
export const PATH_ERROR = 2 ** -76;
const ROUNDED = 2 ** -60;
/** Relative difference of ζ at a knot from what it comes to from the knot before. */
const CARRIED = 2 ** -20;
/** Room for the trajectory's own error in the comparison of two knots. */
const COMPARED = 4;

/** Finds (ζ, η) at the outermost knot that the series reaches, from the innermost outwards, as long as ζ grows as λ_s x does:
 *  beyond its reach the series may still take the values of the knot, elsewhere.
 *  @param knots on the trajectory, of decreasing u
 *  @param rate d(λ_s x)/dξ
 *  @throws SolverError "not_converged" where no knot is within its reach, or Newton's method fails. */
export function passThrough(chart: NodeChart, knots: readonly NodeKnot[], rate: Pair): Passed {
  let found: Met | null = null;
  let previous: Met | null = null;
  for (const knot of [...knots].reverse()) {
    const expected = found === null ? null : carried(chart, found, knot, rate);
    const at = solve(chart, knot, expected ?? linear(chart, knot));
    if (expected !== null && at !== null && !(apart(at.zeta, expected.zeta) < CARRIED)) break;
    if (at === null || !(chartRest(chart, Math.abs(toNumber(at.zeta)), Math.abs(toNumber(at.eta))).whole < REST)) break;
    previous = found;
    found = { knot, ...at };
  }
  if (found === null)
    throw new SolverError("not_converged", "The trajectory does not come near enough to w = 1 to be followed into it.");
  const { knot, zeta, eta } = found;
  return { xi: knot.xi, zeta, eta, etaError: previous === null ? 1 : disagreement(chart, previous, found) };
}

interface Met {
  readonly knot: NodeKnot;
  readonly zeta: Pair;
  readonly eta: Pair;
}

/** (ζ, η) of the linear equation. */
function linear(chart: NodeChart, { u, slope }: NodeKnot): { zeta: Pair; eta: Pair } {
  const { index, nearest, series } = chart;
  const unit = series.at(0, 1);
  const value = divide(u, unit);
  const rate = divide(slope, unit);
  if (nearest === 1) return { zeta: divide(subtract(rate, multiply(index, value)), chart.resonance), eta: value };
  const eta = divide(subtract(rate, value), subtract(index, pair(1)));
  return { zeta: subtract(value, eta), eta };
}

/** (ζ, η) moved along the flow from one knot to another. */
function carried(chart: NodeChart, from: Met, to: NodeKnot, rate: Pair): { zeta: Pair; eta: Pair } {
  const way = multiply(subtract(to.xi, from.knot.xi), rate);
  // what is lost in rounding must not be carried on at the fast rate
  const known = Math.abs(from.eta[0]) > PATH_ERROR * Math.abs(from.zeta[0]);
  return {
    zeta: multiply(from.zeta, exponential(way)),
    eta: known ? moveEta(chart, from.zeta, from.eta, way) : ZERO,
  };
}

function apart(a: Pair, b: Pair): number {
  return Math.abs(toNumber(divide(subtract(a, b), b)));
}

/** η after λ_s x has grown by `way`. */
export function moveEta(chart: NodeChart, zeta: Pair, eta: Pair, way: Pair): Pair {
  const { nearest, gap, resonance } = chart;
  let power = resonance;
  for (let k = 0; k < nearest && power[0] !== 0; k += 1) power = multiply(power, zeta);
  const grown = multiply(gap, way);
  // (e^{g y} − 1)/g
  const stretch =
    Math.abs(grown[0]) < 1e-4 ? stretchSeries(way, grown) : divide(subtract(exponential(grown), pair(1)), gap);
  const whole = exponential(scale(way, nearest));
  return multiply(whole, add(multiply(eta, exponential(grown)), multiply(power, stretch)));
}

function stretchSeries(way: Pair, grown: Pair): Pair {
  let term = way;
  let sum = way;
  for (let k = 2; k < 9; k += 1) {
    term = divide(multiply(term, grown), pair(k));
    sum = add(sum, term);
  }
  return sum;
}

function solve(chart: NodeChart, knot: NodeKnot, first: { zeta: Pair; eta: Pair }): { zeta: Pair; eta: Pair } | null {
  let { zeta, eta } = first;
  for (let round = 0; round < ROUNDS; round += 1) {
    const at = chartValue(chart, zeta, eta);
    const gapU = subtract(knot.u, at.u);
    const gapSlope = subtract(knot.slope, at.slope);
    if (!Number.isFinite(gapU[0] + gapSlope[0])) return null;
    if (Math.abs(gapU[0]) + Math.abs(gapSlope[0]) / (1 + chart.index[0]) <= SOLVED * Math.abs(knot.u[0]))
      return { zeta, eta };
    const stepZeta = scale(zeta, NUDGE);
    const stepEta = pair((Math.abs(toNumber(eta)) + Math.abs(toNumber(zeta))) * NUDGE);
    const a = chartValue(chart, add(zeta, stepZeta), eta);
    const b = chartValue(chart, zeta, add(eta, stepEta));
    const uz = divide(subtract(a.u, at.u), stepZeta);
    const ue = divide(subtract(b.u, at.u), stepEta);
    const vz = divide(subtract(a.slope, at.slope), stepZeta);
    const ve = divide(subtract(b.slope, at.slope), stepEta);
    const determinant = subtract(multiply(uz, ve), multiply(ue, vz));
    zeta = add(zeta, divide(subtract(multiply(gapU, ve), multiply(gapSlope, ue)), determinant));
    eta = add(eta, divide(subtract(multiply(gapSlope, uz), multiply(gapU, vz)), determinant));
  }
  return { zeta, eta };
}

/** What the singularity at s = 1 is proportional to, from the two outermost knots: their difference is that of the trajectory's error. */
function disagreement(chart: NodeChart, inner: Met, outer: Met): number {
  const { gap, nearest, resonance } = chart;
  const weigh = ({ zeta, eta }: Met) => {
    if (resonance[0] === 0) return eta;
    let power = resonance;
    for (let k = 0; k < nearest; k += 1) power = multiply(power, zeta);
    return add(multiply(gap, eta), power);
  };
  const way = Math.log(divide(outer.zeta, inner.zeta)[0]);
  // compared as they stand at the inner knot: there the error of either counts more
  const moved = multiply(weigh(outer), exponential(scale(scale(chart.index, way), -1)));
  const one = weigh(inner);
  const difference = COMPARED * Math.abs(toNumber(divide(subtract(one, moved), one)));
  const least = (PATH_ERROR * Math.abs(outer.zeta[0])) / Math.abs(weigh(outer)[0]);
  const known = difference * Math.exp(-(chart.index[0] - 1) * way) + least + ROUNDED;
  return difference < 1 && known < 1 ? known : 1;
}

import { SolverError } from "./errors.ts";
import { fastRate, linearise } from "./linear.ts";
import { type Branching, nonlinearity } from "./offspring.ts";
import { PairSeries, pairComposer } from "./pair-series.ts";
import { add, divide, multiply, negate, ONE, pair, scale, subtract, toNumber, ZERO } from "./pairs.ts";
import type { Pair, ProcessModel } from "./types.ts";

/**
 * u(x) = P_x(the process on the half-line survives for ever), solved from far away towards the barrier.
 *
 * D u″ + drift u′ + rate ((mean − 1) u − M(u)) = 0 with u(0) = 0 and u → p, the chance that branching alone survives; M as in
 * offspring.ts. In ξ = κx, with κ the decay rate at the saddle u = p:  u″ + damping·u′ + pull·u = strength·M(u).
 */
export interface SurvivalPath {
  /** κ [1/length] */
  readonly rate: number;
  /** ξ at the barrier, where u = 0 */
  readonly barrier: number;
  /** u = Σ far[k] z^k with z = e^{−ξ}, used for ξ ≥ knots[0].xi */
  readonly far: Float64Array;
  /** Taylor expansion in ξ − barrier, used to `reach`: near the barrier u keeps its relative accuracy. */
  readonly near: { readonly reach: number; readonly series: Float64Array };
  /** Taylor expansions in ξ − xi, of decreasing ξ; each reaches down to the next one's, the last one past the barrier. */
  readonly knots: readonly { readonly xi: number; readonly series: Float64Array }[];
}

/** Terms of each expansion, and the relative size of what is left out. */
const ORDER = 30;
const TOLERANCE = 2 ** -66;
const MOST_STEPS = 5000;
const NEWTON_STEPS = 8;
const MOST_HALVINGS = 30;
/** Below this the double's range is near its end, and with it the digits of every product. */
const SMALLEST = 2 ** -930;

interface Equation {
  readonly law: Branching;
  readonly p: Pair;
  readonly rate: Pair;
  readonly damping: Pair;
  readonly pull: Pair;
  readonly strength: Pair;
}

/** Solves for u in a process whose mean number of children is above 1 and whose regime is not `toward`.
 *  Method: power series of u at the saddle p, where it is approached at the rate κ, then Taylor steps towards the barrier,
 *  in which direction the other mode dies out. Double-doubles throughout.
 *  Source: T. E. Harris, The Theory of Branching Processes (1963), chapter I, for p; H. Kesten, Stochastic Process. Appl. 7
 *  (1978) 9–47, for the process with absorption.
 *  @throws SolverError "not_converged" when the barrier is not reached. */
export function survivalPath(model: ProcessModel): SurvivalPath {
  const equation = equationOf(model);
  const origin = farSeries(equation);
  let reach = Math.min(1 / 8, TOLERANCE ** (1 / ORDER) / growthOf(origin));
  reach = 2 ** Math.floor(Math.log2(reach * toNumber(equation.p)));
  const xi = -Math.log(reach);
  const start = origin.evaluate(pair(Math.exp(-xi)), ORDER);
  // du/dξ = −z du/dz
  let u = start.value;
  let slope = negate(scale(start.derivative, Math.exp(-xi)));
  let at = xi;
  const knots: { xi: number; series: Float64Array }[] = [];
  for (let step = 0; step < MOST_STEPS; step += 1) {
    const series = expandAt(equation, u, slope);
    knots.push({ xi: at, series: series.high.slice() });
    let length = stepOf(series);
    let next = series.evaluate(pair(-length), ORDER);
    // u increases up to the barrier and turns only behind it: a step that ends behind the turn is too long.
    for (let halvings = 0; next.derivative[0] <= 0 && halvings < MOST_HALVINGS; halvings += 1) {
      length /= 2;
      next = series.evaluate(pair(-length), ORDER);
    }
    if (!(next.derivative[0] > SMALLEST)) break;
    if (next.value[0] <= 0) {
      const down = zeroOf(series, length);
      const near = expandAt(equation, ZERO, series.evaluate(negate(down), ORDER).derivative);
      return {
        rate: toNumber(equation.rate),
        barrier: at - toNumber(down),
        far: origin.high.slice(),
        near: { reach: stepOf(near), series: near.high.slice() },
        knots,
      };
    }
    at -= length;
    u = next.value;
    slope = next.derivative;
  }
  throw new SolverError(
    "not_converged",
    `Near the barrier the survival probability is below ${SMALLEST.toExponential(0)}: the drift is too near the one at which every line is absorbed.`,
  );
}

/** u at a distance ξ − barrier ≥ 0 from the barrier. */
export function survivalIn(path: SurvivalPath, distance: number): number {
  if (distance <= path.near.reach) return horner(path.near.series, distance);
  const xi = path.barrier + distance;
  const [first] = path.knots;
  if (first === undefined || xi >= first.xi) return horner(path.far, Math.exp(-xi));
  let low = 0;
  let high = path.knots.length - 1;
  while (low < high) {
    const middle = Math.ceil((low + high) / 2);
    if ((path.knots[middle]?.xi ?? 0) >= xi) low = middle;
    else high = middle - 1;
  }
  const knot = path.knots[low] ?? first;
  return horner(knot.series, xi - knot.xi);
}

function equationOf(model: ProcessModel): Equation {
  const { law } = linearise(model);
  const p = survivingRoot(law);
  const drift = pair(model.drift);
  const growth = scale(subtract(law.excess, slopeOfM(law, p)), model.rate);
  const discriminant = subtract(multiply(drift, drift), scale(scale(growth, model.diffusion), 4));
  const rate = fastRate(model.drift, model.diffusion, growth, discriminant);
  const unit = scale(multiply(rate, rate), model.diffusion);
  const strength = divide(pair(model.rate), unit);
  const damping = divide(drift, scale(rate, model.diffusion));
  return { law, p, rate, damping, strength, pull: multiply(strength, law.excess) };
}

/** p > 0 with M(p) = (mean − 1) p, from double precision to double-doubles by Newton's method. */
function survivingRoot(law: Branching): Pair {
  let p: Pair = ONE;
  if (law.law === "finite" && (law.aboutZero[0]?.[0] ?? 0) === 0) return p;
  for (let round = 0; round < 100; round += 1) {
    const { value, derivative } = nonlinearity(law, p[0]);
    const step = (value - law.excess[0] * p[0]) / (derivative - law.excess[0]);
    p = pair(p[0] - step);
    if (Math.abs(step) <= Number.EPSILON * p[0]) break;
  }
  for (let round = 0; round < 3; round += 1) {
    const series = new PairSeries(1);
    series.set(0, p);
    const residual = subtract(pairComposer(law, series)(0), multiply(law.excess, p));
    p = subtract(p, divide(residual, pair(nonlinearity(law, p[0]).derivative - law.excess[0])));
  }
  return p;
}

/** M′(p). */
function slopeOfM(law: Branching, p: Pair): Pair {
  const series = new PairSeries(2);
  const compose = pairComposer(law, series);
  series.set(0, p);
  compose(0);
  series.set(1, ONE);
  return compose(1);
}

/** u = p − z + …: (k² − damping k + pull) u_k = strength [z^k] M(u), whose own u_k is moved to the left. */
function farSeries({ law, p, damping, pull, strength }: Equation): PairSeries {
  const u = new PairSeries(ORDER + 1);
  const compose = pairComposer(law, u);
  const linear = multiply(strength, slopeOfM(law, p));
  u.set(0, p);
  compose(0);
  u.set(1, pair(-1));
  compose(1);
  for (let k = 2; k <= ORDER; k += 1) {
    const source = multiply(strength, compose(k));
    const bracket = add(subtract(pair(k * k), scale(damping, k)), subtract(pull, linear));
    u.set(k, divide(source, bracket));
    compose(k);
  }
  return u;
}

/** Largest |c_k|^{1/k} of the last coefficients: one over the radius of convergence. */
function growthOf(series: PairSeries): number {
  let largest = 1;
  for (let k = ORDER - 3; k <= ORDER; k += 1) largest = Math.max(largest, Math.abs(series.high[k] ?? 0) ** (1 / k));
  return largest;
}

function expandAt({ law, damping, pull, strength }: Equation, value: Pair, slope: Pair): PairSeries {
  const c = new PairSeries(ORDER + 1);
  const compose = pairComposer(law, c);
  c.set(0, value);
  c.set(1, slope);
  for (let k = 0; k + 2 <= ORDER; k += 1) {
    const drag = add(multiply(pull, c.at(k)), scale(multiply(damping, c.at(k + 1)), k + 1));
    c.set(k + 2, divide(subtract(multiply(strength, compose(k)), drag), pair((k + 1) * (k + 2))));
  }
  return c;
}

/** The step over which the last terms stay below the tolerance, relative to the larger of u and its slope. */
function stepOf(c: PairSeries): number {
  const size = Math.max(Math.abs(c.high[0] ?? 0), Math.abs(c.high[1] ?? 0));
  let length = ORDER / 4;
  for (const k of [ORDER - 1, ORDER]) {
    const last = Math.abs(c.high[k] ?? 0);
    if (last > 0) length = Math.min(length, ((TOLERANCE * size) / last) ** (1 / k));
  }
  return length;
}

/** h in (0, length] with u(ξ − h) = 0; u increases with ξ. */
function zeroOf(c: PairSeries, length: number): Pair {
  let near = 0;
  let far = length;
  for (let round = 0; round < 20; round += 1) {
    const middle = (near + far) / 2;
    if (c.evaluate(pair(-middle), ORDER).value[0] > 0) near = middle;
    else far = middle;
  }
  let h: Pair = pair((near + far) / 2);
  for (let round = 0; round < NEWTON_STEPS; round += 1) {
    const { value, derivative } = c.evaluate(negate(h), ORDER);
    h = add(h, divide(value, derivative));
  }
  return h;
}

function horner(coefficients: Float64Array, h: number): number {
  let value = 0;
  for (let k = coefficients.length - 1; k >= 0; k -= 1) value = value * h + (coefficients[k] ?? 0);
  return value;
}

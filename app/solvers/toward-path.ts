import type { Linearised, Normalised } from "./linear.ts";
import { type NodeChart, nodeChart } from "./node-chart.ts";
import { type NodeKnot, type Passed, passThrough } from "./node-passage.ts";
import {
  add,
  divide,
  exponential,
  logarithm,
  multiply,
  negate,
  ONE,
  pair,
  scale,
  squareRoot,
  subtract,
  toNumber,
} from "./pairs.ts";
import { followBelow, plain } from "./path.ts";
import { type Saddle, saddleOf } from "./saddle.ts";
import { normaliseAt } from "./saddle-path.ts";
import type { Knot, Pair, ProcessModel } from "./types.ts";
import { firstKnot, type OriginSeries, originSeries, type PairKnot, type WalkSettings, walk } from "./walk.ts";

/** The trajectory of the regime `toward`, from the saddle q into the node 1. */
export interface TowardPath {
  readonly saddle: Saddle;
  readonly normalised: Normalised;
  readonly origin: OriginSeries;
  readonly below: Knot[];
  readonly above: Knot[];
  /** B_0, and du/dξ where w = 0; of no meaning where q = 0 */
  readonly amplitude: Pair;
  readonly slope: Pair;
  /** λ_s and λ_b/λ_s */
  readonly slow: Pair;
  readonly index: Pair;
  readonly chart: NodeChart;
  readonly passed: Passed;
}

/** How near to w = 1 the walk goes, as a share of 1 − q: the chart's series is met on the way, at several knots. */
const INNERMOST = 2 ** -10;
const OUTERMOST = 3 / 4;

/** λ_s = (−drift − √discriminant)/(2 D) and d = λ_b/λ_s, without cancellation.
 *  Source: the linear equation at w = 1, D r² + drift r + f'(1) = 0. */
export function nodeRates(model: ProcessModel, { growth, discriminant }: Linearised): { slow: Pair; index: Pair } {
  const sum = add(pair(-model.drift), squareRoot(discriminant));
  if (discriminant[0] === 0) return { slow: divide(scale(growth, 2), sum), index: ONE };
  return {
    slow: divide(scale(growth, 2), sum),
    index: divide(multiply(sum, sum), scale(scale(growth, model.diffusion), 4)),
  };
}

/** Follows the trajectory of a model in the regime `toward`.
 *  @throws SolverError "not_converged" where a walk does not end. */
export function followToward(model: ProcessModel, linear: Linearised, settings: WalkSettings): TowardPath {
  const saddle = saddleOf(linear.law);
  const normalised = normaliseAt(model, linear, saddle);
  const { slow, index } = nodeRates(model, linear);
  const origin = originSeries(normalised, settings);
  const start = negate(logarithm(pair(origin.reach)));
  const { knots: below, barrier } = followBelow(normalised, firstKnot(origin, 1, settings.order, start), settings);
  const { centre, scale: q } = saddle.base;
  // u = 1 − w = offset + q û
  const offset = subtract(ONE, scale(q, centre));
  const share = multiply(q, divide(normalised.decay, slow));
  const atNode = (knot: PairKnot): NodeKnot => ({
    xi: knot.xi,
    u: add(offset, multiply(q, knot.u)),
    slope: multiply(share, knot.slope),
  });
  const first = firstKnot(origin, -1, settings.order, start);
  const above = [plain(first)];
  const near: NodeKnot[] = [];
  const size = toNumber(offset);
  const whole = size === 0 ? 1 : size;
  walk(
    normalised,
    first,
    settings,
    (knot) => atNode(knot).u[0] < INNERMOST * whole,
    (_, __, to) => {
      above.push(plain(to));
      const knot = atNode(to);
      if (knot.u[0] < OUTERMOST * whole) near.push(knot);
    },
  );
  const chart = nodeChart(linear.law, index);
  const passed = passThrough(chart, near, divide(slow, normalised.decay));
  return {
    saddle,
    normalised,
    origin,
    below,
    above,
    amplitude: exponential(negate(barrier.xi)),
    slope: barrier.slope,
    slow,
    index,
    chart,
    passed,
  };
}

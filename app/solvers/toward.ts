import { SolverError } from "./errors.ts";
import { HALF_UNIT } from "./input-rounding.ts";
import { type Linearised, linearise } from "./linear.ts";
import { divide, logarithm, multiply, negate, ONE, subtract, toNumber, ZERO } from "./pairs.ts";
import { inexactInputs, NUDGES } from "./saddle-path.ts";
import { COARSE_WALK } from "./spreads.ts";
import { followToward, type TowardPath } from "./toward-path.ts";
import type { Pair, ProcessModel, Trajectory } from "./types.ts";
import { FULL_WALK } from "./walk.ts";

/** Two walks may differ by this, as in spreads.ts. */
const AGREEMENT = 1e-7;

/** Solves the trajectory of the regime `toward`: every line is absorbed or dies out, K is finite, w(x, s) runs from the saddle q into
 *  the node w = 1, which it reaches for no x, and E[s^K] is infinite for every s > 1.
 *  Source: P. Maillard, Ann. Inst. H. Poincaré Probab. Stat. 49 (2013) 428–455, for the radius of convergence, which is 1.
 *  @throws SolverError "not_converged" where a walk does not end, or two of them disagree. */
export function solveToward(model: ProcessModel, linear: Linearised): Trajectory {
  const path = followToward(model, linear, FULL_WALK);
  const coarse = followToward(model, linear, COARSE_WALK);
  if (!(Math.abs(shift(path, coarse)) < AGREEMENT))
    throw new SolverError(
      "not_converged",
      "Two walks of the trajectory, one coarse and one fine, do not agree; its constants cannot be vouched for.",
    );
  const spread = spreadsOf(model, linear, coarse);
  const { saddle, normalised, origin, passed } = path;
  const fromZero = saddle.base.centre === 0;
  return {
    model,
    regime: "toward",
    base: { ...saddle.base, scaleSpread: spread.scale },
    decay: normalised.decay,
    ratio: normalised.ratio,
    strength: normalised.strength,
    series: Array.from(origin.series.high),
    seriesScale: origin.scale,
    seriesReach: origin.reach,
    below: path.below,
    above: path.above,
    amplitude: fromZero ? ONE : path.amplitude,
    slopeAtBarrier: fromZero ? ZERO : multiply(saddle.base.scale, multiply(negate(path.slope), normalised.decay)),
    turning: { refused: RADIUS_ONE },
    edge: null,
    passage: {
      slow: path.slow,
      index: path.index,
      ...passed,
      slowSpread: spread.slow,
      indexSpread: spread.index,
      shiftSpread: spread.shift,
    },
    decaySpread: spread.decay,
    amplitudeSpread: spread.amplitude,
    slopeSpread: spread.slope,
  };
}

/** Why s ends at 1. */
export const RADIUS_ONE =
  "With this drift toward the barrier the tail of K is a power of n: E[s^K] is infinite for every s above 1, and s0 = 1 is no turning point.";

/** Change of ln ζ at a fixed ξ. */
function shift(a: TowardPath, b: TowardPath): number {
  const at = ({ passed, slow, normalised }: TowardPath): Pair =>
    subtract(logarithm(passed.zeta), multiply(passed.xi, divide(slow, normalised.decay)));
  return toNumber(subtract(at(a), at(b)));
}

interface TowardSpreads {
  decay: number;
  amplitude: number;
  slope: number;
  scale: number;
  slow: number;
  index: number;
  shift: number;
}

/** Sums of the changes of each constant as one input after another moves by half a unit in its last place. */
function spreadsOf(model: ProcessModel, linear: Linearised, from: TowardPath): TowardSpreads {
  const total: TowardSpreads = { decay: 0, amplitude: 0, slope: 0, scale: 0, slow: 0, index: 0, shift: 0 };
  for (const nudged of inexactInputs(model)) {
    const found = nudgedPath(nudged, from);
    const { moved, share } = found;
    const change = (a: Pair, b: Pair) => (a[0] === 0 ? 0 : Math.abs(toNumber(divide(subtract(a, b), a))) * share);
    const ownScale = change(from.saddle.base.scale, moved.saddle.base.scale);
    total.scale += ownScale;
    total.decay += change(from.normalised.decay, moved.normalised.decay);
    total.amplitude += change(from.amplitude, moved.amplitude) + ownScale;
    total.slope += change(from.slope, moved.slope) + ownScale;
    total.slow += change(from.slow, moved.slow);
    total.index += change(from.index, moved.index);
    total.shift += Math.abs(shift(from, moved)) * share;
  }
  // a drift taken as critical is so within a few units of its square, on which everything depends smoothly
  const taken = linear.discriminant[0] === 0 ? CRITICAL_UNITS * HALF_UNIT : 0;
  return {
    ...total,
    slope: total.slope + total.decay,
    slow: total.slow + taken,
    index: total.index + taken,
    shift: total.shift + taken,
  };
}

const CRITICAL_UNITS = 16;

/** The process with one input a little off, in the same regime and with the same integer next to d. */
function nudgedPath(nudged: (factor: number) => ProcessModel, from: TowardPath): { moved: TowardPath; share: number } {
  for (const nudge of NUDGES) {
    const model = nudged(1 + nudge);
    const linear = linearise(model);
    if (linear.regime !== "toward") continue;
    const moved = followToward(model, linear, COARSE_WALK);
    if (moved.chart.nearest === from.chart.nearest) return { moved, share: HALF_UNIT / Math.abs(nudge) };
  }
  return { moved: from, share: 0 };
}

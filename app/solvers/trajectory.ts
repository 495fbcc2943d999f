import { type Linearised, linearise, normalise } from "./linear.ts";
import { multiply, negate, ONE, ZERO } from "./pairs.ts";
import { follow } from "./path.ts";
import { FROM_ONE } from "./saddle.ts";
import { followSaddle } from "./saddle-path.ts";
import { constantSpreads } from "./spreads.ts";
import { solveToward } from "./toward.ts";
import type { Answer, Edge, ProcessModel, Trajectory } from "./types.ts";
import { FULL_WALK } from "./walk.ts";

/** Solves the trajectory of D w″ + drift w′ + f(w) = 0 that leaves w = 1 along its fast direction, in the regime `away`; in the
 *  regime `between` the one that leaves the saddle q, on which w(x, s) = E_x[s^K; K finite] passes through 1 and turns back at s0; in
 *  the regime `toward` the one from q into w = 1.
 *
 *  Method: power series of u = 1 − w in z = e^{−decay x}, then Taylor steps towards the barrier, the stable direction,
 *  in double-doubles; on z > 0 past w = 0 (amplitude B_0, slope at the barrier), on z < 0 up to where w turns back (s0).
 *  Source: J. Berestycki, É. Brunet, S. C. Harris, P. Miłoś, J. Funct. Anal. 273 (2017) 2107–2143, for the trajectory.
 *  @returns the trajectory, or the reason why this regime has none.
 *  @throws SolverError "bad_parameter" on misuse, "not_converged" where the walk does not end or fails its check. */
export function solveTrajectory(model: ProcessModel): Answer<Trajectory> {
  const linear = linearise(model);
  if (linear.regime === "between") return solveBetween(model, linear);
  if (linear.regime === "toward") return solveToward(model, linear);
  if (linear.regime !== "away") return linear.regime;
  const n = normalise(model, linear);
  const path = follow(n, FULL_WALK);
  const spread = constantSpreads(model, linear, path);
  return {
    model,
    regime: "away",
    base: FROM_ONE,
    decay: n.decay,
    ratio: n.ratio,
    strength: n.strength,
    series: Array.from(path.origin.series.high),
    seriesScale: path.origin.scale,
    seriesReach: path.origin.reach,
    below: path.below,
    above: path.above,
    amplitude: path.amplitude,
    slopeAtBarrier: multiply(negate(path.slope), n.decay),
    turning: path.turning === null ? { refused: whyNot(path.edge) } : { ...path.turning, ...spread.turning },
    edge: path.edge,
    passage: null,
    decaySpread: spread.decay,
    amplitudeSpread: spread.amplitude,
    slopeSpread: spread.slope,
  };
}

function solveBetween(model: ProcessModel, linear: Linearised): Trajectory {
  const { saddle, normalised, path, spreads } = followSaddle(model, linear);
  const fromZero = saddle.base.centre === 0;
  return {
    model,
    regime: "between",
    base: { ...saddle.base, scaleSpread: spreads.scale },
    decay: normalised.decay,
    ratio: normalised.ratio,
    strength: normalised.strength,
    series: Array.from(path.origin.series.high),
    seriesScale: path.origin.scale,
    seriesReach: path.origin.reach,
    below: path.below,
    above: path.above,
    // w(x, 0) = 0 where nobody dies childless: no constant to tell
    amplitude: fromZero ? ONE : path.amplitude,
    slopeAtBarrier: fromZero ? ZERO : multiply(saddle.base.scale, multiply(negate(path.slope), normalised.decay)),
    turning: path.turning === null ? { refused: whyNot(path.edge) } : { ...path.turning, ...spreads.turning },
    edge: path.edge,
    passage: null,
    decaySpread: spreads.decay,
    amplitudeSpread: spreads.amplitude,
    slopeSpread: spreads.slope,
  };
}

function whyNot(edge: Edge | null): string {
  if (edge === null) return STERILE;
  if (edge.kind === "pole")
    return `s0 lies within a millionth of ${edge.s}, the pole of the geometric law, and is not told apart from it: the n^(−3/2) law begins only beyond n of the order of a million. A smaller drift would do.`;
  return `With mean offspring below 1 and this drift toward the barrier, w(x, s) never turns back: it ends at s = ${edge.s}, the second root of G(s) = s, and the tail is not of the n^(−3/2) kind. A drift further away from the barrier would do.`;
}

const STERILE =
  "No particle ever has two or more children, so at most the particles present at the start are absorbed: w is a polynomial in s, s0 is infinite and there is no tail.";

import { HALF_UNIT, inputUnit, lawUnit } from "./input-rounding.ts";
import { fastRate, type Linearised, linearise } from "./linear.ts";
import { growthSpread, rateSpread } from "./linear-spread.ts";
import { type Branching, nonlinearity } from "./offspring.ts";
import { pair, scale, squareRoot, toNumber } from "./pairs.ts";
import type { Answer, Estimate, Pair, ProcessDescription, ProcessModel } from "./types.ts";

/** What is known of a process at once: means, rates, regime, limits.
 *  Units: malthusian 1/time, criticalDrift length/time, decay and farDecay 1/length, the rest pure numbers.
 *  Source: J. Berestycki, É. Brunet, S. C. Harris, P. Miłoś, J. Funct. Anal. 273 (2017) 2107–2143; T. E. Harris,
 *  The Theory of Branching Processes (1963), chapter I, for the extinction probability.
 *  @throws SolverError "bad_parameter" for a parameter that is not finite, a rate or diffusion ≤ 0, or no offspring law. */
export function describeProcess(model: ProcessModel): ProcessDescription {
  const linear = linearise(model);
  const { law, growth, regime } = linear;
  const relative = growthSpread(model, law);
  const extinctionProbability = extinction(law);
  return {
    meanOffspring: estimate(law.mean, 2 * lawUnit(model.offspring)),
    malthusian: estimate(growth, relative),
    criticalDrift: criticalDrift(model, growth, relative),
    regime,
    decay: decay(model, linear, relative),
    farDecay: farDecay(model, linear, extinctionProbability, relative),
    limit: regime === "away" || growth[0] <= 0 ? { value: 1, error: 0 } : extinctionProbability,
    extinctionProbability,
  };
}

/** A pair read as a double, with a relative spread of the inputs added to its rounding. */
function estimate(x: Pair, spread: number): Estimate {
  const value = toNumber(x);
  return { value, error: Math.abs(value) * (spread + HALF_UNIT) };
}

function criticalDrift(model: ProcessModel, growth: Pair, relative: number): Answer<Estimate> {
  if (growth[0] < 0)
    return { refused: "The Malthusian parameter is negative: every drift is away, and there is no critical drift." };
  return estimate(squareRoot(scale(scale(growth, model.diffusion), 4)), (relative + inputUnit(model.diffusion)) / 2);
}

function decay(model: ProcessModel, linear: Linearised, relative: number): Answer<Estimate> {
  if (linear.regime !== "away")
    return {
      refused:
        typeof linear.regime === "string"
          ? `The decay rate belongs to a drift away from the barrier; here the regime is ${linear.regime}.`
          : linear.regime.refused,
    };
  return estimate(
    fastRate(model.drift, model.diffusion, linear.growth, linear.discriminant),
    rateSpread(model, linear.growth[0], linear.discriminant[0], relative),
  );
}

function farDecay(model: ProcessModel, linear: Linearised, q: Estimate, relative: number): Answer<Estimate> {
  if (linear.regime === "away") return decay(model, linear, relative);
  if (linear.growth[0] === 0)
    return {
      refused:
        "The limit is approached only as a power of x where the mean offspring is 1 and the drift is not above 0.",
    };
  // Near w = q the growth f'(q) = rate (G'(q) − 1) is negative, a saddle; G'(q) = mean − M'(1 − q).
  const m = nonlinearity(linear.law, 1 - q.value);
  const slope = linear.law.excess[0] - m.derivative;
  const growth = model.rate * slope;
  const discriminant = model.drift ** 2 - 4 * model.diffusion * growth;
  const rate = toNumber(fastRate(model.drift, model.diffusion, pair(growth), pair(discriminant)));
  const curvature = linear.law.mean[0] * (1 + linear.law.mean[0]);
  const uncertain = (curvature * q.error + 8 * HALF_UNIT * linear.law.mean[0]) / Math.abs(slope);
  return { value: rate, error: rate * (rateSpread(model, growth, discriminant, uncertain) + 4 * HALF_UNIT) };
}

/** The smallest root q of G(q) = q. With p = 1 − q it is M(p) = (mean − 1) p, solved from p = 1 downward by Newton's method on a convex function. */
function extinction(law: Branching): Estimate {
  const excess = law.excess[0];
  if (law.law === "finite" && (law.aboutZero[0]?.[0] ?? 0) === 0) return { value: 0, error: 0 };
  if (excess <= 0) return { value: 1, error: 0 };
  let p = 1;
  for (let round = 0; round < NEWTON_ROUNDS; round += 1) {
    const { value, derivative } = nonlinearity(law, p);
    const step = (value - excess * p) / (derivative - excess);
    p -= step;
    if (Math.abs(step) <= Number.EPSILON * p) break;
  }
  const { derivative } = nonlinearity(law, p);
  // The residual is known to a few roundings of its terms, G(q) − q included; the probabilities carry their own half units.
  const terms = 8 * HALF_UNIT * (2 + law.mean[0]);
  return {
    value: 1 - p,
    error: (terms * Math.min(1, p * (1 + law.mean[0]))) / Math.abs(derivative - excess) + HALF_UNIT,
  };
}

/** Quadratic convergence from p = 1; near a critical law the first steps halve the distance. */
const NEWTON_ROUNDS = 100;

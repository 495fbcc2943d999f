import { SolverError } from "./errors.ts";
import { type Branching, prepareOffspring } from "./offspring.ts";
import { add, divide, multiply, negate, ONE, pair, scale, squareRoot, subtract, ZERO } from "./pairs.ts";
import type { Answer, Pair, ProcessModel, Regime } from "./types.ts";

/** The linear equation near w = 1, D u″ + drift u′ + f'(1) u = 0, and which regime its roots put the process in. */
export interface Linearised {
  readonly law: Branching;
  /** f'(1) = rate (mean − 1) [1/time] */
  readonly growth: Pair;
  /** drift² − 4 D f'(1) [length²/time²]; exactly 0 where the drift is critical within the rounding of the inputs */
  readonly discriminant: Pair;
  readonly regime: Answer<Regime>;
}

/** A drift whose discriminant is within this of 0, relative to drift², was meant to be critical:
 *  the roots depend on the square root of the discriminant, and its last digits are those of the inputs' rounding. */
const CRITICAL_TOLERANCE = 4 * Number.EPSILON;

/** Checks a model and classifies it.
 *  Source: J. Berestycki, É. Brunet, S. C. Harris, P. Miłoś, J. Funct. Anal. 273 (2017) 2107–2143, for the three regimes.
 *  @throws SolverError "bad_parameter" when a parameter is not finite, rate ≤ 0, diffusion ≤ 0, or the offspring law is none. */
export function linearise(model: ProcessModel): Linearised {
  if (!Number.isFinite(model.drift))
    throw new SolverError("bad_parameter", `The drift is ${model.drift}; it must be a finite number.`);
  requirePositive("rate", model.rate);
  requirePositive("diffusion", model.diffusion);
  const law = prepareOffspring(model.offspring);
  const growth = scale(law.excess, model.rate);
  const drift = pair(model.drift);
  const square = multiply(drift, drift);
  const exact = subtract(square, scale(scale(growth, model.diffusion), 4));
  const critical = growth[0] > 0 && Math.abs(exact[0]) < CRITICAL_TOLERANCE * square[0];
  const discriminant = critical ? ZERO : exact;
  return { law, growth, discriminant, regime: classify(growth[0], model.drift, discriminant[0]) };
}

function requirePositive(name: string, value: number): void {
  if (!(Number.isFinite(value) && value > 0))
    throw new SolverError("bad_parameter", `The ${name} is ${value}; it must be a finite number above 0.`);
}

function classify(growth: number, drift: number, discriminant: number): Answer<Regime> {
  if (growth < 0) return "away";
  if (growth === 0) {
    if (drift > 0) return "away";
    return {
      refused: `With mean offspring 1 and drift ${drift} ≤ 0 the profile approaches its limit only as a power of x, which this solver does not treat. A drift above 0 would do.`,
    };
  }
  if (discriminant < 0) return "between";
  return drift > 0 ? "away" : "toward";
}

/** The root rate (drift + √discriminant)/(2 D) [1/length], without cancellation for either sign of the drift.
 *  @param growth f' at the state approached, so that discriminant = drift² − 4 D growth ≥ 0 */
export function fastRate(drift: number, diffusion: number, growth: Pair, discriminant: Pair): Pair {
  const root = squareRoot(discriminant);
  if (drift >= 0) return divide(add(pair(drift), root), scale(pair(diffusion), 2));
  return divide(scale(negate(growth), 2), subtract(root, pair(drift)));
}

/** The numbers on which the normalised trajectory depends, see Trajectory. */
export interface Normalised {
  readonly law: Branching;
  readonly decay: Pair;
  readonly ratio: Pair;
  readonly strength: Pair;
  /** u as far as the trajectory is followed below w = 1: s = −1 */
  readonly lowest?: number;
  /** Whether the trajectory must turn back, however near a fixed point it passes. */
  readonly turns?: true;
}

/** decay, ratio = f'(1)/(D decay²) and strength = rate/(D decay²) in the regime `away`. */
export function normalise(model: ProcessModel, linear: Linearised): Normalised {
  const { law, growth, discriminant } = linear;
  const decay = fastRate(model.drift, model.diffusion, growth, discriminant);
  const unit = scale(multiply(decay, decay), model.diffusion);
  // at the critical drift both rates are one, whatever the last digits of the inputs; the drift itself then drops out
  if (growth[0] > 0 && discriminant[0] === 0) return { law, decay, ratio: ONE, strength: divide(ONE, law.excess) };
  return { law, decay, ratio: divide(growth, unit), strength: divide(pair(model.rate), unit) };
}

import { HALF_UNIT, inputUnit } from "./input-rounding.ts";
import { type Linearised, linearise, type Normalised, normalise } from "./linear.ts";
import { add, divide, multiply, pair, scale, subtract, toNumber } from "./pairs.ts";
import { follow, type Path } from "./path.ts";
import { type Saddle, saddleOf } from "./saddle.ts";
import { COARSE_WALK, checkAgreement, type Spreads } from "./spreads.ts";
import type { Offspring, Pair, ProcessModel } from "./types.ts";
import { FULL_WALK } from "./walk.ts";

/** A trajectory that leaves the saddle q: its numbers, and what the inputs' rounding does to them. */
export interface SaddlePath {
  readonly saddle: Saddle;
  readonly normalised: Normalised;
  readonly path: Path;
  readonly spreads: Spreads & { readonly scale: number };
}

/** Relative change of one input from which the spread of the constants is measured. */
export const NUDGES = [2 ** -20, -(2 ** -20), 2 ** -30, -(2 ** -30)];

/** Follows the trajectory that leaves q, of a law whose mean is above 1.
 *  @throws SolverError "not_converged" where the walk does not end or fails its check. */
export function followSaddle(model: ProcessModel, linear: Linearised): SaddlePath {
  const saddle = saddleOf(linear.law);
  const normalised = normaliseAt(model, linear, saddle);
  const path = follow(normalised, FULL_WALK);
  const coarse = follow(normalised, COARSE_WALK);
  checkAgreement(path, coarse);
  return { saddle, normalised, path, spreads: spreadsOf(model, linear, { saddle, normalised, path: coarse }) };
}

/** decay, ratio and strength at the saddle, where f'(q) < 0. */
export function normaliseAt(model: ProcessModel, linear: Linearised, { base, law }: Saddle): Normalised {
  const growth = scale(law.excess, model.rate);
  const drift = pair(model.drift);
  const discriminant = subtract(multiply(drift, drift), scale(scale(growth, model.diffusion), 4));
  const n = normalise(model, { ...linear, law, growth, discriminant });
  const lowest = base.centre === 0 ? 1 : 1 + 1 / base.scale[0];
  return linear.regime === "between" ? { ...n, lowest, turns: true } : { ...n, lowest };
}

interface Followed {
  readonly saddle: Saddle;
  readonly normalised: Normalised;
  readonly path: Path;
}

/** Sums of the changes of each constant as one input after another moves by half a unit in its last place. */
function spreadsOf(model: ProcessModel, linear: Linearised, from: Followed): Spreads & { readonly scale: number } {
  const total = { decay: 0, amplitude: 0, slope: 0, excess: 0, turningAmplitude: 0, scale: 0 };
  for (const nudged of inexactInputs(model)) {
    const { moved, share } = nudgedPath(nudged, linear);
    const change = (a: Pair, b: Pair) => Math.abs(toNumber(divide(subtract(a, b), a))) * share;
    const ownScale = change(from.saddle.base.scale, moved.saddle.base.scale);
    total.scale += ownScale;
    total.decay += change(from.normalised.decay, moved.normalised.decay);
    total.amplitude += change(from.path.amplitude, moved.path.amplitude) + ownScale;
    total.slope += change(from.path.slope, moved.path.slope) + ownScale;
    if (from.path.turning === null || moved.path.turning === null) continue;
    // the radius is scale·s0: its change is told as one of s0 − centre
    const radius = (f: Followed) => multiply(f.saddle.base.scale, f.path.turning?.s0 ?? pair(1));
    const { s0, excess, amplitude } = from.path.turning;
    total.excess += change(radius(from), radius(moved)) * (s0[0] / excess[0]);
    total.turningAmplitude += change(amplitude, moved.path.turning.amplitude) + ownScale;
  }
  return {
    decay: total.decay,
    amplitude: total.amplitude,
    slope: total.slope + total.decay,
    turning: { excessSpread: total.excess, amplitudeSpread: total.turningAmplitude },
    scale: total.scale,
  };
}

/** The process with one input a little off, in the same regime. */
function nudgedPath(nudged: (factor: number) => ProcessModel, linear: Linearised): { moved: Followed; share: number } {
  const tried = NUDGES.map((nudge) => {
    const model = nudged(1 + nudge);
    return { nudge, model, linear: linearise(model) };
  });
  const found = tried.find((t) => t.linear.regime === linear.regime) ?? (tried[0] as (typeof tried)[number]);
  const saddle = saddleOf(found.linear.law);
  const normalised = normaliseAt(found.model, { ...found.linear, regime: linear.regime }, saddle);
  const path = follow(normalised, COARSE_WALK);
  return { moved: { saddle, normalised, path }, share: HALF_UNIT / Math.abs(found.nudge) };
}

/** One function for each input that the double may have rounded: the model with it multiplied by a factor. */
export function inexactInputs(model: ProcessModel): ((factor: number) => ProcessModel)[] {
  const { drift, rate, diffusion, offspring } = model;
  const inputs: ((factor: number) => ProcessModel)[] = [];
  if (inputUnit(drift) > 0) inputs.push((factor) => ({ ...model, drift: drift * factor }));
  if (inputUnit(rate) > 0) inputs.push((factor) => ({ ...model, rate: rate * factor }));
  if (inputUnit(diffusion) > 0) inputs.push((factor) => ({ ...model, diffusion: diffusion * factor }));
  if (offspring.law !== "finite") {
    const { mean } = offspring;
    if (inputUnit(mean) > 0) inputs.push((factor) => ({ ...model, offspring: { ...offspring, mean: mean * factor } }));
    return inputs;
  }
  offspring.probabilities.forEach((p, k) => {
    if (inputUnit(p) > 0)
      inputs.push((factor) => ({ ...model, offspring: withProbability(offspring.probabilities, k, p * factor) }));
  });
  return inputs;
}

function withProbability(probabilities: readonly number[], k: number, p: number): Offspring {
  const others = probabilities.reduce((sum, other, i) => (i === k ? sum : sum + other), 0);
  const total = toNumber(add(pair(others), pair(p)));
  return { law: "finite", probabilities: probabilities.map((other, i) => (i === k ? p : other) / total) };
}

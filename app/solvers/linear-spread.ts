import { inputUnit, lawUnit } from "./input-rounding.ts";
import type { Branching } from "./offspring.ts";
import type { ProcessModel } from "./types.ts";

/** What the rounding of the inputs does to the rates of the linear equation at w = 1: first-order bounds, relative. */

/** Relative change of f'(1) = rate (mean − 1): the mean is a sum of larger terms than its excess over 1. */
export function growthSpread(model: ProcessModel, law: Branching): number {
  const excess = Math.abs(law.excess[0]);
  if (excess === 0) return 0;
  return inputUnit(model.rate) + lawUnit(model.offspring) * (1 + (law.mean[0] + 1) / excess);
}

/** Absolute change of √discriminant, discriminant = drift² − 4 D growth; 0 where the drift was taken as critical.
 *  @param relative that of the growth */
export function rootSpread(model: ProcessModel, growth: number, discriminant: number, relative: number): number {
  if (discriminant === 0) return 0;
  const { drift, diffusion } = model;
  const change =
    2 * inputUnit(drift) * drift * drift + 4 * diffusion * Math.abs(growth) * (relative + inputUnit(diffusion));
  return change / (2 * Math.sqrt(discriminant));
}

/** A drift this near the critical one, relative, is taken for it: its square to 4 ε. */
const CRITICAL_DRIFT = 2 * Number.EPSILON;

/** Relative change of the root rate (drift + √discriminant)/(2 D). */
export function rateSpread(model: ProcessModel, growth: number, discriminant: number, relative: number): number {
  // where the drift was taken as critical, it may be off the critical one by as much as that allows, and that by its own inputs
  if (growth > 0 && discriminant === 0) return CRITICAL_DRIFT + (relative + inputUnit(model.diffusion)) / 2;
  const root = Math.sqrt(discriminant);
  const shift = rootSpread(model, growth, discriminant, relative) + inputUnit(model.drift) * Math.abs(model.drift);
  const share = shift / (Math.abs(model.drift) + root);
  return model.drift >= 0 ? share + inputUnit(model.diffusion) : share + relative;
}

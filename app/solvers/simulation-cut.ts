import { linearise } from "./linear.ts";
import { toNumber } from "./pairs.ts";
import type { Offspring, ProcessModel, Start } from "./types.ts";

/** The linear equation D u″ + drift u′ + f'(1) u = 0 in doubles, with what second moments need. */
export interface Spread {
  readonly model: ProcessModel;
  /** mean number of children */
  readonly mean: number;
  /** f'(1) [1/time] */
  readonly growth: number;
  /** S = √(drift² − 4 D f'(1)) [length/time]; NaN where that is below 0 */
  readonly root: number;
  /** f''(1) = rate E[children (children − 1)] [1/time] */
  readonly curvature: number;
}

/** @throws SolverError "bad_parameter" when the model is none */
export function spreadOf(model: ProcessModel): Spread {
  const linear = linearise(model);
  const mean = toNumber(linear.law.mean);
  return {
    model,
    mean,
    growth: toNumber(linear.growth),
    root: Math.sqrt(toNumber(linear.discriminant)),
    curvature: model.rate * pairsOfChildren(model.offspring, mean),
  };
}

/** λ = (drift + S)/(2 D), without cancellation. */
export function decayOf({ model, growth, root }: Spread): number {
  return model.drift >= 0 ? (model.drift + root) / (2 * model.diffusion) : (-2 * growth) / (root - model.drift);
}

/** Var K in the regime `away`.
 *  Source: D v″ + drift v′ + f'(1) v + f''(1) e^{−2 λ x} = 0 for v = E K(K − 1), v(0) = 0. */
export function varianceAway(spread: Spread, starts: readonly Start[]): number {
  const decay = decayOf(spread);
  return starts.reduce((sum, { position, particles }) => {
    const mean = Math.exp(-decay * position);
    const branching = (sizeBias(spread, decay) * mean * -Math.expm1(-decay * position)) / decay;
    return sum + particles * (branching + mean - mean * mean);
  }, 0);
}

/** f''(1)/(3 D λ − drift) */
function sizeBias({ model, curvature }: Spread, decay: number): number {
  return curvature / (3 * model.diffusion * decay - model.drift);
}

/** What dropping particles above a cut can change, in the regime `away`. */
export interface CutBias {
  /** bound on what E K loses, on the change of every P(K = n), and on P(K changes) */
  readonly mean: number;
  /** bound on the change of Var K */
  readonly variance: number;
}

/**
 * Bounds on what a cut changes: E K loses Σ e^{−λ z} over the particles dropped, by many-to-one
 * e^{−λ x} P(a path of drift −S from x reaches the cut before 0) at most, and P(K changes) is no larger.
 * E K² loses at most twice E[K R], R being what is lost: with K seen from the spine of R, that path's end included,
 * E[K R] ≤ (loss of E K)·(1 + f''(1)/(λ (3 D λ − drift)) + f''(1) min(1/(D λ²), 1/(S λ))).
 * Source: R. Lyons, R. Pemantle, Y. Peres, Ann. Probab. 23 (1995) 1125–1138, for the spine; Green's function of the path
 * killed at 0 times the probability to reach the cut is at most that probability times min(y/D, 1/S).
 */
export function cutBias(spread: Spread, starts: readonly Start[], cut: number): CutBias {
  const { model, root, curvature } = spread;
  const decay = decayOf(spread);
  const lost = starts.map(
    ({ position, particles }) => particles * Math.exp(-decay * position) * reachProbability(spread, position, cut),
  );
  const mean = lost.reduce((sum, loss) => sum + loss, 0);
  const along = curvature * Math.min(1 / (model.diffusion * decay * decay), 1 / (root * decay));
  const crossed = 1 + sizeBias(spread, decay) / decay + along;
  return { mean, variance: 2 * mean * crossed };
}

/** P(a path with generator D ∂² − S ∂ from x reaches `cut` before 0), 0 < x; 1 from above it. */
function reachProbability({ model, root }: Spread, x: number, cut: number): number {
  if (x >= cut) return 1;
  const rate = root / model.diffusion;
  if (rate * cut < Number.EPSILON) return x / cut;
  return (Math.exp(-rate * (cut - x)) * Math.expm1(-rate * x)) / Math.expm1(-rate * cut);
}

/** The lowest cut whose bias of E K is at most `target`, rounded up to three digits. */
export function lowestCut(spread: Spread, starts: readonly Start[], target: number): number {
  const highest = Math.max(...starts.map(({ position }) => position));
  const { diffusion, rate } = spread.model;
  const least = highest + Math.sqrt(diffusion / rate);
  return roundedUp(leastWhere((cut) => cutBias(spread, starts, cut).mean <= target, least));
}

/** The highest cut at which all replicates together take at most `steps` particle steps, rounded up to three digits. */
export function affordableCut(spread: Spread, starts: readonly Start[], steps: number): number {
  const highest = Math.max(...starts.map(({ position }) => position));
  return roundedUp(leastWhere((cut) => expectedSteps(spread, starts, cut) > steps, highest));
}

/** The least number from `from` on, to a part in a million, where a condition that stays holds. */
function leastWhere(holds: (x: number) => boolean, from: number): number {
  if (holds(from)) return from;
  let low = from;
  let high = 2 * from + 1;
  while (!holds(high) && high < Number.MAX_VALUE / 2) [low, high] = [high, 2 * high];
  while (high - low > 1e-6 * high) {
    const middle = (low + high) / 2;
    if (holds(middle)) high = middle;
    else low = middle;
  }
  return high;
}

function roundedUp(x: number): number {
  const near = Number(x.toPrecision(3));
  return near >= x ? near : Number((x + 10 ** (Math.floor(Math.log10(x)) - 2)).toPrecision(3));
}

/**
 * Expected particle steps of one replicate; Infinity where it passes the double's range. `cut` null: none is dropped, in the
 * regime `toward` or where the mean offspring is below 1.
 * Source: N = 1 + E[mean·N at a branching not above the cut] solves D N″ + drift N′ + f'(1) N + rate = 0 below the cut with
 * N(0) = 1, and above it N − 1 falls as e^{−η x}, D η² − drift η = rate; N is continuously differentiable.
 */
export function expectedSteps(spread: Spread, starts: readonly Start[], cut: number | null): number {
  const below = cut === null ? uncutSteps(spread) : cutSteps(spread, cut);
  return starts.reduce((sum, { position, particles }) => sum + (position === 0 ? 0 : particles * below(position)), 0);
}

function uncutSteps({ model, mean, root, growth }: Spread): (x: number) => number {
  // The root that leaves N least: (drift − S)/(2 D) where the drift is toward the barrier, (drift + S)/(2 D) where f'(1) < 0.
  const rate = growth > 0 ? (2 * growth) / (model.drift - root) : (model.drift + root) / (2 * model.diffusion);
  return (x) => (mean * Math.exp(-rate * x) - 1) / (mean - 1);
}

function cutSteps({ model, mean, root, growth }: Spread, cut: number): (x: number) => number {
  const { drift, diffusion, rate } = model;
  const beyond = (drift + Math.sqrt(drift * drift + 4 * diffusion * rate)) / (2 * diffusion);
  if (growth === 0) {
    const fall = drift / diffusion;
    const slope = rate / drift;
    const left = Math.exp(-fall * cut);
    const b = (slope * (1 + beyond * cut)) / (left + (beyond / fall) * (1 - left));
    return (x) => 1 - (b / fall) * Math.expm1(-fall * x) - slope * x;
  }
  // N = −1/(mean − 1) + e^{−a x} (A cosh θx + B sinh(θx)/θ), scaled by e^{−θ cut} at the cut.
  const a = drift / (2 * diffusion);
  const theta = root / (2 * diffusion);
  const amplitude = mean / (mean - 1);
  const cosh = (1 + Math.exp(-2 * theta * cut)) / 2;
  const sinh = theta * cut < Number.EPSILON ? cut : -Math.expm1(-2 * theta * cut) / (2 * theta);
  const b =
    (beyond * amplitude * Math.exp((a - theta) * cut) - amplitude * (theta * theta * sinh - a * cosh + beyond * cosh)) /
    (cosh - a * sinh + beyond * sinh);
  return (x) => {
    const up = Math.exp((theta - a) * x);
    const down = Math.exp(-(theta + a) * x);
    const odd = theta * x < Number.EPSILON ? x * up : (up - down) / (2 * theta);
    return (amplitude * (up + down)) / 2 + b * odd - 1 / (mean - 1);
  };
}

/** E[children (children − 1)] */
function pairsOfChildren(offspring: Offspring, mean: number): number {
  if (offspring.law === "geometric") return 2 * mean * mean;
  if (offspring.law === "poisson") return mean * mean;
  return offspring.probabilities.reduce((sum, p, k) => sum + p * k * (k - 1), 0);
}

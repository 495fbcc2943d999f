/** The contract of the half-line solver: what goes in, what comes out, and what each error bounds.
 *
 *  Model: a particle moves with generator D ∂² + drift ∂ on x > 0 (drift > 0 points away from the barrier at 0), is
 *  absorbed and counted at 0, and branches at `rate` into a number of children with generating function G.
 *  K is the number ever absorbed; w(x, s) = E_x[s^K]; f(s) = rate (G(s) − s).
 *
 *  Everything here is plain JSON, so that it can be kept as a result and sent between threads.
 *  Every error is an absolute bound on the value's distance from that of the model whose inputs are the decimals that
 *  round to the given doubles: it covers the method, the rounding, and half a unit in the last place of each input. */

/** value ± error. */
export interface Estimate {
  readonly value: number;
  readonly error: number;
}

/** (mantissa ± error)·2^exponent, for numbers beyond the double's range; |mantissa| in [1/2, 1), or 0. */
export interface ScaledEstimate {
  readonly mantissa: number;
  readonly exponent: number;
  readonly error: number;
}

/** What was asked for is infinite, undefined or not available, and why. Never printed as a number. */
export interface Refusal {
  readonly refused: string;
}

export type Answer<T> = T | Refusal;

/** The law of the number of children of a branching particle. */
export type Offspring =
  /** `probabilities[k]` is the probability of k children. */
  | { readonly law: "finite"; readonly probabilities: readonly number[] }
  /** On 0, 1, 2, …: G(s) = 1/(1 + mean (1 − s)). */
  | { readonly law: "geometric"; readonly mean: number }
  /** G(s) = exp(mean (s − 1)). */
  | { readonly law: "poisson"; readonly mean: number };

/** drift [length/time], rate [1/time] > 0, diffusion [length²/time] > 0 (the D of D ∂²). */
export interface ProcessModel {
  readonly drift: number;
  readonly rate: number;
  readonly diffusion: number;
  readonly offspring: Offspring;
}

export type Regime = "away" | "between" | "toward";

/** What is known of a process before its trajectory is solved. */
export interface ProcessDescription {
  readonly meanOffspring: Estimate;
  /** f'(1) = rate (mean − 1) [1/time] */
  readonly malthusian: Estimate;
  /** √(4 D f'(1)); refused where f'(1) < 0, where every drift is `away` */
  readonly criticalDrift: Answer<Estimate>;
  readonly regime: Answer<Regime>;
  /** λ = (drift + √(drift² − 4 D f'(1)))/(2 D) [1/length]; refused outside `away` */
  readonly decay: Answer<Estimate>;
  /** the rate [1/length] at which w(x, 0) approaches its limit */
  readonly farDecay: Answer<Estimate>;
  /** lim w(x, 0) as x → ∞ */
  readonly limit: Answer<Estimate>;
  /** of the branching alone, without a barrier: the smallest root of G(s) = s in [0, 1] */
  readonly extinctionProbability: Estimate;
}

/** An unevaluated sum high + low of two doubles, about 32 digits. */
export type Pair = readonly [high: number, low: number];

/** A point of the trajectory: u = 1 − w and du/dξ at ξ = decay·x, up to translation. */
export interface Knot {
  readonly xi: number;
  readonly u: number;
  readonly slope: number;
}

/** Constants of the trajectory's upper end (in units of the base's scale), where w turns back; refused where no particle can branch. */
export interface Turning {
  /** s0, the radius of convergence of w(x, ·) */
  readonly s0: Pair;
  /** s0 − 1 */
  readonly excess: Pair;
  /** −B_{s0} > 0: w(x, s0) = W(B_{s0} e^{−decay x}) */
  readonly amplitude: Pair;
  /** bound on the relative change of s0 − 1, and of B_{s0}, under half a unit in the last place of the inputs */
  readonly excessSpread: number;
  readonly amplitudeSpread: number;
}

/** What the trajectory's upper end tends to without turning back: a second fixed point G(s) = s > 1 (offspring mean below 1 and a
 *  drift strongly toward the barrier), or the pole of a geometric law (closer than 10^−6 to s0). It ends the reach of w(x, ·). */
export interface Edge {
  readonly kind: "fixed point" | "pole";
  readonly s: number;
}

/** The state that a trajectory leaves: w = scale·(centre − u). In the regime `away`, scale = centre = 1; else scale is q, the smallest
 *  root of G(s) = s, or, where that is 0, centre = 0 and scale = 1. */
export interface Base {
  readonly centre: 0 | 1;
  readonly scale: Pair;
  /** bound on the relative change of the scale under half a unit in the last place of the inputs */
  readonly scaleSpread: number;
  /** K − (number of particles at the start) is a multiple of this */
  readonly period: number;
}

/** How a trajectory of the regime `toward` comes to rest in w = 1, a node with the rates λ_s ≤ λ_b [1/length]: at `xi` it has the
 *  coordinates (zeta, eta) of node-chart.ts. */
export interface Passage {
  /** λ_s = (−drift − √(drift² − 4 D f'(1)))/(2 D) */
  readonly slow: Pair;
  /** d = λ_b/λ_s ≥ 1 */
  readonly index: Pair;
  readonly xi: Pair;
  readonly zeta: Pair;
  readonly eta: Pair;
  /** bound on the relative error of what the singularity at s = 1 is proportional to; 1 where it is lost in rounding */
  readonly etaError: number;
  /** bounds on the relative changes of λ_s and d, and on the change of ln zeta at a fixed ξ, under half a unit in the last place of the inputs */
  readonly slowSpread: number;
  readonly indexSpread: number;
  readonly shiftSpread: number;
}

/** The trajectory of D w″ + drift w′ + f(w) = 0 that leaves w = 1 (or q, see Base) along its fast direction, from which all answers are read.
 *  In ξ = decay·x, u = 1 − w it obeys u″ + (1 + ratio) u′ + ratio u = strength·(G(1 − u) − 1 + mean u), with u = z − … at z = e^{−ξ}. */
export interface Trajectory {
  readonly model: ProcessModel;
  readonly regime: Regime;
  readonly base: Base;
  readonly decay: Pair;
  /** slow rate over fast rate, f'(1)/(D decay²), at most 1 */
  readonly ratio: Pair;
  /** rate/(D decay²) */
  readonly strength: Pair;
  /** u = Σ series[k] (z/seriesScale)^k near z = 0 */
  readonly series: readonly number[];
  readonly seriesScale: number;
  /** largest |z| at which `series` is used */
  readonly seriesReach: number;
  /** knots of decreasing ξ on z = e^{−ξ} > 0, beyond w = −1 */
  readonly below: readonly Knot[];
  /** knots of decreasing ξ on z = −e^{−ξ} < 0, the last one at the turning point where there is one */
  readonly above: readonly Knot[];
  /** B_0: 1 − w(x, 0) ~ B_0 e^{−decay x} */
  readonly amplitude: Pair;
  /** ∂w/∂x at x = 0, s = 0 */
  readonly slopeAtBarrier: Pair;
  readonly turning: Answer<Turning>;
  /** where there is branching and yet no turning point within reach: what w tends to instead */
  readonly edge: Edge | null;
  /** in the regime `toward`, how it ends in w = 1; else null */
  readonly passage: Passage | null;
  /** bounds on relative changes under half a unit in the last place of the inputs */
  readonly decaySpread: number;
  readonly amplitudeSpread: number;
  readonly slopeSpread: number;
}

export interface ProfileConstants {
  /** lim w(x, s) as x → ∞, for s below s0 */
  readonly limit: Estimate;
  readonly s0: Answer<Estimate>;
  readonly slopeAtBarrier: Answer<Estimate>;
  readonly amplitude: Answer<Estimate>;
  readonly decay: Answer<Estimate>;
}

/** `particles` independent particles at `position` ≥ 0 [length]; 1 ≤ particles, an integer. */
export interface Start {
  readonly position: number;
  readonly particles: number;
}

/** Where the particles start; "far" is the limit law of K given K > 0 as the start recedes. */
export type Starts = readonly Start[] | "far";

/** P(K = n) = (mantissa[n] ± error[n])·2^exponent[n], n = 0, …, upTo. */
export interface AbsorbedLaw {
  readonly upTo: number;
  readonly mantissa: readonly number[];
  readonly exponent: readonly number[];
  readonly error: readonly number[];
  /** how it was computed, for the record: "slit contour, 96 + 214 nodes" */
  readonly method: string;
}

export interface AbsorbedMoments {
  /** P(K = 0) */
  readonly zero: Estimate;
  /** E[K], given that K is finite */
  readonly mean: Estimate;
  /** refused where it is infinite */
  readonly variance: Answer<Estimate>;
  /** P(K = ∞) */
  readonly infinite: Estimate;
}

/** As n → ∞, P(K = n) ~
 *  "square-root": constant·n^{−3/2} s0^{−n} (1 + corrections[1]/n + corrections[2]/n² + …);
 *  "power" (regime `toward`): constant·n^{−1−d} (1 + corrections[1]/n + corrections[2]/n^{d − 1} + …), d the exponent;
 *  "logarithmic" (at the critical drift toward the barrier): constant/(n ln n)². */
export interface TailLaw {
  readonly kind: "square-root" | "power" | "logarithmic";
  readonly s0: Estimate;
  /** d of the power law; refused where it is none */
  readonly exponent: Answer<Estimate>;
  /** ∂w(x, s0)/∂x at the start; refused for several starts and for "far", where it is not what the constant is made of */
  readonly slopeAtStart: Answer<Estimate>;
  readonly constant: Estimate;
  /** K lives on the lattice offset + period·ℕ, and the law is 0 elsewhere; the constant is that of the lattice's points */
  readonly period: number;
  readonly offset: number;
  /** number of terms summed: 1 means the law as written, without corrections */
  readonly terms: number;
  /** corrections[0] = 1; of a square-root law at least `terms` + 1, the next one measuring what is omitted */
  readonly corrections: readonly number[];
  /** log2 of s0 as a pair, so that s0^{−n} keeps its digits at large n */
  readonly log2s0: Pair;
  /** bound on the relative change of s0 under half a unit in the last place of the inputs */
  readonly spread: number;
}

/** The tail law at one n. */
export interface TailProbability {
  readonly probability: ScaledEstimate;
  /** size of the first omitted term relative to the value: what the asymptotic law itself is off by */
  readonly omitted: number;
}

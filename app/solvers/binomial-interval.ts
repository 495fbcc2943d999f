import { SolverError } from "./errors.ts";

/** Ends of an interval for a probability. */
export interface ProbabilityInterval {
  readonly low: number;
  readonly high: number;
}

/** Bound on the relative error of the ends. */
export const INTERVAL_ACCURACY = 1e-12;

/** The interval of Clopper and Pearson for a probability from `hits` in `trials`: it covers the probability with at least the
 *  given confidence, whatever the probability is.
 *  Source: C. J. Clopper, E. S. Pearson, Biometrika 26 (1934) 404–413; its ends are quantiles of beta laws.
 *  @param confidence strictly between 0 and 1
 *  @throws SolverError "bad_parameter" for numbers that are no counts, or no confidence */
export function clopperPearson(hits: number, trials: number, confidence: number): ProbabilityInterval {
  if (!(Number.isSafeInteger(trials) && trials >= 1 && Number.isSafeInteger(hits) && hits >= 0 && hits <= trials))
    throw new SolverError(
      "bad_parameter",
      `${hits} hits in ${trials} trials are no counts; they must be whole numbers with 0 ≤ hits ≤ trials, at least one trial.`,
    );
  if (!(confidence > 0 && confidence < 1))
    throw new SolverError("bad_parameter", `The confidence is ${confidence}; it must lie between 0 and 1.`);
  const outside = (1 - confidence) / 2;
  // P(at least `hits` | p) = outside at the lower end, P(at most `hits` | p) = outside at the upper one.
  return {
    low: hits === 0 ? 0 : lowerEnd(hits, trials, outside),
    high: hits === trials ? 1 : upperEnd(hits, trials, outside),
  };
}

/** The p with P(X ≥ hits) = outside for X binomial (trials, p); hits ≥ 1. */
function lowerEnd(hits: number, trials: number, outside: number): number {
  if (hits === trials) return outside ** (1 / trials);
  const share = hits / trials;
  const atLeast = (p: number): Tail => {
    const { mass, probability } = atMost(trials - hits, trials, 1 - p, p);
    return { probability, slope: (hits * mass) / p };
  };
  return solved(atLeast, outside, { low: 0, high: share, first: share / 2, rises: true });
}

/** The p with P(X ≤ hits) = outside; hits < trials. */
function upperEnd(hits: number, trials: number, outside: number): number {
  if (hits === 0) return -Math.expm1(Math.log(outside) / trials);
  const share = hits / trials;
  const most = (p: number): Tail => {
    const { mass, probability } = atMost(hits, trials, p, 1 - p);
    return { probability, slope: (-(trials - hits) * mass) / (1 - p) };
  };
  const first = share + Math.min(2 / trials, (1 - share) / 2);
  return solved(most, outside, { low: share, high: 1, first, rises: false });
}

/** A tail of the binomial law and its derivative in p. */
interface Tail {
  readonly probability: number;
  readonly slope: number;
}

/** The p at which a tail is `outside`, by Newton's method for log P as a function of log p, which is nearly straight, kept within its bracket. */
function solved(
  tail: (p: number) => Tail,
  outside: number,
  bracket: { readonly low: number; readonly high: number; readonly first: number; readonly rises: boolean },
): number {
  const { first, rises } = bracket;
  let { low, high } = bracket;
  let p = first;
  for (let round = 0; round < MOST_ROUNDS; round += 1) {
    const { probability, slope } = tail(p);
    if (probability > outside === rises) high = p;
    else low = p;
    const step = (Math.log(outside / probability) * probability) / (slope * p);
    const next = p * Math.exp(Math.max(-LARGEST_STEP, Math.min(LARGEST_STEP, step)));
    const taken = next > low && next < high ? next : (low + high) / 2;
    if (Math.abs(taken - p) <= 2 * Number.EPSILON * p) return taken;
    p = taken;
  }
  return p;
}

const MOST_ROUNDS = 200;
const LARGEST_STEP = 2;

/** P(X = hits) and P(X ≤ hits) for X binomial (trials, p = 1 − q), hits at or below the mean: terms from the largest down. */
function atMost(hits: number, trials: number, p: number, q: number): { mass: number; probability: number } {
  const mass = binomialProbability(hits, trials, p, q);
  let sum = 1;
  let term = 1;
  for (let k = hits; k >= 1 && term > Number.EPSILON * sum; k -= 1) {
    term *= (k * q) / ((trials - k + 1) * p);
    sum += term;
  }
  return { mass, probability: mass * sum };
}

/** P(X = hits) for X binomial (trials, p = 1 − q), 0 < hits < trials, to near full accuracy however large the counts.
 *  Source: C. Loader, Fast and accurate computation of binomial probabilities (2000). */
function binomialProbability(hits: number, trials: number, p: number, q: number): number {
  const misses = trials - hits;
  // From the smaller of p and q, whose rounding is the smaller too.
  const excess = p < q ? hits - trials * p : trials * q - misses;
  const exponent =
    stirlingError(trials) -
    stirlingError(hits) -
    stirlingError(misses) -
    deviance(hits, trials * p, excess) -
    deviance(misses, trials * q, -excess);
  return Math.exp(exponent) * Math.sqrt(trials / (2 * Math.PI * hits * misses));
}

/** log n! − log(√(2 π n) (n/e)^n). Source: NIST Digital Library of Mathematical Functions, 5.11.1. */
function stirlingError(n: number): number {
  if (n < SUMMED_UP_TO) {
    let logFactorial = 0;
    for (let k = 2; k <= n; k += 1) logFactorial += Math.log(k);
    return logFactorial - Math.log(2 * Math.PI * n) / 2 - n * Math.log(n) + n;
  }
  const inverse = 1 / (n * n);
  return (1 / 12 - (1 / 360 - (1 / 1260 - inverse / 1680) * inverse) * inverse) / n;
}

const SUMMED_UP_TO = 40;

/** x log(x/mean) + mean − x for excess = x − mean, without cancellation where that is small. */
function deviance(x: number, mean: number, excess: number): number {
  const v = excess / (x + mean);
  if (Math.abs(v) > NEAR) return x * Math.log(x / mean) - excess;
  // log(x/mean) = 2 artanh v
  let sum = excess * v;
  let power = 2 * x * v;
  for (let k = 3; ; k += 2) {
    power *= v * v;
    const next = sum + power / k;
    if (next === sum) return sum;
    sum = next;
  }
}

const NEAR = 0.1;

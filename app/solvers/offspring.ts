import { SolverError } from "./errors.ts";
import { add, divide, multiply, negate, ONE, pair, scale, subtract, toNumber, ZERO } from "./pairs.ts";
import type { Offspring, Pair } from "./types.ts";

/** A law of the number of children, checked and prepared: probabilities normalised exactly, polynomials about 0 and about 1.
 *  M(u) = G(1 − u) − 1 + mean·u is what branching adds to the linear equation near w = 1; it vanishes with its derivative at u = 0. */
export type Branching =
  | {
      readonly law: "finite";
      readonly mean: Pair;
      readonly excess: Pair;
      /** p_0, p_1, … of G(w) = Σ p_j w^j */
      readonly aboutZero: readonly Pair[];
      /** 0, 0, c_2, … of M(u) = Σ c_j u^j, c_j = (−1)^j Σ_k p_k binomial(k, j) */
      readonly aboutOne: readonly Pair[];
      /** u = −w is measured from w = 0 (see saddle.ts), where `aboutOne` alone serves */
      readonly fromZero?: true;
    }
  | { readonly law: "geometric" | "poisson"; readonly mean: Pair; readonly excess: Pair };

/** How far the probabilities of a finite law may sum from 1. */
const SUM_TOLERANCE = 1e-12;
/** A mean within this of 1, relative to its terms, was meant to be 1: the inputs are known to half a unit only. */
const CRITICAL_TOLERANCE = 4 * Number.EPSILON;
/** Largest number of children: the polynomial's work and its rounding grow with it. */
const MOST_CHILDREN = 200;

/** Checks a law of offspring and prepares it.
 *  @returns mean = G'(1), excess = mean − 1 (without cancellation; exactly 0 where the law is critical within rounding).
 *  @throws SolverError "bad_parameter" when it is no probability law, or has no finite mean > 0. */
export function prepareOffspring(offspring: Offspring): Branching {
  if (offspring.law === "finite") return prepareFinite(offspring.probabilities);
  const { law, mean } = offspring;
  if (!(Number.isFinite(mean) && mean > 0))
    throw new SolverError(
      "bad_parameter",
      `The mean of the ${law} offspring law is ${mean}; it must be a finite number above 0.`,
    );
  const critical = Math.abs(mean - 1) < CRITICAL_TOLERANCE;
  return critical ? { law, mean: ONE, excess: ZERO } : { law, mean: pair(mean), excess: subtract(pair(mean), ONE) };
}

function prepareFinite(probabilities: readonly number[]): Branching {
  probabilities.forEach((p, k) => {
    if (!(Number.isFinite(p) && p >= 0 && p <= 1 + SUM_TOLERANCE))
      throw new SolverError("bad_parameter", `The probability of ${k} children is ${p}; it must lie between 0 and 1.`);
  });
  const last = probabilities.findLastIndex((p) => p > 0);
  const used = probabilities.slice(0, last + 1);
  const total = used.reduce((sum, p) => add(sum, pair(p)), ZERO);
  if (Math.abs(toNumber(subtract(total, ONE))) > SUM_TOLERANCE)
    throw new SolverError(
      "bad_parameter",
      `The probabilities of the numbers of children sum to ${toNumber(total)}; they must sum to 1. State the missing case.`,
    );
  if (last > MOST_CHILDREN)
    throw new SolverError(
      "bad_parameter",
      `The offspring law reaches ${last} children; at most ${MOST_CHILDREN} are allowed.`,
    );
  const aboutZero = used.map((p) => divide(pair(p), total));
  let excess = ZERO;
  let size = 0;
  aboutZero.forEach((p, k) => {
    excess = add(excess, scale(p, k - 1));
    size += Math.abs(k - 1) * p[0];
  });
  if (Math.abs(excess[0]) < CRITICAL_TOLERANCE * size) excess = ZERO;
  const mean = add(ONE, excess);
  if (mean[0] <= 0)
    throw new SolverError(
      "bad_parameter",
      "The offspring law gives no children at all (mean 0): a particle that would branch dies. Give some children a probability.",
    );
  return { law: "finite", mean, excess, aboutZero, aboutOne: shiftToOne(aboutZero) };
}

/** c_j = (−1)^j Σ_k p_k binomial(k, j) for j ≥ 2, with c_0 = c_1 = 0. */
export function shiftToOne(probabilities: readonly Pair[]): Pair[] {
  const shifted: Pair[] = [];
  // binomials[k] = binomial(k, j), raised from j to j + 1 in each round
  let binomials = probabilities.map(() => ONE);
  for (let j = 0; j < probabilities.length; j += 1) {
    let sum = ZERO;
    probabilities.forEach((p, k) => {
      sum = add(sum, multiply(p, binomials[k] as Pair));
    });
    shifted.push(j < 2 ? ZERO : j % 2 === 0 ? sum : negate(sum));
    binomials = binomials.map((b, k) => divide(scale(b, k - j), pair(j + 1)));
  }
  return shifted;
}

/** Whether a particle can ever have two or more children. */
export function branches(law: Branching): boolean {
  return law.law !== "finite" || law.aboutZero.length > 2;
}

/** M(u) = G(1 − u) − 1 + mean·u and M'(u) for real u, in double precision, to full relative accuracy for −∞ < u ≤ 1.
 *  For a geometric law u > −1/mean. */
export function nonlinearity(law: Branching, u: number): { value: number; derivative: number } {
  const mean = law.mean[0];
  const q = mean * u;
  if (law.law === "geometric") {
    const one = 1 + q;
    return { value: (q * q) / one, derivative: (mean * q * (2 + q)) / (one * one) };
  }
  if (law.law !== "finite") return { value: exponentialRest(q), derivative: -mean * Math.expm1(-q) };
  if (law.fromZero || 1 + Math.abs(u) < FORM_FACTOR * Math.max(1, Math.abs(1 - u))) return horner(law.aboutOne, u);
  const g = horner(law.aboutZero, 1 - u);
  return { value: g.value - 1 + q, derivative: mean - g.derivative };
}

/** The root s > 1 of G(s) = s, where mean < 1: 1 − u with M(u) = (mean − 1) u, u < 0, by Newton's method on a convex function. */
export function upperFixedPoint(law: Branching): number {
  const excess = law.excess[0];
  if (law.law === "finite" && law.fromZero) return 1;
  if (law.law === "geometric") return 1 / law.mean[0];
  let u = excess;
  while (nonlinearity(law, u).value < excess * u) u *= 2;
  for (let round = 0; round < NEWTON_ROUNDS; round += 1) {
    const { value, derivative } = nonlinearity(law, u);
    const step = (value - excess * u) / (derivative - excess);
    u -= step;
    if (Math.abs(step) <= Number.EPSILON * Math.abs(u)) break;
  }
  return 1 - u;
}

const NEWTON_ROUNDS = 100;

/** The polynomial about u = 0 is used where its terms exceed those of the polynomial about w = 0 by less than this factor per power. */
export const FORM_FACTOR = 1.3;

/** e^{−q} − 1 + q. */
export function exponentialRest(q: number): number {
  if (Math.abs(q) > SERIES_BELOW) return Math.expm1(-q) + q;
  let term = (q * q) / 2;
  let sum = 0;
  for (let k = 3; Math.abs(term) > Math.abs(sum) * 2 ** -56; k += 1) {
    sum += term;
    term *= -q / k;
  }
  return sum;
}

/** Below this |q|, e^{−q} − 1 + q is summed as a series. */
const SERIES_BELOW = 0.5;

function horner(coefficients: readonly Pair[], v: number): { value: number; derivative: number } {
  let value = 0;
  let derivative = 0;
  for (let j = coefficients.length - 1; j >= 0; j -= 1) {
    derivative = derivative * v + value;
    value = value * v + (coefficients[j] as Pair)[0];
  }
  return { value, derivative };
}

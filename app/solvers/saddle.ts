import { type Branching, shiftToOne } from "./offspring.ts";
import { PairSeries } from "./pair-series.ts";
import { add, divide, exponential, multiply, negate, ONE, pair, scale, subtract, ZERO } from "./pairs.ts";
import type { Base, Pair } from "./types.ts";

/** The state that a trajectory leaves, in coordinates in which it looks like w = 1 of another process.
 *
 *  Where K may be infinite, or every line is absorbed, w(x, s) = E_x[s^K; K finite] tends not to 1 but to q, the smallest root of
 *  G(s) = s. For q > 0, w = q ŵ: ŵ(x, s/q) belongs to the process given that its branching dies out, whose law of offspring has the
 *  generating function Ĝ(s) = G(q s)/q and a mean below 1, and P(K = n) = q^{1−n} P̂(K = n). For q = 0 there is nothing to scale:
 *  u = −w in place of 1 − w, and M(u) = G(−u) + p_1 u.
 *  Source: K. B. Athreya, P. E. Ney, Branching Processes (1972), section I.12, for the law given extinction. */
export interface Saddle {
  readonly base: Base;
  readonly law: Branching;
}

/** What leaves w = 1 itself. */
export const FROM_ONE: Base = { centre: 1, scale: ONE, scaleSpread: 0, period: 1 };

/** The saddle of a law with mean above 1. */
export function saddleOf(law: Branching): Saddle {
  const q = extinctionRoot(law);
  if (q[0] > 0) return { base: { ...FROM_ONE, scale: q }, law: givenExtinction(law, q) };
  return { base: { centre: 0, scale: ONE, scaleSpread: 0, period: periodOf(law) }, law: aboutNone(law) };
}

/** The smallest root q of G(q) = q, relative to itself: Newton's method in double-doubles from below on a convex function. */
function extinctionRoot(law: Branching): Pair {
  if (law.law === "geometric") return divide(ONE, law.mean);
  if (law.law === "finite" && (law.aboutZero[0]?.[0] ?? 0) === 0) return ZERO;
  let q: Pair = ZERO;
  for (let round = 0; round < MOST_ROUNDS; round += 1) {
    const { value, slope } = generating(law, q);
    const step = divide(subtract(value, q), subtract(ONE, slope));
    q = add(q, step);
    if (Math.abs(step[0]) <= CONVERGED * q[0]) break;
  }
  return q;
}

const MOST_ROUNDS = 200;
/** The square of such a step is below the rounding of double-doubles. */
const CONVERGED = 2 ** -56;

/** G and G' at w, for a law that is finite or Poisson. */
function generating(law: Branching, w: Pair): { value: Pair; slope: Pair } {
  if (law.law !== "finite") {
    const value = exponential(multiply(law.mean, subtract(w, ONE)));
    return { value, slope: multiply(law.mean, value) };
  }
  const series = new PairSeries(law.aboutZero.length);
  law.aboutZero.forEach((p, k) => {
    series.set(k, p);
  });
  const { value, derivative } = series.evaluate(w, law.aboutZero.length - 1);
  return { value, slope: derivative };
}

/** Ĝ(s) = G(q s)/q: a law of the same family. */
function givenExtinction(law: Branching, q: Pair): Branching {
  if (law.law !== "finite") {
    const mean = law.law === "geometric" ? q : multiply(law.mean, q);
    return { law: law.law, mean, excess: subtract(mean, ONE) };
  }
  let power = divide(ONE, q);
  let excess = ZERO;
  const aboutZero = law.aboutZero.map((p, k) => {
    const shared = multiply(p, power);
    power = multiply(power, q);
    excess = add(excess, scale(shared, k - 1));
    return shared;
  });
  return { law: "finite", mean: add(ONE, excess), excess, aboutZero, aboutOne: shiftToOne(aboutZero) };
}

/** The law without childless deaths, in u = −w. */
function aboutNone(law: Branching): Branching {
  if (law.law !== "finite") return law;
  const mean = law.aboutZero[1] ?? ZERO;
  const aboutOne = law.aboutZero.map((p, k) => (k < 2 ? ZERO : k % 2 === 0 ? p : negate(p)));
  return { ...law, mean, excess: subtract(mean, ONE), aboutOne, fromZero: true };
}

/** The greatest common divisor of the numbers by which a branching raises the number of particles, where none dies childless. */
function periodOf(law: Branching): number {
  if (law.law !== "finite") return 1;
  let divisor = 0;
  law.aboutZero.forEach((p, k) => {
    if (k < 2 || p[0] === 0) return;
    let [a, b] = [k - 1, divisor];
    while (b > 0) [a, b] = [b, a % b];
    divisor = a;
  });
  return Math.max(1, divisor);
}

/** û of a given s: s = scale (centre − û), with all digits of a small û. */
export function deviationOf(base: Base, s: number): number {
  if (base.centre === 0) return -s;
  if (base.scale[0] === 1) return 1 - s;
  const gap = subtract(base.scale, pair(s));
  return divide(gap, base.scale)[0];
}

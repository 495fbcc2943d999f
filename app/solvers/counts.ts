import { convolvedLaw, sterileLaw } from "./convolution.ts";
import { SolverError } from "./errors.ts";
import { infiniteProbability } from "./finite-moments.ts";
import { prepareLaw } from "./prepare.ts";
import { type PreparedLaw, readLaw, zeroOf } from "./prepared.ts";
import { ROUNDING, readerOf } from "./reader.ts";
import { normalise } from "./scaled.ts";
import { checkStarts } from "./sources.ts";
import type { Wanted } from "./sums.ts";
import type { AbsorbedLaw, Answer, Estimate, ScaledEstimate, Start, Starts, Trajectory } from "./types.ts";

/** Largest n of a whole law; single probabilities go on beyond it. */
const MOST = 1_000_000;
const ZERO: ScaledEstimate = { mantissa: 0, exponent: 0, error: 0 };
const ONE: ScaledEstimate = { mantissa: 1 / 2, exponent: 1, error: 0 };

/** P(K = n) for n = 0, …, upTo, each with its own relative accuracy however small it is; for "far" the limit law given K > 0.
 *  Source: Cauchy's integral around the saddle s0 (see contour.ts); P. Flajolet, R. Sedgewick, Analytic Combinatorics (2009), chapter VI, for the slit.
 *  @throws SolverError "bad_parameter" for a start or upTo that is none, "not_converged" where no contour passes its tests. */
export function absorbedLaw(t: Trajectory, starts: Starts, upTo: number): Answer<AbsorbedLaw> {
  requireCount("upTo", upTo);
  if (starts === "far" && t.regime !== "away") return { refused: noLimitLaw(t) };
  if (upTo > MOST)
    throw new SolverError(
      "bad_parameter",
      `The law is asked for up to ${upTo}; at most ${MOST} values are computed at once.`,
    );
  const question = pose(t, starts);
  const { shift, rest, sterile } = question;
  const values: ScaledEstimate[] = new Array(Math.min(shift, upTo + 1)).fill(ZERO);
  let method = "exact";
  const last = upTo - shift;
  if (last >= 0) {
    if (rest !== "far" && rest.length === 0) values.push(...pointMass(last));
    else if (sterile) values.push(...sterileLaw(t, rest, last));
    else {
      const law = prepareLaw(t, rest, last, "each");
      const read = wholeLaw(t, law, rest, last);
      values.push(...read.values);
      method = read.method;
    }
  }
  return {
    upTo,
    mantissa: values.map((v) => v.mantissa),
    exponent: values.map((v) => v.exponent),
    error: values.map((v) => v.error),
    method,
  };
}

/** P(K = n), one n without the others.
 *  Source: as absorbedLaw.
 *  @throws SolverError as absorbedLaw. */
export function absorbedProbability(t: Trajectory, starts: Starts, n: number): Answer<ScaledEstimate> {
  requireCount("n", n);
  if (starts === "far" && t.regime !== "away") return { refused: noLimitLaw(t) };
  const { shift, rest, sterile } = pose(t, starts);
  const m = n - shift;
  if (m < 0) return ZERO;
  if (rest !== "far" && rest.length === 0) return m === 0 ? ONE : ZERO;
  if (sterile) return sterileProbability(t, rest, m);
  return single(t, rest, m, "each");
}

/** P(K > n), one n without the others; K = ∞ is beyond every n.
 *  Source: as absorbedLaw, with Σ_{k > n} s^{−k−1} = s^{−n−1}/(s − 1).
 *  @throws SolverError as absorbedLaw. */
export function absorbedAbove(t: Trajectory, starts: Starts, n: number): Answer<ScaledEstimate> {
  requireCount("n", n);
  if (starts === "far" && t.regime !== "away") return { refused: noLimitLaw(t) };
  const { shift, rest, sterile } = pose(t, starts);
  const m = n - shift;
  if (m < 0) return ONE;
  if (rest !== "far" && rest.length === 0) return ZERO;
  if (sterile) return sterileAbove(t, rest, m);
  if (m === 0) return rest === "far" ? ONE : zeroOf(t, rest).complement;
  const { period } = t.base;
  const particles = rest === "far" ? 1 : rest.reduce((sum, s) => sum + s.particles, 0);
  if (m < particles && t.base.centre === 0) return ONE;
  // on a lattice, the last n of it that is not above m
  const onLattice = m - ((((m - particles) % period) + period) % period);
  const finite = single(t, rest, onLattice, "above");
  return rest === "far" ? finite : plus(finite, infiniteProbability(t, rest));
}

function noLimitLaw(t: Trajectory): string {
  return `The law of K from far away, given absorption, is one of a drift away from the barrier; here the regime is ${t.regime}.`;
}

/** A checked question: particles already at the barrier count at once, the rest have the law to be computed. */
interface Question {
  readonly shift: number;
  readonly rest: Starts;
  readonly sterile: boolean;
}

function pose(t: Trajectory, starts: Starts): Question {
  const { sterile } = readerOf(t);
  if (starts === "far") return { shift: 0, rest: starts, sterile };
  const checked = checkStarts(starts);
  const atBarrier = checked.filter((s) => s.position === 0).reduce((sum, s) => sum + s.particles, 0);
  return { shift: atBarrier, rest: checked.filter((s) => s.position > 0), sterile };
}

function plus(a: ScaledEstimate, b: Estimate): ScaledEstimate {
  if (b.value === 0 && b.error === 0) return a;
  const size = 2 ** a.exponent;
  const value = a.mantissa * size + b.value;
  return normalise(value, a.error * size + b.error + ROUNDING * value, 0);
}

function requireCount(name: string, n: number): void {
  if (!(Number.isSafeInteger(n) && n >= 0))
    throw new SolverError("bad_parameter", `${name} is ${n}; it must be an integer, at least 0.`);
}

function pointMass(last: number): ScaledEstimate[] {
  return [ONE, ...new Array<ScaledEstimate>(last).fill(ZERO)];
}

/** The value at n = 0, which the sums do not give to relative accuracy. */
function atZero(t: Trajectory, rest: Starts): ScaledEstimate {
  return rest === "far" ? ZERO : zeroOf(t, rest).zero;
}

/** P(K = 1) where s was taken out of E[s^K]: the sum gives P(K = 1) − 1. */
function plusOne(value: ScaledEstimate): ScaledEstimate {
  const size = 2 ** value.exponent;
  return normalise(1 + value.mantissa * size, value.error * size + Number.EPSILON, 0);
}

function single(t: Trajectory, rest: Starts, n: number, wanted: Wanted): ScaledEstimate {
  if (n === 0) return atZero(t, rest);
  const law = prepareLaw(t, rest, n, wanted);
  const value = readLaw(law, n, n)[0] as ScaledEstimate;
  const read = wanted === "each" && n < law.first ? plusOne(value) : value;
  if (!isSeveral(rest) || !isCancelled(read) || n > CONVOLVED_UP_TO) return read;
  const convolved = convolvedLaw(t, rest, n);
  return better(
    read,
    wanted === "each" ? (convolved[n] as ScaledEstimate) : complementOf(convolved, infiniteProbability(t, rest)),
  );
}

/** Up to here a law of many particles is convolved from that of one where its contour cancels. */
const CONVOLVED_UP_TO = 4000;
/** Relative error beyond which another method is tried. */
const CANCELLED = 1e-11;

/** P(K finite) − Σ, where the contour cancels: n is then not far in the tail, and the complement not small. */
function complementOf(law: readonly ScaledEstimate[], infinite: Estimate): ScaledEstimate {
  let value = 1 - infinite.value;
  let error = law.length * Number.EPSILON + infinite.error;
  for (const v of law) {
    value -= v.mantissa * 2 ** v.exponent;
    error += v.error * 2 ** v.exponent;
  }
  return normalise(value, error, 0);
}

function isSeveral(rest: Starts): rest is readonly Start[] {
  return rest !== "far" && (rest.length > 1 || (rest[0] as Start).particles > 1);
}

function isCancelled(value: ScaledEstimate): boolean {
  return value.error > CANCELLED * Math.abs(value.mantissa);
}

function better(a: ScaledEstimate, b: ScaledEstimate): ScaledEstimate {
  const relative = (v: ScaledEstimate) =>
    v.mantissa === 0 ? Number.POSITIVE_INFINITY : v.error / Math.abs(v.mantissa);
  return relative(b) < relative(a) ? b : a;
}

function wholeLaw(
  t: Trajectory,
  law: PreparedLaw,
  rest: Starts,
  last: number,
): { values: ScaledEstimate[]; method: string } {
  const values = [atZero(t, rest)];
  if (last >= 1) values.push(...readLaw(law, 1, last));
  if (law.first > 1 && last >= 1) values[1] = plusOne(values[1] as ScaledEstimate);
  const lastCancelled = values.findLastIndex((v, n) => n > 0 && n <= CONVOLVED_UP_TO && isCancelled(v));
  if (!isSeveral(rest) || lastCancelled < 1) return { values, method: law.method };
  const convolved = convolvedLaw(t, rest, lastCancelled);
  return {
    values: values.map((v, n) => (n > 0 && n <= lastCancelled ? better(v, convolved[n] as ScaledEstimate) : v)),
    method: `${law.method}; convolved from single particles up to n = ${lastCancelled}`,
  };
}

function sterileProbability(t: Trajectory, rest: Starts, n: number): ScaledEstimate {
  const total = rest === "far" ? 1 : rest.reduce((sum, s) => sum + s.particles, 0);
  return n > total ? ZERO : (sterileLaw(t, rest, n)[n] as ScaledEstimate);
}

function sterileAbove(t: Trajectory, rest: Starts, n: number): ScaledEstimate {
  const total = rest === "far" ? 1 : rest.reduce((sum, s) => sum + s.particles, 0);
  if (n >= total) return ZERO;
  if (n === 0 && rest !== "far") return zeroOf(t, rest).complement;
  const law = sterileLaw(t, rest, total);
  // summed from the small end, on a common exponent
  let value = 0;
  let error = 0;
  for (let k = total; k > n; k -= 1) {
    const v = law[k] as ScaledEstimate;
    value += v.mantissa * 2 ** v.exponent;
    error += v.error * 2 ** v.exponent;
  }
  return normalise(value, error + total * Number.EPSILON * value, 0);
}

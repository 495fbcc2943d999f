import { curvatureError } from "./curvature.ts";
import { SolverError } from "./errors.ts";
import { divide, LN2, logarithm, multiply } from "./pairs.ts";
import { profileConstants, profileSlopeAt, radius } from "./profile.ts";
import { ROUNDING, readerOf, type TrajectoryReader } from "./reader.ts";
import { scaledByPower } from "./scaled.ts";
import { checkStarts } from "./sources.ts";
import { bernoulliPolynomials, composed, inverseSquareRise, multiplied, raised } from "./tail-series.ts";
import { powerProbability, tailToward } from "./tail-toward.ts";
import type { Answer, Estimate, Starts, TailLaw, TailProbability, Trajectory, Turning } from "./types.ts";

/** Most terms of the expansion in 1/n. */
const MOST_TERMS = 10;

/** The law of large n: P(K = n) ~ constant·n^{−3/2} s0^{−n} (1 + corrections[1]/n + …), from the square-root singularity at s0.
 *  Source: P. Flajolet, A. Odlyzko, SIAM J. Discrete Math. 3 (1990) 216–240, for the transfer; J. Berestycki, É. Brunet, S. C. Harris,
 *  P. Miłoś, J. Funct. Anal. 273 (2017) 2107–2143, for s0; constant = −w'(x, s0) √(D s0/(2π f(s0))) for one particle.
 *  @param terms 1 to 10; 1 is constant·n^{−3/2} s0^{−n} itself
 *  @throws SolverError "bad_parameter" for a number of terms or a start that is none. */
export function tailLaw(t: Trajectory, starts: Starts, terms: number): Answer<TailLaw> {
  if (!(Number.isInteger(terms) && terms >= 1 && terms <= MOST_TERMS))
    throw new SolverError(
      "bad_parameter",
      `The tail is asked for with ${terms} terms; from 1 to ${MOST_TERMS} are given.`,
    );
  if (t.passage !== null && starts !== "far")
    return terms === 1 ? tailToward(t, t.passage, starts) : { refused: ONE_TERM };
  const reader = readerOf(t);
  const { turning } = reader;
  if (turning === null) return t.turning as { refused: string };
  const shares = oddShares(t, reader, turning, starts, terms + 1);
  if (shares === null)
    return { refused: "Every particle starts at the barrier and is absorbed at once: K is certain and has no tail." };
  const inverse = inversePowers(shares);
  const { period, scale } = t.base;
  const particles = starts === "far" ? 1 : starts.reduce((sum, s) => sum + s.particles, 0);
  // P(K = n) = scale^{particles − n} P̂(K = n), and every image of s0 gives the same
  const leading = inverse[0] as number;
  const value = leading * period * scale[0] ** particles;
  const relative =
    CONSTANT_ROUNDINGS * ROUNDING +
    turning.excessSpread +
    turning.amplitudeSpread +
    spreadOfStarts(t, reader, starts) +
    curvatureError(t, reader, turning);
  return {
    kind: "square-root",
    s0: radius(turning, t.base),
    exponent: { refused: NO_POWER },
    slopeAtStart: slopeAtStart(t, starts),
    constant: { value, error: Math.abs(value) * relative },
    period,
    offset: particles,
    terms,
    corrections: inverse.map((c) => c / leading),
    log2s0: divide(logarithm(multiply(turning.s0, scale)), LN2),
    spread: (turning.excessSpread * turning.excess[0]) / turning.s0[0],
  };
}

/** The asymptotic law at n ≥ 1 with the law's own number of terms, and what it omits.
 *  Source: as tailLaw. The error is that of the numbers; `omitted` is the size of the first term left out, relative.
 *  @throws SolverError "bad_parameter" where n is no integer ≥ 1. */
export function tailProbability(law: TailLaw, n: number): TailProbability {
  if (!(Number.isSafeInteger(n) && n >= 1))
    throw new SolverError("bad_parameter", `The tail is asked for at n = ${n}; n must be an integer, at least 1.`);
  if ((n - law.offset) % law.period !== 0) return { probability: { mantissa: 0, exponent: 0, error: 0 }, omitted: 0 };
  if (law.kind !== "square-root") return powerProbability(law, n);
  let sum = 0;
  for (let k = law.terms - 1; k >= 0; k -= 1) sum = sum / n + (law.corrections[k] as number);
  const value = law.constant.value * n ** -1.5 * sum;
  const relative = law.constant.error / Math.abs(law.constant.value) + n * law.spread + 8 * ROUNDING;
  const omitted = Math.abs((law.corrections[law.terms] as number) / n ** law.terms / sum);
  return { probability: scaledByPower(value, Math.abs(value) * relative, law.log2s0, n), omitted };
}

const ONE_TERM =
  "With this drift toward the barrier the tail is a power of n, of which the leading term alone is given; `terms` is 1 there.";
const NO_POWER =
  "The tail is no power of n but falls like n^(−3/2) s0^(−n); an exponent belongs to a drift toward the barrier, at or beyond the critical one.";

/** Roundings in the constant: the turning point's expansion, its inverse, the expansion at the start. */
const CONSTANT_ROUNDINGS = 64;

function spreadOfStarts(t: Trajectory, reader: TrajectoryReader, starts: Starts): number {
  if (starts === "far") return t.amplitudeSpread;
  return starts.reduce(
    (sum, s) =>
      sum + s.particles * (turningSpread(reader) + reader.decay * s.position * (t.decaySpread + 2 * ROUNDING)),
    0,
  );
}

function turningSpread(reader: TrajectoryReader): number {
  return reader.turning === null ? 0 : reader.turning.excessSpread + reader.turning.amplitudeSpread;
}

function slopeAtStart(t: Trajectory, starts: Starts): Answer<Estimate> {
  const only = starts === "far" ? undefined : starts[0];
  if (starts === "far" || starts.length !== 1 || only?.particles !== 1)
    return {
      refused:
        "The slope at the start is that of one particle; here the law is of several, or of the limit from far away.",
    };
  const { s0 } = profileConstants(t);
  return "refused" in s0 ? s0 : profileSlopeAt(t, only.position, s0.value);
}

/** Coefficients F_1, F_3, F_5, … of E[s^K] in powers of √(1 − s/s0), `count` of them; null for a law without them. */
function oddShares(
  t: Trajectory,
  reader: TrajectoryReader,
  turning: Turning,
  starts: Starts,
  count: number,
): number[] | null {
  const order = 2 * count;
  const top = reader.topExpansion();
  // y(r), r = √(1 − s/s0): s0 r² = u(ξ0 + y) − u(ξ0), y > 0 on the way to w = 1
  const y = inverseSquareRise(top.re, turning.s0[0], order);
  const odd = (series: Float64Array) => Array.from({ length: count }, (_, i) => series[2 * i + 1] as number);
  if (starts === "far") {
    // 1 − z/B_0 with z = −amplitude e^{−y}
    const exponential = Float64Array.from({ length: order + 1 }, (_, k) => (-1) ** k / factorial(k));
    const z = composed(exponential, y, order).map((v) => (v * turning.amplitude[0]) / t.amplitude[0]);
    return odd(z);
  }
  let product: Float64Array | null = null;
  let moves = false;
  for (const { position, particles } of checkStarts(starts)) {
    moves ||= position > 0;
    const single = composed(profileExpansion(reader, position), y, order);
    const powered = raised(single, particles, order);
    product = product === null ? powered : multiplied(product, powered, order);
  }
  return moves && product !== null ? odd(product) : null;
}

/** Taylor coefficients of w(x + ·, s0) in ξ. */
function profileExpansion(reader: TrajectoryReader, position: number): Float64Array {
  const xi = reader.topExpansion().xiRe + reader.decay * position;
  const at = { re: 0, im: 0, slopeRe: 0, slopeIm: 0 };
  reader.evaluateAt("above", xi, at);
  if (position === 0) at.slopeRe = 0;
  const c = reader.expander.create();
  reader.expander.expand(xi, 0, at, c);
  const w = c.re.map((v) => -v);
  w[0] = reader.base.centre - at.re;
  return w;
}

function factorial(k: number): number {
  return k < 2 ? 1 : k * factorial(k - 1);
}

/** Coefficients of n^{−3/2 − m} s0^{−n}, from [s^n] (1 − s/s0)^{i + 1/2} = s0^{−n} Γ(n − i − 1/2)/(Γ(−i − 1/2) n!).
 *  Source: ln Γ(n + b) ~ (n + b − 1/2) ln n − n + ln(2π)/2 + Σ_k (−1)^{k+1} B_{k+1}(b)/(k (k + 1) n^k), DLMF 5.11.8. */
function inversePowers(shares: readonly number[]): number[] {
  const count = shares.length;
  const atOne = bernoulliPolynomials(1, count + 1);
  const total = new Array<number>(count).fill(0);
  let gamma = -2 * Math.sqrt(Math.PI); // Γ(−1/2)
  shares.forEach((share, i) => {
    const b = -i - 1 / 2;
    if (i > 0) gamma /= b;
    const atStart = bernoulliPolynomials(b, count + 1);
    const exponent = Array.from({ length: count }, (_, k) =>
      k === 0 ? 0 : ((-1) ** (k + 1) * ((atStart[k + 1] as number) - (atOne[k + 1] as number))) / (k * (k + 1)),
    );
    const ratio = exponentialOf(exponent);
    for (let k = 0; i + k < count; k += 1)
      total[i + k] = (total[i + k] as number) + (share / gamma) * (ratio[k] as number);
  });
  return total;
}

/** e^{series} for a series without constant term: k e_k = Σ j a_j e_{k − j}. */
function exponentialOf(a: readonly number[]): number[] {
  const e = [1];
  for (let k = 1; k < a.length; k += 1) {
    let sum = 0;
    for (let j = 1; j <= k; j += 1) sum += j * (a[j] as number) * (e[k - j] as number);
    e.push(sum / k);
  }
  return e;
}

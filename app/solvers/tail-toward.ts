import { SolverError } from "./errors.ts";
import { logGamma } from "./gamma.ts";
import { lawUnit } from "./input-rounding.ts";
import { type NodeChart, nodeChart } from "./node-chart.ts";
import { type Branching, nonlinearity, prepareOffspring } from "./offspring.ts";
import { multiply, toNumber, ZERO } from "./pairs.ts";
import { profileSlopeAt } from "./profile.ts";
import { ROUNDING } from "./reader.ts";
import { scaledByPower } from "./scaled.ts";
import { checkStarts } from "./sources.ts";
import type { Answer, Estimate, Passage, Start, TailLaw, TailProbability, Trajectory } from "./types.ts";

/** The law of large n in the regime `toward`: P(K = n) ~ constant·n^{−1−d}; at the critical drift, where d = 1,
 *  constant/(n ln n)².
 *  With 1 − s = ζ + … + h ζ^d near s = 1 (d no integer), E[s^K] contains −h (E^d − E) (1 − s)^d, E = e^{λ_s x} the mean of K, and the
 *  constant is −h (E^d − E)/Γ(−d); h is read where the trajectory passes into the node, so that nothing is fitted. As d passes through
 *  an integer h has a pole and 1/Γ(−d) a zero: their product is formed from what node-chart.ts has in their place.
 *  Source: P. Maillard, Ann. Inst. H. Poincaré Probab. Stat. 49 (2013) 428–455, for the two laws; P. Flajolet, A. Odlyzko,
 *  SIAM J. Discrete Math. 3 (1990) 216–240, for the transfer. */
export function tailToward(t: Trajectory, passage: Passage, starts: readonly Start[]): Answer<TailLaw> {
  const checked = checkStarts(starts).filter((s) => s.position > 0);
  if (checked.length === 0)
    return { refused: "Every particle starts at the barrier and is absorbed at once: K is certain and has no tail." };
  const d = toNumber(passage.index);
  const critical = passage.index[0] === 1 && passage.index[1] === 0;
  if (!critical && passage.etaError > MOST_ERROR)
    return {
      refused: `P(K = n) falls like n^(−1−d) with d = ${Number(d.toPrecision(6))}, but so large a d is felt only where P(K = n) is below any probability of interest, and its constant is lost in rounding.`,
    };
  const constant = critical ? logarithmicConstant(t, passage, checked) : powerConstant(t, passage, checked);
  if (!Number.isFinite(constant.value))
    return {
      refused: `The constant of n^(−1−d), d = ${Number(d.toPrecision(6))}, exceeds the largest number that can be given.`,
    };
  const only = starts.length === 1 && starts[0]?.particles === 1 ? starts[0] : null;
  return {
    kind: critical ? "logarithmic" : "power",
    s0: { value: 1, error: 0 },
    exponent: { value: d, error: critical ? 0 : d * (passage.indexSpread + ROUNDING) },
    slopeAtStart: only === null ? { refused: SEVERAL } : profileSlopeAt(t, only.position, 1),
    constant,
    period: t.base.period,
    offset: starts.reduce((sum, s) => sum + s.particles, 0),
    terms: 1,
    corrections: critical ? [1] : nextTerms(t, passage, checked),
    log2s0: ZERO,
    spread: 0,
  };
}

const SEVERAL = "The slope at the start is that of one particle; here the law is of several.";
const MOST_ERROR = 1e-3;
const CONSTANT_ROUNDINGS = 64;

/** Of several particles one alone reaches a large n: the constants add. On a lattice its points have all the probability. */
function powerConstant(t: Trajectory, passage: Passage, starts: readonly Start[]): Estimate {
  const chart = nodeChart(prepareOffspring(t.model.offspring), passage.index);
  const d = toNumber(passage.index);
  const slow = toNumber(passage.slow);
  const base = logOfFactor(chart, passage);
  let value = 0;
  let farthest = 0;
  for (const { position, particles } of starts) {
    const way = slow * position;
    // E^d − E
    value += particles * Math.exp(base + way) * Math.expm1((d - 1) * way);
    farthest = Math.max(farthest, way);
  }
  value *= t.base.period;
  const { etaError, indexSpread, slowSpread, shiftSpread } = passage;
  const logs = Math.abs(base) + d * (1 + Math.log(1 + d) + farthest);
  const relative =
    etaError +
    CONSTANT_ROUNDINGS * ROUNDING +
    2 * ROUNDING * logs +
    indexSpread * (logs + d / (d - 1)) +
    (1 + d) * (shiftSpread + farthest * slowSpread + lawUnit(t.model.offspring));
  return { value, error: value * relative };
}

/** ln of the constant over E^d − E. */
function logOfFactor(chart: NodeChart, { zeta, eta }: Passage): number {
  const { nearest, gap, index, resonance, series } = chart;
  const d = toNumber(index);
  const g = toNumber(gap);
  const unit = Math.log(toNumber(series.at(0, 1)));
  const met = Math.log(toNumber(zeta));
  if (nearest === 1) {
    // u = unit (A e^y + B e^{d y}), A = ζ/g, B = η − ζ/g, and 1/Γ(−1 − g) = g (1 + g)/Γ(1 − g)
    const fast = toNumber(zeta) - g * toNumber(eta);
    return Math.log(fast * (1 + g)) + (1 - d) * unit + d * (Math.log(g) - met) - logGamma(1 - g);
  }
  let power = resonance;
  for (let k = 0; k < nearest && power[0] !== 0; k += 1) power = multiply(power, zeta);
  const singular = Math.abs(g * toNumber(eta) + toNumber(power));
  const sine = g === 0 ? 1 : Math.sin(Math.PI * g) / (Math.PI * g);
  return (1 - d) * unit - d * met + Math.log(singular) + logGamma(1 + d) + Math.log(sine);
}

/** At the critical drift 1 − s = −Z ln Z + …, and E[s^K] contains λ x e^{λ x} Z. */
function logarithmicConstant(t: Trajectory, passage: Passage, starts: readonly Start[]): Estimate {
  const slow = toNumber(passage.slow);
  let value = 0;
  let error = 0;
  for (const { position, particles } of starts) {
    const way = slow * position;
    const one = particles * way * Math.exp(way) * t.base.period;
    value += one;
    error += one * ((1 + way) * (passage.slowSpread + 2 * ROUNDING) + 4 * ROUNDING);
  }
  return { value, error };
}

/** How near to 2 d may come before the first two corrections are one with a logarithm: their size is then taken from here. */
const APART = 0.1;

/** 1, and the coefficients of 1/n and n^{−(d − 1)} that the one term leaves out, relative to it; the second counts for d < 2 alone. */
function nextTerms(t: Trajectory, passage: Passage, starts: readonly Start[]): number[] {
  const law = prepareOffspring(t.model.offspring);
  const chart = nodeChart(law, passage.index);
  const d = toNumber(passage.index);
  const farthest = starts.at(-1) as Start;
  const mean = Math.exp(toNumber(passage.slow) * farthest.position);
  const strength = d / law.excess[0];
  const apart = Math.abs(2 - d) < APART ? (d < 2 ? APART : -APART) : 2 - d;
  // u = Z + a Z² + h Z^d (1 + b Z) + …; 2 c Z^{d + 1} is the product of Z and h Z^d in M(u) = c u² + …
  const c = secondCoefficient(law);
  const a = (strength * c) / apart;
  const b = (2 * strength * c) / d;
  const power = mean ** d;
  const first = power - mean;
  const second = power * (b * mean - d * a) - mean * (b - 2 * a - d * a + 2 * a * mean);
  const byN = (d * (d + 1)) / 2 - ((d + 1) * second) / first;
  if (d >= 2 || chart.nearest === 2) {
    const h = d < 2 ? hOf(chart, passage) : 0;
    return d < 2 ? [1, byN, lowTerm(h, d)] : [1, byN];
  }
  const g = toNumber(chart.gap);
  const slowPart = toNumber(passage.zeta) / g;
  const unit = toNumber(chart.series.at(0, 1));
  return [1, byN, lowTerm(((toNumber(passage.eta) - slowPart) * unit) / (unit * slowPart) ** d, d)];
}

/** −h d Γ(−d)/Γ(1 − 2d), Γ of negative arguments by reflection. */
function lowTerm(h: number, d: number): number {
  const gammas = logGamma(2 * d) - logGamma(1 + d);
  return -h * d * Math.exp(gammas) * (Math.sin(2 * Math.PI * d) / -Math.sin(Math.PI * d));
}

function hOf(chart: NodeChart, { zeta, eta }: Passage): number {
  const d = toNumber(chart.index);
  const unit = toNumber(chart.series.at(0, 1));
  const g = Math.min(toNumber(chart.gap), -APART);
  const resonant = toNumber(chart.resonance) * toNumber(zeta) ** chart.nearest;
  return unit ** (1 - d) * toNumber(zeta) ** -d * (toNumber(eta) + resonant / g);
}

/** c of M(u) = c u² + … */
function secondCoefficient(law: Branching): number {
  if (law.law === "finite") return (law.aboutOne[2] as readonly [number, number])[0];
  const small = 2 ** -20;
  return nonlinearity(law, small).value / small ** 2;
}

/** T(n) of a law that is no square-root law. */
export function powerProbability(law: TailLaw, n: number): TailProbability {
  if (!Number.isSafeInteger(n) || n < 1)
    throw new SolverError("bad_parameter", `The tail is asked for at n = ${n}; n must be an integer, at least 1.`);
  const { constant, exponent, corrections } = law;
  const relative = constant.error / constant.value;
  const log = Math.log(n);
  if (law.kind === "logarithmic") {
    const value = n === 1 ? Number.POSITIVE_INFINITY : constant.value / (n * log) ** 2;
    return {
      probability: scaledByPower(value, value * (relative + 8 * ROUNDING), ZERO, 0),
      omitted: (2 * Math.log(Math.max(log, 2))) / log,
    };
  }
  const d = "refused" in exponent ? 1 : exponent.value;
  const spread = "refused" in exponent ? 0 : exponent.error * log;
  const power = -(1 + d) * Math.log2(n);
  const error = constant.value * (relative + spread + ROUNDING * (8 + 2 * Math.abs(power)));
  const [, byN = 0, low = 0] = corrections;
  const omitted = Math.abs(byN) / n + Math.abs(low) * n ** (1 - d);
  return { probability: scaledByPower(constant.value, error, ZERO, 0, power), omitted };
}

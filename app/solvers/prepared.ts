import type { Contour } from "./contour.ts";
import { contoursFor } from "./contours.ts";
import { curvatureError } from "./curvature.ts";
import { SolverError } from "./errors.ts";
import { lawUnit } from "./input-rounding.ts";
import { nonlinearity } from "./offspring.ts";
import { divide, LN2, logarithm, multiply, toNumber } from "./pairs.ts";
import { profileAt, profileComplementAt } from "./profile.ts";
import { ROUNDING, readerOf, type TrajectoryReader } from "./reader.ts";
import { scaledByPower } from "./scaled.ts";
import { differenceValues, nodeValues } from "./sources.ts";
import { type Lattice, type Sums, sumAt, sumRange, sumsOf, type Wanted } from "./sums.ts";
import type { Pair, ScaledEstimate, Start, Starts, Trajectory } from "./types.ts";

/** A law made ready for reading at any n up to some bound. */
export interface PreparedLaw {
  readonly fine: Sums;
  readonly check: Sums;
  /** added to the power of two of every value: the size of a start too far away for doubles */
  readonly extra: number;
  readonly log2Radius: Pair;
  /** relative spread of s0 and of what multiplies s0^−n, under half a unit in each input */
  readonly radiusSpread: number;
  readonly factorSpread: number;
  /** a further relative spread at n, where that of the inputs is not of this form */
  readonly spreadAt?: (n: number) => number;
  /** the first n for which the sums are the law itself: 2 where a multiple of s was taken out of E[s^K] */
  readonly first: number;
  readonly lattice: Lattice;
  readonly method: string;
}

/** Beyond decay·x = FAR a start's law is the limit law times its size: the correction is of the relative size e^−FAR. */
const FAR = 600;
/** Below this decay·x, w(x, s) − s is read off as one difference, since P(K = n) ~ x for every n ≠ 1. */
const NEAR = 0.25;

/** Traces the law of K for particles at positions > 0, or of the limit law.
 *  @throws SolverError "not_converged" where no contour passes its tests. */
export function prepareLaw(t: Trajectory, starts: Starts, n: number, wanted: Wanted): PreparedLaw {
  const reader = readerOf(t);
  const contours = contoursFor(t, reader, n);
  const nearest = starts === "far" ? 0 : reader.decay * (starts[0] as Start).position;
  const distant = starts !== "far" && nearest > FAR;
  if (distant && reader.base.centre === 0 && !isSingle(starts)) throw new SolverError("not_converged", TOO_FAR);
  const source: Starts = distant ? "far" : starts;
  const near = source !== "far" && isSingle(source) && nearest < NEAR ? nearest : null;
  const { fine, check, reference } = contours;
  const particles = starts === "far" ? 1 : starts.reduce((sum, s) => sum + s.particles, 0);
  const lattice = { base: reader.base, offset: particles };
  const both = [fine, check];
  const differences = near === null ? [null] : both.map((contour) => differenceValues(reader, contour, near));
  const close = differences.every((values) => values !== null);
  const read = (contour: Contour, i: number) => {
    const values = close ? differences[i] : nodeValues(t, reader, contour, source);
    if (!values)
      throw new SolverError("not_converged", "The law could not be continued along its contour from this start.");
    return { sums: sumsOf(contour, reference, values, lattice, wanted), power: values.power ?? 0 };
  };
  const [first, second] = [read(fine, 0), read(check, 1)];
  const scale = reader.base.scale[0] === 1 ? 0 : particles * toNumber(divide(logarithm(reader.base.scale), LN2));
  return {
    fine: first.sums,
    check: second.sums,
    extra: (distant ? farSize(t, reader, starts) : 0) + scale + first.power,
    log2Radius: divide(logarithm(multiply(reference.radius, reader.base.scale)), LN2),
    radiusSpread: radiusSpread(t, reader),
    factorSpread: factorSpread(t, reader, starts),
    first: close ? 2 : 1,
    lattice,
    method: `Cauchy's integral along the slit from s0, ${fine.legNodes} + ${fine.arcNodes} nodes`,
  };
}

const TOO_FAR =
  "The particles start so far away that the probability that all their lines are absorbed is below the double's range.";

function isSingle(starts: readonly Start[]): boolean {
  return starts.length === 1 && starts[0]?.particles === 1;
}

/** log2 of Σ particles·B_0 e^{−decay x}. */
function farSize(t: Trajectory, reader: TrajectoryReader, starts: readonly Start[]): number {
  const nearest = (starts[0] as Start).position;
  const total = starts.reduce((sum, s) => sum + s.particles * Math.exp(-reader.decay * (s.position - nearest)), 0);
  return (Math.log(total * t.amplitude[0]) - reader.decay * nearest) / Math.LN2;
}

/** What half a unit in each input does to ln s0, or to that of the edge of a trajectory that does not turn. */
function radiusSpread(t: Trajectory, reader: TrajectoryReader): number {
  const { turning, law } = reader;
  if (turning !== null) return (turning.excessSpread * turning.excess[0]) / turning.s0[0];
  const unit = lawUnit(t.model.offspring);
  if (t.edge === null || t.edge.kind === "pole") return 2 * unit;
  const growth = law.mean[0] - nonlinearity(law, 1 - t.edge.s).derivative;
  return (2 * unit * growth) / (growth - 1);
}

/** What half a unit in each input does to the factor of s0^−n. */
function factorSpread(t: Trajectory, reader: TrajectoryReader, starts: Starts): number {
  const { turning } = reader;
  const base = t.amplitudeSpread + (turning === null ? t.decaySpread : turning.excessSpread + turning.amplitudeSpread);
  const curvature = turning === null ? 0 : curvatureError(t, reader, turning);
  if (starts === "far") return base + curvature;
  const perParticle = starts.reduce(
    (sum, s) => sum + s.particles * (base + reader.decay * s.position * (t.decaySpread + 2 * ROUNDING)),
    0,
  );
  return base + perParticle + curvature + ownRoundings(t, starts);
}

const NONE: ScaledEstimate = { mantissa: 0, exponent: 0, error: 0 };
/** Of a probability that is above 0, but whose every term passes below the double's range. */
const BELOW_RANGE: ScaledEstimate = { mantissa: 0, exponent: -960, error: 1 };

/** Of a product of many factors that are not near 1, and of the scale's power. */
function ownRoundings(t: Trajectory, starts: readonly Start[]): number {
  if (t.regime === "away") return 0;
  const particles = starts.reduce((sum, s) => sum + s.particles, 0);
  return particles * (FACTOR_ROUNDINGS * ROUNDING * (1 + Math.abs(Math.log2(t.base.scale[0]))) + t.base.scaleSpread);
}

const FACTOR_ROUNDINGS = 8;

/** Roundings that the two contours have in common: the turning point's expansion, and the first ones on the way from it. */
const SHARED_ROUNDINGS = 64;

/** Values at from, …, to with all errors: rounding, difference of the two contours, spread of the inputs. */
export function readLaw(law: PreparedLaw, from: number, to: number): ScaledEstimate[] {
  const { values, rounding } = sumRange(law.fine, from, to);
  const methodError = differences(law, values, from, to);
  const read: ScaledEstimate[] = [];
  for (let i = 0; i < values.length; i += 1) {
    const n = from + i;
    if (!isPossible(law.lattice, n)) {
      read.push(NONE);
      continue;
    }
    const value = values[i] as number;
    const spread =
      Math.abs(value) *
      (n * law.radiusSpread + law.factorSpread + (law.spreadAt?.(n) ?? 0) + SHARED_ROUNDINGS * ROUNDING);
    const error = (rounding[i] as number) + Math.abs(value) * (methodError[i] as number) + spread;
    // a probability is not below 0: where the rounding is larger than the value, that much is known
    const at =
      value < 0 && !takenOut(law, n)
        ? scaledByPower(0, error - value, law.log2Radius, n, law.extra)
        : scaledByPower(value, error, law.log2Radius, n, law.extra);
    read.push(at.mantissa === 0 && at.error === 0 ? BELOW_RANGE : at);
  }
  return read;
}

/** K keeps to its lattice; where nobody dies childless, what is absorbed is at least what started. */
function isPossible({ base, offset }: Lattice, n: number): boolean {
  return (n - offset) % base.period === 0 && !(base.centre === 0 && n < offset);
}

/** Where the sum is P(K = 1) − 1. */
function takenOut(law: PreparedLaw, n: number): boolean {
  return n < law.first;
}

/** Values of n between which the relative difference of the contours is carried over, as a share of n. */
const SAMPLE_STEP = 1.3;
/** The check contour is hardly better than the other, and some of their errors are alike: their difference counts so many times. */
const DIFFERENCE_FACTOR = 4;

/** Relative difference of the two contours for n = from, …, to, sampled on a geometric grid.
 *  @param values of the fine contour there */
function differences(law: PreparedLaw, values: Float64Array, from: number, to: number): Float64Array {
  const relative = new Float64Array(to - from + 1);
  const differenceAt = (at: number) => {
    const n = onLattice(law.lattice, at);
    const a = n <= to ? (values[n - from] as number) : sumAt(law.fine, n);
    const b = sumAt(law.check, n);
    return a === b ? 0 : Math.abs(a - b) / Math.max(Math.abs(a), Number.MIN_VALUE);
  };
  let previous = differenceAt(from);
  let n = from;
  while (n <= to) {
    const next = Math.min(to, Math.max(n + 1, Math.ceil(n * SAMPLE_STEP)));
    const at = differenceAt(next);
    const larger = DIFFERENCE_FACTOR * Math.max(previous, at);
    for (let m = n; m <= next; m += 1) relative[m - from] = Math.max(relative[m - from] as number, larger);
    previous = at;
    if (next === to) break;
    n = next;
  }
  return relative;
}

/** The first n of the lattice from `at` on. */
function onLattice({ base, offset }: Lattice, at: number): number {
  return at + ((((offset - at) % base.period) + base.period) % base.period);
}

/** P(K = 0) and 1 − P(K = 0) for particles at given positions, to full relative accuracy each. */
export function zeroOf(t: Trajectory, starts: readonly Start[]): { zero: ScaledEstimate; complement: ScaledEstimate } {
  if (t.base.centre === 0) return { zero: NONE, complement: { mantissa: 1 / 2, exponent: 1, error: 0 } };
  let log = 0;
  let error = 0;
  for (const { position, particles } of starts) {
    const u = profileComplementAt(t, position, 0);
    if ("refused" in u) throw new SolverError("not_converged", u.refused);
    // where w is small its own error counts, not that of 1 − w
    const w = u.value > 1 / 2 ? profileAt(t, position, 0) : { value: 1 - u.value, error: u.error };
    if ("refused" in w) throw new SolverError("not_converged", w.refused);
    log += particles * (u.value > 1 / 2 ? Math.log(w.value) : Math.log1p(-u.value));
    error += (particles * w.error) / Math.max(w.value, Number.MIN_VALUE) + ROUNDING * Math.abs(log);
  }
  const power = log / Math.LN2;
  const survivors = -Math.expm1(log);
  return {
    zero: scaledByPower(1, error + 4 * ROUNDING * (1 + Math.abs(log)), [0, 0], 0, power),
    complement: scaledByPower(survivors, Math.exp(log) * error + 4 * ROUNDING * survivors, [0, 0], 0),
  };
}

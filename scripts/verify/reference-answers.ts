import type { Decimal, ExactModel } from "./exact-model.ts";
import { excessOf, toFixed } from "./exact-model.ts";
import { Fixed, lengthOf, type Real } from "./fixed.ts";
import { fieldSeries, fixedPointSeries, flowSeries, linearisingAtOne, linearisingSeries, multiplied } from "./flow.ts";
import { at, generating } from "./generating.ts";
import { type Constants, constantsOf, ReferenceTrajectory } from "./reference-process.ts";
import { inT, powerOf, type SingularExpansion, times } from "./singular.ts";

export interface ExactStart {
  readonly position: Decimal;
  readonly particles: number;
}

export type ExactStarts = readonly ExactStart[] | "far";

/** Bits beyond those that the smallest value asked for needs. */
const GUARD = 128;
/** Bits that a probability must keep beyond what the recursion's rounding may have grown to. */
const JUDGED = 90;
/** Powers of t kept in the expansion at s0. */
const SINGULAR_ORDER = 41;

/** Bits that a recursion for the law loses up to n. A deviation grows as if it met a singularity (1 − w/s*)^ratio at the fixed point
 *  s* that the trajectory leaves, whose coefficients are binomial(n + |ratio|, n) s*^−n where the ratio is negative.
 *  @param perTerm log2 of the law's own radius of convergence over s*
 *  @param ratio the rate at which deviations from the trajectory leave s*, over its own */
export function recursionBits(n: number, perTerm: number, ratio: number): number {
  let bits = n * perTerm;
  if (ratio < 0) for (let k = 1; k <= n; k += 1) bits += Math.log2((k - ratio) / k);
  return bits;
}

/** Answers in many digits about one model, by methods that share nothing with the solvers: recursions in s, see flow.ts. */
export class ReferenceAnswers {
  readonly f: Fixed;
  readonly constants: Constants;
  readonly trajectory: ReferenceTrajectory;
  private readonly below: bigint;
  private escape: ReferenceTrajectory | null = null;

  /** @param bits of the smallest value that will be asked for, below 1 */
  constructor(exact: ExactModel, bits: number) {
    this.f = new Fixed(GUARD + Math.ceil(bits));
    const { f } = this;
    this.constants = constantsOf(f, exact);
    this.below = -f.one - f.one / 64n;
    const from = this.constants.regime === "away" ? "one" : "extinction";
    this.trajectory = new ReferenceTrajectory(f, this.constants, from, this.below);
  }

  real(units: bigint): Real {
    return { units, exponent: -this.f.bits };
  }

  get mean(): bigint {
    return excessOf(this.f, this.constants.law) + this.f.one;
  }

  get criticalDrift(): bigint {
    return this.f.squareRoot(4n * this.f.multiply(this.constants.diffusion, this.constants.growth));
  }

  get s0(): bigint | null {
    const top = this.trajectory.turning;
    return top === null ? null : at(top.series, 0);
  }

  /** B_0, in the regime away. */
  get amplitude(): bigint {
    const { trajectory } = this;
    return trajectory.amplitude(this.placeOf(0n));
  }

  get slopeAtBarrier(): bigint {
    if (this.trajectory.point === 0n) return 0n;
    return this.trajectory.at(this.placeOf(0n)).slope;
  }

  private placeOf(s: bigint) {
    const place = this.trajectory.locate(s);
    if (place === null) throw new Error("The reference's trajectory does not go so far.");
    return place;
  }

  /** w(x, s) and ∂w/∂x; null beyond where the trajectory goes. */
  profile(x: bigint, s: bigint): { value: bigint; slope: bigint } | null {
    const { trajectory } = this;
    if (s === trajectory.point) return { value: s, slope: 0n };
    const place = trajectory.locate(s);
    return place && trajectory.at(trajectory.moved(place, x));
  }

  /** w(x, s0) and its slope. */
  profileAtTop(x: bigint): { value: bigint; slope: bigint } | null {
    const { trajectory } = this;
    if (trajectory.turning === null) return null;
    return trajectory.at(trajectory.moved({ side: "above", xi: trajectory.turning.xi }, x));
  }

  /** 1 − E_x[1^…] on the trajectory that leaves the extinction probability: the chance that the process survives for ever. */
  survival(x: bigint): bigint | null {
    const { f, constants } = this;
    if (constants.growth <= 0n || constants.regime === "toward") return 0n;
    if (constants.regime === "between") this.escape = this.trajectory;
    this.escape ??= new ReferenceTrajectory(f, constants, "extinction", this.below);
    const place = this.escape.locate(f.one);
    return place && f.one - this.escape.at(this.escape.moved(place, x)).value;
  }

  /** P(K = n), n = 0, …, order. */
  law(starts: ExactStarts, order: number): bigint[] {
    const { f, constants, trajectory } = this;
    if (starts !== "far") return this.together(starts, order, (x) => this.single(x, order));
    const place = this.placeOf(0n);
    const a = fieldSeries(f, constants, 0n, trajectory.at(place).slope, order);
    const start = trajectory.amplitude(place);
    return linearisingSeries(f, a, trajectory.decay, start, order).map((b, n) => (n === 0 ? 0n : -f.divide(b, start)));
  }

  /** P(K = n) of a law, or null where the recursion's rounding leaves less than it takes to judge an error. */
  probability(law: readonly bigint[], n: number): Real | null {
    return this.judgeable(at(law, n), n);
  }

  /** P(K > n), the same. */
  above(law: readonly bigint[], n: number): Real | null {
    return this.judgeable(
      law.slice(0, n + 1).reduce((rest, p) => rest - p, this.f.one),
      n,
    );
  }

  private judgeable(value: bigint, n: number): Real | null {
    const { f, trajectory } = this;
    const top = this.s0 ?? f.one;
    const perTerm = trajectory.point === 0n ? 0 : Math.max(0, Math.log2(f.toNumber(f.divide(top, trajectory.point))));
    const growth = recursionBits(n, perTerm, f.toNumber(trajectory.damping) - 1);
    return value !== 0n && lengthOf(value) < growth + JUDGED ? null : this.real(value);
  }

  private single(x: bigint, order: number): readonly bigint[] {
    const { f, constants, trajectory } = this;
    if (trajectory.point === 0n) return fixedPointSeries(f, constants, 0n, -trajectory.decay, x, order).value;
    const place = this.placeOf(0n);
    const a = fieldSeries(f, constants, 0n, trajectory.at(place).slope, order);
    return flowSeries(f, constants, a, trajectory.at(trajectory.moved(place, x)), order).value;
  }

  /** The product over all particles of the series that `of` gives for each position. */
  private together(starts: readonly ExactStart[], order: number, of: (x: bigint) => readonly bigint[]): bigint[] {
    let product: bigint[] = [this.f.one];
    for (const { position, particles } of starts) {
      const one = of(toFixed(this.f, position));
      for (let i = 0; i < particles; i += 1) product = multiplied(this.f, product, one, order);
    }
    return product;
  }

  /** Coefficients of E[(1 + ε)^K | K finite], or of the limit law. */
  momentSeries(starts: ExactStarts, order: number): bigint[] {
    const { f, constants, trajectory } = this;
    if (starts === "far") {
      const start = this.amplitude;
      return linearisingAtOne(f, constants, trajectory.decay, order).map((b, k) =>
        k === 0 ? f.one : -f.divide(b, start),
      );
    }
    if (constants.regime === "between") {
      const place = this.placeOf(f.one);
      const a = fieldSeries(f, constants, f.one, trajectory.at(place).slope, order);
      const series = this.together(
        starts,
        order,
        (x) => flowSeries(f, constants, a, trajectory.at(trajectory.moved(place, x)), order).value,
      );
      return series.map((c) => f.divide(c, at(series, 0)));
    }
    const { drift, diffusion, root } = constants;
    // away: minus the fast rate, a root that vanishes nowhere; toward: the slow one
    const rate = f.divide(-drift - root, 2n * diffusion);
    return this.together(starts, order, (x) => fixedPointSeries(f, constants, f.one, rate, x, order).value);
  }

  /** P(K = ∞). */
  infinite(starts: readonly ExactStart[]): bigint {
    const { f, constants } = this;
    if (constants.regime !== "between") return 0n;
    let finite = f.one;
    for (const { position, particles } of starts) {
      const one = this.profile(toFixed(f, position), f.one);
      if (one === null) throw new Error("The reference's trajectory does not reach s = 1.");
      finite = f.multiply(finite, f.power(one.value, particles));
    }
    return f.one - finite;
  }

  /** The expansion at s0, or null without a turning point. */
  singular(starts: ExactStarts): SingularExpansion | null {
    const { f, trajectory } = this;
    const top = trajectory.turning;
    if (top === null) return null;
    const order = Math.min(SINGULAR_ORDER, top.series.length - 3);
    if (starts === "far") {
      const size = f.divide(f.exponential(-top.xi), this.amplitude);
      let factor = size;
      const outer = Array.from({ length: order + 1 }, (_, k) => {
        if (k > 0) factor = -factor / BigInt(k);
        return k === 0 ? f.one + size : factor;
      });
      return { s0: at(top.series, 0), shares: inT(f, top.series, outer, order), period: 1 };
    }
    const shares = this.together(starts, order, (x) =>
      inT(f, top.series, trajectory.expansion(trajectory.moved({ side: "above", xi: top.xi }, x)), order),
    );
    return { s0: at(top.series, 0), shares, period: this.period() };
  }

  /** Where nobody dies childless and every line is absorbed, K grows by steps of the greatest common divisor of children − 1. */
  private period(): number {
    const { law } = this.constants;
    if (law.law !== "finite" || this.trajectory.point !== 0n) return 1;
    let divisor = 0;
    law.probabilities.forEach((p, k) => {
      let [a, b] = [k - 1, divisor];
      if (p === 0n || k < 2) return;
      while (b > 0) [a, b] = [b, a % b];
      divisor = a;
    });
    return divisor;
  }

  /** C of P(K = n) ~ C n^{−3/2} s0^{−n}: the coefficient of t is C·(−2√π). */
  tailConstant({ shares, period }: SingularExpansion): bigint {
    const { f } = this;
    return f.divide(-at(shares, 1) * BigInt(period), 2n * f.squareRoot(f.pi));
  }

  /** C n^{−3/2} s0^{−n}. */
  tailAt(expansion: SingularExpansion, n: number): Real {
    const { f } = this;
    const root = f.squareRoot(f.integer(n));
    const value = f.divide(this.tailConstant(expansion), BigInt(n) * root);
    return times(f, this.real(value), powerOf(f, expansion.s0, -n));
  }

  /** The rate at which w(x, 0) approaches its limit. */
  get farDecay(): bigint {
    return this.trajectory.decay;
  }

  /** f′ at the extinction probability, for its conditioning. */
  slopeAtExtinction(): bigint {
    return generating(this.f, this.constants.law, this.constants.extinction).slope - this.f.one;
  }
}

import { type Branch, derivative, type Equation, type Segment, walkBranch, zeroOf } from "./branch.ts";
import { type ExactModel, excessOf, fixedLaw, toFixed } from "./exact-model.ts";
import type { Fixed } from "./fixed.ts";
import type { FlowEquation } from "./flow.ts";
import { at, composer, evaluate, type FixedLaw, generating } from "./generating.ts";

export type ReferenceRegime = "away" | "between" | "toward";

/** What a trajectory leaves: the fixed point s* and the rate at which it does, w ≈ s* ∓ e^{−decay x}. */
interface Leaving {
  readonly point: bigint;
  readonly decay: bigint;
}

/** A place on a trajectory: ξ on the side below or above its fixed point. */
interface Place {
  readonly side: "below" | "above";
  readonly xi: bigint;
}

/** The numbers of a model in fixed point. */
export interface Constants extends FlowEquation {
  /** f′(1) */
  readonly growth: bigint;
  /** √(drift² − 4 D f′(1)), 0 where it is imaginary */
  readonly root: bigint;
  readonly regime: ReferenceRegime;
  /** the smallest root of G(s) = s in [0, 1] */
  readonly extinction: bigint;
}

/** The constants of a model as it was meant. */
export function constantsOf(f: Fixed, exact: ExactModel): Constants {
  const law = fixedLaw(f, exact.offspring);
  const rate = toFixed(f, exact.rate);
  const diffusion = toFixed(f, exact.diffusion);
  const growth = f.multiply(rate, excessOf(f, law));
  const product = 4n * f.multiply(diffusion, growth);
  const critical = f.squareRoot(product);
  const meant = exact.drift;
  const drift = meant === "critical" ? critical : meant === "critical toward" ? -critical : toFixed(f, meant);
  const discriminant = typeof meant === "string" ? 0n : f.multiply(drift, drift) - product;
  const regime = growth <= 0n ? "away" : discriminant < 0n ? "between" : drift > 0n ? "away" : "toward";
  return {
    law,
    rate,
    diffusion,
    drift,
    growth,
    root: f.squareRoot(discriminant),
    regime,
    extinction: smallestRoot(f, law),
  };
}

/** Newton's method from 0 on a convex function. */
function smallestRoot(f: Fixed, law: FixedLaw): bigint {
  if (law.law === "geometric") return law.mean > f.one ? f.divide(f.one, law.mean) : f.one;
  if (excessOf(f, law) <= 0n) return f.one;
  let q = 0n;
  for (let round = 0; round < 500; round += 1) {
    const { value, slope } = generating(f, law, q);
    const step = f.divide(value - q, f.one - slope);
    q += step;
    if (step < 16n) break;
  }
  return q;
}

/** Orders of the expansions for so many bits: near the optimum of work, order² steps(order). */
const ORDER_SHARE = 0.3;

/** 1 − w at which a trajectory that tends to 1 towards the barrier is left, as a power of 1/2. */
const NEAREST = 60n;

/** A trajectory of D w″ + drift w′ + f(w) = 0 in many digits, with both its sides. */
export class ReferenceTrajectory {
  readonly f: Fixed;
  readonly constants: Constants;
  readonly decay: bigint;
  /** drift/(D decay): 1 + the other rate at that point over this one */
  readonly damping: bigint;
  /** the fixed point it leaves */
  readonly point: bigint;
  readonly below: Branch;
  readonly above: Branch;
  private readonly series: readonly bigint[];
  private readonly reach: bigint;

  /** @param from "one": the fast direction at w = 1 (regime away); "extinction": the smallest root of G(s) = s
   *  @param lowest how far below w = 0 it is followed, in fixed point */
  constructor(f: Fixed, constants: Constants, from: "one" | "extinction", lowest: bigint) {
    this.f = f;
    this.constants = constants;
    const { point, decay } = from === "one" ? leavingOne(f, constants) : leavingExtinction(f, constants);
    this.point = point;
    this.decay = decay;
    const order = Math.ceil(ORDER_SHARE * f.bits);
    const unit = f.multiply(constants.diffusion, f.multiply(decay, decay));
    this.damping = f.divide(constants.drift, f.multiply(constants.diffusion, decay));
    const equation: Equation = {
      law: constants.law,
      damping: this.damping,
      strength: f.divide(constants.rate, unit),
    };
    this.series = originSeries(f, equation, point, order);
    this.reach = reachOf(f, this.series, order);
    const start = (z: bigint) => {
      const { value, slope } = evaluate(f, this.series, z);
      return { xi: -f.logarithm(this.reach), value, slope: -f.multiply(z, slope) };
    };
    this.below = walkBranch(f, equation, start(this.reach), order, (w) => w < lowest);
    const highest = this.upperEnd();
    this.above = walkBranch(f, equation, start(-this.reach), order, (w) => w > highest);
  }

  /** Short of 1 in the regime toward, and of the pole of a geometric law; no end otherwise. */
  private upperEnd(): bigint {
    const { f, constants } = this;
    if (constants.regime === "toward") return f.one - (f.one >> NEAREST);
    if (constants.law.law !== "geometric") return f.integer(2 ** 40);
    return f.one + (f.divide(f.one, constants.law.mean) * 999_999n) / 1_000_000n;
  }

  /** s0, and the expansion where w turns; null where the walk met no turning point. */
  get turning(): Segment | null {
    return this.above.turning;
  }

  /** Where w has the value s ≠ point; null where the trajectory does not go so far. */
  locate(s: bigint): Place | null {
    const side = s < this.point ? "below" : "above";
    const branch = this[side];
    const beyond = (w: bigint) => (side === "below" ? w <= s : w >= s);
    const first = branch.segments[0] as Segment;
    if (beyond(at(first.series, 0))) return { side, xi: -this.f.logarithm(this.inSeries(s)) };
    for (const [i, { xi, series }] of branch.segments.entries()) {
      const far = (branch.segments[i + 1]?.xi ?? branch.end) - xi;
      if (!beyond(evaluate(this.f, series, far).value)) continue;
      return { side, xi: xi + zeroOf(this.f, [at(series, 0) - s, ...series.slice(1)], far) };
    }
    return null;
  }

  /** |z| with w(z) = s, within the power series' reach. */
  private inSeries(s: bigint): bigint {
    let z = this.point - s;
    for (let digits = 2; digits < 4 * this.f.bits; digits *= 2) {
      const { value, slope } = evaluate(this.f, this.series, z);
      z -= this.f.divide(value - s, slope);
    }
    return z < 0n ? -z : z;
  }

  /** The place moved by x away from the barrier. */
  moved(place: Place, x: bigint): Place {
    return { side: place.side, xi: place.xi + this.f.multiply(this.decay, x) };
  }

  /** w and ∂w/∂x [1/length]. */
  at(place: Place): { value: bigint; slope: bigint } {
    const { f } = this;
    const branch = this[place.side];
    const first = branch.segments[0] as Segment;
    if (place.xi >= first.xi) {
      const size = f.exponential(-place.xi);
      const z = place.side === "below" ? size : -size;
      const { value, slope } = evaluate(f, this.series, z);
      return { value, slope: -f.multiply(this.decay, f.multiply(z, slope)) };
    }
    const { xi, series } = branch.segments.findLast((s) => s.xi >= place.xi) as Segment;
    const { value, slope } = evaluate(f, series, place.xi - xi);
    return { value, slope: f.multiply(this.decay, slope) };
  }

  /** z = ±e^{−ξ}, which is B_s at the place of s. */
  amplitude(place: Place): bigint {
    const size = this.f.exponential(-place.xi);
    return place.side === "below" ? size : -size;
  }

  /** Taylor coefficients of w in ξ about a place. */
  expansion(place: Place): bigint[] {
    const { f } = this;
    const branch = this[place.side];
    const first = branch.segments[0] as Segment;
    if (place.xi < first.xi) {
      const { xi, series } = branch.segments.findLast((s) => s.xi >= place.xi) as Segment;
      return shifted(f, series, place.xi - xi);
    }
    // w = Σ c_k z^k, and z^k = z_0^k e^{−k h}
    const z = this.amplitude(place);
    const terms: bigint[] = [];
    let power = f.one;
    for (const c of this.series) {
      terms.push(f.multiply(c, power));
      power = f.multiply(power, z);
    }
    const out: bigint[] = [];
    let scaled = terms;
    for (let j = 0; j < this.series.length; j += 1) {
      out.push(scaled.reduce((sum, t) => sum + t, 0n));
      scaled = scaled.map((t, k) => (-t * BigInt(k)) / BigInt(j + 1));
    }
    return out;
  }
}

/** Taylor coefficients about another point: repeated derivatives over factorials. */
function shifted(f: Fixed, series: readonly bigint[], h: bigint): bigint[] {
  const out: bigint[] = [];
  let rest: readonly bigint[] = series;
  for (let j = 0; j < series.length; j += 1) {
    out.push(evaluate(f, rest, h).value);
    rest = derivative(rest).map((c) => c / BigInt(j + 1));
  }
  return out;
}

function leavingOne(f: Fixed, c: Constants): Leaving {
  return { point: f.one, decay: f.divide(c.drift + c.root, 2n * c.diffusion) };
}

/** At a saddle f′(q) < 0 and the root is real for every drift. */
function leavingExtinction(f: Fixed, c: Constants): Leaving {
  const { slope } = generating(f, c.law, c.extinction);
  const growth = f.multiply(c.rate, slope - f.one);
  const root = f.squareRoot(f.multiply(c.drift, c.drift) - 4n * f.multiply(c.diffusion, growth));
  return { point: c.extinction, decay: f.divide(c.drift + root, 2n * c.diffusion) };
}

/** w = point − z + Σ c_k z^k: k² c_k − damping k c_k + strength [z^k] (G(w) − w) = 0. */
function originSeries(f: Fixed, { law, damping, strength }: Equation, point: bigint, order: number): bigint[] {
  const w = [point, -f.one];
  const compose = composer(f, law, w);
  compose(0);
  const linear = f.multiply(strength, -compose(1) - f.one);
  for (let k = 2; k <= order; k += 1) {
    w[k] = 0n;
    const source = f.multiply(strength, compose(k));
    const bracket = f.integer(k * k) - BigInt(k) * damping + linear;
    w[k] = -f.divide(source, bracket);
    compose(k);
  }
  return w;
}

/** Largest |z| at which the series is used: its last terms below 2^−bits, and dw/dz still near −1. */
function reachOf(f: Fixed, series: readonly bigint[], order: number): bigint {
  let log = -3;
  for (let k = order - 3; k <= order; k += 1) {
    const size = f.toNumber(at(series, k));
    if (size !== 0) log = Math.min(log, -(f.bits + Math.log2(Math.abs(size))) / k);
  }
  let reach = f.one >> BigInt(Math.ceil(-log));
  const near = (z: bigint) => {
    const slope = f.toNumber(evaluate(f, series, z).slope);
    return slope < -1 / 2 && slope > -2;
  };
  while (!(near(reach) && near(-reach))) reach >>= 1n;
  return reach;
}

import { Expander, type Expansion, evaluate, type PointValue, pointValue } from "./expansion.ts";
import { type Branching, prepareOffspring } from "./offspring.ts";
import { toNumber } from "./pairs.ts";
import { Rays } from "./rays.ts";
import { saddleOf } from "./saddle.ts";
import type { Base, Knot, Trajectory, Turning } from "./types.ts";
import { SLOW_RATIO } from "./walk.ts";

/** Which side of w = 1: below (w < 1, z > 0) or above (w > 1, z < 0). */
export type Side = "below" | "above";

/** A place on the real trajectory: z = ±e^{−ξ}. */
export interface Place {
  readonly side: Side;
  readonly xi: number;
  /** bound on the error of ξ */
  readonly error: number;
}

/** One rounding, relative. */
export const ROUNDING = 2 ** -53;
/** Roundings that one evaluation of a Taylor polynomial may cost. */
const EVALUATION_ROUNDINGS = 8;
const NEWTON_ROUNDS = 60;
/** Slow over fast rate below which continuing against the damping would lose digits. */
const STIFF_RATIO = -1.5;

/** A trajectory made ready for reading: the expansions at its knots, made when first needed. */
export class TrajectoryReader {
  /** the law of offspring in the trajectory's own coordinates, see Base */
  readonly law: Branching;
  readonly base: Base;
  readonly decay: number;
  readonly expander: Expander;
  readonly turning: Turning | null;
  /** no particle can ever have two or more children: u = z exactly */
  readonly sterile: boolean;
  /** largest s, in units of the base's scale, at which w(x, s) is given: s0, or just short of where a trajectory without turning point ends */
  readonly largest: number;
  /** set where continuation must keep to decreasing Re ξ */
  readonly rays: Rays | null;
  private readonly t: Trajectory;
  private readonly expansions: Record<Side, (Expansion | undefined)[]> = { below: [], above: [] };
  private readonly scratch: PointValue = pointValue();

  constructor(t: Trajectory) {
    this.t = t;
    const law = prepareOffspring(t.model.offspring);
    this.law = t.regime === "away" ? law : saddleOf(law).law;
    this.base = t.base;
    this.decay = toNumber(t.decay);
    this.expander = new Expander(t, this.law);
    this.turning = "refused" in t.turning ? null : t.turning;
    this.rays = t.ratio[0] < STIFF_RATIO && t.ratio[0] >= SLOW_RATIO ? new Rays(this) : null;
    this.sterile = this.turning === null && t.edge === null && t.passage === null;
    if (this.sterile) this.largest = Number.POSITIVE_INFINITY;
    else if (t.passage !== null) this.largest = 1 / this.base.scale[0];
    else
      this.largest = this.turning === null ? this.base.centre - (t.above.at(-1) as Knot).u : toNumber(this.turning.s0);
  }

  /** Largest |z| at which the power series at z = 0 is used. */
  get seriesReach(): number {
    return this.t.seriesReach;
  }

  /** out = u and du/dξ at z from the power series, |z| ≤ seriesReach, to full relative accuracy. */
  evaluateSeries(zRe: number, zIm: number, out: PointValue): void {
    const { series, seriesScale } = this.t;
    const re = zRe / seriesScale;
    const im = zIm / seriesScale;
    let vr = 0;
    let vi = 0;
    let dr = 0;
    let di = 0;
    for (let k = series.length - 1; k >= 1; k -= 1) {
      const c = series[k] as number;
      const v = vr * re - vi * im + c;
      vi = vr * im + vi * re;
      vr = v;
      const d = dr * re - di * im + k * c;
      di = dr * im + di * re;
      dr = d;
    }
    out.re = vr * re - vi * im;
    out.im = vr * im + vi * re;
    out.slopeRe = -(dr * re - di * im);
    out.slopeIm = -(dr * im + di * re);
  }

  /** out = u and du/dξ at a real place; returns a bound on the rounding error of u, exclusive of that of ξ. */
  evaluateAt(side: Side, xi: number, out: PointValue): number {
    const z = Math.exp(-xi);
    if (z <= this.t.seriesReach) {
      this.evaluateSeries(side === "below" ? z : -z, 0, out);
      return EVALUATION_ROUNDINGS * ROUNDING * Math.abs(out.re);
    }
    const c = this.expansionNear(side, xi);
    evaluate(c, xi - c.xiRe, 0, out);
    const size = Math.max(Math.abs(out.re), Math.abs(c.re[0] as number));
    return ROUNDING * (EVALUATION_ROUNDINGS * size + (2 + Math.abs(xi)) * Math.abs(out.slopeRe));
  }

  /** The expansion about the knot nearest to ξ on one side. */
  expansionNear(side: Side, xi: number): Expansion {
    const knots = this.t[side];
    let low = 0;
    let high = knots.length - 1;
    // knots run towards decreasing ξ
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if ((knots[middle] as Knot).xi > xi) low = middle;
      else high = middle;
    }
    const nearer = Math.abs((knots[low] as Knot).xi - xi) <= Math.abs((knots[high] as Knot).xi - xi) ? low : high;
    return this.expansionAt(side, nearer);
  }

  private expansionAt(side: Side, index: number): Expansion {
    const known = this.expansions[side][index];
    if (known !== undefined) return known;
    const knot = this.t[side][index] as Knot;
    const made = this.expander.create();
    this.expander.expand(knot.xi, 0, { re: knot.u, im: 0, slopeRe: knot.slope, slopeIm: 0 }, made);
    this.expansions[side][index] = made;
    return made;
  }

  /** The expansion about the turning point, where du/dξ = 0. */
  topExpansion(): Expansion {
    return this.expansionAt("above", this.t.above.length - 1);
  }

  /** The place where u takes a value, not 0, down to that at s0. Within a few units of s0, the turning point itself. */
  locate(u: number): Place {
    if (u < 0 && this.turning !== null) {
      const gap = this.turning.excess[0] + u + this.turning.excess[1];
      if (gap <= this.unitsAtTop() * Number.EPSILON * this.turning.s0[0]) {
        const xi = (this.t.above.at(-1) as Knot).xi;
        return { side: "above", xi, error: ROUNDING * (1 + Math.abs(xi)) };
      }
      const near = this.locateNearTop(gap);
      if (near !== null) return near;
    }
    const side: Side = u > 0 ? "below" : "above";
    return this.refine(side, u, this.bracket(side, u));
  }

  /** A value of s scaled by a double-double has its own rounding. */
  private unitsAtTop(): number {
    return this.base.scale[0] === 1 ? 2 : 4;
  }

  /** Solves u(ξ0 + y) − u(ξ0) = gap for small y > 0, where u rises as y². */
  private locateNearTop(gap: number): Place | null {
    const top = this.topExpansion();
    let y = Math.sqrt(gap / (top.re[2] as number));
    if (y > top.reach / 2) return null;
    for (let round = 0; round < NEWTON_ROUNDS; round += 1) {
      evaluate(top, y, 0, this.scratch, true);
      const step = (this.scratch.re - gap) / this.scratch.slopeRe;
      y -= step;
      if (Math.abs(step) <= 2 * ROUNDING * y) break;
    }
    const xi = top.xiRe + y;
    return { side: "above", xi, error: ROUNDING * (2 + Math.abs(xi) + EVALUATION_ROUNDINGS * y) };
  }

  /** Two ξ between which u passes the wanted value; the series' own inverse where it is small. */
  private bracket(side: Side, u: number): { low: number; high: number; first: number } {
    const knots = this.t[side];
    const size = Math.abs(u);
    const start = knots[0] as Knot;
    if (size <= Math.abs(start.u)) {
      const first = -Math.log(size);
      return { low: start.xi, high: Math.max(first, start.xi) + 2, first: Math.max(first, start.xi) };
    }
    const index = knots.findIndex((k) => Math.abs(k.u) >= size);
    const beyond = index < 0 ? knots.length - 1 : index;
    const low = (knots[beyond] as Knot).xi;
    const high = (knots[beyond - 1] as Knot).xi;
    return { low, high, first: (low + high) / 2 };
  }

  /** Newton's method kept within a bracket. */
  private refine(side: Side, u: number, bracket: { low: number; high: number; first: number }): Place {
    let { low, high, first: xi } = bracket;
    const sign = Math.sign(u);
    let error = 0;
    for (let round = 0; round < NEWTON_ROUNDS; round += 1) {
      const rounding = this.evaluateAt(side, xi, this.scratch);
      const { re, slopeRe } = this.scratch;
      error = Math.abs(rounding / slopeRe) + ROUNDING * (1 + Math.abs(xi));
      // |u| falls as ξ grows
      if (sign * (re - u) > 0) low = xi;
      else high = xi;
      const step = (u - re) / slopeRe;
      if (Math.abs(step) <= error / 4) return { side, xi: xi + step, error };
      const next = xi + step;
      xi = next > low && next < high ? next : (low + high) / 2;
    }
    return { side, xi, error: error + (high - low) };
  }
}

const readers = new WeakMap<Trajectory, TrajectoryReader>();

/** The reader of a trajectory, made once. */
export function readerOf(t: Trajectory): TrajectoryReader {
  const known = readers.get(t);
  if (known !== undefined) return known;
  const made = new TrajectoryReader(t);
  readers.set(t, made);
  return made;
}

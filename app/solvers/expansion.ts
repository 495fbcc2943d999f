import { type ComplexSeries, type Composer, complexComposer, complexSeries, type Register } from "./complex-series.ts";
import type { Branching } from "./offspring.ts";
import type { Trajectory } from "./types.ts";

/** A Taylor polynomial of u about a complex ξ, in double precision. */
export interface Expansion extends ComplexSeries {
  xiRe: number;
  xiIm: number;
  /** largest |h| at which it is exact to rounding */
  reach: number;
}

/** Terms of the expansions. The walk's knots are a fifth of the radius apart, so half of that leaves 0.1^ORDER. */
const ORDER = 24;
/** Size of the last terms, relative to u, up to which an expansion is used. */
const LAST_TERM = 2 ** -55;
/** Share of the damping's own scale that one expansion covers. */
const DAMPING_SHARE = 4;

/** Slow over fast rate below which the slow motion is tried first: in double precision it is told from the trajectory's by nothing at a
 *  weaker damping than in walk.ts, and where its rounds do not settle, the equation itself is expanded. */
const SLOW_RATIO = -300;
/** Rounds of the slow motion, and what ends them; see walk.ts. */
const SLOW_ROUNDS = 80;
const SLOW_GAIN = 0.7;
const SETTLED = 2 ** -51;
const LONGEST = 1;

/** u and du/dξ at a complex point. */
export interface PointValue {
  re: number;
  im: number;
  slopeRe: number;
  slopeIm: number;
}

/** A place for what an expansion gives at a point: filled again and again, so that loops allocate nothing. */
export function pointValue(): PointValue {
  return { re: 0, im: 0, slopeRe: 0, slopeIm: 0 };
}

/** Makes Taylor expansions of the normalised equation at any state. */
export class Expander {
  private readonly ratio: number;
  private readonly strength: number;
  private readonly work: ComplexSeries;
  private readonly compose: Composer;
  private readonly register: Register = { re: 0, im: 0 };

  constructor(t: Trajectory, law: Branching) {
    this.ratio = t.ratio[0];
    this.strength = t.strength[0];
    this.work = complexSeries(ORDER + 1);
    this.compose = complexComposer(law, this.work);
  }

  create(): Expansion {
    return { ...complexSeries(ORDER + 1), xiRe: 0, xiIm: 0, reach: 0 };
  }

  /** Fills `into` with the expansion about ξ of the solution with the given u and slope there. `from` may belong to `into`'s own evaluation. */
  expand(xiRe: number, xiIm: number, at: PointValue, into: Expansion): void {
    if (this.ratio < SLOW_RATIO && this.expandSlow(xiRe, xiIm, at, into)) return;
    const { ratio, strength, work, register } = this;
    const { re, im } = work;
    re[0] = at.re;
    im[0] = at.im;
    re[1] = at.slopeRe;
    im[1] = at.slopeIm;
    for (let k = 0; k + 2 <= ORDER; k += 1) {
      this.compose(k, register);
      const damping = (1 + ratio) * (k + 1);
      const share = 1 / ((k + 1) * (k + 2));
      re[k + 2] = (strength * register.re - ratio * (re[k] as number) - damping * (re[k + 1] as number)) * share;
      im[k + 2] = (strength * register.im - ratio * (im[k] as number) - damping * (im[k + 1] as number)) * share;
    }
    into.re.set(re);
    into.im.set(im);
    into.xiRe = xiRe;
    into.xiIm = xiIm;
    into.reach = this.reachOf(into, ORDER / (DAMPING_SHARE * (1 + Math.abs(ratio))));
  }

  /** The slow motion through u, see walk.ts. @returns false where its rounds win nothing. */
  private expandSlow(xiRe: number, xiIm: number, at: PointValue, into: Expansion): boolean {
    const { ratio, strength, work, register } = this;
    const { re, im } = work;
    re.fill(0);
    im.fill(0);
    re[0] = at.re;
    im[0] = at.im;
    let before = Number.POSITIVE_INFINITY;
    for (let round = 0; round < SLOW_ROUNDS; round += 1) {
      let moved = 0;
      for (let k = 0; k < ORDER; k += 1) {
        this.compose(k, register);
        const share = 1 / ((1 + ratio) * (k + 1));
        const bend = (k + 1) * (k + 2);
        const a = (strength * register.re - ratio * (re[k] as number) - bend * (re[k + 2] ?? 0)) * share;
        const b = (strength * register.im - ratio * (im[k] as number) - bend * (im[k + 2] ?? 0)) * share;
        const own = Math.hypot(a - (re[k + 1] as number), b - (im[k + 1] as number)) / Math.hypot(a, b);
        if (own > 0) moved += own * 4 ** -k;
        re[k + 1] = a;
        im[k + 1] = b;
      }
      if (moved <= SETTLED) break;
      if (!(moved < SLOW_GAIN * before)) return false;
      before = moved;
    }
    into.re.set(re);
    into.im.set(im);
    into.xiRe = xiRe;
    into.xiIm = xiIm;
    into.reach = this.reachOf(into, LONGEST);
    return true;
  }

  private reachOf(c: Expansion, longest: number): number {
    const size = Math.hypot(c.re[0] as number, c.im[0] as number);
    let reach = longest;
    for (const k of [ORDER - 1, ORDER]) {
      const last = Math.hypot(c.re[k] as number, c.im[k] as number);
      if (last > 0) reach = Math.min(reach, ((LAST_TERM * size) / last) ** (1 / k));
    }
    return reach;
  }
}

/** out = u and du/dξ at ξ + h, by Horner's rule; `skip` leaves the constant term out, for differences that keep their digits. */
export function evaluate(c: Expansion, hRe: number, hIm: number, out: PointValue, skip = false): void {
  const { re, im } = c;
  let vr = 0;
  let vi = 0;
  let dr = 0;
  let di = 0;
  for (let k = ORDER; k >= 0; k -= 1) {
    const dRe = dr * hRe - di * hIm + vr;
    di = dr * hIm + di * hRe + vi;
    dr = dRe;
    const constant = k > 0 || !skip;
    const vRe = vr * hRe - vi * hIm + (constant ? (re[k] as number) : 0);
    vi = vr * hIm + vi * hRe + (constant ? (im[k] as number) : 0);
    vr = vRe;
  }
  out.re = vr;
  out.im = vi;
  out.slopeRe = dr;
  out.slopeIm = di;
}

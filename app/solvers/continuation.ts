import { type Expansion, evaluate, type PointValue, pointValue } from "./expansion.ts";
import type { TrajectoryReader } from "./reader.ts";

/** Share of an expansion's reach within which it is trusted. */
const TRUSTED = 0.9;
/** More expansions than any move between neighbouring nodes needs. */
const MOST_MOVES = 200;
const NEWTON_ROUNDS = 20;

/** Analytic continuation of u along a path in the complex ξ-plane, by Taylor expansions one after another.
 *  Each call moves from where the last one ended; z = −e^{−ξ} leaves the real axis with ξ. */
export class Continuation {
  private readonly reader: TrajectoryReader;
  private current: Expansion;
  private spare: Expansion;
  private readonly scratch: PointValue = pointValue();
  private readonly found: PointValue = pointValue();
  /** whether `found` is u and du/dξ at the last ξ solved for, to first order */
  private known = false;
  /** the last ξ solved for */
  xiRe: number;
  xiIm: number;

  /** Starts on the real trajectory above w = 1, at ξ. */
  constructor(reader: TrajectoryReader, xi: number) {
    this.reader = reader;
    this.current = reader.expander.create();
    this.spare = reader.expander.create();
    this.xiRe = xi;
    this.xiIm = 0;
    this.restart(reader.expansionNear("above", xi));
  }

  private restart(from: Expansion): void {
    this.current.re.set(from.re);
    this.current.im.set(from.im);
    this.current.xiRe = from.xiRe;
    this.current.xiIm = from.xiIm;
    this.current.reach = from.reach;
  }

  /** out = u and du/dξ at ξ. @returns false where the path could not be followed. */
  evaluate(xiRe: number, xiIm: number, out: PointValue): boolean {
    const size = Math.exp(-xiRe);
    if (size <= this.reader.seriesReach) {
      this.reader.evaluateSeries(-size * Math.cos(xiIm), size * Math.sin(xiIm), out);
      return true;
    }
    if (!this.moveTo(xiRe, xiIm)) return false;
    evaluate(this.current, xiRe - this.current.xiRe, xiIm - this.current.xiIm, out);
    return true;
  }

  /** Re-expands along the straight line towards ξ until it lies within the trusted reach. */
  private moveTo(xiRe: number, xiIm: number): boolean {
    if (this.reader.rays !== null) return this.takeRay(xiRe, xiIm);
    for (let move = 0; move < MOST_MOVES; move += 1) {
      const gapRe = xiRe - this.current.xiRe;
      const gapIm = xiIm - this.current.xiIm;
      const distance = Math.hypot(gapRe, gapIm);
      const trusted = TRUSTED * this.current.reach;
      if (distance <= trusted) return true;
      if (!(trusted > 0) || !Number.isFinite(distance)) return false;
      const share = trusted / distance;
      const re = gapRe * share;
      const im = gapIm * share;
      evaluate(this.current, re, im, this.scratch);
      this.reader.expander.expand(this.current.xiRe + re, this.current.xiIm + im, this.scratch, this.spare);
      [this.current, this.spare] = [this.spare, this.current];
    }
    return false;
  }

  private takeRay(xiRe: number, xiIm: number): boolean {
    const found = this.reader.rays?.covering(xiRe, xiIm) ?? null;
    if (found === null) return false;
    this.current = found;
    return true;
  }

  /** Moves to the ξ near the last one where u has the given value: Newton's method. @returns false where it does not converge. */
  solve(uRe: number, uIm: number): boolean {
    const at = this.found;
    if (this.known) this.step(uRe - at.re, uIm - at.im, at);
    this.known = false;
    for (let round = 0; round < NEWTON_ROUNDS; round += 1) {
      if (!this.evaluate(this.xiRe, this.xiIm, at)) return false;
      const moved = this.step(uRe - at.re, uIm - at.im, at);
      if (!Number.isFinite(moved)) return false;
      if (moved > SOLVED * (1 + Math.abs(this.xiRe) + Math.abs(this.xiIm))) continue;
      at.re = uRe;
      at.im = uIm;
      this.known = true;
      return true;
    }
    return false;
  }

  /** Moves ξ so that u changes by a gap, to first order. @returns the length of the step */
  private step(gapRe: number, gapIm: number, { slopeRe, slopeIm }: PointValue): number {
    const size = slopeRe * slopeRe + slopeIm * slopeIm;
    const stepRe = (gapRe * slopeRe + gapIm * slopeIm) / size;
    const stepIm = (gapIm * slopeRe - gapRe * slopeIm) / size;
    this.xiRe += stepRe;
    this.xiIm += stepIm;
    return Math.abs(stepRe) + Math.abs(stepIm);
  }

  /** Places the continuation at a ξ found otherwise (near the turning point, where Newton's method in u is ill conditioned). */
  place(xiRe: number, xiIm: number): void {
    this.xiRe = xiRe;
    this.xiIm = xiIm;
    this.known = false;
  }
}

/** A Newton step this small, relative to ξ, is the last: the next would be of its square. */
const SOLVED = 1e-11;

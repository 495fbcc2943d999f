import { type Expansion, evaluate, type PointValue, pointValue } from "./expansion.ts";
import type { TrajectoryReader } from "./reader.ts";

/** One line. */
interface Ray {
  readonly im: number;
  /** in order of decreasing Re ξ */
  readonly expansions: Expansion[];
}

/** Share of an expansion's reach within which it is used, and that of each step down a ray. */
const TRUSTED = 0.8;
const STEP = 0.6;
/** More steps than any ray needs. */
const MOST_STEPS = 2000;

/** Expansions along lines Im ξ = constant, each walked from the series at z = 0 towards decreasing Re ξ.
 *
 *  Where f'(1) is negative and the drift toward the barrier, the fast damping makes every other direction unstable: a step
 *  of Re ξ by h > 0 multiplies errors by e^{|ratio| h}. Along these lines errors die out. Lines are kept and shared by all
 *  who continue. */
export class Rays {
  private readonly reader: TrajectoryReader;
  private readonly rays: Ray[] = [];
  private readonly scratch: PointValue = pointValue();

  constructor(reader: TrajectoryReader) {
    this.reader = reader;
  }

  /** An expansion within whose trusted reach ξ lies (with z = −e^{−ξ}), or null where none can be made. */
  covering(xiRe: number, xiIm: number): Expansion | null {
    const near = this.nearestRay(xiIm);
    if (near !== null) {
      const found = this.on(near, xiRe, xiIm);
      if (found !== null) return found;
    }
    const ray: Ray = { im: xiIm, expansions: [this.start(xiIm)] };
    this.rays.push(ray);
    return this.on(ray, xiRe, xiIm);
  }

  private nearestRay(im: number): Ray | null {
    let nearest: Ray | null = null;
    for (const ray of this.rays)
      if (nearest === null || Math.abs(ray.im - im) < Math.abs(nearest.im - im)) nearest = ray;
    return nearest;
  }

  /** The expansion at the edge of the series' disc. */
  private start(im: number): Expansion {
    const { seriesReach, expander } = this.reader;
    this.reader.evaluateSeries(-seriesReach * Math.cos(im), seriesReach * Math.sin(im), this.scratch);
    const made = expander.create();
    expander.expand(-Math.log(seriesReach), im, this.scratch, made);
    return made;
  }

  /** The ray's expansion that covers ξ, the ray being walked on as far as needed. */
  private on(ray: Ray, xiRe: number, xiIm: number): Expansion | null {
    const { expansions } = ray;
    const aside = Math.abs(xiIm - ray.im);
    for (let step = 0; step < MOST_STEPS; step += 1) {
      const last = expansions.at(-1) as Expansion;
      if (last.xiRe <= xiRe) break;
      if (covers(last, xiRe, xiIm)) return last;
      const length = STEP * last.reach;
      // no step of this ray would bring ξ within reach
      if (!(length > 0) || aside > last.reach) return null;
      evaluate(last, -length, 0, this.scratch);
      const made = this.reader.expander.create();
      this.reader.expander.expand(last.xiRe - length, ray.im, this.scratch, made);
      if (!Number.isFinite(made.re[0] as number)) return null;
      expansions.push(made);
    }
    let low = 0;
    let high = expansions.length - 1;
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if ((expansions[middle] as Expansion).xiRe > xiRe) low = middle;
      else high = middle;
    }
    const [a, b] = [expansions[low] as Expansion, expansions[high] as Expansion];
    const closer = Math.abs(a.xiRe - xiRe) < Math.abs(b.xiRe - xiRe) ? a : b;
    return covers(closer, xiRe, xiIm) ? closer : null;
  }
}

function covers(c: Expansion, xiRe: number, xiIm: number): boolean {
  return Math.hypot(xiRe - c.xiRe, xiIm - c.xiIm) <= TRUSTED * c.reach;
}

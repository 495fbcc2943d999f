import { Continuation } from "./continuation.ts";
import type { Contour } from "./contour.ts";
import { SolverError } from "./errors.ts";
import { evaluate, pointValue } from "./expansion.ts";
import type { TrajectoryReader } from "./reader.ts";
import type { Base, Start, Starts, Trajectory } from "./types.ts";

/** What a law is the law of: 1 − E[s^K] on the contour, as complex numbers. */
export interface NodeValues {
  readonly re: Float64Array;
  readonly im: Float64Array;
  /** a power of two that was taken out */
  readonly power?: number;
}

/** Checks the starts; merges equal positions and sorts by position.
 *  @throws SolverError "bad_parameter" for a position < 0, a number of particles that is no integer ≥ 1, or no start at all. */
export function checkStarts(starts: readonly Start[]): Start[] {
  if (starts.length === 0) throw new SolverError("bad_parameter", "There is no start; give at least one position.");
  const merged = new Map<number, number>();
  for (const { position, particles } of starts) {
    if (!(Number.isFinite(position) && position >= 0))
      throw new SolverError(
        "bad_parameter",
        `A start stands at ${position}; a position must be a finite number, at least 0.`,
      );
    if (!(Number.isSafeInteger(particles) && particles >= 1))
      throw new SolverError(
        "bad_parameter",
        `${particles} particles start at ${position}; their number must be an integer, at least 1.`,
      );
    merged.set(position, (merged.get(position) ?? 0) + particles);
  }
  return [...merged].map(([position, particles]) => ({ position, particles })).sort((a, b) => a.position - b.position);
}

/** 1 − E[s^K] at the contour's nodes: for one particle 1 − w(ξ + decay·x), for several 1 − Π w^particles, for "far" z/B_0.
 *  Source: for "far", 1 − E[s^K | K > 0] → B_s/B_0 as the start recedes (numerator and denominator ~ B e^{−decay x}). */
export function nodeValues(
  t: Trajectory,
  reader: TrajectoryReader,
  contour: Contour,
  starts: Starts,
): NodeValues | null {
  if (starts === "far") return farValues(t, contour);
  const first = starts[0] as Start;
  if (starts.length === 1 && first.particles === 1) return singleValues(reader, contour, first.position);
  return productValues(reader, contour, starts);
}

function farValues(t: Trajectory, contour: Contour): NodeValues {
  const count = contour.xiRe.length;
  const re = new Float64Array(count);
  const im = new Float64Array(count);
  for (let j = 0; j < count; j += 1) {
    const size = -Math.exp(-(contour.xiRe[j] as number)) / t.amplitude[0];
    re[j] = size * Math.cos(contour.xiIm[j] as number);
    im[j] = -size * Math.sin(contour.xiIm[j] as number);
  }
  return { re, im };
}

function singleValues(reader: TrajectoryReader, contour: Contour, position: number): NodeValues | null {
  const count = contour.xiRe.length;
  const re = new Float64Array(count);
  const im = new Float64Array(count);
  const way = reader.decay * position;
  const path = new Continuation(reader, (contour.xiRe[0] as number) + way);
  const at = pointValue();
  for (let j = 0; j < count; j += 1) {
    if (!path.evaluate((contour.xiRe[j] as number) + way, contour.xiIm[j] as number, at)) return null;
    re[j] = at.re;
    im[j] = at.im;
  }
  return { re, im };
}

/** The way from s to w(x, s) must lie within this share of an expansion's reach. */
const COVERED = 0.5;

/** s − w(x, s) at the nodes for a start near the barrier, as one difference along the trajectory. @returns null where the way is too long for one expansion. */
export function differenceValues(reader: TrajectoryReader, contour: Contour, way: number): NodeValues | null {
  const count = contour.xiRe.length;
  const re = new Float64Array(count);
  const im = new Float64Array(count);
  const path = new Continuation(reader, contour.xiRe[0] as number);
  const local = reader.expander.create();
  const at = pointValue();
  for (let j = 0; j < count; j += 1) {
    const xiRe = contour.xiRe[j] as number;
    const xiIm = contour.xiIm[j] as number;
    if (!path.evaluate(xiRe, xiIm, at)) return null;
    reader.expander.expand(xiRe, xiIm, at, local);
    if (way > COVERED * local.reach) return null;
    evaluate(local, way, 0, at, true);
    re[j] = at.re;
    im[j] = at.im;
  }
  return { re, im };
}

function productValues(reader: TrajectoryReader, contour: Contour, starts: readonly Start[]): NodeValues | null {
  const parts: { values: NodeValues; particles: number }[] = [];
  for (const { position, particles } of starts) {
    const values = singleValues(reader, contour, position);
    if (values === null) return null;
    parts.push({ values, particles });
  }
  return productOf(reader.base, parts);
}

/** 1 − Π w^particles at the nodes, from 1 − w of one particle of each kind. */
export function productOf(
  { centre }: Base,
  parts: readonly { readonly values: NodeValues; readonly particles: number }[],
): NodeValues {
  const count = (parts[0]?.values.re ?? []).length;
  const logRe = new Float64Array(count);
  const logIm = new Float64Array(count);
  const fromZero = centre === 0;
  for (const { values: u, particles } of parts) {
    for (let j = 0; j < count; j += 1) {
      const a = u.re[j] as number;
      const b = u.im[j] as number;
      // ln w; the branch of its imaginary part drops out of the integer power
      const square = fromZero ? Math.log(a * a + b * b) : Math.log1p(a * a + b * b - 2 * a);
      logRe[j] = (logRe[j] as number) + (particles * square) / 2;
      logIm[j] = (logIm[j] as number) + particles * Math.atan2(-b, centre - a);
    }
  }
  const top = fromZero ? (logRe[0] as number) : 0;
  for (let j = 0; j < count; j += 1) {
    if (fromZero) {
      // −e^{l − top}: a product of many small numbers stays within the double's range
      const size = -Math.exp((logRe[j] as number) - top);
      const angle = logIm[j] as number;
      logRe[j] = size * Math.cos(angle);
      logIm[j] = size * Math.sin(angle);
      continue;
    }
    // 1 − e^l
    const a = logRe[j] as number;
    const b = logIm[j] as number;
    logRe[j] = -Math.expm1(a) * Math.cos(b) + 2 * Math.sin(b / 2) ** 2;
    logIm[j] = -Math.exp(a) * Math.sin(b);
  }
  return { re: logRe, im: logIm, power: top / Math.LN2 };
}

import { Continuation } from "./continuation.ts";
import { type Expansion, evaluate, pointValue } from "./expansion.ts";
import { gaussLegendre } from "./quadrature.ts";
import type { TrajectoryReader } from "./reader.ts";
import type { Pair } from "./types.ts";

/** The contour of Cauchy's formula for P(K = n), in L = ln(s/s0): out from s0 beside the slit [s0, ∞), then round on a circle.
 *
 *      upper half:   L = τ² e^{i tilt},  τ from 0 up to where Re L = width     "leg"
 *                    L = width + iθ,     θ from width·tan(tilt) up to π        "arc"
 *
 *  s0 is the saddle of s^{−n} for every n. On the leg s^{−n} falls (and is real without tilt): no cancellation, at any n.
 *  On the arc it is smaller by e^{−n width}, so that the arc needs to resolve e^{−inθ} only for small n. L is known exactly
 *  at every node; what is found by continuation is ξ(s), with w(ξ) = s. A tilt keeps clear of further singularities on the slit.
 *
 *  Where K lives on a lattice of step d, s0 has d images on its circle, all alike: θ ends at π/d, and the sector counts d times.
 *
 *  Layout: node 0 is s0 itself, with weight 0; then the nodes of the leg in order of τ; then those of the arc in order of θ. */
export interface Contour {
  readonly legNodes: number;
  readonly arcNodes: number;
  readonly logRe: Float64Array;
  readonly logIm: Float64Array;
  /** dL at the node: quadrature weight times dL/dτ or dL/dθ */
  readonly weightRe: Float64Array;
  readonly weightIm: Float64Array;
  readonly xiRe: Float64Array;
  readonly xiIm: Float64Array;
}

/** Where the leg starts (in units of the base's scale), and what L = ln(s/radius) is measured from: s0, or a point just short of the end of a trajectory that does not turn. */
export interface Reference {
  readonly radius: Pair;
  /** radius − centre, see Base */
  readonly excess: Pair;
}

export interface ContourShape {
  /** ln of the circle's radius over s0 */
  readonly width: number;
  /** angle [rad] of the leg with the slit, in [0, π/2) */
  readonly tilt: number;
  /** nodes on each panel of the leg */
  readonly panelNodes: number;
  /** the innermost panel ends at or below this τ */
  readonly finest: number;
  readonly arcNodes: number;
}

/** Share of the turning point's expansion that is used on the leg. */
const TRUSTED = 0.9;
const NEWTON_ROUNDS = 30;
/** At θ = π, s is real and so must ξ + iπ be (at π/d, ξ + iπ/d): the path has come round on the right sheet. */
export const CLOSING_TOLERANCE = 1e-9;

/** Finds ξ at all nodes. @returns null where the continuation fails or does not close: the circle meets a singularity. */
export function traceContour(reader: TrajectoryReader, reference: Reference, shape: ContourShape): Contour | null {
  const { centre, period } = reader.base;
  const end = Math.PI / period;
  if (shape.width * Math.tan(shape.tilt) > end / 2) return null;
  const contour = layNodes(shape, end);
  const { logRe, logIm, legNodes } = contour;
  const radius = reference.radius[0];
  const top = reader.turning?.s0[0] === radius ? reader.topExpansion() : null;
  const start = reader.locate(-reference.excess[0]).xi;
  const path = new Continuation(reader, start);
  contour.xiRe[0] = start;
  for (let j = 1; j < logRe.length; j += 1) {
    // s − radius = radius (e^L − 1), so that u must fall by as much below its value where the leg starts
    const a = logRe[j] as number;
    const b = logIm[j] as number;
    const riseRe = radius * (Math.expm1(a) * Math.cos(b) - 2 * Math.sin(b / 2) ** 2);
    const riseIm = radius * Math.exp(a) * Math.sin(b);
    const solved =
      (top !== null && j <= legNodes && solveNearTop(top, riseRe, riseIm, path)) ||
      path.solve(-(reference.excess[0] + riseRe), -riseIm);
    if (!solved) return null;
    contour.xiRe[j] = path.xiRe;
    contour.xiIm[j] = path.xiIm;
  }
  const size = radius * Math.exp(shape.width);
  const closed = period === 1 ? path.solve(centre + size, 0) : path.solve(-size * Math.cos(end), -size * Math.sin(end));
  return closed && Math.abs(path.xiIm + end) < CLOSING_TOLERANCE ? contour : null;
}

function layNodes(shape: ContourShape, end: number): Contour {
  const { width, tilt } = shape;
  const leg = legRule(shape);
  const arc = gaussLegendre(shape.arcNodes);
  const count = 1 + leg.tau.length + shape.arcNodes;
  const make = () => new Float64Array(count);
  const c: Contour = {
    legNodes: leg.tau.length,
    arcNodes: shape.arcNodes,
    logRe: make(),
    logIm: make(),
    weightRe: make(),
    weightIm: make(),
    xiRe: make(),
    xiIm: make(),
  };
  leg.tau.forEach((tau, i) => {
    const weight = 2 * tau * (leg.weight[i] as number);
    c.logRe[i + 1] = tau * tau * Math.cos(tilt);
    c.logIm[i + 1] = tau * tau * Math.sin(tilt);
    c.weightRe[i + 1] = weight * Math.cos(tilt);
    c.weightIm[i + 1] = weight * Math.sin(tilt);
  });
  const from = width * Math.tan(tilt);
  const half = (end - from) / 2;
  arc.nodes.forEach((node, i) => {
    const j = 1 + c.legNodes + i;
    c.logRe[j] = width;
    c.logIm[j] = from + half * (1 + node);
    c.weightIm[j] = half * (arc.weights[i] as number);
  });
  return c;
}

/** Gauss–Legendre panels on the leg, each half as long as the next one out: a Gaussian of any width ≥ `finest` is resolved. */
export function legRule(shape: Pick<ContourShape, "width" | "tilt" | "finest" | "panelNodes">): {
  tau: Float64Array;
  weight: Float64Array;
} {
  const end = Math.sqrt(shape.width / Math.cos(shape.tilt));
  const halvings = Math.max(1, Math.ceil(Math.log2(end / shape.finest)));
  const rule = gaussLegendre(shape.panelNodes);
  const count = (halvings + 1) * shape.panelNodes;
  const tau = new Float64Array(count);
  const weight = new Float64Array(count);
  for (let panel = 0; panel <= halvings; panel += 1) {
    const to = end * 2 ** (panel - halvings);
    const from = panel === 0 ? 0 : to / 2;
    for (let i = 0; i < shape.panelNodes; i += 1) {
      tau[panel * shape.panelNodes + i] = from + ((to - from) / 2) * (1 + (rule.nodes[i] as number));
      weight[panel * shape.panelNodes + i] = ((to - from) / 2) * (rule.weights[i] as number);
    }
  }
  return { tau, weight };
}

/** Solves u(ξ0 + y) − u(ξ0) = −rise for y near −i √(rise/c_2), keeping all digits of small y. @returns false beyond the expansion's reach. */
function solveNearTop(top: Expansion, riseRe: number, riseIm: number, path: Continuation): boolean {
  const at = pointValue();
  const size = Math.sqrt(Math.hypot(riseRe, riseIm) / (top.re[2] as number));
  const angle = Math.atan2(riseIm, riseRe) / 2;
  let yRe = size * Math.sin(angle);
  let yIm = -size * Math.cos(angle);
  for (let round = 0; round < NEWTON_ROUNDS; round += 1) {
    if (!(Math.hypot(yRe, yIm) < TRUSTED * top.reach)) return false;
    evaluate(top, yRe, yIm, at, true);
    const gapRe = -riseRe - at.re;
    const gapIm = -riseIm - at.im;
    const square = at.slopeRe * at.slopeRe + at.slopeIm * at.slopeIm;
    const stepRe = (gapRe * at.slopeRe + gapIm * at.slopeIm) / square;
    const stepIm = (gapIm * at.slopeRe - gapRe * at.slopeIm) / square;
    yRe += stepRe;
    yIm += stepIm;
    if (Math.hypot(stepRe, stepIm) <= Number.EPSILON * Math.hypot(yRe, yIm)) {
      path.place(top.xiRe + yRe, yIm);
      return true;
    }
  }
  return false;
}

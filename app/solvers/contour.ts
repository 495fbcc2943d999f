import { Continuation } from "./continuation.ts";
import { type Expansion, evaluate, pointValue } from "./expansion.ts";
import { gaussLegendre } from "./quadrature.ts";
import type { TrajectoryReader } from "./reader.ts";
import type { Turning } from "./types.ts";

/** The contour of Cauchy's formula for P(K = n): in from and out along the slit [s0, s0 (1 + width)], and once round on |s| = s0 (1 + width).
 *
 *      upper half:   s = s0 (1 + τ²),  τ from 0 to √width          "leg", just above the slit
 *                    s = s0 (1 + width) e^{iθ},  θ from 0 to π     "arc"
 *
 *  s0 is the saddle of s^{−n} for every n, and on the leg s^{−n} is real and falls: no cancellation, at any n. On the arc it is
 *  smaller by (1 + width)^{−n}, so that the arc needs to resolve e^{−inθ} only for small n. s is known exactly at every node;
 *  what is found by continuation is ξ(s), with w(ξ) = s.
 *
 *  Layout: the arrays hold the nodes of the leg in order of τ, then those of the arc in order of θ. */
export interface Contour {
  readonly width: number;
  readonly legNodes: number;
  readonly arcNodes: number;
  /** τ on the leg, θ on the arc */
  readonly parameter: Float64Array;
  /** quadrature weight in that parameter */
  readonly weight: Float64Array;
  readonly xiRe: Float64Array;
  readonly xiIm: Float64Array;
}

export interface ContourShape {
  readonly width: number;
  /** nodes on each panel of the leg */
  readonly panelNodes: number;
  /** the innermost panel ends at or below this τ */
  readonly finest: number;
  readonly arcNodes: number;
}

/** Share of the turning point's expansion that is used on the leg. */
const TRUSTED = 0.9;
const NEWTON_ROUNDS = 30;
/** At θ = π, s is real and so must ξ + iπ be: the path has come round on the right sheet. */
const CLOSING_TOLERANCE = 1e-9;

/** Finds ξ at all nodes. @returns null where the continuation fails or does not close: the circle meets a singularity. */
export function traceContour(reader: TrajectoryReader, turning: Turning, shape: ContourShape): Contour | null {
  const leg = legRule(shape);
  const arc = gaussLegendre(shape.arcNodes);
  const legNodes = leg.tau.length;
  const count = legNodes + shape.arcNodes;
  const contour: Contour = {
    width: shape.width,
    legNodes,
    arcNodes: shape.arcNodes,
    parameter: new Float64Array(count),
    weight: new Float64Array(count),
    xiRe: new Float64Array(count),
    xiIm: new Float64Array(count),
  };
  const s0 = turning.s0[0];
  const top = reader.topExpansion();
  const path = new Continuation(reader, "above", top.xiRe);
  for (let j = 0; j < legNodes; j += 1) {
    const tau = leg.tau[j] as number;
    const solved = solveNearTop(top, s0 * tau * tau, path) || path.solve(-(turning.excess[0] + s0 * tau * tau), 0);
    if (!solved) return null;
    record(contour, j, tau, leg.weight[j] as number, path);
  }
  const radius = s0 * (1 + shape.width);
  for (let j = 0; j < shape.arcNodes; j += 1) {
    const theta = (Math.PI / 2) * (1 + (arc.nodes[j] as number));
    if (!path.solve(1 - radius * Math.cos(theta), -radius * Math.sin(theta))) return null;
    record(contour, legNodes + j, theta, (Math.PI / 2) * (arc.weights[j] as number), path);
  }
  if (!path.solve(1 + radius, 0)) return null;
  return Math.abs(path.xiIm + Math.PI) < CLOSING_TOLERANCE ? contour : null;
}

function record(contour: Contour, j: number, parameter: number, weight: number, path: Continuation): void {
  contour.parameter[j] = parameter;
  contour.weight[j] = weight;
  contour.xiRe[j] = path.xiRe;
  contour.xiIm[j] = path.xiIm;
}

/** Gauss–Legendre panels on the leg, each half as long as the next one out: a Gaussian of any width ≥ `finest` is resolved. */
function legRule(shape: ContourShape): { tau: Float64Array; weight: Float64Array } {
  const end = Math.sqrt(shape.width);
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
function solveNearTop(top: Expansion, rise: number, path: Continuation): boolean {
  const at = pointValue();
  let yRe = 0;
  let yIm = -Math.sqrt(rise / (top.re[2] as number));
  for (let round = 0; round < NEWTON_ROUNDS; round += 1) {
    if (!(Math.hypot(yRe, yIm) < TRUSTED * top.reach)) return false;
    evaluate(top, yRe, yIm, at, true);
    const gapRe = -rise - at.re;
    const gapIm = -at.im;
    const size = at.slopeRe * at.slopeRe + at.slopeIm * at.slopeIm;
    const stepRe = (gapRe * at.slopeRe + gapIm * at.slopeIm) / size;
    const stepIm = (gapIm * at.slopeRe - gapRe * at.slopeIm) / size;
    yRe += stepRe;
    yIm += stepIm;
    if (Math.hypot(stepRe, stepIm) <= Number.EPSILON * Math.hypot(yRe, yIm)) {
      path.place(top.xiRe + yRe, yIm);
      return true;
    }
  }
  return false;
}

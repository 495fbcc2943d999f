import { Continuation } from "./continuation.ts";
import { CLOSING_TOLERANCE, type Contour, legRule } from "./contour.ts";
import { pointValue } from "./expansion.ts";
import type { NodePlace, NodeReader } from "./node-reader.ts";
import { gaussLegendre } from "./quadrature.ts";
import type { TrajectoryReader } from "./reader.ts";

/** The contour of Cauchy's formula in the regime `toward`, in L = ln s, where E[s^K] is singular at s = 1 itself:
 *
 *      upper side:   L = τ², τ ≥ 0                     along the cut [1, ∞), as far as the node's series reaches     "leg"
 *                    L = start + slope·θ + iθ          obliquely away from it
 *                    L = width + iθ, θ up to π/period  round on a circle                                             "arc"
 *
 *  On the cut only the imaginary part counts, which the node's series gives to its own relative accuracy however small. On the way
 *  round, s^−n has fallen by n·slope·θ wherever e^{−inθ} turns fast, so that panels that double in length resolve it for every n. */
export interface CutContour extends Contour {
  /** y = λ_s x at every node, see NodePlace; of no meaning where `fromPath` */
  readonly yRe: Float64Array;
  readonly yExtra: Float64Array;
  /** nodes from here on were found on the trajectory itself, beyond the node's series */
  readonly fromPath: number;
}

export interface CutShape {
  readonly slope: number;
  readonly width: number;
  /** what is left of the series' reach on the leg, in y */
  readonly margin: number;
  readonly panelNodes: number;
  readonly finest: number;
}

/** n Re L up to which e^{−nL} is resolved: s^−n has then fallen to nothing, or, where the law falls fast, a little further. */
const REACH = 40;
const MOST_REACH = 140;

/** The same for a law of tail index d. */
export function reachFor(index: number): number {
  return Math.min(MOST_REACH, REACH + index);
}
const NODES_PER_TURN = 0.55;
const NODES_AT_MOST = 40_000;
const BACK_STEP = 1 / 16;
/** The circle's width over the leg's end, at least. */
const BEYOND_LEG = 1.05;
/** Largest index for which the panels of the leg have more nodes. */
const STEEPEST = 64;

/** A placed node of the oblique and round part: L and dL. */
interface Laid {
  readonly log: readonly [number, number];
  readonly weight: readonly [number, number];
}

/** Finds y (or ξ) at all nodes, for starts up to λ_s x = `farthest`. @returns null where it fails, or does not close. */
export function traceCut(
  reader: TrajectoryReader,
  node: NodeReader,
  farthest: number,
  shape: CutShape,
): CutContour | null {
  const end = Math.PI / reader.base.period;
  const first = outermost(node, node.knownEdge - farthest - shape.margin, Math.expm1(shape.width / BEYOND_LEG));
  if (first === null) return null;
  const { place, r } = first;
  const start = Math.log1p(r);
  // the integrand rises like τ^{2d + 1} before s^−n takes it down
  const panelNodes = shape.panelNodes + Math.ceil(Math.min(node.index, STEEPEST));
  const leg = legRule({ width: start, tilt: 0, panelNodes, finest: shape.finest });
  const laid = layWay(start, end, shape, reachFor(node.index));
  if (laid.length > NODES_AT_MOST) return null;
  const c = emptyContour(leg.tau.length, laid.length);
  const walker: NodePlace = { ...place };
  let before = r;
  for (let i = leg.tau.length - 1; i >= 0; i -= 1) {
    const tau = leg.tau[i] as number;
    const at = Math.expm1(tau * tau);
    walker.re += Math.log(at / before);
    if (!node.solve(walker, -at, 0)) return null;
    before = at;
    c.logRe[i + 1] = tau * tau;
    c.weightRe[i + 1] = 2 * tau * (leg.weight[i] as number);
    c.yRe[i + 1] = walker.re;
    c.yExtra[i + 1] = walker.extra;
  }
  const way = followWay(reader, node, place, laid, c);
  return way === null || !closes(reader, c, way.path, shape.width) ? null : { ...c, fromPath: way.fromPath };
}

/** The outermost place on the cut at or before Re y = `edge`, and at or before s − 1 = `most`, that lies before w(x, ·) turns. */
function outermost(node: NodeReader, edge: number, most: number): { place: NodePlace; r: number } | null {
  const at = pointValue();
  for (let y = edge; y > edge - 8; y -= BACK_STEP) {
    node.evaluate({ re: y, extra: 0, halves: 1 }, at);
    if (!(at.re < 0 && at.slopeRe < 0.4 * at.re)) continue;
    const r = Math.min(-at.re, most);
    const place = node.turn(r);
    if (place !== null) return { place, r };
  }
  return null;
}

function emptyContour(legNodes: number, arcNodes: number): Omit<CutContour, "fromPath"> {
  const make = () => new Float64Array(1 + legNodes + arcNodes);
  return {
    legNodes,
    arcNodes,
    logRe: make(),
    logIm: make(),
    weightRe: make(),
    weightIm: make(),
    xiRe: make(),
    xiIm: make(),
    yRe: make(),
    yExtra: make(),
  };
}

/** Nodes from the end of the leg obliquely out to `width`, then round to θ = end. */
function layWay(start: number, end: number, { slope, width, panelNodes }: CutShape, reach: number): Laid[] {
  const corner = Math.min(end / 2, (width - start) / slope);
  const steep = (width - start) / corner;
  const laid: Laid[] = [];
  const panel = (from: number, to: number, rise: number) => {
    const least = start + steep * Math.min(from, corner);
    const count = panelNodes + Math.ceil((NODES_PER_TURN * reach * (to - from)) / least);
    const rule = gaussLegendre(Math.min(count, LARGEST_RULE));
    const half = (to - from) / 2;
    rule.nodes.forEach((x, i) => {
      const theta = from + half * (1 + x);
      const w = half * (rule.weights[i] as number);
      laid.push({ log: [start + steep * Math.min(theta, corner), theta], weight: [w * rise, w] });
    });
  };
  let from = 0;
  let length = Math.min(start, corner);
  while (from < corner) {
    const to = from + length > 0.8 * corner ? corner : from + length;
    panel(from, to, steep);
    length = to;
    from = to;
  }
  const pieces = Math.max(1, Math.ceil((reach * (end - corner)) / width / LARGEST_RULE));
  for (let k = 0; k < pieces; k += 1)
    panel(corner + ((end - corner) * k) / pieces, corner + ((end - corner) * (k + 1)) / pieces, 0);
  return laid;
}

const LARGEST_RULE = 400;

/** Solves for the nodes one after another: in the series of the node while it reaches, then on the trajectory.
 *  @returns the number of the first node that is beyond the series, and the path there; null where Newton's method fails. */
function followWay(
  reader: TrajectoryReader,
  node: NodeReader,
  from: NodePlace,
  laid: readonly Laid[],
  c: Omit<CutContour, "fromPath">,
): { fromPath: number; path: Continuation | null } | null {
  const { base } = reader;
  const q = base.scale[0];
  const offset = 1 - q * base.centre;
  const place: NodePlace = { re: from.re, extra: from.extra - Math.PI, halves: 0 };
  let path: Continuation | null = null;
  let fromPath = c.logRe.length;
  for (let i = 0; i < laid.length; i += 1) {
    const { log, weight } = laid[i] as Laid;
    const j = 1 + c.legNodes + i;
    [c.logRe[j], c.logIm[j]] = log;
    [c.weightRe[j], c.weightIm[j]] = weight;
    const [a, b] = log;
    const re = -(Math.expm1(a) * Math.cos(b) - 2 * Math.sin(b / 2) ** 2);
    const im = -Math.exp(a) * Math.sin(b);
    if (path === null) {
      const known = { ...place };
      if (node.solve(place, re, im) && place.re <= node.knownEdge) {
        c.yRe[j] = place.re;
        c.yExtra[j] = place.extra;
        continue;
      }
      path = new Continuation(reader, node.xiOf(node.edge));
      path.place(node.xiOf(known.re), known.extra * node.stretch);
      fromPath = j;
    }
    if (!path.solve((re - offset) / q, im / q)) return null;
    c.xiRe[j] = path.xiRe;
    c.xiIm[j] = path.xiIm;
  }
  return { fromPath, path };
}

/** At θ = π/period, s·e^{−iθ} is real and so must ξ + i·π/period be: the path has come round on the right sheet. */
function closes(
  reader: TrajectoryReader,
  c: Omit<CutContour, "fromPath">,
  followed: Continuation | null,
  width: number,
): boolean {
  const { centre, period, scale } = reader.base;
  const end = Math.PI / period;
  const last = c.logRe.length - 1;
  // all the way within the series: ξ of the last node is not far from the real trajectory
  const path = followed ?? new Continuation(reader, c.xiRe[last] as number);
  if (followed === null) path.place(c.xiRe[last] as number, c.xiIm[last] as number);
  const size = Math.exp(width) / scale[0];
  const closed = period === 1 ? path.solve(centre + size, 0) : path.solve(-size * Math.cos(end), -size * Math.sin(end));
  return closed && Math.abs(path.xiIm + end) < CLOSING_TOLERANCE;
}

import { Continuation } from "./continuation.ts";
import type { CutContour } from "./cut-contour.ts";
import { evaluate, pointValue } from "./expansion.ts";
import type { NodePlace, NodeReader } from "./node-reader.ts";
import type { TrajectoryReader } from "./reader.ts";
import type { NodeValues } from "./sources.ts";

/** The way from s to w(x, s) must lie within this share of an expansion's reach. */
const COVERED = 0.5;

function placeAt(c: CutContour, j: number): NodePlace {
  return { re: c.yRe[j] as number, extra: c.yExtra[j] as number, halves: j <= c.legNodes ? 1 : 0 };
}

const beside = pointValue();

/** Im w(x, s) beside the cut; where it is lost in rounding, its bound. */
function imaginaryOnLeg(node: NodeReader, place: NodePlace, way: number): number {
  if (node.lost) return node.lostSize(place.re + way);
  node.evaluateDifference(place, way, beside);
  return beside.im;
}

/** û = (u − 1 + q·centre)/q at the nodes for one particle λ_s x = `way` from the barrier. On the leg the imaginary part is that of
 *  w(x, s) − s, which is right to its own size. @returns null where continuation fails. */
export function cutValues(reader: TrajectoryReader, node: NodeReader, c: CutContour, way: number): NodeValues | null {
  const count = c.logRe.length;
  const re = new Float64Array(count);
  const im = new Float64Array(count);
  const { base } = reader;
  const q = base.scale[0];
  const offset = 1 - q * base.centre;
  re[0] = -offset / q;
  const path = new Continuation(reader, node.xiOf(node.edge));
  const at = pointValue();
  for (let j = 1; j < count; j += 1) {
    const inSeries = j < c.fromPath;
    const place = placeAt(c, j);
    if (inSeries && place.re + way <= node.knownEdge) {
      node.evaluate({ ...place, re: place.re + way }, at);
      re[j] = (at.re - offset) / q;
      im[j] = at.im / q;
      if (j > c.legNodes) continue;
      im[j] = imaginaryOnLeg(node, place, way) / q;
      continue;
    }
    const xiRe = inSeries ? node.xiOf(place.re + way) : (c.xiRe[j] as number) + way * node.stretch;
    const xiIm = inSeries ? (place.extra - Math.PI * place.halves) * node.stretch : (c.xiIm[j] as number);
    if (!path.evaluate(xiRe, xiIm, at)) return null;
    re[j] = at.re;
    im[j] = at.im;
  }
  return { re, im };
}

/** (s − w(x, s))/q at the nodes for a start near the barrier, as one difference. @returns null where the way is too long for one expansion. */
export function cutDifferences(
  reader: TrajectoryReader,
  node: NodeReader,
  c: CutContour,
  way: number,
): NodeValues | null {
  const count = c.logRe.length;
  const re = new Float64Array(count);
  const im = new Float64Array(count);
  const q = reader.base.scale[0];
  const path = new Continuation(reader, node.xiOf(node.edge));
  const local = reader.expander.create();
  const at = pointValue();
  for (let j = 1; j < count; j += 1) {
    const place = placeAt(c, j);
    if (j < c.fromPath && place.re + way <= node.knownEdge) {
      node.evaluateDifference(place, way, at);
      re[j] = at.re / q;
      im[j] = (j > c.legNodes ? at.im : imaginaryOnLeg(node, place, way)) / q;
      continue;
    }
    const xiRe = j < c.fromPath ? node.xiOf(place.re) : (c.xiRe[j] as number);
    const xiIm = j < c.fromPath ? (place.extra - Math.PI * place.halves) * node.stretch : (c.xiIm[j] as number);
    if (!path.evaluate(xiRe, xiIm, at)) return null;
    reader.expander.expand(xiRe, xiIm, at, local);
    if (way * node.stretch > COVERED * local.reach) return null;
    evaluate(local, way * node.stretch, 0, at, true);
    re[j] = at.re;
    im[j] = at.im;
  }
  return { re, im };
}

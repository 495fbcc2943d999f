import { pointValue } from "./expansion.ts";
import { inputUnit } from "./input-rounding.ts";
import { nodeReaderOf } from "./node-reader.ts";
import { ROUNDING, readerOf } from "./reader.ts";
import { RADIUS_ONE } from "./toward.ts";
import type { Estimate, Refusal, Trajectory } from "./types.ts";

/** 1 − w(x, s) and ∂w/∂x near s = 1 in the regime `toward`. */
export interface NearOne {
  readonly complement: Estimate;
  readonly slope: () => Estimate;
}

/** Roundings of the node's series, relative to u, and of a place found by Newton's method. */
const SERIES_ROUNDINGS = 24;
const PLACE_ROUNDINGS = 16;
/** Roundings of an expansion on the trajectory, see reader.ts, and of its slope. */
const EXPANSION_ROUNDINGS = 16;
const SLOPE_AMPLIFICATION = 8;

/** Reads w(x, s) by the coordinates of the node w = 1, in which 1 − w keeps its relative accuracy however near s is to 1.
 *  @returns null where s is beyond their series, and is found on the trajectory itself. */
export function readNearOne(t: Trajectory, x: number, s: number): NearOne | Refusal | null {
  if (s > 1 + 2 * Number.EPSILON) return { refused: `${RADIUS_ONE} Here s = ${s}; take s up to 1.` };
  const exactly = (value: number): Estimate => ({ value, error: 0 });
  if (s >= 1) return { complement: exactly(0), slope: () => exactly(0) };
  const node = nodeReaderOf(t);
  const y = node.locate(1 - s);
  if (y === null) return null;
  const { slowSpread, shiftSpread } = node.passage;
  const at = pointValue();
  node.evaluate({ re: y, extra: 0, halves: 0 }, at);
  // what moves the place: roundings, the input's own, and over a way the trajectory's shape
  const perPlace = (PLACE_ROUNDINGS * ROUNDING * (1 - s) + inputUnit(s) * Math.abs(s)) / at.slopeRe;
  const way = node.slow * x;
  const moved = perPlace + way * (slowSpread + inputUnit(x) + 3 * ROUNDING) + Math.min(1, way) * shiftSpread;
  const there = y + way;
  if (there <= node.knownEdge) {
    node.evaluate({ re: there, extra: 0, halves: 0 }, at);
    const { re, slopeRe } = at;
    const slope = () => {
      const value = -node.slow * slopeRe;
      const own = SERIES_ROUNDINGS * ROUNDING + slowSpread;
      return { value, error: Math.abs(value) * own + node.slow * (node.index + 1) * Math.abs(slopeRe) * moved };
    };
    return { complement: { value: re, error: SERIES_ROUNDINGS * ROUNDING * re + slopeRe * moved }, slope };
  }
  return onTrajectory(t, there, moved);
}

/** The same once w has left the reach of the series. */
function onTrajectory(t: Trajectory, y: number, moved: number): NearOne {
  const reader = readerOf(t);
  const node = nodeReaderOf(t);
  const { scale, centre, scaleSpread } = t.base;
  const q = scale[0];
  const xi = node.xiOf(y);
  const at = pointValue();
  const rounding = reader.evaluateAt("above", xi, at);
  const terms = 1 + q * (centre + Math.abs(at.re));
  const known =
    moved * node.stretch + ROUNDING * (2 + Math.abs(xi)) + Math.max(0, xi) * t.decaySpread + t.amplitudeSpread;
  const value = 1 - q * centre + q * at.re;
  const error = q * (rounding + Math.abs(at.slopeRe) * known) + terms * (EXPANSION_ROUNDINGS * ROUNDING + scaleSpread);
  const unit = reader.decay * q;
  const slopeRe = at.slopeRe;
  const slope = () => {
    const c = reader.expander.create();
    reader.expander.expand(xi, 0, at, c);
    const second = 2 * Math.abs(c.re[2] as number);
    const own = t.decaySpread + scaleSpread + EXPANSION_ROUNDINGS * ROUNDING;
    return {
      value: -unit * slopeRe,
      error: unit * (rounding * SLOPE_AMPLIFICATION + second * known + Math.abs(slopeRe) * own),
    };
  };
  return { complement: { value, error }, slope };
}

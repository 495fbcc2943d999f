import { SolverError } from "./errors.ts";
import { type PointValue, pointValue } from "./expansion.ts";
import { inputUnit } from "./input-rounding.ts";
import { multiply, toNumber } from "./pairs.ts";
import { readNearOne } from "./profile-toward.ts";
import { type Place, ROUNDING, readerOf, type TrajectoryReader } from "./reader.ts";
import { deviationOf } from "./saddle.ts";
import type { Answer, Base, Estimate, Pair, ProfileConstants, Refusal, Trajectory, Turning } from "./types.ts";

/** w(x, s) = E_x[s^K], a pure number.
 *  Source: the flow of the trajectory, w(x, s) = W(B_s e^{−decay x}); G. Koenigs, Ann. Sci. Éc. Norm. Sup. 1 (1884), for W.
 *  @param x start [length], ≥ 0   @param s between −1 and s0; s equal to the double next to s0 means s0 itself
 *  @throws SolverError "bad_parameter" where x < 0 or an argument is not finite. */
export function profileAt(t: Trajectory, x: number, s: number): Answer<Estimate> {
  const read = readProfile(t, x, s);
  if ("refused" in read) return read;
  if (read.complement !== undefined) {
    const value = 1 - read.complement.value;
    // w(x, 1) is 1 exactly
    return { value, error: read.complement.error + (read.complement.value === 0 ? 0 : ROUNDING * value) };
  }
  const { centre, scale, scaleSpread } = t.base;
  const value = scale[0] * (centre - read.u);
  return { value, error: scale[0] * read.error + Math.abs(value) * (ROUNDINGS_OF_SCALE * ROUNDING + scaleSpread) };
}

/** 1 − w(x, s), a pure number, with full relative accuracy however small it is.
 *  Source: as profileAt.
 *  @throws SolverError "bad_parameter" where x < 0 or an argument is not finite. */
export function profileComplementAt(t: Trajectory, x: number, s: number): Answer<Estimate> {
  const read = readProfile(t, x, s);
  if ("refused" in read || t.regime === "away") return "refused" in read ? read : { value: read.u, error: read.error };
  if (read.complement !== undefined) return read.complement;
  const { centre, scale, scaleSpread } = t.base;
  const value = 1 - scale[0] * centre + scale[0] * read.u;
  const terms = scale[0] * (centre + Math.abs(read.u));
  const rounding = ROUNDINGS_OF_SCALE * ROUNDING;
  return { value, error: scale[0] * read.error + terms * (rounding + scaleSpread) + ROUNDING * Math.abs(value) };
}

const ROUNDINGS_OF_SCALE = 3;

/** ∂w(x, s)/∂x [1/length].
 *  Source: as profileAt.
 *  @throws SolverError "bad_parameter" where x < 0 or an argument is not finite. */
export function profileSlopeAt(t: Trajectory, x: number, s: number): Answer<Estimate> {
  const read = readProfile(t, x, s);
  return "refused" in read ? read : read.slope();
}

/** s0 (pure number), ∂w/∂x at x = 0, s = 0 [1/length], amplitude B_0 = lim e^{decay x} (1 − w(x, 0)) (pure number), decay [1/length].
 *  Source: J. Berestycki, É. Brunet, S. C. Harris, P. Miłoś, J. Funct. Anal. 273 (2017) 2107–2143. */
export function profileConstants(t: Trajectory): ProfileConstants {
  return {
    limit: limitOf(t),
    s0: t.passage !== null ? { value: 1, error: 0 } : "refused" in t.turning ? t.turning : radius(t.turning, t.base),
    slopeAtBarrier: constant(t.slopeAtBarrier, t.slopeSpread),
    amplitude: t.regime === "away" ? constant(t.amplitude, t.amplitudeSpread) : { refused: noDecay(t, "amplitude") },
    decay: t.regime === "away" ? constant(t.decay, t.decaySpread) : { refused: noDecay(t, "decay rate") },
  };
}

function limitOf({ base }: Trajectory): Estimate {
  if (base.centre === 0 || base.scale[0] === 1) return { value: base.centre, error: 0 };
  return constant(base.scale, base.scaleSpread);
}

/** s0 with its error. */
export function radius(turning: Turning, base: Base): Estimate {
  const value = toNumber(multiply(turning.s0, base.scale));
  return { value, error: ROUNDING * value + turning.excessSpread * turning.excess[0] * base.scale[0] };
}

function noDecay(t: Trajectory, what: string): string {
  return `The ${what} belongs to a drift away from the barrier, where w(x, s) tends to 1; here the regime is ${t.regime}.`;
}

/** A pair read as a double: its rounding, and the spread of the inputs. */
function constant(x: Pair, spread: number): Estimate {
  const value = toNumber(x);
  return { value, error: Math.abs(value) * (ROUNDING + spread) };
}

interface Reading {
  readonly u: number;
  readonly error: number;
  readonly slope: () => Estimate;
  /** 1 − w, where it is known better than by u */
  readonly complement?: Estimate;
}

function readProfile(t: Trajectory, x: number, s: number): Reading | Refusal {
  if (!(Number.isFinite(x) && x >= 0))
    throw new SolverError("bad_parameter", `The start is x = ${x}; it must be a finite number, at least 0.`);
  if (!Number.isFinite(s)) throw new SolverError("bad_parameter", `s is ${s}; it must be a finite number.`);
  const reader = readerOf(t);
  if (s < -1) return { refused: `w(x, s) is given for s from −1 up to s0; s = ${s} is below −1.` };
  const u = deviationOf(t.base, s);
  if (u === 0) return { u: 0, error: 0, slope: () => ({ value: 0, error: 0 }) };
  if (reader.sterile) return withoutBranching(t, x, s);
  if (t.passage !== null) {
    const near = readNearOne(t, x, s);
    if (near !== null) return "refused" in near ? near : { u, error: 0, ...near };
    return shifted(t, reader, x, s);
  }
  const largest = reader.largest * t.base.scale[0];
  if (s > largest * (1 + 2 * Number.EPSILON))
    return {
      refused:
        reader.turning === null
          ? `w(x, s) is given for s up to ${largest}, where its trajectory ends; s = ${s} is beyond.`
          : `The series in s diverges beyond s0 = ${largest}: E[s^K] is infinite at s = ${s}. Take s up to s0.`,
    };
  return shifted(t, reader, x, s);
}

/** The place of a value of s, with u, |du/dξ| and |d²u/dξ²| there. */
interface Located {
  readonly place: Place;
  readonly u: number;
  readonly slope: number;
  readonly second: number;
}

/** Values of s whose places are kept: a figure asks for many x at each. */
const MOST_KEPT = 32;
const located = new WeakMap<TrajectoryReader, Map<number, Located>>();

function locate(reader: TrajectoryReader, u: number): Located {
  const kept = located.get(reader) ?? new Map<number, Located>();
  located.set(reader, kept);
  const known = kept.get(u);
  if (known !== undefined) return known;
  const place = reader.locate(u);
  const at = pointValue();
  reader.evaluateAt(place.side, place.xi, at);
  const second = Math.abs(secondDerivative(reader, place.xi, at));
  const found = { place, u: at.re, slope: Math.abs(at.slopeRe), second };
  if (kept.size >= MOST_KEPT) kept.clear();
  kept.set(u, found);
  return found;
}

/** Reads u at the place of s, moved by decay·x. */
function shifted(t: Trajectory, reader: TrajectoryReader, x: number, s: number): Reading {
  const found = locate(reader, deviationOf(t.base, s));
  const { place } = found;
  const way = reader.decay * x;
  const xi = place.xi + way;
  const at = pointValue();
  const rounding = reader.evaluateAt(place.side, xi, at);
  const { shift, lift, apart } = placeSpread(t, reader, found, way, s);
  const known = place.error + ROUNDING * (2 * way + Math.abs(xi)) + way * (inputUnit(x) + t.decaySpread) + shift.own;
  // over a short way the place and what is read there move together
  const error = rounding + Math.abs(at.slopeRe) * (known + apart * shift.ofTop) + apart * lift * at.re * at.re;
  const unit = reader.decay * t.base.scale[0];
  const slope = () => {
    const value = -unit * at.slopeRe;
    const second = Math.abs(secondDerivative(reader, xi, at));
    const fromPlace =
      unit *
      (rounding * SLOPE_AMPLIFICATION + second * (known + shift.ofTop) + 2 * lift * Math.abs(at.re * at.slopeRe));
    return { value, error: fromPlace + Math.abs(value) * (t.decaySpread + t.base.scaleSpread + 5 * ROUNDING) };
  };
  return { u: at.re, error, slope };
}

interface PlaceSpread {
  /** of ξ: with s and by the amplitude, and by the turning point's own move */
  readonly shift: { readonly own: number; readonly ofTop: number };
  /** u at a fixed ξ moves by lift·u² */
  readonly lift: number;
  /** share of what the trajectory's own move does that is left after a way: none of it where w is still s */
  readonly apart: number;
}

/** What half a unit in each input, s included, does to the place of s and to the trajectory beyond it.
 *  u(ξ) = z + … is fixed to first order in z; at u(s0) = −excess it moves as the excess does, so it moves by lift·u² in between. The
 *  place of a given s then moves by that over du/dξ, and near the turning point, where du/dξ is 0, by the root of it. */
function placeSpread(t: Trajectory, reader: TrajectoryReader, at: Located, way: number, s: number): PlaceSpread {
  const { turning } = reader;
  const { place, slope, second } = at;
  const near = Math.min(1, way);
  const above = place.side === "above" && turning !== null;
  const lift = above ? turning.excessSpread / turning.excess[0] : 0;
  const amplitude = near * (above ? turning.amplitudeSpread : t.amplitudeSpread);
  const isTop = above && place.xi === t.above.at(-1)?.xi;
  if (isTop) return { shift: { own: amplitude, ofTop: 0 }, lift, apart: 1 };
  const shiftBy = (move: number) => (move === 0 ? 0 : Math.min(move / slope, Math.sqrt((2 * move) / second)));
  const own = Math.abs(s) / t.base.scale[0];
  return {
    shift: {
      own: amplitude + shiftBy(own * inputUnit(s)),
      ofTop: shiftBy(lift * at.u * at.u + own * t.base.scaleSpread),
    },
    lift,
    apart: Math.min(1, way * (1 + second / slope)),
  };
}

/** Derivatives of a Taylor polynomial lose this factor over its values, on steps of a fifth of the radius. */
const SLOPE_AMPLIFICATION = 8;

function secondDerivative(reader: TrajectoryReader, xi: number, at: PointValue): number {
  const c = reader.expander.create();
  reader.expander.expand(xi, 0, at, c);
  return 2 * (c.re[2] as number);
}

/** Without branching u = z exactly, so 1 − w = (1 − s) e^{−decay x} for every s. */
function withoutBranching(t: Trajectory, x: number, s: number): Reading {
  const decay = toNumber(t.decay);
  const u = (1 - s) * Math.exp(-decay * x);
  const error = Math.abs(u) * (decay * x * (t.decaySpread + 2 * ROUNDING) + 4 * ROUNDING);
  const slope = () => ({
    value: decay * u,
    error: decay * error + Math.abs(decay * u) * (t.decaySpread + 2 * ROUNDING),
  });
  return { u, error, slope };
}

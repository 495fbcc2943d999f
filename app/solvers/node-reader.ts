import type { PointValue } from "./expansion.ts";
import { chartRest, type NodeChart, nodeChart } from "./node-chart.ts";
import { PATH_ERROR } from "./node-passage.ts";
import { prepareOffspring } from "./offspring.ts";
import { divide, multiply, toNumber } from "./pairs.ts";
import type { Passage, Trajectory } from "./types.ts";

/** A place near w = 1: y = λ_s x measured from where the trajectory was met, with Im y = extra − π·halves. Beside the cut s > 1
 *  halves is 1 and extra tiny: kept apart from −π, it makes imaginary parts there right to their own size. */
export interface NodePlace {
  re: number;
  extra: number;
  readonly halves: 0 | 1;
}

/** What the series may leave out in double precision, relative to u, and to what the cut sees of it alone. */
const REST = 2 ** -56;
const FAST_REST = 2 ** -50;
const NEWTON_ROUNDS = 40;
/** Steps on the way from s < 1 round to s > 1. */
const TURN_STEPS = 24;
/** The turn's radius, as a share of u where the trajectory was met, and the steps from there outwards. */
const TURNED_AT = 0.5;
const OUTWARD_STEP = 1.1;
/** The outermost place is found to this. */
const EDGE_STEP = 1 / 32;

/** Reads u = 1 − w near w = 1 off the chart of the node, in double precision, on either side of 1 and in the complex plane. */
export class NodeReader {
  readonly passage: Passage;
  readonly index: number;
  readonly slow: number;
  /** the fast damping over the rate at which q is left */
  readonly stiffness: number;
  /** dξ/dy */
  readonly stretch: number;
  /** largest Re y at which the series is used */
  readonly edge: number;
  private readonly rows: readonly Float64Array[];
  private readonly nearest: number;
  private readonly gap: number;
  private readonly zeta: number;
  private readonly eta: number;
  /** resonance·ζ^m and gap·η + resonance·ζ^m where the trajectory was met */
  private readonly resonant: number;
  private readonly singular: number;

  constructor(t: Trajectory, passage: Passage) {
    const chart = nodeChart(prepareOffspring(t.model.offspring), passage.index);
    this.passage = passage;
    this.nearest = chart.nearest;
    this.gap = toNumber(chart.gap);
    this.index = toNumber(passage.index);
    this.slow = toNumber(passage.slow);
    this.stiffness = Math.abs(t.ratio[0]);
    this.stretch = toNumber(divide(t.decay, passage.slow));
    this.zeta = toNumber(passage.zeta);
    this.eta = toNumber(passage.eta);
    let power = chart.resonance;
    for (let k = 0; k < chart.nearest && power[0] !== 0; k += 1) power = multiply(power, passage.zeta);
    this.resonant = toNumber(power);
    this.singular = this.gap * this.eta + this.resonant;
    this.rows = chart.series.rows.map((row) => row.high);
    this.edge = this.findEdge(chart);
  }

  private findEdge(chart: NodeChart): number {
    const { gap, index } = this;
    let edge = 0;
    const fits = (y: number) => {
      const stretch = (Math.abs(y) + Math.PI) * Math.exp(Math.abs(gap) * Math.abs(y));
      const eta = Math.exp(index * y) * (Math.abs(this.eta) + Math.abs(this.resonant) * stretch);
      const { whole, fast } = chartRest(chart, this.zeta * Math.exp(y), eta);
      return whole < REST && fast < FAST_REST;
    };
    while (!fits(edge)) edge -= EDGE_STEP;
    while (edge < 4 && fits(edge + EDGE_STEP)) edge += EDGE_STEP;
    return edge;
  }

  /** Whether the size of the singularity at s = 1 is lost in rounding: d is large, and the singularity tiny. */
  get lost(): boolean {
    return this.passage.etaError >= 1;
  }

  /** Largest Re y at which the series is right in double precision: its edge, or where what is lost of the singularity would be felt. */
  get knownEdge(): number {
    return this.lost ? Math.min(this.edge, Math.log(REST / (LOST_FACTOR * PATH_ERROR)) / this.index) : this.edge;
  }

  /** A bound on |Im u| beside the cut at y where it is lost. */
  lostSize(y: number): number {
    return LOST_FACTOR * PATH_ERROR * this.zeta * (this.rows[1]?.[0] ?? 1) * Math.exp(this.index * y);
  }

  /** ξ at y. */
  xiOf(y: number): number {
    return toNumber(this.passage.xi) + y * this.stretch;
  }

  /** y at ξ. */
  yOf(xi: number): number {
    return (xi - this.passage.xi[0] - this.passage.xi[1]) / this.stretch;
  }

  /** out = u and du/dy at a place, from the series. */
  evaluate(place: NodePlace, out: PointValue): void {
    this.coordinates(place);
    const { zetaRe: a, zetaIm: b, etaRe: c, etaIm: d } = this.at;
    const { rows } = this;
    let [ur, ui, er, ei, zr, zi] = [0, 0, 0, 0, 0, 0];
    for (let j = rows.length - 1; j >= 0; j -= 1) {
      const row = rows[j] as Float64Array;
      let [vr, vi, wr, wi] = [0, 0, 0, 0];
      for (let i = row.length - 1; i >= 0; i -= 1) {
        const w = wr * a - wi * b + vr;
        wi = wr * b + wi * a + vi;
        wr = w;
        const v = vr * a - vi * b + (row[i] as number);
        vi = vr * b + vi * a;
        vr = v;
      }
      const e = er * c - ei * d + ur;
      ei = er * d + ei * c + ui;
      er = e;
      const z = zr * c - zi * d + wr;
      zi = zr * d + zi * c + wi;
      zr = z;
      const u = ur * c - ui * d + vr;
      ui = ur * d + ui * c + vi;
      ur = u;
    }
    out.re = ur;
    out.im = ui;
    const { etaSlopeRe: p, etaSlopeIm: q } = this.at;
    out.slopeRe = a * zr - b * zi + (p * er - q * ei);
    out.slopeIm = a * zi + b * zr + (p * ei + q * er);
  }

  /** out = u(y + by) − u(y), to its own relative accuracy; beside the cut also its imaginary part. */
  evaluateDifference(place: NodePlace, by: number, out: PointValue): void {
    this.coordinates(place);
    const { zetaRe: a, zetaIm: b, etaRe: c, etaIm: d, powerRe, powerIm, restRe, restIm, growRe, growIm } = this.at;
    const grown = Math.expm1(by);
    const [da, db] = [a * grown, b * grown];
    const share = this.gap === 0 ? by : Math.expm1(this.gap * by) / this.gap;
    // η = power·rest: rest moves by grow·singular·share, power by e^{m by}
    const [mr, mi] = [growRe * this.singular * share, growIm * this.singular * share];
    const whole = Math.exp(this.nearest * by);
    const more = Math.expm1(this.nearest * by);
    const [sr, si] = [whole * mr + more * restRe, whole * mi + more * restIm];
    const [dc, dd] = [powerRe * sr - powerIm * si, powerRe * si + powerIm * sr];
    const { rows } = this;
    let [ur, ui, xr, xi] = [0, 0, 0, 0];
    for (let j = rows.length - 1; j >= 0; j -= 1) {
      const row = rows[j] as Float64Array;
      let [vr, vi, wr, wi] = [0, 0, 0, 0];
      for (let i = row.length - 1; i >= 0; i -= 1) {
        const w = wr * (a + da) - wi * (b + db) + (vr * da - vi * db);
        wi = wr * (b + db) + wi * (a + da) + (vr * db + vi * da);
        wr = w;
        const v = vr * a - vi * b + (row[i] as number);
        vi = vr * b + vi * a;
        vr = v;
      }
      const x = xr * (c + dc) - xi * (d + dd) + (ur * dc - ui * dd) + wr;
      xi = xr * (d + dd) + xi * (c + dc) + (ur * dd + ui * dc) + wi;
      xr = x;
      const u = ur * c - ui * d + vr;
      ui = ur * d + ui * c + vi;
      ur = u;
    }
    out.re = xr;
    out.im = xi;
  }

  /** Moves a place until u has the given value, by Newton's method. @returns false where it does not converge. */
  solve(place: NodePlace, re: number, im: number): boolean {
    const at = this.found;
    let size = Number.POSITIVE_INFINITY;
    for (let round = 0; round < NEWTON_ROUNDS; round += 1) {
      this.evaluate(place, at);
      const [gapRe, gapIm] = [re - at.re, im - at.im];
      const square = at.slopeRe * at.slopeRe + at.slopeIm * at.slopeIm;
      const stepRe = (gapRe * at.slopeRe + gapIm * at.slopeIm) / square;
      const stepIm = (gapIm * at.slopeRe - gapRe * at.slopeIm) / square;
      place.re += stepRe;
      place.extra += stepIm;
      const moved = Math.abs(stepRe) + Math.abs(stepIm);
      if (!Number.isFinite(moved)) return false;
      // a last step for the imaginary part, whose own size is far below that of the real one
      if (size < CONVERGED && moved < CONVERGED) return true;
      size = moved;
    }
    return false;
  }

  /** y of a real t = 1 − s > 0; null beyond the series. */
  locate(t: number): number | null {
    let guess = Math.log(t / this.scaleOfU());
    for (const first of [Math.min(guess, this.edge), this.edge]) {
      const place: NodePlace = { re: first, extra: 0, halves: 0 };
      guess = first;
      if (this.solve(place, t, 0)) return place.re <= this.edge ? place.re : null;
    }
    return null;
  }

  private scaleOfU(): number {
    const at = this.found;
    this.evaluate({ re: 0, extra: 0, halves: 0 }, at);
    return at.re;
  }

  /** The place beside the cut, on its upper side, where s − 1 = r > 0: reached from below 1 by a turn about s = 1, then outwards. */
  turn(r: number): NodePlace | null {
    let size = Math.min(r, this.scaleOfU() * TURNED_AT);
    const start = this.locate(size);
    if (start === null) return null;
    const place: NodePlace = { re: start, extra: 0, halves: 0 };
    for (let step = 1; step < TURN_STEPS; step += 1) {
      const angle = (-Math.PI * step) / TURN_STEPS;
      place.extra -= Math.PI / TURN_STEPS;
      if (!this.solve(place, size * Math.cos(angle), size * Math.sin(angle))) return null;
    }
    const cut: NodePlace = { re: place.re, extra: place.extra + Math.PI - Math.PI / TURN_STEPS, halves: 1 };
    if (!this.solve(cut, -size, 0)) return null;
    while (size < r) {
      const next = Math.min(r, size * OUTWARD_STEP);
      cut.re += Math.log(next / size) / 2;
      if (!this.solve(cut, -next, 0)) return null;
      size = next;
    }
    return cut;
  }

  private readonly found: PointValue = { re: 0, im: 0, slopeRe: 0, slopeIm: 0 };
  private readonly at = {
    zetaRe: 0,
    zetaIm: 0,
    etaRe: 0,
    etaIm: 0,
    etaSlopeRe: 0,
    etaSlopeIm: 0,
    powerRe: 0,
    powerIm: 0,
    restRe: 0,
    restIm: 0,
    growRe: 0,
    growIm: 0,
  };

  /** ζ, η and dη/dy at a place. */
  private coordinates({ re, extra, halves }: NodePlace): void {
    const { at, nearest, gap, eta, resonant } = this;
    const sign = halves === 1 ? -1 : 1;
    const size = sign * this.zeta * Math.exp(re);
    at.zetaRe = size * Math.cos(extra);
    at.zetaIm = size * Math.sin(extra);
    const power = (nearest % 2 === 0 ? 1 : sign) * Math.exp(nearest * re);
    at.powerRe = power * Math.cos(nearest * extra);
    at.powerIm = power * Math.sin(nearest * extra);
    const angle = extra - Math.PI * halves;
    const grown = Math.exp(gap * re);
    at.growRe = grown * Math.cos(gap * angle);
    at.growIm = grown * Math.sin(gap * angle);
    // (e^{g y} − 1)/g
    const moreRe =
      gap === 0 ? re : (Math.expm1(gap * re) * Math.cos(gap * angle) - 2 * Math.sin((gap * angle) / 2) ** 2) / gap;
    const moreIm = gap === 0 ? angle : (grown * Math.sin(gap * angle)) / gap;
    at.restRe = eta * at.growRe + resonant * moreRe;
    at.restIm = this.singular * moreIm;
    at.etaRe = at.powerRe * at.restRe - at.powerIm * at.restIm;
    at.etaIm = at.powerRe * at.restIm + at.powerIm * at.restRe;
    // dη/dy = m η + power·grow·singular
    const { growRe, growIm } = at;
    at.etaSlopeRe = nearest * at.etaRe + this.singular * (at.powerRe * growRe - at.powerIm * growIm);
    at.etaSlopeIm = nearest * at.etaIm + this.singular * (at.powerRe * growIm + at.powerIm * growRe);
  }
}

/** Room over the error of a walk. */
const LOST_FACTOR = 4;
/** A Newton step this small is followed by one more and no other. */
const CONVERGED = 1e-9;

const readers = new WeakMap<Passage, NodeReader>();

/** The reader of a trajectory's passage into w = 1, made once. */
export function nodeReaderOf(t: Trajectory): NodeReader {
  const passage = t.passage;
  if (passage === null) throw new Error("A node is read in the regime `toward` alone.");
  const known = readers.get(passage);
  if (known !== undefined) return known;
  const made = new NodeReader(t, passage);
  readers.set(passage, made);
  return made;
}

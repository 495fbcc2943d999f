import { type CutContour, type CutShape, reachFor, traceCut } from "./cut-contour.ts";
import { cutDifferences, cutValues } from "./cut-values.ts";
import { SolverError } from "./errors.ts";
import { type NodeReader, nodeReaderOf } from "./node-reader.ts";
import { divide, LN2, logarithm, ONE, subtract, toNumber } from "./pairs.ts";
import type { PreparedLaw } from "./prepared.ts";
import { ROUNDING, readerOf, type TrajectoryReader } from "./reader.ts";
import { type NodeValues, productOf } from "./sources.ts";
import { type Lattice, type Sums, sumRange, sumsOf, type Wanted } from "./sums.ts";
import type { Pair, Start, Trajectory } from "./types.ts";

/** Contours tried: an oblique part less steep, or a circle less wide, keeps clear of other singularities of w(x, ·); a wide circle
 *  loses fewer digits where the law falls fast. */
const WIDTHS = [2.5, 1.7, 1.2, 0.7, 0.4, 0.2, 0.1, 0.04, 0.01];
const SLOPES = [0.5, 0.15];
/** What the second contour changes. */
const CHECK = { slope: 0.7, width: 0.8, margin: 0.1, panelNodes: 20 };
const PANEL_NODES = 16;
/** The innermost panel of the leg, in units of n^−1/2. */
const FINEST = 1 / 64;
/** A contour whose law is known this well, relative, ends the search; two versions that differ by more than the other are none. */
const ACCEPTED = 1e-12;
const TOLERATED = 1e-6;
/** n at which contours are compared. */
const SAMPLES = [1, 2, 3, 5, 8, 13, 21, 34, 55, 89, 144, 233, 377, 610, 1000];
/** Below this λ_s x, w(x, s) − s is read off as one difference, since P(K = n) ~ x for every n ≠ 1. */
const NEAR = 0.25;
/** Beyond this λ_s x the numbers of the leg leave the double's range. */
const FARTHEST = 300;

interface Traced {
  readonly fine: Sums;
  readonly check: Sums;
  readonly power: number;
  readonly first: number;
  readonly nodes: string;
}

/** Traces the law of K for particles at positions > 0 in the regime `toward`.
 *  Source: Cauchy's integral along the cut [1, ∞) (see cut-contour.ts).
 *  @throws SolverError "not_converged" where no contour passes its tests. */
export function prepareToward(t: Trajectory, starts: readonly Start[], n: number, wanted: Wanted): PreparedLaw {
  const reader = readerOf(t);
  const node = nodeReaderOf(t);
  const farthest = node.slow * Math.max(...starts.map((s) => s.position));
  if (farthest > FARTHEST)
    throw new SolverError(
      "not_converged",
      `The mean of K is e^${farthest.toPrecision(3)} from the farthest start, beyond what this solver follows.`,
    );
  const particles = starts.reduce((sum, s) => sum + s.particles, 0);
  const lattice = { base: reader.base, offset: particles };
  const traced = search(t, reader, node, { starts, farthest, n, wanted, lattice });
  const log2q = t.base.scale[0] === 1 ? 0 : particles * toNumber(divide(logarithm(t.base.scale), LN2));
  return {
    fine: traced.fine,
    check: traced.check,
    extra: log2q + traced.power,
    log2Radius: [0, 0],
    radiusSpread: 0,
    factorSpread: particles * (FACTOR_ROUNDINGS * ROUNDING * (1 + Math.abs(log2q) / particles) + t.base.scaleSpread),
    spreadAt: inputSpread(t, node, starts),
    first: traced.first,
    lattice,
    method: `Cauchy's integral along the cut from s = 1, ${traced.nodes} nodes`,
  };
}

const FACTOR_ROUNDINGS = 8;

/** What half a unit in each input does to ln P(K = n): the law falls like n^{−1−d} beyond n = d, and exponentially before. */
function inputSpread(t: Trajectory, node: NodeReader, starts: readonly Start[]): (n: number) => number {
  const { slowSpread, indexSpread, shiftSpread } = node.passage;
  const way = starts.reduce((sum, s) => sum + s.particles * (node.slow * s.position) * (slowSpread + 2 * ROUNDING), 0);
  const d = node.index;
  const shape = way + shiftSpread + t.amplitudeSpread;
  return (n) => (1 + Math.min(n, d)) * shape + Math.min(n, d * (1 + Math.max(0, Math.log(n / d)))) * indexSpread;
}

interface Question {
  readonly starts: readonly Start[];
  readonly farthest: number;
  readonly n: number;
  readonly wanted: Wanted;
  readonly lattice: Lattice;
}

/** The contour whose law is known best among those whose two versions agree within what rounding excuses. */
function search(t: Trajectory, reader: TrajectoryReader, node: NodeReader, question: Question): Traced {
  const level = Math.ceil(Math.log10(Math.max(question.n, 1000)));
  let best: Traced | null = null;
  let highest = 0;
  for (const slope of SLOPES) {
    for (const width of WIDTHS) {
      const traced = traceBoth(t, reader, node, question, { slope, width }, level);
      if (traced === null) continue;
      const judged = judge(traced, question);
      if (judged === null) continue;
      if (judged.worst < ACCEPTED) return traced;
      if (best !== null && judged.digits <= highest) return best;
      highest = judged.digits;
      best = traced;
    }
    if (best !== null) return best;
  }
  throw new SolverError(
    "not_converged",
    "No contour passed its tests; the probabilities of this law cannot be vouched for.",
  );
}

function traceBoth(
  t: Trajectory,
  reader: TrajectoryReader,
  node: NodeReader,
  question: Question,
  { slope, width }: Pick<CutShape, "slope" | "width">,
  level: number,
): Traced | null {
  const finest = FINEST / Math.sqrt(10 ** level);
  const shape = { slope, width, margin: 0, panelNodes: PANEL_NODES, finest };
  const narrower = { ...shape, slope: slope * CHECK.slope, width: width * CHECK.width, margin: CHECK.margin };
  const contours = contoursOf(t, reader, node, question.farthest, shape, { ...narrower, panelNodes: CHECK.panelNodes });
  if (contours === null) return null;
  const [a, b] = contours;
  const one = read(reader, node, a, question);
  const other = read(reader, node, b, question);
  if (one === null || other === null || one.first !== other.first) return null;
  return {
    fine: one.sums,
    check: other.sums,
    power: one.power,
    first: one.first,
    nodes: `${a.legNodes} + ${a.arcNodes}`,
  };
}

const cache = new WeakMap<Trajectory, Map<string, readonly [CutContour, CutContour] | null>>();
const MOST_KEPT = 24;

function contoursOf(
  t: Trajectory,
  reader: TrajectoryReader,
  node: NodeReader,
  farthest: number,
  fine: CutShape,
  check: CutShape,
): readonly [CutContour, CutContour] | null {
  const known = cache.get(t) ?? new Map<string, readonly [CutContour, CutContour] | null>();
  cache.set(t, known);
  const key = `${farthest} ${fine.slope} ${fine.width} ${fine.finest}`;
  const found = known.get(key);
  if (found !== undefined) return found;
  const a = traceCut(reader, node, farthest, fine);
  const b = a === null ? null : traceCut(reader, node, farthest, check);
  const made = a === null || b === null ? null : ([a, b] as const);
  if (known.size >= MOST_KEPT) known.clear();
  known.set(key, made);
  return made;
}

/** Sums of a law over one contour. */
function read(
  reader: TrajectoryReader,
  node: NodeReader,
  contour: CutContour,
  { starts, wanted, lattice }: Question,
): { sums: Sums; power: number; first: number } | null {
  const only = starts.length === 1 && starts[0]?.particles === 1 ? starts[0] : null;
  const near = only !== null && node.slow * only.position < NEAR ? node.slow * only.position : null;
  const difference = near === null ? null : cutDifferences(reader, node, contour, near);
  const values = difference ?? wholeValues(reader, node, contour, starts);
  if (values === null) return null;
  const radius = divide(ONE, reader.base.scale);
  const reference = { radius, excess: subtract(radius, [reader.base.centre, 0] as Pair) };
  const sums = sumsOf(contour, reference, values, lattice, wanted);
  const share = node.lost ? 2 : node.passage.etaError + LEG_ROUNDINGS * ROUNDING;
  const arcShare = node.stiffness > STIFF ? STIFF_ROUNDINGS * ROUNDING : 0;
  const resolved = { nodes: contour.legNodes, reach: reachFor(node.index), share: arcShare };
  const uncertain = { nodes: contour.legNodes, share };
  return {
    sums: { ...sums, uncertain, resolved, negligible: FALLEN },
    power: values.power ?? 0,
    first: difference === null ? 1 : 2,
  };
}

/** Roundings of the imaginary part on the leg: the series' sums. */
const LEG_ROUNDINGS = 32;
/** Where the damping limits the steps on the trajectory, each loses some digits. */
const STIFF = 100;
const STIFF_ROUNDINGS = 65_536;
/** s^−n at which a term no longer counts, as −ln: the amplitudes rise like L^{d + 1}. */
const FALLEN = 300;

function wholeValues(
  reader: TrajectoryReader,
  node: NodeReader,
  contour: CutContour,
  starts: readonly Start[],
): NodeValues | null {
  const parts: { values: NodeValues; particles: number }[] = [];
  for (const { position, particles } of starts) {
    const values = cutValues(reader, node, contour, node.slow * position);
    if (values === null) return null;
    parts.push({ values, particles });
  }
  const [first] = parts;
  return parts.length === 1 && first?.particles === 1 ? first.values : productOf(reader.base, parts);
}

/** The largest relative error at sampled n up to the n asked for, and the digits known at all of them; null where the two laws differ
 *  by more than rounding excuses. */
function judge({ fine, check }: Traced, { n, lattice, wanted }: Question): { worst: number; digits: number } | null {
  let worst = 0;
  let digits = 0;
  const { period } = lattice.base;
  for (const sample of SAMPLES) {
    if (sample > Math.max(n, LEAST_SAMPLED + lattice.offset)) break;
    const at = sample + ((((lattice.offset - sample) % period) + period) % period);
    if (reachesNothing(lattice, at, wanted)) continue;
    const a = sumRange(fine, at, at);
    const b = sumRange(check, at, at);
    const value = Math.abs(a.values[0] as number);
    const gap = Math.abs((a.values[0] as number) - (b.values[0] as number));
    const rounding = a.rounding[0] as number;
    if (!(gap <= TOLERATED * value + EXCUSED * (rounding + (b.rounding[0] as number)))) return null;
    const relative = Math.min(1, (gap + rounding) / Math.max(value, Number.MIN_VALUE));
    worst = Math.max(worst, relative);
    digits -= Math.log10(Math.max(relative, ACCEPTED));
  }
  return { worst, digits };
}

/** n to which the two laws are compared at least, beyond the number of particles. */
const LEAST_SAMPLED = 10;
const EXCUSED = 2;

/** Without childless deaths K is at least the number of particles. */
function reachesNothing({ base, offset }: Lattice, n: number, wanted: Wanted): boolean {
  return base.centre === 0 && (wanted === "each" ? n < offset : n < offset - base.period);
}

import { SolverError } from "./errors.ts";
import type { Probe, Sample } from "./root-bracket.ts";
import { bracketWithin, Prober } from "./root-bracket.ts";
import type { Answer, Estimate, ScaledEstimate } from "./types.ts";

/** Where a function becomes 0. */
export interface Root {
  /** The function changes sign within root.error of root.value: covers the bracket and the errors of the function's values. */
  readonly root: Estimate;
  /** the function at root.value */
  readonly residual: ScaledEstimate;
  readonly evaluations: number;
  /** the part of the interval within which the function was found to have values */
  readonly answered: readonly [number, number];
  /** why it has none in the rest; null where there is no rest */
  readonly unanswered: string | null;
}

/** Why no root is given, in samples that words can be made of. */
export type NoRoot =
  /** the function has no value anywhere it was asked for */
  | { readonly why: "no values"; readonly reason: string }
  /** it has the same sign at both ends of where it has values */
  | { readonly why: "same sign"; readonly low: Sample; readonly high: Sample; readonly unanswered: string | null }
  /** at an end of the interval its sign is undecided within its error */
  | { readonly why: "undecided end"; readonly end: Sample }
  /** its sign changes across a stretch where it has no value */
  | { readonly why: "gap"; readonly low: Sample; readonly high: Sample; readonly reason: string }
  /** its sign changes at a jump or a pole */
  | { readonly why: "jump"; readonly low: Sample; readonly high: Sample };

const MOST_STEPS = 500;
/** Near 0 the bracket is closed at this share of the whole interval, elsewhere at a unit in the last place. */
const NEAR_ZERO = 2 ** -104;
/** How many times wider a stretch is looked at to tell a jump from a steep slope, and what share of the change a slope leaves at most. */
const WIDER = 2 ** 20;
const SLOPE_SHARE = 1 / 8;
/** Refinements of the final bracket. */
const ROUNDS = 6;

/** A root of a continuous function whose values carry errors, between two arguments where its signs are certain and opposite.
 *  Where the function has no value at an end, the search keeps to the stretch next to it where it has.
 *  Source: T. R. Chandrupatla, Adv. Eng. Software 28 (1997) 145–149, for the steps; the final bracket's ends have certain, opposite signs.
 *  @param f value with its error, or why there is none
 *  @throws SolverError "bad_parameter" where the ends are not finite and in order, "not_converged" after 500 steps. */
export function findRoot(f: Probe, from: number, to: number): Root | NoRoot {
  if (!(Number.isFinite(from) && Number.isFinite(to) && from < to))
    throw new SolverError(
      "bad_parameter",
      `The interval from ${from} to ${to} is none; the second end must be the larger one.`,
    );
  const prober = new Prober(f);
  const bracket = bracketWithin(prober, from, to);
  if ("why" in bracket) return bracket;
  const { low, high, unanswered } = bracket;
  const told = { answered: [low.x, high.x] as const, unanswered };
  const exact = [low, high].find((end) => end.value.mantissa === 0 && end.value.error === 0);
  if (exact !== undefined)
    return { root: { value: exact.x, error: 0 }, residual: exact.value, evaluations: prober.evaluations, ...told };
  const undecided = [low, high].find((end) => end.sign === 0);
  if (undecided !== undefined) return { why: "undecided end", end: undecided };
  if (low.sign === high.sign) return { why: "same sign", low, high, unanswered };
  const narrowed = narrow(prober, low, high, to - from);
  if ("why" in narrowed) return narrowed;
  if (narrowed.middle === null && isJump(prober, narrowed, low, high))
    return { why: "jump", low: narrowed.low, high: narrowed.high };
  const { root, residual } = enclosed(prober, narrowed);
  return { root, residual, evaluations: prober.evaluations, ...told };
}

interface Narrowed {
  /** certain and opposite signs */
  readonly low: Sample;
  readonly high: Sample;
  /** between them, 0 within its error; null where the bracket closed without meeting such a point */
  readonly middle: Sample | null;
}

/** Inverse quadratic interpolation where it is safe, bisection else, until a value is 0 within its error or the bracket is closed. */
function narrow(prober: Prober, first: Sample, second: Sample, width: number): Narrowed | NoRoot {
  let a = second;
  let b = first;
  let c = second;
  let share = 1 / 2;
  for (let step = 0; step < MOST_STEPS; step += 1) {
    const [low, high] = a.x < b.x ? [a, b] : [b, a];
    const best = Math.abs(a.height) < Math.abs(b.height) ? a : b;
    const tolerance = unitAt(best.x) + NEAR_ZERO * width;
    if (high.x - low.x <= tolerance) return { low, high, middle: null };
    const least = Math.min(1 / 2, tolerance / Math.abs(b.x - a.x));
    const next = between(prober, a, b, Math.min(Math.max(share, least), 1 - least));
    if ("refused" in next) return { why: "gap", low, high, reason: next.refused };
    if (next.sign === 0) return { low, high, middle: next };
    if (next.sign === a.sign) c = a;
    else [c, b] = [b, a];
    a = next;
    share = nextShare(a, b, c);
  }
  throw new SolverError(
    "not_converged",
    `No root was enclosed within ${MOST_STEPS} steps between ${first.x} and ${second.x}.`,
  );
}

/** Where between a and b the next point lies. */
function nextShare(a: Sample, b: Sample, c: Sample): number {
  const xi = (a.x - b.x) / (c.x - b.x);
  const phi = (a.height - b.height) / (c.height - b.height);
  const isSafe = phi * phi < xi && (1 - phi) * (1 - phi) < 1 - xi;
  if (!isSafe) return 1 / 2;
  const first = (a.height / (b.height - a.height)) * (c.height / (b.height - c.height));
  const second = ((c.x - a.x) / (b.x - a.x)) * (a.height / (c.height - a.height)) * (b.height / (c.height - b.height));
  return Number.isFinite(first + second) ? first + second : 1 / 2;
}

/** A sample at a share of the way from a to b, or elsewhere between them where there is no value there. */
function between(prober: Prober, a: Sample, b: Sample, share: number): Answer<Sample> {
  let refused: Answer<Sample> | null = null;
  for (const tried of [share, 0.5, 0.25, 0.75, 0.1, 0.9, 0.01, 0.99]) {
    const x = a.x + tried * (b.x - a.x);
    if (x === a.x || x === b.x) continue;
    const sample = prober.at(x);
    if (!("refused" in sample)) return sample;
    refused ??= sample;
  }
  return refused ?? { refused: "There is no value." };
}

/** A slope leaves a small share of its change in so narrow a bracket; a jump leaves all of it, a pole more. */
function isJump(prober: Prober, { low, high }: Narrowed, first: Sample, last: Sample): boolean {
  const reach = WIDER * (high.x - low.x);
  const before = prober.at(Math.max(low.x - reach, first.x));
  const after = prober.at(Math.min(high.x + reach, last.x));
  if ("refused" in before || "refused" in after) return false;
  return Math.abs(high.height - low.height) > SLOPE_SHARE * Math.abs(after.height - before.height);
}

/** The root with the smallest error that certain signs on both sides vouch for. */
function enclosed(prober: Prober, narrowed: Narrowed): { root: Estimate; residual: ScaledEstimate } {
  let { low, high } = narrowed;
  const middle = narrowed.middle ?? (Math.abs(low.height) < Math.abs(high.height) ? low : high);
  for (let round = 0; round < ROUNDS && narrowed.middle !== null; round += 1) {
    const slope = Math.abs(high.height - low.height) / (high.x - low.x);
    const step = Math.max((5 / 4) * (middle.uncertainty / slope), 2 * unitAt(middle.x));
    if (!(4 * step < Math.max(middle.x - low.x, high.x - middle.x))) break;
    low = stepOut(prober, middle, low, step);
    high = stepOut(prober, middle, high, step);
  }
  const error = Math.max(middle.x - low.x, high.x - middle.x);
  return { root: { value: middle.x, error: error * (1 + Number.EPSILON) }, residual: middle.value };
}

/** The nearest point found on one side of the middle, at doubling distances, where the sign is as at the side's end. */
function stepOut(prober: Prober, middle: Sample, end: Sample, step: number): Sample {
  const toward = Math.sign(end.x - middle.x);
  for (let distance = step; distance < Math.abs(end.x - middle.x); distance *= 2) {
    const sample = prober.at(middle.x + toward * distance);
    if (!("refused" in sample) && sample.sign === end.sign) return sample;
  }
  return end;
}

/** One or two units in the last place. */
function unitAt(x: number): number {
  return Number.EPSILON * Math.abs(x);
}

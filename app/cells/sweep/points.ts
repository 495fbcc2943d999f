import type { Value } from "../../formulas/index.ts";
import type { Border, BorderWords, Branches } from "../borders.ts";
import { borderWords, findBorders, mergedBorders, openSide, sameBranches } from "../borders.ts";
import type { ComputeContext } from "../context.ts";
import { CellFault } from "../context.ts";
import type { VariedValues } from "../varying.ts";
import { endsOf } from "../varying.ts";
import type { Stretch } from "./adapt.ts";
import { adaptedPoints } from "./adapt.ts";
import { drawnInLogs, heightOf } from "./heights.ts";

export const SCALES = ["linear", "log", "adapted"] as const;
export type SweepScale = (typeof SCALES)[number];

/** Where the points of a curve lie: at listed places, or on an interval. */
export type Range =
  | { readonly places: readonly number[] }
  | { readonly from: number; readonly to: number; readonly count: number; readonly scale: SweepScale };

/** What is found at one place. */
export type Recorded = Readonly<Record<string, Value>>;

/** The points of one curve, in their order; `piece[i]` changes where the curve breaks. */
export interface Curve {
  readonly x: readonly number[];
  readonly piece: readonly number[];
  readonly recorded: readonly Recorded[];
  readonly jumps: readonly Jump[];
}

/** Where a curve breaks, and why. */
export interface Jump {
  readonly below: number;
  readonly above: number;
  /** The end that is not attained. */
  readonly open: "below" | "above";
  readonly words: BorderWords | null;
}

/** How a curve's points are found: what is recorded at a place, and the branches there. */
export interface Probe {
  recordAt(x: number): Recorded;
  branchesAt(x: number): Branches;
}

/** Branches are looked up at so many places of an interval before any point is chosen. */
const LOOKS = 48;
/** One-sided ends at a jump: two points each. */
const LEAST_POINTS = 2;

/** @throws CellFault when values are no numbers, run backwards, or cannot lie on the scale. */
export function rangeOf(
  values: VariedValues,
  path: string,
  { count, scale }: { count: number; scale: SweepScale },
  context: ComputeContext,
): Range {
  if ("list" in values)
    return { places: values.list.map((formula, index) => context.number(formula, `${path}.${index}`, {})) };
  const [from, to] = endsOf(values, path, context);
  if (from === to) throw new CellFault(path, `\`${path}\` goes from ${from} to ${to}; its ends must be apart.`);
  if (scale === "log" && from <= 0)
    throw new CellFault(path, `\`${path}\` begins at ${from}; on a log scale it must begin above 0.`);
  return { from, to, count: Math.max(LEAST_POINTS, count), scale };
}

/** How many points a range has. */
export function countOf(range: Range): number {
  return "places" in range ? range.places.length : range.count;
}

/** The curve over a range. `onPoint` is called after each point. */
export function curveOver(range: Range, probe: Probe, onPoint: () => void): Curve {
  const recordAt = (x: number): Recorded => {
    const recorded = probe.recordAt(x);
    onPoint();
    return recorded;
  };
  if ("places" in range || range.scale !== "adapted") return fixedCurve(placesOf(range), recordAt, probe);
  return adaptedCurve(range, recordAt, probe);
}

function placesOf(range: Range): readonly number[] {
  if ("places" in range) return range.places;
  const { from, to, count, scale } = range;
  const share = (index: number) => index / (count - 1);
  return Array.from({ length: count }, (_, index) => {
    if (index === 0) return from;
    if (index === count - 1) return to;
    return scale === "log" ? from * (to / from) ** share(index) : from + (to - from) * share(index);
  });
}

/** Points where they were asked for; the curve breaks between those that a jump parts. */
function fixedCurve(x: readonly number[], recordAt: (x: number) => Recorded, probe: Probe): Curve {
  const increasing = [...new Set(x)].sort((a, b) => a - b);
  const jumps = jumpsOn(increasing, probe);
  return { x, piece: piecesOf(x, jumps), recorded: x.map(recordAt), jumps };
}

/** Points where what is recorded bends, on stretches from jump to jump, each with its one-sided ends. */
function adaptedCurve(
  { from, to, count }: { from: number; to: number; count: number },
  recordAt: (x: number) => Recorded,
  probe: Probe,
): Curve {
  const looks = Array.from({ length: LOOKS + 1 }, (_, index) =>
    index === LOOKS ? to : from + ((to - from) * index) / LOOKS,
  );
  const jumps = jumpsOn(looks, probe);
  // Each stretch has two ends; where there are fewer points than that takes, the last jumps have none beside them.
  const parting = jumps.slice(0, Math.max(0, Math.floor(count / 2) - 1));
  const starts = [from, ...parting.map((jump) => jump.above)];
  const ends = [...parting.map((jump) => jump.below), to];
  const stretches = starts.map((start, index): Stretch => {
    const [first, last] = [index > 0, index < parting.length];
    return {
      from: start,
      to: ends[index] ?? to,
      rootAt: first && last ? "both" : first ? "from" : last ? "to" : "neither",
    };
  });
  const points = adaptedPoints(stretches, count, recordAt, heightsFor);
  const x = points.map((point) => point.x);
  return { x, piece: piecesOf(x, jumps), recorded: points.map((point) => point.found), jumps };
}

function jumpsOn(places: readonly number[], probe: Probe): readonly Jump[] {
  return mergedBorders(findBorders(places, (at) => probe.branchesAt(at), sameBranches)).map(jumpAt);
}

function piecesOf(x: readonly number[], jumps: readonly Jump[]): readonly number[] {
  return x.map((at) => jumps.filter((jump) => jump.above <= at).length);
}

/** The side that does not reach the border is left a few doubles before it, so that a break can be drawn in between. */
function jumpAt({ below, above, lower, upper }: Border<Branches>): Jump {
  const step = 4 * Number.EPSILON * Math.max(Math.abs(below), Math.abs(above));
  const open = openSide(lower, upper);
  const words = borderWords(lower, upper);
  return open === "below"
    ? { below: Math.min(below, above - step), above, open, words }
    : { below, above: Math.max(above, below + step), open, words };
}

/** Heights of what is recorded as a figure draws it, judged by the first points. */
function heightsFor(first: readonly Recorded[]): (recorded: Recorded) => readonly (number | null)[] {
  const names = Object.keys(first[0] ?? {});
  const inLogs = new Map(names.map((name) => [name, drawnInLogs(first.flatMap((recorded) => recorded[name] ?? []))]));
  return (recorded) => names.map((name) => heightOf(recorded[name], inLogs.get(name) === true));
}

import { toDouble } from "../formulas/index.ts";
import type { Paper } from "../paper/index.ts";
import type { Border, Branches } from "./borders.ts";
import {
  borderWords,
  DOUBLES,
  findBordersSteps,
  finish,
  mergedBorders,
  openSide,
  sameBranches,
  WHOLE_NUMBERS,
} from "./borders.ts";
import { computePlan, quickCells } from "./compute.ts";
import { planPaper } from "./plan.ts";
import { isJudged, isRefusal, standingsAt } from "./standings.ts";
import type { CellResult, Outcome, Plan, PlannedCell, PlannedParameter } from "./types.ts";

/** Where along a parameter the cells that read it answer otherwise, or not at all. */
export interface AnswerRange {
  readonly parameter: string;
  /** In increasing order: all within the parameter's scale, or the nearest ones where it has none. */
  readonly borders: readonly AnswerBorder[];
}

/** One such place, between two neighbouring doubles. */
export interface AnswerBorder {
  readonly below: number;
  readonly above: number;
  /** The side that does not reach the border. */
  readonly open: "below" | "above";
  /** "the drift is critical in larvae"; "" where only an input goes out of its range. */
  readonly why: string;
  readonly sides: { readonly below: AnswerSide; readonly above: AnswerSide };
}

export interface AnswerSide {
  /** "K is infinite with positive probability"; "" where no theory changes its branch. */
  readonly holds: string;
  /** Cells that have no answer in the middle of the stretch from here to the next border, with the reason. */
  readonly without: readonly { readonly id: string; readonly reason: string }[];
}

/** What the search may use, and how far it goes. */
export interface AnswerRangeOptions {
  readonly overrides?: Readonly<Record<string, string>>;
  /** Results known by key. */
  known?(key: string): CellResult | undefined;
}

/** So many places of a scale are looked at before borders are closed in on. */
const LOOKS = 48;
/** Without a scale: so far from the present value, in shares of its size. */
const REACH = [1 / 64, 1 / 16, 1 / 4, 1 / 2, 1, 2, 4];

/**
 * Finds where along a parameter the quick cells that read it change the branch of their theory or have no answer. Each step is
 * some milliseconds of work, so that a page may do something else in between. Planning decides inputs out of range and
 * branches; then each stretch between two borders is computed once, in its middle, for the cells that fail there.
 */
export function* answerRangeSteps(
  paper: Paper,
  plan: Plan,
  name: string,
  options: AnswerRangeOptions = {},
): Generator<void, AnswerRange> {
  const parameter = plan.parameters.find((each) => each.name === name);
  const quick = quickCells(plan);
  const readers = plan.cells.filter((cell) => quick.has(cell.id) && cell.parameters.includes(name));
  const grid = parameter !== undefined && counts(parameter) ? WHOLE_NUMBERS : DOUBLES;
  const places = parameter === undefined ? [] : increasing(placesOf(parameter).map(grid));
  if (readers.length === 0 || places.length === 0) return { parameter: name, borders: [] };
  const judged = readers.filter((cell) => isJudged(cell, plan, name));
  const standings = (x: number) => standingsAt(plan, name, x, judged, options.known);
  const found = yield* findBordersSteps(places, standings, sameBranches, grid);
  const borders = mergedBorders(found);
  if (borders.length === 0) return { parameter: name, borders: [] };
  const stretches: (readonly Missing[])[] = [];
  const ends = [places[0] ?? 0, ...borders.flatMap(({ below, above }) => [below, above]), places.at(-1) ?? 0];
  for (let index = 0; index < ends.length; index += 2) {
    const [from = 0, to = 0] = ends.slice(index, index + 2);
    stretches.push(yield* missingAt(paper, name, grid(from + (to - from) / 2), readers, options));
  }
  return { parameter: name, borders: borders.map((border, index) => answerBorder(border, stretches, index)) };
}

/** The same at once. */
export function answerRange(paper: Paper, plan: Plan, name: string, options: AnswerRangeOptions = {}): AnswerRange {
  return finish(answerRangeSteps(paper, plan, name, options));
}

interface Missing {
  readonly id: string;
  readonly reason: string;
}

/** Whether a parameter goes in whole numbers alone: its scale, its step and its present value are whole. */
function counts({ min, step, value }: PlannedParameter): boolean {
  const present = value.type === "number" ? toDouble(value.quantity) : Number.NaN;
  return step !== null && [step, min ?? 0, present].every(Number.isInteger);
}

/** Where to look: over the scale, its present value among them, or around that value. */
function placesOf({ min, max, value }: PlannedParameter): number[] {
  const present = value.type === "number" ? toDouble(value.quantity) : null;
  const around = present === null ? [] : [present];
  if (min !== null && max !== null && min < max) {
    const even = Array.from({ length: LOOKS + 1 }, (_, index) =>
      index === LOOKS ? max : min + ((max - min) * index) / LOOKS,
    );
    return [...even, ...around.filter((x) => x > min && x < max)];
  }
  if (present === null) return [];
  const size = present === 0 ? 1 : Math.abs(present);
  return [...around, ...REACH.flatMap((share) => [present - share * size, present + share * size])];
}

function increasing(places: readonly number[]): number[] {
  return [...new Set(places)].sort((a, b) => a - b);
}

/** Quick readers without an answer at one value of the parameter. One cell a step. */
function* missingAt(
  paper: Paper,
  name: string,
  x: number,
  readers: readonly PlannedCell[],
  { overrides, known }: AnswerRangeOptions,
): Generator<void, readonly Missing[]> {
  const plan = planPaper(paper, { overrides: { ...overrides, [name]: String(x) } });
  yield;
  const here = new Map<string, CellResult>();
  const missing: Missing[] = [];
  for (const { id } of readers) {
    const outcome = computePlan(plan, {
      known: (key) => here.get(key) ?? known?.(key),
      only: [id],
      onOutcome: keep,
    }).get(id);
    const reason = outcome === undefined ? null : reasonOf(outcome, missing);
    if (reason !== null) missing.push({ id, reason });
    yield;
  }
  return missing;

  function keep(_cell: PlannedCell, outcome: Outcome): void {
    if (outcome.status === "computed") here.set(outcome.result.key, outcome.result);
  }
}

function reasonOf(outcome: Outcome, missing: readonly Missing[]): string | null {
  if (outcome.status === "computed") return null;
  if (outcome.status === "failed") return outcome.failure.message;
  return missing.find(({ id }) => outcome.needs.includes(id))?.reason ?? "It waits for a cell that has no answer.";
}

function answerBorder(
  { below, above, lower, upper }: Border<Branches>,
  stretches: readonly (readonly Missing[])[],
  index: number,
): AnswerBorder {
  const refused = refusedSide(lower, upper);
  const words = refused === null ? borderWords(lower, upper) : null;
  return {
    below,
    above,
    open: refused ?? openSide(lower, upper),
    why: words?.at ?? "",
    sides: {
      below: { holds: words?.below ?? "", without: stretches[index] ?? [] },
      above: { holds: words?.above ?? "", without: stretches[index + 1] ?? [] },
    },
  };
}

/** The side on which more inputs are refused, taken not to reach the border; null where neither has more. */
function refusedSide(lower: Branches, upper: Branches): "below" | "above" | null {
  const refusals = (standings: Branches) => [...standings.values()].filter(isRefusal).length;
  const difference = refusals(lower) - refusals(upper);
  return difference === 0 ? null : difference > 0 ? "below" : "above";
}

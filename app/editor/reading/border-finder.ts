import {
  type AnswerBorder,
  type AnswerRange,
  answerRangeSteps,
  type CellResult,
  type Plan,
  parameterWords,
} from "../../cells/index.ts";
import { printExact } from "../../formulas/index.ts";
import type { Paper } from "../../paper/index.ts";
import type { BorderFace, BorderSide } from "../model/borders.ts";

/** What the search needs of a paper at rest: nothing in it is under the hand. */
export interface Ground {
  readonly paper: Paper;
  readonly plan: Plan;
  /** A visitor's own values. */
  readonly overrides: Readonly<Record<string, string>>;
  /** "Figure 1", by id. */
  readonly titles: ReadonlyMap<string, string>;
  known(key: string): CellResult | undefined;
}

/** Ranges remembered, so that going back and forth between two values finds them ready. */
const MOST_RANGES = 64;

/**
 * Finds, step by step and only while nothing else is to be done, where along each parameter the cells answer otherwise.
 * A range is remembered under all that it depends on; prose may change as it likes.
 */
export class BorderFinder {
  private readonly ranges = new Map<string, AnswerRange>();
  private ground: Ground | null = null;
  private wanted: { readonly name: string; readonly sign: string }[] = [];
  private work: { readonly sign: string; readonly steps: Generator<void, AnswerRange> } | null = null;

  /** The paper as it is now. Work on what is still wanted goes on. */
  stand(ground: Ground): void {
    this.ground = ground;
    this.wanted = ground.plan.parameters.map(({ name }) => ({ name, sign: signOf(ground.plan, name) }));
    if (!this.wanted.some(({ sign }) => sign === this.work?.sign)) this.work = null;
  }

  /** Some milliseconds of work. @returns whether more is to be done */
  step(): boolean {
    const { ground } = this;
    if (ground === null) return false;
    if (this.work === null) {
      const next = this.wanted.find(({ sign }) => !this.ranges.has(sign));
      if (next === undefined) return false;
      this.work = { sign: next.sign, steps: answerRangeSteps(ground.paper, ground.plan, next.name, ground) };
    }
    const step = this.work.steps.next();
    if (step.done === true) {
      if (this.ranges.size >= MOST_RANGES) this.ranges.clear();
      this.ranges.set(this.work.sign, step.value);
      this.work = null;
    }
    return true;
  }

  /** The borders found so far, by parameter. */
  faces(): Record<string, readonly BorderFace[]> {
    const faces: Record<string, readonly BorderFace[]> = {};
    for (const { name, sign } of this.wanted) {
      const borders = this.ranges.get(sign)?.borders ?? [];
      if (borders.length > 0) faces[name] = borders.map((border) => this.faceOf(border));
    }
    return faces;
  }

  private faceOf(border: AnswerBorder): BorderFace {
    const at = border.open === "below" ? border.above : border.below;
    return {
      at,
      open: border.open,
      shown: shownPlace(at),
      why: border.why,
      below: this.sideFace(border.sides.below),
      above: this.sideFace(border.sides.above),
    };
  }

  /** Cells that print something are named; the others only where no other is missing. */
  private sideFace({ holds, without }: AnswerBorder["sides"]["below"]): BorderSide {
    const printed = without.filter(({ id }) => (this.ground?.plan.byId.get(id)?.show.length ?? 0) > 0);
    const told = printed.length > 0 ? printed : without;
    return { holds, without: told.map(({ id }) => this.ground?.titles.get(id) ?? id) };
  }
}

const SHOWN_DIGITS = 4;
/** A border found this near to 0 is at 0: bisection comes to it by halves. */
const NEAR_ZERO = 1e-12;

function shownPlace(x: number): string {
  return printExact(Math.abs(x) < NEAR_ZERO ? 0 : Number(x.toPrecision(SHOWN_DIGITS)));
}

/** All that a parameter's range depends on: its scale, the other parameters, and the workings that read it. */
function signOf(plan: Plan, name: string): string {
  const own = plan.parameters.find((parameter) => parameter.name === name);
  const scaled = own?.min !== null && own?.max !== null;
  const others = plan.parameters.map((parameter) =>
    parameter.name === name
      ? [name, own?.min, own?.max, scaled ? "" : parameterWords(parameter)]
      : [parameter.name, parameter.reads.includes(name) ? parameter.source : parameterWords(parameter)],
  );
  const readers = plan.cells.filter((cell) => cell.parameters.includes(name));
  return JSON.stringify([others, readers.map(({ id, workingKey, show }) => [id, workingKey, show])]);
}

import type { KindWords } from "../model/knowledge.ts";
import type { ParameterFace } from "../model/types.ts";
import type { Asked } from "./asked.ts";
import { type Curve, curveWanted, freeDummy } from "./curve.ts";
import { endsOf, numberOf, numberWanted, parameterWanted, roundAbove, rounded } from "./measured.ts";
import { namesHidden, namesTaken, takeName } from "./names.ts";
import type { CaseKnowledge } from "./types.ts";

/** What is varied, and what is looked at meanwhile. */
interface Measured {
  readonly formula: string;
  readonly column: string;
  readonly varied: string;
  readonly symbol: string;
  readonly low: string;
  readonly high: string;
}

/**
 * What the places of a kind's body stand for in one paper. A cell that a place needs and the paper lacks is made with it:
 * then it stands in `made`, in the order in which the cells are to be set.
 */
export class Ground {
  readonly made: string[] = [];
  readonly asked: Asked;
  readonly knowledge: CaseKnowledge;
  private readonly taken: Set<string>;
  /** Names of cells that were made here, by kind. */
  private readonly own = new Map<string, string>();
  private readonly filled = new Map<string, string>();
  private measuredOnce: Measured | null = null;
  private curveOnce: Curve | null = null;

  constructor(asked: Asked, knowledge: CaseKnowledge) {
    this.asked = asked;
    this.knowledge = knowledge;
    this.taken = namesTaken(knowledge);
  }

  /** What stands in a place of a body: a name of PLACES, or a kind, for the name of a cell of that kind. */
  at(place: string): string {
    const known = this.filled.get(place);
    if (known !== undefined) return known;
    const fill = PLACES[place];
    const made = fill === undefined ? this.cellOf(place) : fill(this);
    this.filled.set(place, made);
    return made;
  }

  has(place: string): boolean {
    return this.filled.has(place);
  }

  /** A name for a new cell or parameter. */
  take(base: string): string {
    return takeName(base, this.taken);
  }

  /** A name for a column or a key: it may be used elsewhere, but hides no parameter and no cell. */
  inner(base: string): string {
    return takeName(base, namesHidden(this.knowledge, this.own.values()));
  }

  measured(): Measured {
    this.measuredOnce ??= this.findMeasured();
    return this.measuredOnce;
  }

  curve(): Curve {
    this.curveOnce ??= curveWanted(this.asked, this.knowledge) ?? this.survival();
    return this.curveOnce;
  }

  /** A cell of a kind: the one asked for, else the first; where there is none, one is made. */
  private cellOf(kind: string): string {
    const cells = this.knowledge.names.cells.filter((cell) => cell.kind === kind);
    const found = cells.find(({ name }) => this.asked.words.includes(name)) ?? cells[0];
    if (found !== undefined) return found.name;
    const own = this.own.get(kind);
    if (own !== undefined) return own;
    const words = this.knowledge.words.kinds.find(({ name }) => name === kind);
    if (words === undefined) throw new Error(`«${kind}» is no place that the case knows, and no kind of cell.`);
    const name = this.take(words.offered.name === "" ? kind : words.offered.name);
    this.own.set(kind, name);
    this.made.push(fence(words, name, withoutMarks(fillPlaces(words.offered.body, this))));
    return name;
  }

  private findMeasured(): Measured {
    const { asked, knowledge } = this;
    const number = numberWanted(asked, knowledge);
    const parameter = number === null ? null : parameterWanted(asked, number.cell, knowledge);
    if (number === null || parameter === null) {
      const { formula, dummy, from, to, column } = this.curve();
      return { formula, column, varied: dummy, symbol: dummy, low: from, high: to };
    }
    const [low, high] = endsOf(parameter);
    const { name, symbol } = parameter;
    return { formula: `${number.cell}.${number.member}`, column: number.member, varied: name, symbol, low, high };
  }

  /** What a process alone lets one ask. */
  private survival(): Curve {
    const dummy = freeDummy("x", this.knowledge);
    const formula = `${this.at("process")}.survival(${dummy})`;
    return { formula, dummy, from: "0", to: "4", few: "4", column: "survival" };
  }
}

const PLACES: Readonly<Record<string, (ground: Ground) => string>> = {
  /** Where a first particle starts. */
  start: ({ asked, knowledge }) =>
    asked.words.find((word) => /^\d+(?:\.\d+)?$/.test(word)) ??
    parameterFor(knowledge, /^x_?0$/, /\bstart/i)?.name ??
    "1",
  drift: ({ knowledge }) => parameterFor(knowledge, /^(?:mu|drift)$/, /\b(?:drift|current)\b/i)?.name ?? "2",
  rate: ({ knowledge }) => parameterFor(knowledge, /^(?:beta|rate)$/, /\brate\b/i)?.name ?? "1",
  /** A free name for a parameter, and for the key of a formula cell. */
  new: (ground) => ground.take("a"),
  key: (ground) => ground.inner("first"),
  /** A number among the results, and a round one near it and above it. */
  number: (ground) => {
    const number = numberWanted(ground.asked, ground.knowledge);
    return number === null ? `${ground.at("process")}.critical_drift` : `${number.cell}.${number.member}`;
  },
  near: (ground) => nowOf(ground, (now) => rounded(now, 3)) ?? "1/2",
  above: (ground) => nowOf(ground, roundAbove) ?? "1",
  /** What is looked at while something varies, between which ends. */
  measured: (ground) => ground.measured().formula,
  varied: (ground) => ground.measured().varied,
  symbol: (ground) => ground.measured().symbol,
  low: (ground) => ground.measured().low,
  high: (ground) => ground.measured().high,
  /** A formula in a new name, and the range of it. */
  curve: (ground) => ground.curve().formula,
  dummy: (ground) => ground.curve().dummy,
  from: (ground) => ground.curve().from,
  to: (ground) => ground.curve().to,
  few: (ground) => ground.curve().few,
  /** What is recorded, drawn or tabulated, by a name of its own. */
  column: (ground) => ground.inner(ground.has("varied") ? ground.measured().column : ground.curve().column),
};

function parameterFor({ parameters }: CaseKnowledge, name: RegExp, note: RegExp): ParameterFace | undefined {
  return parameters.find((each) => name.test(each.name)) ?? parameters.find((each) => note.test(each.note));
}

function nowOf(ground: Ground, write: (now: number) => string): string | null {
  const formula = ground.has("measured") ? ground.at("measured") : ground.at("number");
  const value = ground.knowledge.values.get(formula);
  const now = value === undefined ? null : numberOf(value);
  return now === null ? null : write(now);
}

/** A body with its places filled; the marks of what one changes first are left. */
export function fillPlaces(body: string, ground: Ground): string {
  return body.replace(/«([^»]+)»/g, (_, place: string) => ground.at(place));
}

export function withoutMarks(body: string): string {
  return body.replace(/[‹›]/g, "");
}

export function fence({ name: kind }: Pick<KindWords, "name">, name: string, body: string): string {
  return `\`\`\`${name === "" ? kind : `${kind} ${name}`}\n${body}\n\`\`\``;
}

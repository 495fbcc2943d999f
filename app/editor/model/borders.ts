import type { Run } from "./types.ts";

/** A place on a parameter's scale beyond which cells answer otherwise, as the rule tells it. */
export interface BorderFace {
  /** The last double of the side that reaches the border. */
  readonly at: number;
  /** The side that does not. */
  readonly open: Side;
  /** "1.414" */
  readonly shown: string;
  /** "the drift is critical in larvae"; "" where only an input goes out of its range. */
  readonly why: string;
  readonly below: BorderSide;
  readonly above: BorderSide;
}

export interface BorderSide {
  /** "K is infinite with positive probability"; "" where nothing is to be said but which cells have no answer. */
  readonly holds: string;
  /** "Table 1": cells without an answer there. */
  readonly without: readonly string[];
}

/** Of each parameter that has any, in increasing order. */
export type Borders = Readonly<Record<string, readonly BorderFace[]>>;

export type Side = "below" | "above";

/** On which side of a border a value lies. */
export function sideOf(border: BorderFace, value: number): Side {
  if (border.open === "below") return value < border.at ? "below" : "above";
  return value > border.at ? "above" : "below";
}

/** Of the borders between two values the one nearest to the second: where one has got to; null where there is none. */
export function crossedBorder(
  borders: readonly BorderFace[],
  from: number | null,
  to: number | null,
): BorderFace | null {
  if (from === null || to === null) return null;
  const crossed = borders.filter((border) => sideOf(border, from) !== sideOf(border, to));
  return crossed.sort((a, b) => Math.abs(a.at - to) - Math.abs(b.at - to))[0] ?? null;
}

/**
 * What holds on one side of a border: "Below μ = 1.414, where the drift is critical in larvae, K is infinite with positive
 * probability. Table 1 has no answer there."
 */
export function borderRuns(symbol: string, border: BorderFace, side: Side): Run[] {
  const { holds, without } = border[side];
  const reaches = border.open !== side;
  const lead = side === "below" ? (reaches ? "Up to " : "Below ") : reaches ? "From " : "Above ";
  const where: Run[] = [text(lead), { run: "math", tex: symbol }, text(` = ${border.shown}`)];
  const onwards = side === "above" && reaches ? " on" : "";
  const why = border.why === "" ? onwards : `${onwards}, where ${border.why},`;
  const lacking = without.length === 0 ? "" : `${titles(without)} ${without.length === 1 ? "has" : "have"} no answer`;
  if (holds === "") return [...where, text(`${why} ${lacking === "" ? "all cells have an answer" : lacking}.`)];
  return [...where, text(`${why} ${holds}.${lacking === "" ? "" : ` ${lacking} there.`}`)];
}

/** The same as plain words, a parameter by its name. */
export function borderWords(name: string, border: BorderFace, side: Side): string {
  return borderRuns(name, border, side)
    .map((run) => (run.run === "text" ? run.text : name))
    .join("");
}

/** What lies beyond each border, seen from a value: what a scale's marks mean. */
export function scaleRuns(symbol: string, borders: readonly BorderFace[], value: number | null): Run[] {
  return borders.flatMap((border, index): Run[] => {
    const side = value === null || sideOf(border, value) === "above" ? "below" : "above";
    return [...(index === 0 ? [] : [text(" ")]), ...borderRuns(symbol, border, side)];
  });
}

/** The same as plain words. */
export function scaleWords(name: string, borders: readonly BorderFace[], value: number | null): string {
  return scaleRuns(name, borders, value)
    .map((run) => (run.run === "text" ? run.text : name))
    .join("");
}

const MOST_TITLES = 3;

function titles(all: readonly string[]): string {
  const more = all.length - MOST_TITLES;
  if (more > 0) return `${all.slice(0, MOST_TITLES).join(", ")} and ${more} more`;
  return all.length < 2 ? (all[0] ?? "") : `${all.slice(0, -1).join(", ")} and ${all.at(-1)}`;
}

function text(value: string): Run {
  return { run: "text", text: value };
}

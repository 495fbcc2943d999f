import { cellAround, inMath } from "./place.ts";

/** Where something comes to stand that is set in line at a place of a text. */
export type Spot =
  /** Within a sentence, a formula, or the formula of a working. */
  | { readonly spot: "prose" | "math" | "working"; readonly at: number }
  /** Nothing can stand in line there: on a cell's own marks. */
  | { readonly spot: "below" };

/** Keys of a working whose values are prose. */
const PROSE_KEY = /^\s*(?:caption|because|note|head):/;

/**
 * Where a number comes to stand that is quoted at a place: there, or after the number or pointer that the place is
 * within, so that nothing is torn apart.
 */
export function spotOfNumber(text: string, offset: number): Spot {
  const lineFrom = text.lastIndexOf("\n", offset - 1) + 1;
  const line = lineAt(text, lineFrom);
  if (/^ {0,3}(?:`{3,}|~{3,})/.test(line)) return { spot: "below" };
  const cell = cellAround(text, offset);
  const isProse = cell === null || PROSE_KEY.test(line);
  const blockFrom = cell === null ? Math.max(0, text.lastIndexOf("\n\n", offset - 1)) : lineFrom;
  const at = afterMark(line, lineFrom, offset);
  if (!isProse) return { spot: "working", at };
  return { spot: inMath(text.slice(blockFrom, at)) ? "math" : "prose", at };
}

/** The same of a reference or a citation, which stand in sentences alone. */
export function spotOfPointer(text: string, offset: number): Spot {
  const spot = spotOfNumber(text, offset);
  if (spot.spot === "working") return { spot: "below" };
  if (spot.spot !== "math") return spot;
  const blockFrom = Math.max(0, text.lastIndexOf("\n\n", offset - 1));
  const blockEnd = text.indexOf("\n\n", offset);
  for (let at = spot.at + 1; at <= (blockEnd < 0 ? text.length : blockEnd); at += 1) {
    if (text[at - 1] === "$" && !inMath(text.slice(blockFrom, at))) {
      const isDisplay = text.slice(at - 2, at) === "$$";
      return isDisplay ? { spot: "below" } : { spot: "prose", at };
    }
  }
  return { spot: "below" };
}

const MARK = /:(?:value|ref|cite)\[[^\]\n]*\](?:\{[^}\n]*\})?|\\value(?:\[[^\]\n]*\])?\{[^}\n]*\}/g;

function afterMark(line: string, lineFrom: number, offset: number): number {
  for (const { index, 0: mark } of line.matchAll(MARK)) {
    const [from, to] = [lineFrom + index, lineFrom + index + mark.length];
    if (from < offset && offset < to) return to;
  }
  return offset;
}

function lineAt(text: string, from: number): string {
  const end = text.indexOf("\n", from);
  return text.slice(from, end < 0 ? text.length : end);
}

import type { Paper } from "../../paper/index.ts";
import { planPaper } from "../plan.ts";
import { namesOfPaper, usesOf } from "../renaming/uses.ts";
import type { TextEdit } from "../text-edits.ts";
import type { ParameterEdit } from "./change.ts";
import { type ParameterPlace, placeOf } from "./entry.ts";
import { errorGained, type ParameterProblem, paperAfter } from "./judge.ts";
import { aroundOf, lineStart, linesOf, nextLine, removedEntry, startsLine } from "./map-edits.ts";

/** What still reads a parameter that was to be removed. */
export interface StillRead {
  /** Places of the text where its name is read, in rising order. */
  readonly readers: readonly { readonly at: number; readonly line: number }[];
}

/**
 * The edits that take a parameter out of a paper; its cell goes with the last of its parameters. While anything reads
 * it, nothing is to be changed.
 * @param bibliography the paper's BibTeX, to read the paper again
 */
export function removesParameter(
  paper: Paper,
  bibliography: string,
  name: string,
): ParameterEdit | StillRead | ParameterProblem {
  const place = placeOf(paper, name);
  if (place === null) return { problem: `${name} is not a parameter of this paper any more.`, field: null };
  const uses = usesOf(namesOfPaper(paper), name).filter((at) => at !== place.entry.keyFrom && !isQuotedKey(place, at));
  if (uses.length > 0) return { readers: uses.map((at) => ({ at, line: lineOf(paper.text, at) })) };
  const edits = takenOut(paper.text, place);
  const after = paperAfter(paper, bibliography, edits);
  const gained = errorGained({ paper, plan: planPaper(paper) }, after);
  if (gained !== null) return { problem: `Without it, line ${gained.line}: ${gained.message}`, field: null };
  return { edits, after: null };
}

/** The edits by which an entry leaves its cell, and the cell the text with its last entry. */
export function takenOut(text: string, { cell, body, entry }: ParameterPlace): readonly TextEdit[] {
  if (body.entries.length === 1) return [{ ...cellLines(text, cell.span), insert: "" }];
  if (aroundOf(text, body) === "flow" || !startsLine(text, entry)) return removedEntry(text, body, entry);
  return [{ ...linesOf(text, entry), insert: "" }];
}

/** A cell's lines with one blank line after it, or before it at the end. */
function cellLines(text: string, span: { from: number; to: number }): { from: number; to: number } {
  const from = lineStart(text, span.from);
  const to = nextLine(text, Math.max(span.from, span.to - 1));
  const blank = /^[ \t]*\n/.exec(text.slice(to));
  const before = /\n[ \t]*\n$/.test(text.slice(0, from)) || from === 0;
  return { from, to: before && blank !== null ? to + blank[0].length : to };
}

/** A use is told at the name itself, past a quotation mark. */
function isQuotedKey({ entry }: ParameterPlace, at: number): boolean {
  return at >= entry.keyFrom && at < entry.keyTo;
}

function lineOf(text: string, at: number): number {
  return text.slice(0, at).split("\n").length;
}

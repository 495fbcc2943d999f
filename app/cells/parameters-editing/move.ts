import type { Paper } from "../../paper/index.ts";
import { planPaper } from "../plan.ts";
import type { TextEdit } from "../text-edits.ts";
import type { ParameterEdit } from "./change.ts";
import { type ParameterPlace, parameterPlaces } from "./entry.ts";
import { errorGained, type ParameterProblem, paperAfter } from "./judge.ts";
import { aroundOf, indentOf, lineStart, linesOf, startsLine } from "./map-edits.ts";
import { takenOut } from "./remove.ts";
import { endOf } from "./scalar.ts";

/**
 * The edits that let a parameter stand one place earlier or later on the rule. Within a cell two entries change places,
 * each with the comments directly above it; past the end of its cell it goes over into the neighbour's.
 * @param bibliography the paper's BibTeX, to read the paper again
 */
export function movesParameter(
  paper: Paper,
  bibliography: string,
  name: string,
  by: -1 | 1,
): ParameterEdit | ParameterProblem {
  const places = parameterPlaces(paper);
  const at = places.findIndex(({ entry }) => entry.key === name);
  const [own, other] = [places[at], places[at + by]];
  if (own === undefined) return { problem: `${name} is not a parameter of this paper any more.`, field: null };
  if (other === undefined)
    return { problem: by < 0 ? `${name} is the first parameter.` : `${name} is the last parameter.`, field: null };
  const edits = movedEdits(paper.text, own, other, by);
  if (edits === null)
    return { problem: "These parameters are written in one line; move them in the text.", field: null };
  const after = paperAfter(paper, bibliography, edits);
  const gained = errorGained({ paper, plan: planPaper(paper) }, after);
  if (gained !== null) return { problem: `There, line ${gained.line}: ${gained.message}`, field: null };
  return { edits, after: after.plan.parameters.find((each) => each.name === name) ?? null };
}

function movedEdits(text: string, own: ParameterPlace, other: ParameterPlace, by: -1 | 1): readonly TextEdit[] | null {
  const ownLines = aroundOf(text, own.body) === "block" && startsLine(text, own.entry);
  const otherLines = aroundOf(text, other.body) === "block" && startsLine(text, other.entry);
  if (own.cell === other.cell) {
    const [first, second] = by < 0 ? [other, own] : [own, other];
    return ownLines && otherLines ? exchangedLines(text, first, second, by) : exchangedInLine(text, first, second);
  }
  if (!ownLines || !otherLines) return null;
  const block = indented(text, own, other);
  const lines = linesOf(text, other.entry);
  const to = by < 0 ? lines.from : lines.to;
  const edits = [...takenOut(text, own), { from: to, to, insert: block }];
  return edits.sort((a, b) => a.from - b.from);
}

/** The entry that moves is taken out and written again, with what lies between; the other stays untouched. */
function exchangedLines(text: string, first: ParameterPlace, second: ParameterPlace, by: -1 | 1): TextEdit[] {
  const [a, b] = [linesOf(text, first.entry), linesOf(text, second.entry)];
  const between = text.slice(a.to, b.from);
  const [firstLines, secondLines] = [ended(text.slice(a.from, a.to)), ended(text.slice(b.from, b.to))];
  if (by < 0)
    return [
      { from: a.from, to: a.from, insert: secondLines + between },
      { from: a.to, to: b.to, insert: "" },
    ];
  return [
    { from: a.from, to: b.from, insert: "" },
    { from: b.to, to: b.to, insert: between + firstLines },
  ];
}

function exchangedInLine(text: string, first: ParameterPlace, second: ParameterPlace): TextEdit[] {
  const [a, b] = [first, second].map(({ entry }) => ({ from: entry.keyFrom, to: endOf(text, entry.value) }));
  if (a === undefined || b === undefined) return [];
  return [
    { ...a, insert: text.slice(b.from, b.to) },
    { ...b, insert: text.slice(a.from, a.to) },
  ];
}

/** The lines of an entry as they would stand in another cell. */
function indented(text: string, own: ParameterPlace, other: ParameterPlace): string {
  const { from, to } = linesOf(text, own.entry);
  const [before, after] = [indentOf(text, own.entry), indentOf(text, other.entry)];
  const lines = ended(text.slice(lineStart(text, from), to));
  if (before === after) return lines;
  return lines.replace(/^.*\n/gm, (line) => (line.startsWith(before) ? after + line.slice(before.length) : line));
}

function ended(lines: string): string {
  return lines.endsWith("\n") ? lines : `${lines}\n`;
}

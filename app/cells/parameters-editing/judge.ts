import type { Paper, Problem } from "../../paper/index.ts";
import { readPaper } from "../../paper/index.ts";
import { planPaper } from "../plan.ts";
import { edited, type TextEdit } from "../text-edits.ts";
import type { Plan } from "../types.ts";
import { fieldAt, type ParameterField, placeOf } from "./entry.ts";

/** Why an edit is not to be made, said where it was asked for. */
export interface ParameterProblem {
  readonly problem: string;
  /** What it is about; null: the whole. */
  readonly field: ParameterField | "name" | null;
}

/** A paper as an edit would make it. */
export interface PaperAfter {
  readonly paper: Paper;
  readonly plan: Plan;
}

export function paperAfter(paper: Paper, bibliography: string, edits: readonly TextEdit[]): PaperAfter {
  const after = readPaper(edited(paper.text, edits), bibliography);
  return { paper: after, plan: planPaper(after) };
}

/** What is wrong with a parameter itself: its working cannot be read, its formulas name nothing, it has no value. */
export function faultOf({ paper, plan }: PaperAfter, name: string): ParameterProblem | null {
  const place = placeOf(paper, name);
  const planned = plan.parameters.find((each) => each.name === name);
  if (place === null || planned === undefined) {
    const first = errorsOf({ paper, plan })[0]?.message ?? "";
    return { problem: `This cannot be written there. ${first}`.trim(), field: null };
  }
  const { entry } = place;
  const to = Math.max(entry.value.to, entry.keyTo);
  const inEntry = errorsOf({ paper, plan }).find((problem) => problem.from >= entry.keyFrom && problem.from <= to);
  if (inEntry !== undefined) return { problem: inEntry.message, field: fieldAt(paper.text, entry, inEntry.from) };
  if (planned.value.type === "refused") {
    const reason = planned.value.reason.replace(/^The parameter `\w+` has no value \(line \d+\): /, "");
    return { problem: `It has no value: ${reason}`, field: "value" };
  }
  return null;
}

/** An error that a paper has after an edit and had not before, lines apart; null: there is none. */
export function errorGained(before: PaperAfter, after: PaperAfter): Problem | null {
  const counts = new Map<string, number>();
  for (const problem of errorsOf(before)) counts.set(sign(problem), (counts.get(sign(problem)) ?? 0) + 1);
  for (const problem of errorsOf(after)) {
    const left = counts.get(sign(problem)) ?? 0;
    if (left === 0) return problem;
    counts.set(sign(problem), left - 1);
  }
  return null;
}

/** The same problem stands in another line after an edit, and lists and guesses other names. */
function sign({ message }: Problem): string {
  return message.replace(/ Did you mean .*$/, "").replace(/\bline \d+/g, "line");
}

function errorsOf({ paper, plan }: PaperAfter): readonly Problem[] {
  return [...paper.problems, ...plan.problems].filter(
    ({ severity, where }) => severity === "error" && where !== "bibliography",
  );
}

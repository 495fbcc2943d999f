import type { Plan } from "../../cells/index.ts";
import type { Paper, Problem } from "../../paper/index.ts";
import type { BibliographyFace, ProblemFace } from "../model/types.ts";
import { itemRuns } from "./runs.ts";

/** Everything wrong in the text, each once, in its order. */
export function problemFaces(paper: Paper, plan: Plan): ProblemFace[] {
  const slots = new Map(paper.cells.map(({ id, slot }) => [id, slot]));
  const seen = new Set<string>();
  return [...paper.problems, ...plan.problems]
    .filter((problem) => {
      const sign = `${problem.from} ${problem.message}`;
      if (seen.has(sign)) return false;
      seen.add(sign);
      return true;
    })
    .sort((a, b) => a.from - b.from)
    .map((problem) => faceOf(problem, slots));
}

function faceOf(problem: Problem, slots: ReadonlyMap<string, string>): ProblemFace {
  const { from, to, line, severity, message, cell, fix } = problem;
  return {
    from,
    to,
    line,
    severity,
    message,
    slot: cell === undefined ? null : (slots.get(cell) ?? null),
    fix: fix ?? null,
  };
}

/** The printed bibliography: what is cited, in the order of its numbers. */
export function bibliographyFaces(paper: Paper): BibliographyFace[] {
  return paper.bibliography
    .flatMap((entry) =>
      entry.number === null ? [] : [{ key: entry.key, number: entry.number, runs: itemRuns(entry) }],
    )
    .sort((a, b) => a.number - b.number);
}

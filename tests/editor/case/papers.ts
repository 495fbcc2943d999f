import { readFileSync } from "node:fs";
import { join } from "node:path";
import { computePlan, planPaper } from "../../../app/cells/index.ts";
import { namesWritten } from "../../../app/editor/case/names.ts";
import { formulasOf } from "../../../app/editor/case/paper-offers.ts";
import type { CaseKnowledge } from "../../../app/editor/case/types.ts";
import { SheetReader } from "../../../app/editor/reading/sheet-reader.ts";
import { readPaper } from "../../../app/paper/index.ts";
import { emptyPaper } from "../../../app/routes/parts/new-paper.ts";

const folder = join(import.meta.dirname, "../../../db/specimen");
export const SPECIMEN = readFileSync(join(folder, "paper.md"), "utf8");
export const BIBLIOGRAPHY = readFileSync(join(folder, "bibliography.bib"), "utf8");
export const EMPTY = emptyPaper("Inês Valadão");

/** What the case knows of a paper of which all is computed that takes no long time. */
export function knowledgeOf(text: string): CaseKnowledge {
  const reader = new SheetReader();
  reader.hear({ tell: "text", version: 1, text, bibliography: BIBLIOGRAPHY });
  const plan = planPaper(readPaper(text, BIBLIOGRAPHY));
  const quick = plan.cells.filter(({ quick: soon }) => soon).map(({ id }) => id);
  const outcomes = [...computePlan(plan, { only: quick })];
  const results = outcomes.flatMap(([, outcome]) => (outcome.status === "computed" ? [outcome.result] : []));
  const cells = Object.fromEntries(
    outcomes.flatMap(([id, outcome]) => {
      const planned = plan.byId.get(id);
      if (outcome.status !== "computed" || planned === undefined) return [];
      const { key, seconds, solver } = outcome.result;
      const { parameterValues, workingKey } = planned;
      const at = "2026-05-01T12:00:00Z";
      return [[planned.slot, { key, at, by: "Inês", seconds, solver, parameterValues, workingKey: workingKey ?? "" }]];
    }),
  );
  reader.hear({ tell: "shown", cells, work: {}, changes: {} });
  reader.hear({ tell: "results", results });
  const model = reader.sheet();
  const values = new Map(reader.values(formulasOf(model)).map((value) => [value.formula, value]));
  return { ...model, values, taken: namesWritten(text) };
}

/** The problems of a paper, those of its plan included. */
export function problemsOf(text: string): string[] {
  const paper = readPaper(text, BIBLIOGRAPHY);
  const plan = planPaper(paper);
  return [...paper.problems, ...plan.problems]
    .filter(({ severity }) => severity === "error")
    .map(({ message, line }) => `${line}: ${message}`);
}

import type { PrintedNumber, QuantityJson, Value } from "../formulas/index.ts";
import { quantityToJson } from "../formulas/index.ts";
import type { Cell, Paper } from "../paper/index.ts";
import { computePlan } from "./compute.ts";
import { evaluateNumber } from "./numbers.ts";
import { planPaper } from "./plan.ts";
import type { CellResult, Outcome, Plan } from "./types.ts";
import { findingOf } from "./view.ts";

/** Everything that a paper gives when it is computed without a browser; the JSON of the command line. */
export interface Report {
  readonly cells: Readonly<Record<string, ReportedCell>>;
  readonly numbers: readonly ReportedNumber[];
  readonly problems: readonly ReportedProblem[];
}

export type ReportedCell = { readonly kind: string; readonly line: number } & (
  | {
      readonly status: "computed";
      readonly key: string;
      /** The solver's own time. */
      readonly seconds: number;
      readonly values: Readonly<Record<string, ReportedValue>>;
    }
  | { readonly status: "failed"; readonly message: string }
  | { readonly status: "waiting"; readonly needs: readonly string[] }
);

export type ReportedValue =
  | QuantityJson
  | { readonly text: string }
  | { readonly truth: boolean | null }
  | { readonly none: true }
  | { readonly refused: string };

export type ReportedNumber = { readonly line: number; readonly formula: string } & ReportedValue & {
    /** As it is printed in the paper. */
    readonly text?: string;
  };

export interface ReportedProblem {
  readonly line: number;
  readonly message: string;
}

/**
 * Plans and computes a paper in this thread and reports its cells in the order of the text, its bound numbers and its
 * problems by line. A cell that fails, or a number that has no value, is a problem too.
 */
export function reportPaper(paper: Paper, overrides: Readonly<Record<string, string>> = {}): Report {
  const plan = planPaper(paper, { overrides });
  const outcomes = computePlan(plan);
  const results = new Map<string, CellResult>();
  for (const [id, outcome] of outcomes) if (outcome.status === "computed") results.set(id, outcome.result);
  const problems: ReportedProblem[] = [...paper.problems, ...plan.problems].map(({ line, message }) => ({
    line,
    message,
  }));
  const cells = reportCells(paper, plan, outcomes, problems);
  const numbers = paper.numbers.map((number): ReportedNumber => {
    const { value, printed, problem } = evaluateNumber(number, plan, results);
    const place = { line: number.span.line, formula: number.formula };
    const reason = problem ?? unprintable(printed);
    if (reason !== null)
      problems.push({ line: place.line, message: `\`${number.formula}\` has no value to print: ${reason}` });
    return { ...place, ...reportedValue(value), ...(printed === null ? {} : { text: printed.text }) };
  });
  return { cells, numbers, problems: inOrder(problems) };
}

/** A number that is known to no digit prints words, which are not what its author meant to print. */
function unprintable(printed: PrintedNumber | null): string | null {
  return printed !== null && printed.supported === 0 && printed.sheet.known === "" ? "no digit of it is known." : null;
}

function reportCells(
  paper: Paper,
  plan: Plan,
  outcomes: ReadonlyMap<string, Outcome>,
  problems: ReportedProblem[],
): Record<string, ReportedCell> {
  const cells: Record<string, ReportedCell> = {};
  for (const cell of paper.cells) {
    const planned = plan.byId.get(cell.id);
    const isPlanned = planned !== undefined && planned.cell.span.from === cell.span.from;
    const outcome = isPlanned ? outcomes.get(cell.id) : undefined;
    const reported = reportCell(cell, outcome, problems);
    // A second cell of the same name is listed by its place.
    cells[Object.hasOwn(cells, cell.id) ? `${cell.kind}@${cell.span.line}` : cell.id] = reported;
    if (reported.status === "failed") problems.push({ line: failureLine(cell, outcome), message: reported.message });
    if (planned === undefined || outcome?.status !== "computed") continue;
    const finding = findingOf(planned, outcome.result, plan);
    if (finding?.isGrave === true) problems.push({ line: cell.span.line, message: `\`${cell.id}\`: ${finding.words}` });
  }
  return cells;
}

function reportCell(cell: Cell, outcome: Outcome | undefined, problems: readonly ReportedProblem[]): ReportedCell {
  const place = { kind: cell.kind, line: cell.span.line };
  if (outcome?.status === "waiting") return { ...place, status: "waiting", needs: outcome.needs };
  if (outcome?.status === "failed") return { ...place, status: "failed", message: outcome.failure.message };
  if (outcome === undefined) {
    const own = problems.find(({ line }) => line >= cell.span.line && line <= cell.span.lastLine);
    return { ...place, status: "failed", message: own?.message ?? "This cell could not be read." };
  }
  const { key, seconds, values } = outcome.result;
  const reported = Object.entries(values).map(([name, value]) => [name, reportedValue(value)] as const);
  return { ...place, status: "computed", key, seconds, values: Object.fromEntries(reported) };
}

function failureLine(cell: Cell, outcome: Outcome | undefined): number {
  return outcome?.status === "failed" ? outcome.failure.line : cell.span.line;
}

/** A value as JSON tells it. */
export function reportedValue(value: Value): ReportedValue {
  switch (value.type) {
    case "number":
      return quantityToJson(value.quantity);
    case "text":
      return { text: value.text };
    case "truth":
      return { truth: value.holds };
    case "none":
      return { none: true };
    case "refused":
      return { refused: value.reason };
  }
}

/** By line, each told once. */
function inOrder(problems: readonly ReportedProblem[]): ReportedProblem[] {
  const unique = new Map<string, ReportedProblem>();
  for (const problem of problems) {
    const isTold = [...unique.values()].some(({ message }) => message === problem.message);
    if (!isTold) unique.set(`${problem.line} ${problem.message}`, problem);
  }
  return [...unique.values()].sort((a, b) => a.line - b.line);
}

import type { BoundNumber, Paper, Problem } from "../paper/index.ts";
import { parsedFormula } from "./body.ts";
import { planningContext } from "./compute.ts";
import { CellFault, NotKnownYet } from "./context.ts";
import type { Declarations } from "./declared.ts";
import { declareNames, faultAt } from "./declared.ts";
import type { Dependencies } from "./dependencies.ts";
import { findDependencies } from "./dependencies.ts";
import type { Draft } from "./drafts.ts";
import { readDrafts } from "./drafts.ts";
import { Keys } from "./keys.ts";
import { fixOfFault, lookUp, placeOfFault } from "./lookup.ts";
import type { ParameterValues } from "./parameter-values.ts";
import { evaluateParameters, parameterWords } from "./parameter-values.ts";
import { Tasks } from "./tasks.ts";
import type { CellTask, Plan, PlannedCell } from "./types.ts";

/**
 * Plans a paper: which cells there are, in what order, each with its key; nothing is computed but parameters.
 * `overrides` set parameters otherwise than the text does: name to formula. Pure, and quick enough for each keystroke.
 */
export function planPaper(paper: Paper, options: { readonly overrides?: Readonly<Record<string, string>> } = {}): Plan {
  const drafts = readDrafts(paper);
  const names = declareNames(drafts);
  const parameters = evaluateParameters(names, options.overrides ?? {});
  const { order, dependencies } = findDependencies(names, parameters);
  const keys = new Keys(names.drafts, dependencies, parameters);
  const tasks = new Tasks(names.drafts, dependencies, order, parameters, keys);
  const quick = new Map<string, boolean>();
  const cells = order.flatMap((id) => {
    const draft = names.drafts.get(id);
    const reads = dependencies.get(id);
    if (draft === undefined || reads === undefined) return [];
    const planned = plannedCell(draft, reads, keys, tasks, parameters);
    // What varies a parameter is no quicker than the cells it computes again.
    const isQuick =
      planned.quick && (planned.task?.recomputed?.cells ?? []).every((again) => quick.get(again.id) === true);
    quick.set(id, isQuick);
    return [{ ...planned, quick: isQuick }];
  });
  const problems = [
    ...parameters.problems,
    ...drafts.flatMap((draft) => [...draft.faults, ...(draft.looks?.problems ?? []), ...looksFaults(draft, names)]),
    ...paper.numbers.flatMap((number) => numberProblems(number, names)),
  ];
  return {
    parameters: parameters.planned,
    cells,
    byId: new Map(cells.map((cell) => [cell.id, cell])),
    problems: withoutRepeats(problems, paper.problems),
    macros: paper.front.macros,
  };
}

function plannedCell(
  draft: Draft,
  reads: Dependencies,
  keys: Keys,
  tasks: Tasks,
  parameters: ParameterValues,
): PlannedCell {
  const { cell } = draft;
  const { quick, cost } = inspect(draft, tasks);
  const key = keys.key(cell.id);
  const first = [...draft.faults].sort((a, b) => a.from - b.from)[0];
  const used = parameters.planned.filter(({ name }) => reads.parameters.has(name));
  return {
    cell,
    id: cell.id,
    slot: cell.slot,
    kind: cell.kind,
    line: cell.span.line,
    key,
    failure: first === undefined ? null : { line: first.line, message: first.message },
    needs: [...reads.cells],
    parameters: used.map(({ name }) => name),
    parameterValues: Object.fromEntries(used.map((parameter) => [parameter.name, parameterWords(parameter)])),
    workingKey: key === null ? null : keys.workingKey(cell.id),
    task: key === null ? null : tasks.task(cell.id),
    show: draft.show,
    quick,
    cost,
  };
}

/** Inputs that need no other cell's value are judged now, so that a wrong one is shown before anything is computed. */
function inspect(draft: Draft, tasks: Tasks): Pick<PlannedCell, "quick" | "cost"> {
  const nothing = { quick: true, cost: null };
  if (draft.kind === null || draft.faults.length > 0) return nothing;
  const task: CellTask | null = tasks.task(draft.cell.id);
  if (task === null) return nothing;
  try {
    const context = planningContext(task);
    return { quick: draft.kind.inspect(draft.model, context), cost: draft.kind.cost?.(draft.model, context) ?? null };
  } catch (error) {
    if (error instanceof NotKnownYet) return nothing;
    if (!(error instanceof CellFault)) throw error;
    draft.faults.push(faultAt(draft, draft.body?.placeOf(error.path) ?? draft.cell.span, error.message));
    return nothing;
  }
}

/** Axes may be given by parameters. */
function looksFaults(draft: Draft, names: Declarations): Problem[] {
  const axes = draft.looks?.formulas.filter(({ path }) => path.startsWith("axes.")) ?? [];
  return axes.flatMap((use) => {
    const { faults, reads } = lookUp(use.formula, [], names);
    const misspelt = faults.map((fault) => faultAt(draft, placeOfFault(fault, use, use.base), fault.message));
    const results = [...reads.cells].map((id) =>
      faultAt(draft, use, `An axis may be given by numbers and parameters, not by \`${id}\`.`),
    );
    return [...misspelt, ...results];
  });
}

function numberProblems(number: BoundNumber, names: Declarations): Problem[] {
  const place = { from: number.formulaFrom, to: number.formulaFrom + number.formula.length, line: number.span.line };
  const problem = (at: { from: number; to: number; line: number }, message: string, fix?: Problem["fix"]): Problem => ({
    fix,
    ...at,
    severity: "error",
    message,
  });
  const parsed = parsedFormula(number.formula);
  if (!parsed.ok) {
    const from = place.from + parsed.problem.from;
    return [problem({ from, to: place.from + parsed.problem.to, line: place.line }, parsed.problem.message)];
  }
  const { faults } = lookUp(parsed.formula, [], names);
  return faults.map((fault) =>
    problem(placeOfFault(fault, place, place.from), fault.message, fixOfFault(fault, place, place.from)),
  );
}

/** Each problem once, in the order of the text, those apart that the paper's own reading has found. */
function withoutRepeats(problems: readonly Problem[], found: readonly Problem[]): Problem[] {
  const seen = new Set(found.map((problem) => `${problem.from} ${problem.message}`));
  const kept = problems.filter((problem) => {
    const mark = `${problem.from} ${problem.message}`;
    return !seen.has(mark) && seen.add(mark);
  });
  return kept.sort((a, b) => a.from - b.from);
}

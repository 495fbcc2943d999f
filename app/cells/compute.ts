import type { Quantity, Scope, Value } from "../formulas/index.ts";
import { SolverError } from "../solvers/index.ts";
import type { ReadCell } from "./context.ts";
import { CellFault, ComputeContext, evaluated, NotKnownYet } from "./context.ts";
import type { Branch, Computed, Kind } from "./kind.ts";
import { KINDS } from "./registry.ts";
import { scopeOver } from "./scope.ts";
import type { CellResult, CellTask, Outcome, Plan } from "./types.ts";
import { numberValue } from "./values.ts";

export interface ComputeHooks {
  /** Called now and then with how far the computation is, in units of the kind's own. */
  progress?(done: number, total: number): void;
}

/**
 * Computes one cell. Synchronous; runs in a worker as well as in a page; the result depends on task and results alone,
 * but for its `seconds`. A cell that cannot compute is an outcome, not an exception; faults of the program itself throw.
 */
export function computeCell(
  task: CellTask,
  results: ReadonlyMap<string, CellResult>,
  hooks: ComputeHooks = {},
): Outcome {
  const unmet = Object.entries(task.needs).filter(([id, key]) => results.get(id)?.key !== key);
  if (unmet.length > 0) return { status: "waiting", needs: unmet.map(([id]) => id) };
  return computeWith(task, results, hooks.progress?.bind(hooks) ?? (() => undefined));
}

/** Computes a plan in this thread, in order: each cell whose result is not known by its key, or only some and what they read. */
export function computePlan(
  plan: Plan,
  options: {
    known?(key: string): CellResult | undefined;
    readonly only?: readonly string[];
    onOutcome?(cell: Plan["cells"][number], outcome: Outcome): void;
  } = {},
): Map<string, Outcome> {
  const outcomes = new Map<string, Outcome>();
  const results = new Map<string, CellResult>();
  const wanted = options.only === undefined ? null : withNeeds(plan, options.only);
  for (const planned of plan.cells) {
    if (wanted !== null && !wanted.has(planned.id)) continue;
    const known = planned.key === null ? undefined : options.known?.(planned.key);
    const outcome =
      known === undefined ? plannedOutcome(planned, results) : { status: "computed" as const, result: known };
    outcomes.set(planned.id, outcome);
    if (outcome.status === "computed") results.set(planned.id, outcome.result);
    options.onOutcome?.(planned, outcome);
  }
  return outcomes;
}

/** Ids of the cells that take a moment only, those they read included: what a page may compute for itself. */
export function quickCells(plan: Plan): ReadonlySet<string> {
  const quick = new Set<string>();
  // In dependency order, so that what a cell reads has been judged before it.
  for (const cell of plan.cells) {
    if (cell.key !== null && cell.quick && cell.needs.every((id) => quick.has(id))) quick.add(cell.id);
  }
  return quick;
}

function plannedOutcome(planned: Plan["cells"][number], results: ReadonlyMap<string, CellResult>): Outcome {
  if (planned.failure !== null) return { status: "failed", failure: { key: planned.key ?? "", ...planned.failure } };
  if (planned.task === null) return { status: "waiting", needs: planned.needs.filter((id) => !results.has(id)) };
  const outcome = computeCell(planned.task, results);
  // Told by the cells it reads directly; those behind them wait for their own.
  if (outcome.status !== "waiting") return outcome;
  const direct = planned.needs.filter((id) => !results.has(id));
  return direct.length > 0 ? { status: "waiting", needs: direct } : outcome;
}

function withNeeds(plan: Plan, ids: readonly string[]): ReadonlySet<string> {
  const wanted = new Set<string>();
  const want = (id: string): void => {
    const planned = plan.byId.get(id);
    if (planned === undefined || wanted.has(id)) return;
    wanted.add(id);
    for (const need of [...planned.needs, ...Object.keys(planned.task?.needs ?? {})]) want(need);
  };
  for (const id of ids) want(id);
  return wanted;
}

function computeWith(
  task: CellTask,
  results: ReadonlyMap<string, ReadCell>,
  progress: (done: number, total: number) => void,
): Outcome {
  return attempt(task, (kind) => {
    const context = contextOf(task, task.parameters, results, progress);
    const begun = performance.now();
    const computed = kind.compute(task.model, context);
    return resultOf(task, kind, computed, (performance.now() - begun) / 1000);
  });
}

/** What a kind computed, as a cell's outcome. */
export function resultOf(task: CellTask, kind: Kind, computed: Computed<unknown>, seconds: number): Outcome {
  const { values, data, method } = computed;
  return {
    status: "computed",
    result: { key: task.key, kind: task.kind, values, data, method, solver: kind.solver, seconds },
  };
}

/** Work on a task that may find that the cell cannot be computed; faults of the program itself throw. */
export function attempt<Answer>(task: CellTask, work: (kind: Kind) => Answer): Answer | FailedOutcome {
  const kind = KINDS.get(task.kind);
  const fail = (line: number | undefined, message: string): FailedOutcome => ({
    status: "failed",
    failure: { key: task.key, line: line ?? task.lines[""] ?? 1, message },
  });
  if (kind === undefined) return fail(undefined, `\`${task.kind}\` is not a kind of cell.`);
  try {
    return work(kind);
  } catch (error) {
    if (error instanceof CellFault) return fail(lineOf(task, error.path), error.message);
    if (error instanceof SolverError) return fail(undefined, error.message);
    throw error;
  }
}

type FailedOutcome = Extract<Outcome, { readonly status: "failed" }>;

/** The line of an entry, or of the nearest one around it. */
function lineOf(task: CellTask, path: string): number | undefined {
  const line = task.lines[path];
  return line !== undefined || path === "" ? line : lineOf(task, path.slice(0, Math.max(0, path.lastIndexOf("."))));
}

/** The context in which a task's inputs are judged at planning: parameters are known, no cell is. */
export function planningContext(task: CellTask): ComputeContext {
  const notYet = (): never => {
    throw new NotKnownYet();
  };
  const scope = scopeOf(task.parameters, new Map());
  return new ComputeContext({
    scope: { name: (name) => scope.name(name), member: notYet, call: notYet },
    results: new Map(),
    progress: () => undefined,
    varied: task.recomputed?.varied ?? [],
    recomputedCells: cellsIn(task.recomputed?.cells ?? []),
    with: notYet,
    branches: notYet,
  });
}

/** The context in which a task computes. */
export function contextOf(
  task: CellTask,
  parameters: Readonly<Record<string, Quantity>>,
  results: ReadonlyMap<string, ReadCell>,
  progress: (done: number, total: number) => void,
): ComputeContext {
  return new ComputeContext({
    scope: scopeOf(parameters, results),
    results,
    progress,
    varied: task.recomputed?.varied ?? [],
    recomputedCells: cellsIn(task.recomputed?.cells ?? []),
    with: (values) => {
      const again = recomputedParameters(task, { ...parameters, ...values });
      return contextOf(task, again, recomputedResults(task, again, results), () => undefined);
    },
    branches: (values) => branchesOf(task, recomputedParameters(task, { ...parameters, ...values }), results),
  });
}

/** Branches of the cells that are computed again; one whose inputs another of them gives, or which refuses them, has none. */
function branchesOf(
  task: CellTask,
  parameters: Readonly<Record<string, Quantity>>,
  results: ReadonlyMap<string, ReadCell>,
): ReadonlyMap<string, Branch> {
  const fixed = new Map(results);
  for (const { id } of task.recomputed?.cells ?? []) fixed.delete(id);
  const branches = new Map<string, Branch>();
  for (const inner of task.recomputed?.cells ?? []) {
    const branch = branchAt(inner, parameters, fixed);
    if (branch !== null) branches.set(inner.id, branch);
  }
  return branches;
}

/** The branch of a cell; null where its kind knows none, its inputs are not known, or they are refused. */
export function branchAt(
  task: CellTask,
  parameters: Readonly<Record<string, Quantity>>,
  results: ReadonlyMap<string, ReadCell>,
): Branch | null {
  const kind = KINDS.get(task.kind);
  if (kind?.branch === undefined) return null;
  try {
    return kind.branch(
      task.model,
      contextOf(task, parameters, results, () => undefined),
    );
  } catch (error) {
    if (error instanceof CellFault || error instanceof SolverError) return null;
    throw error;
  }
}

function scopeOf(parameters: Readonly<Record<string, Quantity>>, results: ReadonlyMap<string, ReadCell>): Scope {
  const value = (name: string): Value | undefined => {
    const found = Object.hasOwn(parameters, name) ? parameters[name] : undefined;
    return found === undefined ? undefined : numberValue(found);
  };
  return scopeOver(value, results);
}

function cellsIn(tasks: readonly CellTask[]): number {
  return tasks.reduce((count, task) => count + 1 + cellsIn(task.recomputed?.cells ?? []), 0);
}

/** Parameters with those that are computed from varied ones evaluated anew; one without a value is left out. */
function recomputedParameters(task: CellTask, values: Readonly<Record<string, Quantity>>): Record<string, Quantity> {
  const again: Record<string, Quantity> = { ...values };
  const scope = scopeOf(again, new Map());
  for (const { name, formula } of task.recomputed?.parameters ?? []) {
    const value = evaluated(formula, scope);
    if (value.type === "number") again[name] = { ...value.quantity, error: 0 };
    else delete again[name];
  }
  return again;
}

/** Results with the cells that read a varied parameter computed anew; one that cannot be gives its reason. */
function recomputedResults(
  task: CellTask,
  parameters: Readonly<Record<string, Quantity>>,
  results: ReadonlyMap<string, ReadCell>,
): ReadonlyMap<string, ReadCell> {
  const again = new Map(results);
  for (const inner of task.recomputed?.cells ?? []) {
    const names = Object.keys(inner.parameters);
    const here = Object.fromEntries(
      names.flatMap((name) => (parameters[name] === undefined ? [] : [[name, parameters[name]]])),
    );
    const outcome = computeWith({ ...inner, parameters: here }, again, () => undefined);
    if (outcome.status === "computed") again.set(inner.id, outcome.result);
    else if (outcome.status === "failed")
      again.set(inner.id, { refused: `\`${inner.id}\` has no result: ${outcome.failure.message}` });
  }
  return again;
}

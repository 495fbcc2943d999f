import type { MessagePort } from "node:worker_threads";
import type { CellPart, CellResult, CellTask, Outcome, PlannedCell, SplitCell } from "../../app/cells/index.ts";
import { beginCell, computePart, mergeParts, planPaper } from "../../app/cells/index.ts";
import { readPaper } from "../../app/paper/index.ts";

/** The entry of the worker threads. All functions are pure; a thread may be ended at any moment. */

/** What every job on a cell brings along. */
interface CellJob {
  readonly task: CellTask;
  /** Where it is told that the thread is at it (`null`, once) and how far it is (`[done, total]`). */
  readonly progress: MessagePort;
}

export interface ComputeJob extends CellJob {
  /** Results of the cells it reads, and of those they read: id → result. */
  readonly results: readonly (readonly [string, CellResult])[];
}

export interface PartJob extends CellJob {
  readonly shared: unknown;
  readonly index: number;
}

export interface MergeJob extends CellJob {
  readonly shared: unknown;
  readonly parts: readonly CellPart[];
}

/** What the server must know of a planned cell. */
export type PlannedWork = Pick<
  PlannedCell,
  "id" | "slot" | "kind" | "line" | "key" | "needs" | "parameterValues" | "workingKey" | "task" | "quick"
>;

/** More often than this nobody wants to know how far a cell is. */
const PROGRESS_EVERY_MS = 100;

/** Computes one cell in this thread, or says into what it splits. The first message says that it has begun; the others how far it is. */
export function compute({ task, results, progress }: ComputeJob): Outcome | SplitCell {
  progress.postMessage(null);
  let told = 0;
  const outcome = beginCell(task, new Map(results), {
    progress(done, total) {
      const now = Date.now();
      if (now - told < PROGRESS_EVERY_MS) return;
      told = now;
      progress.postMessage([done, total]);
    },
  });
  progress.close();
  return outcome;
}

/** Computes one part of a cell that splits. */
export function part({ task, shared, index, progress }: PartJob): ReturnType<typeof computePart> {
  progress.postMessage(null);
  const computed = computePart(task, shared, index);
  progress.close();
  return computed;
}

/** Makes a cell's result of all its parts. */
export function merge({ task, shared, parts, progress }: MergeJob): Outcome {
  progress.postMessage(null);
  const outcome = mergeParts(task, shared, parts);
  progress.close();
  return outcome;
}

/** Reads and plans a text, cells in dependency order. */
export function plan({ text, bibliography }: { text: string; bibliography: string }): PlannedWork[] {
  return planPaper(readPaper(text, bibliography)).cells.map(
    ({ id, slot, kind, line, key, needs, parameterValues, workingKey, task, quick }) => ({
      id,
      slot,
      kind,
      line,
      key,
      needs,
      parameterValues,
      workingKey,
      task,
      quick,
    }),
  );
}

import type { MessagePort } from "node:worker_threads";
import type { CellResult, CellTask, Outcome, PlannedCell } from "../../app/cells/index.ts";
import { computeCell, planPaper } from "../../app/cells/index.ts";
import { readPaper } from "../../app/paper/index.ts";

/** The entry of the worker threads. Both functions are pure; a thread may be ended at any moment. */

export interface ComputeJob {
  readonly task: CellTask;
  /** Results of the cells it reads, and of those they read: id → result. */
  readonly results: readonly (readonly [string, CellResult])[];
  /** Where it is told that the thread is at it (`null`, once) and how far it is (`[done, total]`). */
  readonly progress: MessagePort;
}

/** What the server must know of a planned cell. */
export type PlannedWork = Pick<
  PlannedCell,
  "id" | "slot" | "kind" | "line" | "key" | "needs" | "parameterValues" | "workingKey" | "task" | "quick"
>;

/** More often than this nobody wants to know how far a cell is. */
const PROGRESS_EVERY_MS = 100;

/** Computes one cell in this thread. The first message says that it has begun; the others how far it is. */
export function compute({ task, results, progress }: ComputeJob): Outcome {
  progress.postMessage(null);
  let told = 0;
  const outcome = computeCell(task, new Map(results), {
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

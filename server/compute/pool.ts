import { fileURLToPath } from "node:url";
import { MessageChannel } from "node:worker_threads";
import { Piscina } from "piscina";
import type { CellPart, CellResult, CellTask, Outcome, SplitCell } from "../../app/cells/index.ts";
import type { PaperText } from "../../app/context.ts";
import type { ComputeJob, MergeJob, PartJob, PlannedWork } from "./worker.ts";

const HEAP_MB = 512;
/** With the start of the thread, where it has to be started. */
const PLAN_LIMIT_MS = 60_000;
const IDLE_MS = 60_000;

export interface PoolOptions {
  /** Threads for cells: cores − 1, and at least 1. */
  readonly threads: number;
  /** Longest that one cell may compute. */
  readonly cellLimitMs: number;
  /** Memory of a thread's JavaScript heap (512). Typed arrays are not counted: kinds bound the size of their problems. */
  readonly heapMb?: number;
  /** A thread died without a cell. */
  readonly onThreadError?: (error: unknown) => void;
  /** File of the worker, if not the one beside this file. */
  readonly worker?: string;
}

export interface ComputeHooks {
  /** There is a thread for it; may refuse by throwing. */
  begun(): Promise<void>;
  progress(done: number, total: number): void;
  /** It is over, however it ended, after so many seconds; the thread is given on when this resolves. */
  ended(seconds: number): Promise<void>;
}

/** A job without the port that the pool gives it. */
type JobOnCell = Omit<ComputeJob, "progress"> | Omit<PartJob, "progress"> | Omit<MergeJob, "progress">;

/** A cell that was stopped or whose thread died; `message` is for the author of the cell. */
export class StoppedError extends Error {
  readonly reason: "cancelled" | "stopped";
  constructor(reason: "cancelled" | "stopped", message: string, options?: ErrorOptions) {
    super(message, options);
    this.name = "StoppedError";
    this.reason = reason;
  }
}

/**
 * Worker threads: some for cells, one for reading and planning, which must not wait behind a long cell.
 * A thread that is stopped is replaced; the rest of the process does not notice.
 */
export class Pool {
  readonly #options: PoolOptions;
  readonly #cells: Piscina<ComputeJob | PartJob | MergeJob, unknown>;
  readonly #plans: Piscina<PaperText, PlannedWork[]>;
  readonly #waiting: (() => void)[] = [];
  #free: number;

  constructor(options: PoolOptions) {
    this.#options = options;
    this.#free = options.threads;
    const shared = {
      filename: options.worker ?? workerFile(),
      idleTimeout: IDLE_MS,
      minThreads: 1,
      resourceLimits: { maxOldGenerationSizeMb: options.heapMb ?? HEAP_MB },
    };
    this.#cells = new Piscina({ ...shared, maxThreads: options.threads });
    this.#plans = new Piscina({ ...shared, maxThreads: 1 });
    // A thread that dies without a cell is replaced; one that dies over a cell fails that cell (`#run`).
    for (const threads of [this.#cells, this.#plans]) threads.on("error", options.onThreadError ?? (() => {}));
  }

  /** Reads and plans a text. @throws StoppedError when it takes too long */
  async plan(text: PaperText): Promise<PlannedWork[]> {
    const signal = AbortSignal.timeout(PLAN_LIMIT_MS);
    try {
      return await this.#plans.run({ text: text.text, bibliography: text.bibliography }, { name: "plan", signal });
    } catch (error) {
      if (!signal.aborted) throw error;
      throw new StoppedError("stopped", `The text could not be read within ${PLAN_LIMIT_MS / 1000} s.`, {
        cause: error,
      });
    }
  }

  /** How many jobs on cells are done at once. */
  get threads(): number {
    return this.#options.threads;
  }

  /**
   * Computes a cell as soon as a thread is free, or says into what it splits.
   * @throws what `hooks.begun` throws; StoppedError when it is cancelled, takes too long or too much memory
   */
  compute(
    task: CellTask,
    results: ReadonlyMap<string, CellResult>,
    hooks: ComputeHooks,
    cancel: AbortSignal,
  ): Promise<Outcome | SplitCell> {
    return this.#inTurn("compute", { task, results: [...results] }, hooks, cancel);
  }

  /** Computes one part of a cell that splits. @throws as compute */
  part(
    task: CellTask,
    { shared }: SplitCell,
    index: number,
    hooks: ComputeHooks,
    cancel: AbortSignal,
  ): Promise<CellPart | Extract<Outcome, { status: "failed" }>> {
    return this.#inTurn("part", { task, shared, index }, hooks, cancel);
  }

  /** Makes a cell's result of all its parts. @throws as compute */
  merge(
    task: CellTask,
    { shared }: SplitCell,
    parts: readonly CellPart[],
    hooks: ComputeHooks,
    cancel: AbortSignal,
  ): Promise<Outcome> {
    return this.#inTurn("merge", { task, shared, parts }, hooks, cancel);
  }

  async close(): Promise<void> {
    await Promise.all([this.#cells.destroy(), this.#plans.destroy()]);
  }

  /** @param name of the worker's function, which gives an `Answer` for that job */
  async #inTurn<Answer>(name: string, job: JobOnCell, hooks: ComputeHooks, cancel: AbortSignal): Promise<Answer> {
    await this.#thread(cancel);
    try {
      await hooks.begun();
      return (await this.#run(name, job, hooks, cancel)) as Answer;
    } finally {
      const next = this.#waiting.shift();
      // The thread goes from hand to hand while somebody waits for it.
      if (next) next();
      else this.#free += 1;
    }
  }

  async #run(name: string, job: JobOnCell, hooks: ComputeHooks, cancel: AbortSignal): Promise<unknown> {
    const { cellLimitMs, heapMb = HEAP_MB } = this.#options;
    const limit = new AbortController();
    const { port1, port2 } = new MessageChannel();
    let clock: NodeJS.Timeout | null = null;
    let from = 0;
    port1.on("message", (told: [number, number] | null) => {
      if (told) hooks.progress(...told);
      // A thread that replaces one that was stopped takes a while to be there: not the cell's time.
      else if (!clock) {
        from = performance.now();
        clock = setTimeout(() => limit.abort(), cellLimitMs);
      }
    });
    port1.unref();
    try {
      return await this.#cells.run(
        { ...job, progress: port2 },
        { name, transferList: [port2], signal: AbortSignal.any([cancel, limit.signal]) },
      );
    } catch (error) {
      if (cancel.aborted) throw cancelled(error);
      const words = limit.signal.aborted
        ? `Stopped after ${cellLimitMs / 1000} s, the limit for a cell.`
        : wordsOfDeath(error, heapMb);
      throw new StoppedError("stopped", words, { cause: error });
    } finally {
      if (clock) clearTimeout(clock);
      port1.close();
      await hooks.ended(from > 0 ? (performance.now() - from) / 1000 : 0);
    }
  }

  /** Resolves when this caller has a thread. */
  async #thread(cancel: AbortSignal): Promise<void> {
    if (cancel.aborted) throw cancelled(cancel.reason);
    if (this.#free > 0) {
      this.#free -= 1;
      return;
    }
    await new Promise<void>((go, stop) => {
      const onAbort = () => {
        this.#waiting.splice(this.#waiting.indexOf(next), 1);
        stop(cancelled(cancel.reason));
      };
      const next = () => {
        cancel.removeEventListener("abort", onAbort);
        go();
      };
      cancel.addEventListener("abort", onAbort, { once: true });
      this.#waiting.push(next);
    });
  }
}

function cancelled(cause: unknown): StoppedError {
  return new StoppedError("cancelled", "Cancelled.", { cause });
}

function wordsOfDeath(error: unknown, heapMb: number): string {
  const code = error instanceof Error && "code" in error ? error.code : "";
  if (code === "ERR_WORKER_OUT_OF_MEMORY") {
    return `Stopped: it needed more than ${heapMb} MB of memory, the limit for a cell. A smaller problem would do.`;
  }
  return "Its worker ended before it was done. Recompute tries again.";
}

/** Beside this file when the server runs from its sources; beside the bundle otherwise. */
function workerFile(): string {
  const file = import.meta.url.endsWith(".ts") ? "./worker.from-sources.mjs" : "./compute/worker.js";
  return fileURLToPath(new URL(file, import.meta.url));
}

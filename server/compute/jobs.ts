import type { CellResult, CellTask } from "../../app/cells/index.ts";
import type { Database, SignalLine } from "../../db/index.server.ts";
import { unlessAborted } from "./abandon.ts";
import { computeInParts } from "./in-parts.ts";
import { type ComputeHooks, type Pool, StoppedError } from "./pool.ts";

/** How a job ended. */
export type JobEnd =
  | { readonly end: "computed"; readonly result: CellResult }
  /** `entry`: of the cell's body, a name in `task.lines`; "" the cell itself. */
  | { readonly end: "failed"; readonly entry: string; readonly message: string }
  /** A cell that it reads has no result: ids. */
  | { readonly end: "waiting"; readonly needs: readonly string[] }
  | { readonly end: "cancelled" };

const CANCELLED: JobEnd = { end: "cancelled" };

export interface JobRequest {
  readonly key: string;
  readonly task: CellTask;
  /** Keep the new result although there is one. */
  readonly replace: boolean;
  /** Asked before a thread is given: words of refusal, or null. */
  readonly refusal: () => Promise<string | null>;
  /** Told the seconds a thread was used. */
  readonly used: (seconds: number) => Promise<void>;
}

/** What somebody who waits for a job hears of it. */
export interface Follower {
  begun(): void;
  progress(done: number, total: number): void;
}

interface Job {
  readonly key: string;
  readonly followers: Set<Follower>;
  readonly abort: AbortController;
  readonly ended: Promise<JobEnd>;
  begun: boolean;
}

export interface JobsOptions {
  readonly pool: Pool;
  readonly results: Database["results"];
  readonly parts: Database["parts"];
  /** Claims keys against the other processes. */
  readonly signals: Pick<SignalLine, "claim" | "release">;
  /** A thread was stopped, or ended by itself: its `cause` is for the log. */
  readonly onStopped: (error: StoppedError) => void;
}

/** While another process computes a key, its result is looked for this often. */
const LOOK_EVERY_MS = 300;

/**
 * Computations by key. Whoever asks for a key that is being computed follows that computation: there is one job for a
 * key in this process, and one process at a time has the claim to it.
 *
 *     asked ──▶ claimed ──its needs have ended──▶ has a thread, one or more for its parts ──▶ computed (kept under the key), failed
 *       │          └── a need has no result ──▶ waiting
 *       └── another process has the claim: looks for its result; takes the claim when that process is gone
 *
 * In each of these states it is cancelled when the last who follow it leave.
 */
export class Jobs {
  readonly #options: JobsOptions;
  readonly #jobs = new Map<string, Job>();

  constructor(options: JobsOptions) {
    this.#options = options;
  }

  isRunning(key: string): boolean {
    return this.#jobs.has(key);
  }

  hasThread(key: string): boolean {
    return this.#jobs.get(key)?.begun ?? false;
  }

  /** Begins the job, or follows the one that runs. The follower stays until it leaves or the job ends. */
  follow(request: JobRequest, follower: Follower): Promise<JobEnd> {
    let job = this.#jobs.get(request.key);
    // One that nobody wanted any more is ending: begin again after it.
    if (job?.abort.signal.aborted) return job.ended.then(() => this.follow(request, follower));
    if (job) {
      job.followers.add(follower);
      if (job.begun) follower.begun();
      return job.ended;
    }
    const abort = new AbortController();
    const followers = new Set([follower]);
    const ended = Promise.resolve().then(() => this.#run(request, followers, abort.signal));
    job = { key: request.key, followers, abort, ended, begun: false };
    this.#jobs.set(request.key, job);
    return ended;
  }

  /** The follower wants it no more; a job that nobody wants ends. */
  leave(key: string, follower: Follower): void {
    const job = this.#jobs.get(key);
    if (!job?.followers.delete(follower)) return;
    if (job.followers.size === 0) job.abort.abort();
  }

  /** Ends everything. */
  async close(): Promise<void> {
    const jobs = [...this.#jobs.values()];
    for (const { abort } of jobs) abort.abort();
    await Promise.all(jobs.map(({ ended }) => ended));
  }

  async #run(request: JobRequest, followers: ReadonlySet<Follower>, cancel: AbortSignal): Promise<JobEnd> {
    try {
      const found = await this.#claim(request, cancel);
      if (found) return { end: "computed", result: found };
      try {
        return await this.#compute(request, followers, cancel);
      } finally {
        await this.#options.signals.release(claimOf(request.key));
      }
    } catch (error) {
      if (error instanceof StoppedError) {
        if (error.reason === "cancelled") return CANCELLED;
        if (error.cause) this.#options.onStopped(error);
        return { end: "failed", entry: "", message: error.message };
      }
      if (cancel.aborted) return CANCELLED;
      throw error;
    } finally {
      this.#jobs.delete(request.key);
    }
  }

  /** Takes the claim, or finds the result that another process had it for. */
  async #claim({ key, replace }: JobRequest, cancel: AbortSignal): Promise<CellResult | null> {
    let looked = false;
    for (;;) {
      cancel.throwIfAborted();
      const claimed = await this.#options.signals.claim(claimOf(key));
      // With the claim in hand nobody else is at it; then what is there is there.
      if (!replace || looked) {
        const kept = await this.#options.results.find([key]);
        const result = kept.get(key) as CellResult | undefined;
        if (result) {
          if (claimed) await this.#options.signals.release(claimOf(key));
          return result;
        }
      }
      if (claimed) return null;
      looked = true;
      await new Promise((done) => setTimeout(done, LOOK_EVERY_MS));
    }
  }

  async #compute(request: JobRequest, followers: ReadonlySet<Follower>, cancel: AbortSignal): Promise<JobEnd> {
    const { pool, results, parts } = this.#options;
    const { key, task } = request;
    const missing: string[] = [];
    const read = new Map<string, CellResult>();
    for (const [id, need] of Object.entries(task.needs)) {
      const job = this.#jobs.get(need);
      const end = job ? await unlessAborted(job.ended, cancel, () => CANCELLED) : null;
      if (end?.end === "cancelled") return end;
      const result = end?.end === "computed" ? end.result : (await results.find([need])).get(need);
      if (result) read.set(id, result as CellResult);
      else missing.push(id);
    }
    if (missing.length > 0) return { end: "waiting", needs: missing };

    const hooks: ComputeHooks = {
      begun: async () => {
        const refusal = await request.refusal();
        if (refusal) throw new StoppedError("stopped", refusal);
        const job = this.#jobs.get(key);
        // A cell in parts begins with the first.
        if (!job || job.begun) return;
        job.begun = true;
        for (const follower of followers) follower.begun();
      },
      progress: (done, total) => {
        for (const follower of followers) follower.progress(done, total);
      },
      ended: (seconds) => request.used(seconds),
    };
    if (request.replace) await parts.forget(key);
    const whole = await pool.compute(task, read, hooks, cancel);
    const outcome =
      whole.status === "split" ? await computeInParts({ pool, parts }, task, whole, hooks, cancel) : whole;
    switch (outcome.status) {
      case "computed": {
        const { result } = outcome;
        const { kind, solver, seconds } = result;
        await results.keep({ key, kind, solver, seconds, result }, request.replace);
        if (whole.status === "split") await parts.forget(key);
        return { end: "computed", result };
      }
      case "failed":
        return { end: "failed", entry: entryOf(task, outcome.failure.line), message: outcome.failure.message };
      case "waiting":
        return { end: "waiting", needs: outcome.needs };
    }
  }
}

/** Name of the claim to a key, free or held. */
export function claimOf(key: string): string {
  return `cell/${key}`;
}

/** The same key may stand at other lines in another paper: what failed is told by the entry's name. */
function entryOf(task: CellTask, line: number): string {
  return Object.entries(task.lines).find(([, at]) => at === line)?.[0] ?? "";
}

import type { Person } from "../../app/context.ts";
import type { Database } from "../../db/index.server.ts";
import { unlessAborted } from "./abandon.ts";
import type { Board, Computable } from "./board.ts";
import type { Follower, JobEnd, Jobs } from "./jobs.ts";
import type { Quota } from "./quota.ts";

/** Who asked for what is computed, where and when (ISO time), and the number of the record of it. */
export interface Asking {
  readonly paperId: string;
  readonly person: Pick<Person, "id" | "name">;
  readonly begun: string;
  readonly record: number;
}

/** A cell that is waited for on behalf of a paper. */
interface Wait {
  readonly asking: Asking;
  readonly cell: Computable;
  readonly board: Board;
  readonly follower: Follower;
  /** Given with the name of who cancels. */
  readonly cancel: AbortController;
  /** Settles when the paper shows how it ended. */
  readonly shown: Promise<void>;
}

export interface WaitsOptions {
  readonly database: Database;
  readonly jobs: Jobs;
  readonly quota: Quota;
  /** True of a record that the next process will take up. */
  readonly isLeft: (record: number) => boolean;
  readonly onProblem: (error: unknown, where: string) => void;
}

/** The cells that this process computes for papers, from the asking until the paper shows how each ended. */
export class Waits {
  readonly #options: WaitsOptions;
  /** In dependency order for each asking. */
  readonly #waits = new Set<Wait>();

  constructor(options: WaitsOptions) {
    this.#options = options;
  }

  /** Waits for a cell; resolves when the paper shows how it ended. @param replace a result that is kept already */
  add(asking: Asking, cell: Computable, board: Board, replace: boolean): Promise<void> {
    const { database, jobs, quota, onProblem } = this.#options;
    const { person, begun, record } = asking;
    const tell = (told: Promise<void>) => void told.catch((error) => onProblem(error, "what a paper shows"));
    const follower: Follower = {
      // A quick cell is there before anybody could read that it is being computed.
      begun: () => {
        if (!cell.quick) tell(board.work(cell, { state: "computing", begun, done: 0, total: 0 }));
      },
      progress: (done, total) => tell(board.progress(cell, done, total)),
    };
    const ended = jobs.follow(
      {
        key: cell.key,
        task: cell.task,
        replace,
        refusal: () => quota.refusal(person.id),
        used: (seconds) => database.computations.addSeconds(record, seconds),
      },
      follower,
    );
    const cancel = new AbortController();
    const shown = unlessAborted(ended, cancel.signal, (): JobEnd => ({ end: "cancelled" }))
      .catch((error): JobEnd => {
        onProblem(error, `cell ${cell.id}`);
        return { end: "failed", entry: "", message: "It could not be computed just now. Recompute tries again." };
      })
      .then((end) => this.#show(wait, end))
      .catch((error) => onProblem(error, "what a paper shows"))
      .finally(() => this.#waits.delete(wait));
    const wait: Wait = { asking, cell, board, follower, cancel, shown };
    this.#waits.add(wait);
    return shown;
  }

  /** Keys of the cells that are waited for on behalf of a paper. */
  keysOf(paperId: string): ReadonlySet<string> {
    return new Set(this.#ofPaper(paperId).map(({ cell }) => cell.key));
  }

  /** True while a thread of this process computes a cell of this id. */
  isComputing(id: string): boolean {
    return [...this.#waits].some(({ cell }) => cell.id === id && this.#options.jobs.hasThread(cell.key));
  }

  /** Resolves when nothing is waited for on behalf of the paper; of any paper when none is given. */
  async settled(paperId: string | null = null): Promise<void> {
    const waits = paperId === null ? [...this.#waits] : this.#ofPaper(paperId);
    await Promise.all(waits.map(({ shown }) => shown));
  }

  /** Cancels what is computed for the paper's cells, and what reads them; resolves when the paper shows it. */
  async cancel(paperId: string, ids: readonly string[] | "all", by: string): Promise<void> {
    const waits = this.#ofPaper(paperId);
    const stopped = new Set(waits.map(({ cell }) => cell.id).filter((id) => ids === "all" || ids.includes(id)));
    // Waits stand in dependency order, so one pass finds all that read a cancelled cell.
    for (const { cell } of waits) if (cell.needs.some((need) => stopped.has(need))) stopped.add(cell.id);
    const cancelled = waits.filter(({ cell }) => stopped.has(cell.id));
    for (const wait of cancelled) {
      wait.cancel.abort(by);
      this.#options.jobs.leave(wait.cell.key, wait.follower);
    }
    await Promise.all(cancelled.map(({ shown }) => shown));
  }

  #ofPaper(paperId: string): Wait[] {
    return [...this.#waits].filter(({ asking }) => asking.paperId === paperId);
  }

  async #show({ asking, cell, board, cancel }: Wait, end: JobEnd): Promise<void> {
    const { paperId, person, record } = asking;
    const at = new Date().toISOString();
    switch (end.end) {
      case "computed":
        await this.#options.database.results.recordForPaper(paperId, [cell.key], person.id);
        await board.computed(cell, end.result);
        break;
      case "failed": {
        const line = cell.task.lines[end.entry] ?? cell.line;
        await board.work(cell, { state: "failed", at, line, message: end.message });
        break;
      }
      case "waiting":
        await board.work(cell, { state: "waiting", begun: at, needs: end.needs });
        break;
      case "cancelled":
        // Cancelled by nobody: this process ends.
        if (cancel.signal.aborted) await board.cancelled(cell, String(cancel.signal.reason), at);
        else if (!this.#options.isLeft(record)) await board.forget(cell);
        break;
    }
  }
}

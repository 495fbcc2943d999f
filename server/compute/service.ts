import type { CellResult } from "../../app/cells/index.ts";
import type { ComputeRequest, ComputeService, Person } from "../../app/context.ts";
import type { Database } from "../../db/index.server.ts";
import type { LiveTexts } from "../sync/index.ts";
import { unlessAborted } from "./abandon.ts";
import { Board, type Computable } from "./board.ts";
import { claimOf, type Follower, type JobEnd, Jobs } from "./jobs.ts";
import { Pool, type PoolOptions, StoppedError } from "./pool.ts";
import { Quota } from "./quota.ts";
import { isBlocked, isComputable, unmet, withNeeds } from "./selection.ts";
import type { PlannedWork } from "./worker.ts";

/** Characters of a text and its bibliography that are read here; a long paper has a tenth of it. */
const LONGEST_TEXT = 2_000_000;

export interface ComputeOptions extends PoolOptions {
  readonly database: Database;
  readonly texts: LiveTexts;
  /** Solver seconds that a person may use within an hour. */
  readonly secondsAnHour: number;
  readonly onProblem: (error: unknown, where: string) => void;
}

/** A cell that is waited for on behalf of a paper. */
interface Wait {
  readonly paperId: string;
  readonly cell: Computable;
  readonly follower: Follower;
  readonly board: Board;
  /** Given with the name of who cancels. */
  readonly cancel: AbortController;
  /** Settles when the paper shows how it ended. */
  readonly shown: Promise<void>;
}

/** Computes the cells of papers, and writes how it goes into what they show. */
export class Computations implements ComputeService {
  readonly #options: ComputeOptions;
  readonly #pool: Pool;
  readonly #jobs: Jobs;
  readonly #quota: Quota;
  readonly #waits = new Set<Wait>();

  constructor(options: ComputeOptions) {
    const { database, texts, secondsAnHour } = options;
    this.#options = options;
    this.#pool = new Pool({ onThreadError: (error) => options.onProblem(error, "a thread died"), ...options });
    this.#jobs = new Jobs({
      pool: this.#pool,
      results: database.results,
      signals: texts.signals,
      onStopped: (error) => options.onProblem(error, "a cell was stopped"),
    });
    this.#quota = new Quota(database.results, secondsAnHour);
    texts.listen(({ signal, paperId, cells, by }) => {
      if (signal === "cancel" && typeof paperId === "string" && typeof by === "string") {
        this.#cancelHere(paperId, cells === "all" || !Array.isArray(cells) ? "all" : cells, by);
      }
    });
    texts.onShownLoaded((paperId) => {
      this.#clearStale(paperId).catch((error) => options.onProblem(error, "stale work"));
    });
  }

  async compute(request: ComputeRequest): ReturnType<ComputeService["compute"]> {
    const { paperId, person, force = false } = request;
    const { database, texts } = this.#options;
    const planned = await this.#plan(request.text);
    if ("refused" in planned) return { accepted: [], refused: { reason: planned.refused } };

    const { cells: shown } = await texts.shown(paperId);
    const asked = new Set(
      planned
        .filter((cell) =>
          request.cells === "all" ? shown[cell.slot]?.key !== cell.key || force : request.cells.includes(cell.id),
        )
        .map((cell) => cell.id),
    );
    const wanted = withNeeds(planned, asked).filter(isComputable);
    const kept = (await database.results.find(wanted.map(({ key }) => key))) as Map<string, CellResult>;
    const isReady = (cell: Computable) => kept.has(cell.key) && !(force && asked.has(cell.id));
    const ready = wanted.flatMap((cell): [Computable, CellResult][] => {
      const result = kept.get(cell.key);
      return result && isReady(cell) && shown[cell.slot]?.key !== cell.key ? [[cell, result]] : [];
    });
    const underWay = new Set([...this.#waits].filter((wait) => wait.paperId === paperId).map(({ cell }) => cell.key));
    const absent = wanted.filter((cell) => !isReady(cell));
    const missing = absent.filter((cell) => !underWay.has(cell.key));

    const reason = missing.length > 0 ? await this.#quota.refusal(person.id) : null;
    const begun = new Date().toISOString();
    const board = new Board(texts, paperId, person.name, begun);
    await database.results.recordForPaper(
      paperId,
      ready.map(([{ key }]) => key),
      person.id,
    );
    await board.begin(
      ready,
      reason ? [] : missing.map((cell) => [cell, { state: "waiting", begun, needs: unmet(cell, absent) }]),
    );
    const accepted = [...ready.map(([cell]) => cell), ...(reason ? [] : missing)].map(({ id }) => id);
    if (reason) return { accepted, refused: { reason } };
    if (missing.length > 0) await this.#begin(request, missing, board, begun);
    return { accepted };
  }

  async cancel(request: Parameters<ComputeService["cancel"]>[0]): Promise<void> {
    const { paperId, person, cells } = request;
    await this.#options.texts.send({ signal: "cancel", paperId, cells, by: person.name });
    await Promise.all(this.#cancelHere(paperId, cells, person.name));
    await this.#clearStale(paperId);
  }

  async stand(request: Parameters<ComputeService["stand"]>[0]): ReturnType<ComputeService["stand"]> {
    const { paperId, person, cell: id, text } = request;
    const planned = await this.#plan({ text, bibliography: "" });
    if ("refused" in planned) return planned;
    const cell = planned.find((one) => one.id === id);
    if (!cell) return { refused: `The paper has no cell "${id}".` };
    let refused: string | undefined;
    await this.#options.texts.show(paperId, ({ cells, work }) => {
      const shown = cells.get(cell.slot);
      if (!shown) {
        refused = "It was never computed: there is nothing to let stand.";
      } else if (shown.key === cell.key) {
        refused = "It is current: it stands as it is.";
      } else {
        cells.set(cell.slot, { ...shown, stands: { by: person.name, at: new Date().toISOString() } });
        const state = work.get(cell.slot)?.state;
        if (state === "cancelled" || state === "failed") work.delete(cell.slot);
      }
    });
    return refused === undefined ? {} : { refused };
  }

  async results(paperId: string, keys: readonly string[]): Promise<Readonly<Record<string, CellResult>>> {
    return Object.fromEntries((await this.#options.database.results.ofPaper(paperId, keys)) as Map<string, CellResult>);
  }

  /** True while a thread of this process computes a cell of this id. */
  isComputing(id: string): boolean {
    return [...this.#waits].some(({ cell }) => cell.id === id && this.#jobs.hasThread(cell.key));
  }

  /** Resolves when nothing is being computed for the paper in this process. */
  async settled(paperId: string): Promise<void> {
    await Promise.all([...this.#waits].filter((wait) => wait.paperId === paperId).map(({ shown }) => shown));
  }

  /** Ends what is being computed, as if it had not been asked, and the threads. */
  async close(): Promise<void> {
    await this.#jobs.close();
    await Promise.all([...this.#waits].map(({ shown }) => shown));
    await this.#pool.close();
  }

  async #plan(text: ComputeRequest["text"]): Promise<PlannedWork[] | { refused: string }> {
    if (text.text.length + text.bibliography.length > LONGEST_TEXT) {
      return { refused: `The text is longer than ${LONGEST_TEXT} characters, the limit for computing.` };
    }
    try {
      return await this.#pool.plan(text);
    } catch (error) {
      if (error instanceof StoppedError) return { refused: error.message };
      throw error;
    }
  }

  async #begin(
    { paperId, person, force }: ComputeRequest,
    cells: readonly Computable[],
    board: Board,
    begun: string,
  ): Promise<void> {
    const { results } = this.#options.database;
    const record = await results.openComputation(
      paperId,
      person.id,
      cells.map(({ id }) => id),
    );
    const all = cells.map((cell) => this.#wait(paperId, person, cell, board, begun, record, force ?? false));
    Promise.all(all)
      .then(() => results.closeComputation(record))
      .catch((error) => this.#options.onProblem(error, "record of a computation"));
  }

  #wait(
    paperId: string,
    person: Person,
    cell: Computable,
    board: Board,
    begun: string,
    record: number,
    replace: boolean,
  ): Promise<void> {
    const { database, onProblem } = this.#options;
    const tell = (told: Promise<void>) => void told.catch((error) => onProblem(error, "what a paper shows"));
    const follower: Follower = {
      // A quick cell is there before anybody could read that it is being computed.
      begun: () => {
        if (!cell.quick) tell(board.work(cell, { state: "computing", begun, done: 0, total: 0 }));
      },
      progress: (done, total) => tell(board.progress(cell, done, total)),
    };
    const ended = this.#jobs.follow(
      {
        key: cell.key,
        task: cell.task,
        replace,
        refusal: () => this.#quota.refusal(person.id),
        used: (seconds) => database.results.addSeconds(record, seconds),
      },
      follower,
    );
    const cancel = new AbortController();
    const shown = unlessAborted(ended, cancel.signal, (): JobEnd => ({ end: "cancelled" }))
      .catch((error): JobEnd => {
        onProblem(error, `cell ${cell.id}`);
        return { end: "failed", entry: "", message: "It could not be computed just now. Recompute tries again." };
      })
      .then((end) => this.#show(wait, end, person))
      .catch((error) => onProblem(error, "what a paper shows"))
      .finally(() => this.#waits.delete(wait));
    const wait: Wait = { paperId, cell, follower, board, cancel, shown };
    this.#waits.add(wait);
    return shown;
  }

  async #show({ paperId, cell, board, cancel }: Wait, end: JobEnd, person: Person): Promise<void> {
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
        else await board.forget(cell);
        break;
    }
  }

  /** Cancels what this process computes for the paper's cells, and what reads them. */
  #cancelHere(paperId: string, ids: readonly string[] | "all", by: string): Promise<void>[] {
    const waits = [...this.#waits].filter((wait) => wait.paperId === paperId);
    const stopped = new Set(waits.map(({ cell }) => cell.id).filter((id) => ids === "all" || ids.includes(id)));
    // Waits stand in dependency order, so one pass finds all that read a cancelled cell.
    for (const { cell } of waits) if (cell.needs.some((need) => stopped.has(need))) stopped.add(cell.id);
    const cancelled = waits.filter(({ cell }) => stopped.has(cell.id));
    for (const wait of cancelled) {
      wait.cancel.abort(by);
      this.#jobs.leave(wait.cell.key, wait.follower);
    }
    return cancelled.map(({ shown }) => shown);
  }

  /** Takes away work that no process does: one was killed over it. */
  async #clearStale(paperId: string): Promise<void> {
    const { texts } = this.#options;
    const { work } = await texts.shown(paperId);
    for (const [slot, { key, state }] of Object.entries(work)) {
      if ((state !== "waiting" && state !== "computing") || this.#jobs.isRunning(key) || isBlocked(work, slot))
        continue;
      if (!(await texts.signals.claim(claimOf(key)))) continue;
      try {
        await texts.show(paperId, (maps) => {
          const now = maps.work.get(slot);
          if (now?.key === key && now.state === state) maps.work.delete(slot);
        });
      } finally {
        await texts.signals.release(claimOf(key));
      }
    }
  }
}

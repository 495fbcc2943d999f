import type { CellResult } from "../../app/cells/index.ts";
import type { ComputeRequest, ComputeService } from "../../app/context.ts";
import type { Database } from "../../db/index.server.ts";
import type { LiveTexts } from "../sync/index.ts";
import { Board, type Computable } from "./board.ts";
import { claimOf, Jobs } from "./jobs.ts";
import { Pool, type PoolOptions, StoppedError } from "./pool.ts";
import { Quota } from "./quota.ts";
import { isBlocked, isComputable, unmet, withNeeds } from "./selection.ts";
import { type TakenUp, Unfinished } from "./unfinished.ts";
import { type Asking, Waits } from "./waits.ts";
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

/** Computes the cells of papers, and writes how it goes into what they show. */
export class Computations implements ComputeService {
  readonly #options: ComputeOptions;
  readonly #pool: Pool;
  readonly #jobs: Jobs;
  readonly #quota: Quota;
  readonly #unfinished: Unfinished;
  readonly #waits: Waits;

  constructor(options: ComputeOptions) {
    const { database, texts, secondsAnHour } = options;
    this.#options = options;
    this.#pool = new Pool({ onThreadError: (error) => options.onProblem(error, "a thread died"), ...options });
    this.#jobs = new Jobs({
      pool: this.#pool,
      results: database.results,
      parts: database.parts,
      signals: texts.signals,
      onStopped: (error) => options.onProblem(error, "a cell was stopped"),
    });
    this.#quota = new Quota(database.computations, secondsAnHour);
    this.#unfinished = new Unfinished({
      computations: database.computations,
      signals: texts.signals,
      begin: (taken) => this.#takeUp(taken),
      giveUp: (taken) => this.#giveUp(taken),
      onProblem: options.onProblem,
    });
    this.#waits = new Waits({
      database,
      jobs: this.#jobs,
      quota: this.#quota,
      isLeft: (record) => this.#unfinished.isLeft(record),
      onProblem: options.onProblem,
    });
    texts.listen(({ signal, paperId, cells, by }) => {
      if (signal === "cancel" && typeof paperId === "string" && typeof by === "string") {
        void this.#waits.cancel(paperId, cells === "all" || !Array.isArray(cells) ? "all" : cells, by);
      }
    });
    texts.onShownLoaded((paperId) => {
      this.#clearStale(paperId).catch((error) => options.onProblem(error, "stale work"));
    });
    void this.#unfinished.look();
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
    const underWay = this.#waits.keysOf(paperId);
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
    // What nobody does just now is taken up first, so that it is cancelled as all else.
    await this.#unfinished.look();
    await this.#options.texts.send({ signal: "cancel", paperId, cells, by: person.name });
    await this.#waits.cancel(paperId, cells, person.name);
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
    return this.#waits.isComputing(id);
  }

  /** Resolves when nothing is being computed for the paper in this process. */
  async settled(paperId: string): Promise<void> {
    await this.#waits.settled(paperId);
  }

  /** Ends what is being computed and the threads: what takes long is left to the next process, the rest is as if it had not been asked. */
  async close(): Promise<void> {
    this.#unfinished.end();
    await this.#jobs.close();
    await this.#waits.settled();
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
    const record = await this.#unfinished.open(paperId, person.id, cells);
    this.#follow(
      record,
      cells.map((cell) => this.#waits.add({ paperId, person, begun, record }, cell, board, force ?? false)),
    );
  }

  /** Closes the record when all that is waited for has ended. */
  #follow(record: number, shown: readonly Promise<void>[]): void {
    Promise.all(shown)
      .then(() => this.#unfinished.close(record))
      .catch((error) => this.#options.onProblem(error, "record of a computation"));
  }

  /** Goes on with what another process left: the cells that the paper still shows as waiting or computing. */
  async #takeUp({ id: record, paperId, personId, personName, begunAt, cells }: TakenUp): Promise<void> {
    const { texts } = this.#options;
    const begun = begunAt.toISOString();
    const board = new Board(texts, paperId, personName, begun);
    const { work } = await texts.shown(paperId);
    const open = cells.filter(({ slot, key }) => {
      const mark = work[slot];
      return mark?.key === key && (mark.state === "waiting" || mark.state === "computing");
    });
    const asking: Asking = { paperId, person: { id: personId, name: personName }, begun, record };
    for (const cell of open) await board.work(cell, { state: "waiting", begun, needs: unmet(cell, open) });
    this.#follow(
      record,
      open.map((cell) => this.#waits.add(asking, cell, board, false)),
    );
  }

  async #giveUp({ paperId, personName, begunAt, cells, begunTimes }: TakenUp): Promise<void> {
    const at = new Date().toISOString();
    const message = `It was begun ${begunTimes - 1} times, and each time the server ended before it was done. Recompute tries again.`;
    const board = new Board(this.#options.texts, paperId, personName, begunAt.toISOString());
    for (const cell of cells) await board.work(cell, { state: "failed", at, line: cell.line, message });
  }

  /** Takes away work that no process does: one was killed over it. */
  async #clearStale(paperId: string): Promise<void> {
    const { texts } = this.#options;
    await this.#unfinished.look();
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

import type { CellResult, CellWork, ShownCell } from "../../app/cells/index.ts";
import type { LiveTexts, ShownMaps } from "../sync/index.ts";
import type { PlannedWork } from "./worker.ts";

/** A planned cell that can compute. */
export type Computable = PlannedWork & {
  readonly key: string;
  readonly workingKey: string;
  readonly task: NonNullable<PlannedWork["task"]>;
};

/** Progress is written into the paper at most this often for each cell. */
const PROGRESS_EVERY_MS = 400;

type Distribute<Union, Keys extends PropertyKey> = Union extends unknown ? Omit<Union, Keys> : never;
/** A cell's work without what the board itself adds. */
export type WorkOfCell = Distribute<CellWork, "key" | "by">;

/**
 * Writes into what a paper shows, on behalf of one person who asked at one time. A cell that somebody has asked for
 * since, under another key, is theirs: what comes of the older computation is kept in the database and not shown.
 */
export class Board {
  readonly #texts: LiveTexts;
  readonly #paperId: string;
  readonly #by: string;
  readonly #begun: string;
  readonly #told = new Map<string, number>();

  /** @param begun ISO time of the asking */
  constructor(texts: LiveTexts, paperId: string, by: string, begun: string) {
    this.#texts = texts;
    this.#paperId = paperId;
    this.#by = by;
    this.#begun = begun;
  }

  /** At the asking: these were found ready, those wait or compute from now on. */
  async begin(
    ready: readonly (readonly [Computable, CellResult])[],
    asked: readonly (readonly [Computable, WorkOfCell])[],
  ): Promise<void> {
    if (ready.length === 0 && asked.length === 0) return;
    await this.#texts.show(this.#paperId, (maps) => {
      for (const [cell, result] of ready) this.#put(maps, cell, result);
      for (const [cell, work] of asked) maps.work.set(cell.slot, { ...work, key: cell.key, by: this.#by } as CellWork);
    });
  }

  async computed(cell: Computable, result: CellResult): Promise<void> {
    await this.#ifOurs(cell, (maps) => this.#put(maps, cell, result));
  }

  async work(cell: Computable, work: WorkOfCell): Promise<void> {
    await this.#ifOurs(cell, ({ work: map }) =>
      map.set(cell.slot, { ...work, key: cell.key, by: this.#by } as CellWork),
    );
  }

  async progress(cell: Computable, done: number, total: number): Promise<void> {
    const now = Date.now();
    if (now - (this.#told.get(cell.slot) ?? 0) < PROGRESS_EVERY_MS) return;
    this.#told.set(cell.slot, now);
    await this.#ifOurs(cell, ({ work }) => {
      // A word that comes late must not undo the end.
      if (work.get(cell.slot)?.state === "computing") {
        work.set(cell.slot, { state: "computing", key: cell.key, by: this.#by, begun: this.#begun, done, total });
      }
    });
  }

  /** @param by who cancelled it, not always who asked */
  async cancelled(cell: Computable, by: string, at: string): Promise<void> {
    await this.#ifOurs(cell, ({ work }) => work.set(cell.slot, { state: "cancelled", key: cell.key, by, at }));
  }

  /** Takes the work back as if it had not been asked. */
  async forget(cell: Computable): Promise<void> {
    await this.#ifOurs(cell, ({ work }) => work.delete(cell.slot));
  }

  #put({ cells, work }: ShownMaps, cell: Computable, result: CellResult): void {
    const shown: ShownCell = {
      key: cell.key,
      at: new Date().toISOString(),
      by: this.#by,
      seconds: result.seconds,
      solver: result.solver,
      parameterValues: cell.parameterValues,
      workingKey: cell.workingKey,
    };
    cells.set(cell.slot, shown);
    work.delete(cell.slot);
  }

  async #ifOurs(cell: Computable, change: (maps: ShownMaps) => void): Promise<void> {
    await this.#texts.show(this.#paperId, (maps) => {
      const work = maps.work.get(cell.slot);
      if (work ? work.key === cell.key : !this.#isOvertaken(maps.cells.get(cell.slot), cell.key)) change(maps);
    });
  }

  /** True when another result has been shown since the asking. */
  #isOvertaken(shown: ShownCell | undefined, key: string): boolean {
    return shown !== undefined && shown.key !== key && shown.at > this.#begun;
  }
}

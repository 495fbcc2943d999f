import type { Database, SignalLine, UnfinishedWork } from "../../db/index.server.ts";
import type { Computable } from "./board.ts";

/** A computation that takes long, as another process takes it up. */
export interface TakenUp extends UnfinishedWork {
  readonly cells: readonly Computable[];
}

export interface UnfinishedOptions {
  readonly computations: Database["computations"];
  /** Claims records against the other processes. */
  readonly signals: Pick<SignalLine, "claim" | "release">;
  /** Begins it here; resolves when it has begun. */
  readonly begin: (taken: TakenUp) => Promise<void>;
  /** It was begun as often as it may be, and each process that did so ended over it. */
  readonly giveUp: (taken: TakenUp) => Promise<void>;
  readonly onProblem: (error: unknown, where: string) => void;
}

/** The others are looked after this often. */
const LOOK_EVERY_MS = 30_000;
/** A computation that ends the process each time is given up. */
const MOST_BEGINNINGS = 4;

/**
 * Records of what was asked for. One with cells that take long outlives this process: whoever does it holds a claim, which goes with
 * the process, and a record without an end and without a claim is taken up by the next process that looks.
 *
 *     opened ──claimed──▶ under way ──all cells have ended──▶ closed
 *                          └── the process ends ──▶ unclaimed ──another looks──▶ under way, or given up after the fourth time
 */
export class Unfinished {
  readonly #options: UnfinishedOptions;
  readonly #held = new Set<number>();
  readonly #clock: NodeJS.Timeout;
  #looking: Promise<void> = Promise.resolve();
  #ending = false;

  constructor(options: UnfinishedOptions) {
    this.#options = options;
    this.#clock = setInterval(() => void this.look(), LOOK_EVERY_MS);
    this.#clock.unref();
  }

  /** True of a record that the next process will take up, since this one ends. */
  isLeft(record: number): boolean {
    return this.#ending && this.#held.has(record);
  }

  /** Opens the record of what a person asked for; its number. */
  async open(paperId: string, personId: string, cells: readonly Computable[]): Promise<number> {
    const { computations, signals } = this.#options;
    const id = await computations.nextNumber();
    const ids = cells.map((cell) => cell.id);
    const isLong = cells.some(({ quick }) => !quick);
    if (isLong) {
      this.#held.add(id);
      await signals.claim(claimOf(id));
    }
    await computations.open({ id, paperId, personId, cells: ids, work: isLong ? cells : null });
    return id;
  }

  /** All its cells have ended, unless it is this process that ends. */
  async close(record: number): Promise<void> {
    if (this.isLeft(record)) return;
    const isLong = this.#held.delete(record);
    await this.#options.computations.close(record);
    if (isLong) await this.#options.signals.release(claimOf(record));
  }

  /** Takes up what no process does. */
  look(): Promise<void> {
    this.#looking = this.#looking
      .then(() => this.#lookNow())
      .catch((error: unknown) => this.#options.onProblem(error, "unfinished computations"));
    return this.#looking;
  }

  /** From now on nothing is taken up, and what is under way is left to the next process. */
  end(): void {
    this.#ending = true;
    clearInterval(this.#clock);
  }

  async #lookNow(): Promise<void> {
    const { computations, signals, begin, giveUp } = this.#options;
    if (this.#ending) return;
    for (const record of await computations.unfinished()) {
      if (this.#held.has(record) || !(await signals.claim(claimOf(record)))) continue;
      const found = await computations.takeUp(record);
      const taken = found && { ...found, cells: found.work as readonly Computable[] };
      if (taken !== null && taken.begunTimes <= MOST_BEGINNINGS) {
        this.#held.add(record);
        await begin(taken);
        continue;
      }
      if (taken !== null) await giveUp(taken);
      await computations.close(record);
      await signals.release(claimOf(record));
    }
  }
}

function claimOf(record: number): string {
  return `computation/${record}`;
}

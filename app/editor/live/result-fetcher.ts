import type { CellResult } from "../../cells/index.ts";
import type { ShownRecords } from "./paper-session.ts";
import type { Requests } from "./requests.ts";

/** Before a key that was not found, or a fetch that failed, is tried again, in ms. */
const AGAIN_MS = 4000;

/** Longest wait for what a paper shows at first, in ms: the text is then typeset without. */
const FIRST_MS = 1500;

/** Fetches the results which the paper shows, each once. */
export class ResultFetcher {
  private readonly requests: Pick<Requests, "results">;
  private onResults: (results: readonly CellResult[]) => void;
  private readonly triedAt = new Map<string, number>();
  private wanted: readonly string[] = [];
  private timer: ReturnType<typeof setTimeout> | undefined;

  constructor(requests: Pick<Requests, "results">, onResults: (results: readonly CellResult[]) => void) {
    this.requests = requests;
    this.onResults = onResults;
  }

  /**
   * Fetches what a paper shows while its text is still being read, so that it is set with its numbers and figures at
   * once, and nothing moves when they come. Those that come in time are handed over together.
   * @param besides what else is waited for in the same time
   */
  async first(cells: ShownRecords["cells"], besides?: Promise<unknown>): Promise<readonly CellResult[]> {
    const keys = Object.values(cells).map(({ key }) => key);
    const early: CellResult[] = [];
    const later = this.onResults;
    this.onResults = (results) => early.push(...results);
    const all = Promise.all([this.want(keys), besides]);
    await Promise.race([all, new Promise((resolve) => setTimeout(resolve, FIRST_MS))]);
    this.onResults = later;
    return early;
  }

  /** Fetches those of the keys that are not on their way. */
  async want(keys: readonly string[]): Promise<void> {
    this.wanted = keys;
    const now = Date.now();
    const due = keys.filter((key) => now - (this.triedAt.get(key) ?? Number.NEGATIVE_INFINITY) > AGAIN_MS);
    if (due.length > 0) await this.fetch(due);
  }

  tryAgain(): void {
    this.triedAt.clear();
    void this.want(this.wanted);
  }

  /** Which of the keys the server keeps a result under; passes on what it finds. */
  async kept(keys: readonly string[]): Promise<ReadonlySet<string>> {
    try {
      const results = await this.requests.results(keys);
      if (results.length > 0) this.onResults(results);
      return new Set(results.map(({ key }) => key));
    } catch {
      // Without connection nothing appears by itself; recomputing waits as the tail line says.
      return new Set();
    }
  }

  end(): void {
    clearTimeout(this.timer);
  }

  private async fetch(keys: readonly string[]): Promise<void> {
    const now = Date.now();
    for (const key of keys) this.triedAt.set(key, now);
    const found = await this.kept(keys);
    for (const key of found) this.triedAt.delete(key);
    if (found.size === keys.length) return;
    clearTimeout(this.timer);
    this.timer = setTimeout(() => void this.want(this.wanted), AGAIN_MS + 100);
  }
}

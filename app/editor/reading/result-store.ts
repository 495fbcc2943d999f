import type { CellResult } from "../../cells/index.ts";

/** Trials kept so that dragging back is instant. */
const MOST_TRIALS = 300;

/** Results by key: those the server keeps, and those tried in this page alone. */
export class ResultStore {
  private readonly kept = new Map<string, CellResult>();
  private readonly trials = new Map<string, CellResult>();
  private readonly lastShown = new Map<string, CellResult>();

  keep(result: CellResult): void {
    this.kept.set(result.key, result);
  }

  keepTrial(result: CellResult): void {
    if (this.kept.has(result.key)) return;
    this.trials.delete(result.key);
    this.trials.set(result.key, result);
    if (this.trials.size > MOST_TRIALS) this.trials.delete(this.trials.keys().next().value ?? "");
  }

  /** The result that the paper shows under a key. A trial is never taken for one: only the server says what is kept. */
  shown(key: string | undefined): CellResult | undefined {
    return key === undefined ? undefined : this.kept.get(key);
  }

  /** Notes what a slot shows, so that it stays until what replaces it is here. */
  showing(slot: string, result: CellResult): void {
    this.lastShown.set(slot, result);
  }

  last(slot: string): CellResult | undefined {
    return this.lastShown.get(slot);
  }

  any(key: string): CellResult | undefined {
    return this.kept.get(key) ?? this.trials.get(key);
  }

  /** Keys that are shown and not here yet. */
  missing(keys: readonly (string | undefined)[]): string[] {
    return [...new Set(keys)].filter((key): key is string => key !== undefined && !this.kept.has(key));
  }
}

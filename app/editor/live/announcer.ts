import type { CellFace, CellStateName } from "../model/types.ts";
import { listed } from "../parts/words.ts";

/** At most one message in this time, in ms: what comes between is told together, newest last. */
const BETWEEN_MS = 2000;

/** Gathers what should be heard and tells it in turn. */
export class Announcer {
  private readonly tell: (message: string) => void;
  private waiting: string[] = [];
  private lastAt = 0;
  private timer: ReturnType<typeof setTimeout> | undefined;
  private states = new Map<string, CellStateName>();

  constructor(tell: (message: string) => void) {
    this.tell = tell;
  }

  say(message: string): void {
    if (this.waiting.at(-1) === message) return;
    this.waiting.push(message);
    if (this.timer !== undefined) return;
    this.timer = setTimeout(() => this.speak(), Math.max(0, this.lastAt + BETWEEN_MS - Date.now()));
  }

  /** Says which cells have changed their state since the last call; the first call says nothing. */
  hearCells(cells: readonly CellFace[]): void {
    const before = this.states;
    this.states = new Map(cells.map(({ slot, state }) => [slot, state]));
    if (before.size === 0) return;
    for (const [state, words] of HEARD) {
      const changed = cells.filter(
        (cell) =>
          cell.state === state && cell.parts.length > 0 && before.get(cell.slot) !== state && before.has(cell.slot),
      );
      if (changed.length > 0) this.say(`${listed(changed.map(({ title }) => title))} ${words}.`);
    }
  }

  end(): void {
    clearTimeout(this.timer);
  }

  private speak(): void {
    this.timer = undefined;
    this.lastAt = Date.now();
    this.tell(this.waiting.join(" "));
    this.waiting = [];
  }
}

const HEARD: readonly (readonly [CellStateName, string])[] = [
  ["outOfDate", "out of date"],
  ["failed", "failed"],
  ["cancelled", "cancelled"],
  ["current", "current"],
];

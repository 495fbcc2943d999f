/** A seeded generator for tests, so that a failure can be had again: mulberry32, from memory; its quality is no matter here. */
export class SeededRandom {
  readonly seed: number;
  #state: number;

  constructor(seed: number) {
    this.seed = seed;
    this.#state = seed >>> 0;
  }

  /** In [0, 1). */
  next(): number {
    this.#state = (this.#state + 0x6d2b79f5) >>> 0;
    let t = this.#state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 32;
  }

  /** A whole number in 0 … n − 1. */
  below(n: number): number {
    return Math.floor(this.next() * n);
  }

  pick<T>(items: readonly T[]): T {
    const item = items[this.below(items.length)];
    if (item === undefined) throw new Error("Nothing to pick from.");
    return item;
  }
}

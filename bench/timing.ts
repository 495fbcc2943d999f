/** Times of repeated runs, in milliseconds. */
export interface Timing {
  readonly first: number;
  readonly median: number;
  readonly least: number;
}

const BUDGET_MS = 1500;
const MOST_RUNS = 200;
const FEWEST_RUNS = 3;

/** Runs `work` for about a second and a half, at least three times, or exactly as often as asked; `warmUp` times before that untimed,
 *  until the code is compiled. */
export function timed(work: () => unknown, options: { readonly runs?: number; readonly warmUp?: number } = {}): Timing {
  for (let i = 0; i < (options.warmUp ?? 0); i += 1) work();
  // once, not before each run: a full collection also takes the compiled code whose objects are gone
  globalThis.gc?.();
  const times: number[] = [];
  const begun = performance.now();
  const goesOn = (): boolean =>
    options.runs === undefined
      ? times.length < FEWEST_RUNS || (performance.now() - begun < BUDGET_MS && times.length < MOST_RUNS)
      : times.length < options.runs;
  while (goesOn()) {
    const start = performance.now();
    work();
    times.push(performance.now() - start);
  }
  return summary(times);
}

/** First, median and least of times in the order in which they were taken. */
export function summary(times: readonly number[]): Timing {
  const first = times[0] ?? 0;
  const sorted = [...times].sort((a, b) => a - b);
  return { first, median: sorted[Math.floor(sorted.length / 2)] ?? 0, least: sorted[0] ?? 0 };
}

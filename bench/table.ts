import type { Timing } from "./timing.ts";

/** One line of a table of times. */
export interface Row {
  readonly name: string;
  readonly timing: Timing;
  /** what it is measured against, and its name for the heading */
  readonly against?: Timing;
  /** largest ratio of medians that is asked for */
  readonly bound?: number;
}

/** Prints times, with ratios of medians and of least times where there is something to compare with. */
export function printRows(heading: string, rows: readonly Row[]): void {
  const width = Math.max(heading.length, ...rows.map(({ name }) => name.length));
  console.log(`\n${heading.padEnd(width)}   first ms  median ms   least ms      ratio  of least`);
  for (const { name, timing, against, bound } of rows) {
    const columns = [timing.first, timing.median, timing.least].map((ms) => ms.toFixed(2).padStart(10));
    if (against !== undefined) {
      const ratio = timing.median / against.median;
      columns.push(ratio.toFixed(4).padStart(10), (timing.least / against.least).toFixed(4).padStart(9));
      if (bound !== undefined) columns.push(` asked: ${bound}${ratio > bound ? ", missed" : ""}`);
    }
    console.log(`${name.padEnd(width)} ${columns.join(" ")}`);
  }
}

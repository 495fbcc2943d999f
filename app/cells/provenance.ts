import type { CellResult, PlannedCell, ShownCell } from "./types.ts";

/** Where a result comes from: how it was computed, in words, and by whom and when it was asked for. */
export interface Provenance {
  /** "Slit contour, 310 nodes; D = 0.5; halfline 1; 4 ms" */
  readonly words: string;
  readonly by: string | null;
  /** ISO time. */
  readonly at: string | null;
}

/** The provenance line of a result; empty words for cells that print nothing. */
export function provenance(planned: PlannedCell, result: CellResult, shown: ShownCell | undefined): Provenance {
  const words =
    planned.show.length === 0 ? "" : [result.method, result.solver, durationWords(result.seconds)].join("; ");
  return { words, by: shown?.by ?? null, at: shown?.at ?? null };
}

/** A duration to one or two digits: "4 ms", "0.4 s", "12 s". */
export function durationWords(seconds: number): string {
  if (seconds < 0.0095) return `${Math.max(1, Math.round(seconds * 1000))} ms`;
  if (seconds < 0.095) return `${Math.round(seconds * 100) * 10} ms`;
  return seconds < 9.5 ? `${seconds.toFixed(1)} s` : `${Math.round(seconds)} s`;
}

import { attempt, computeCell, contextOf, resultOf } from "./compute.ts";
import { KINDS } from "./registry.ts";
import type { CellResult, CellTask, Outcome } from "./types.ts";

/** A computation that is to be done in parts: what all of them share, plain JSON, and how many there are. */
export interface SplitCell {
  readonly status: "split";
  readonly shared: unknown;
  readonly count: number;
}

/** One part of a computation, plain JSON, and the solver's seconds that it took. */
export interface CellPart {
  readonly status: "part";
  readonly part: unknown;
  readonly seconds: number;
}

type Failed = Extract<Outcome, { readonly status: "failed" }>;

/** Computes one cell as `computeCell` does, unless it is to be done in several parts: then says how it splits. */
export function beginCell(
  task: CellTask,
  results: ReadonlyMap<string, CellResult>,
  hooks: Parameters<typeof computeCell>[2] = {},
): Outcome | SplitCell {
  const { parts } = KINDS.get(task.kind) ?? {};
  const isMet = Object.entries(task.needs).every(([id, key]) => results.get(id)?.key === key);
  if (parts === undefined || !isMet) return computeCell(task, results, hooks);
  const split = attempt(task, (): SplitCell => {
    const context = contextOf(task, task.parameters, results, () => undefined);
    return { status: "split", ...parts.split(task.model, context) };
  });
  return split.status === "split" && split.count === 1 ? computeCell(task, results, hooks) : split;
}

/** Computes the part of an index from 0 on. Pure: equal arguments, equal part but for its `seconds`. */
export function computePart(task: CellTask, shared: unknown, index: number): CellPart | Failed {
  const begun = performance.now();
  return attempt(task, (kind): CellPart => {
    const part = kind.parts?.part(shared, index);
    return { status: "part", part, seconds: (performance.now() - begun) / 1000 };
  });
}

/** The cell's outcome from all of its parts, in the order of their indices. */
export function mergeParts(task: CellTask, shared: unknown, parts: readonly CellPart[]): Outcome {
  return attempt(task, (kind) => {
    if (kind.parts === undefined) throw new Error(`A ${task.kind} cell does not split into parts.`);
    const merged = kind.parts.merge(
      shared,
      parts.map(({ part }) => part),
    );
    const seconds = parts.reduce((sum, part) => sum + part.seconds, 0);
    return resultOf(task, kind, merged, seconds);
  });
}

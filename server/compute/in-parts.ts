import type { CellPart, CellTask, Outcome, SplitCell } from "../../app/cells/index.ts";
import type { Database } from "../../db/index.server.ts";
import type { ComputeHooks, Pool } from "./pool.ts";

export interface PartsOptions {
  readonly pool: Pick<Pool, "part" | "merge" | "threads">;
  /** Where parts are kept until the whole is there. */
  readonly parts: Pick<Database["parts"], "find" | "keep">;
}

/** A part that could not be computed: what the cell fails with. */
class PartFailure extends Error {
  readonly outcome: Outcome;
  constructor(outcome: Outcome) {
    super("A part could not be computed.");
    this.outcome = outcome;
  }
}

/**
 * Computes a cell in parts, as many at once as there are threads, each kept as soon as it is there: a computation that was
 * cancelled, or whose process died, goes on where it was. Parts take their turns among other cells.
 * @param hooks `begun` before each part; `progress` in parts
 * @throws as Pool.part
 */
export async function computeInParts(
  { pool, parts }: PartsOptions,
  task: CellTask,
  split: SplitCell,
  hooks: ComputeHooks,
  cancel: AbortSignal,
): Promise<Outcome> {
  const done = new Map<number, CellPart>();
  for (const { index, part, seconds } of await parts.find(task.key)) done.set(index, { status: "part", part, seconds });
  const missing = Array.from({ length: split.count }, (_, index) => index).filter((index) => !done.has(index));
  hooks.progress(done.size, split.count);
  // One lane that ends badly ends the others.
  const stop = new AbortController();
  const signal = AbortSignal.any([cancel, stop.signal]);
  const lane = async (): Promise<void> => {
    for (let index = missing.shift(); index !== undefined; index = missing.shift()) {
      const part = await pool.part(task, split, index, { ...hooks, progress: () => undefined }, signal);
      if (part.status === "failed") throw new PartFailure(part);
      await parts.keep(task.key, { index, part: part.part, seconds: part.seconds });
      done.set(index, part);
      hooks.progress(done.size, split.count);
    }
  };
  try {
    await allOrFirst(Array.from({ length: Math.min(pool.threads, missing.length) }, lane), stop);
  } catch (error) {
    if (error instanceof PartFailure) return error.outcome;
    throw error;
  }
  const inOrder = [...done].sort(([a], [b]) => a - b).map(([, part]) => part);
  return pool.merge(task, split, inOrder, { ...hooks, begun: async () => undefined }, cancel);
}

/** Waits for all; the first that fails stops the others, and its reason is what is thrown. */
async function allOrFirst(lanes: readonly Promise<void>[], stop: AbortController): Promise<void> {
  let first: { readonly error: unknown } | null = null;
  await Promise.all(
    lanes.map((lane) =>
      lane.catch((error: unknown) => {
        first ??= { error };
        stop.abort();
      }),
    ),
  );
  if (first !== null) throw (first as { readonly error: unknown }).error;
}

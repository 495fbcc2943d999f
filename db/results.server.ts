import type { Knex } from "knex";

/** A computed cell as kept: `result` is what app/cells calls a CellResult, and is not looked into here. */
export interface StoredResult {
  readonly key: string;
  readonly kind: string;
  readonly solver: string;
  readonly seconds: number;
  readonly result: unknown;
}

/** Results under these keys, whatever paper they were computed for. For the server's own use: see `ofPaper`. */
export async function find(knex: Knex, keys: readonly string[]): Promise<Map<string, unknown>> {
  if (keys.length === 0) return new Map();
  const rows: { key: string; result: unknown }[] = await knex("results").whereIn("key", keys).select("key", "result");
  return new Map(rows.map((row) => [row.key, row.result]));
}

/** Results under these keys that the paper has shown or computed; the others are left out. */
export async function ofPaper(knex: Knex, paperId: string, keys: readonly string[]): Promise<Map<string, unknown>> {
  if (keys.length === 0) return new Map();
  const rows: { key: string; result: unknown }[] = await knex("results")
    .join("paper_results", "paper_results.key", "results.key")
    .where("paper_results.paper_id", paperId)
    .whereIn("results.key", keys)
    .select("results.key", "results.result");
  return new Map(rows.map((row) => [row.key, row.result]));
}

/** Keeps a result under its key. Equal key, equal result: one that is there already stays, unless `replace`. */
export async function keep(knex: Knex, stored: StoredResult, replace = false): Promise<void> {
  const insert = knex("results")
    .insert({ ...stored, result: JSON.stringify(stored.result) })
    .onConflict("key");
  await (replace ? insert.merge() : insert.ignore());
}

/** Records that a paper shows these results, and who asked for them first. */
export async function recordForPaper(
  knex: Knex,
  paperId: string,
  keys: readonly string[],
  personId: string | null,
): Promise<void> {
  if (keys.length === 0) return;
  await knex("paper_results")
    .insert(keys.map((key) => ({ paper_id: paperId, key, person_id: personId })))
    .onConflict(["paper_id", "key"])
    .ignore();
}

import type { Knex } from "knex";

/** A part of a result that is not whole yet: `part` is not looked into here. */
export interface StoredPart {
  readonly index: number;
  readonly part: unknown;
  /** The solver's own. */
  readonly seconds: number;
}

/** Parts of a computation that nobody goes on with are kept so long. */
const KEPT_FOR = "30 days";

/** The parts that are there under a key, by index. */
export async function find(knex: Knex, key: string): Promise<StoredPart[]> {
  return knex("result_parts").where({ key }).orderBy("index").select("index", "part", "seconds");
}

/** Keeps a part. Equal key and index, equal part: one that is there already stays. */
export async function keep(knex: Knex, key: string, { index, part, seconds }: StoredPart): Promise<void> {
  await knex("result_parts")
    .insert({ key, index, part: JSON.stringify(part), seconds })
    .onConflict(["key", "index"])
    .ignore();
}

/** Removes the parts under a key: the result is whole. */
export async function forget(knex: Knex, key: string): Promise<void> {
  await knex("result_parts").where({ key }).delete();
}

/** Removes parts that nobody has gone on with for a month. */
export async function sweep(knex: Knex): Promise<void> {
  await knex("result_parts")
    .where("created_at", "<", knex.raw("now() - ?::interval", [KEPT_FOR]))
    .delete();
}

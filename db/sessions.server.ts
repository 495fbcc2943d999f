import type { Knex } from "knex";
import type { PersonRow } from "./people.server.ts";

/** A session is noted as used at most this often, so that reading a page does not write a row each time. */
const NOTE_USE_EVERY = "5 minutes";
/** A session that nobody used for so long has ended. */
const IDLE_LIMIT = "14 days";

/** @param hash SHA-256 of the cookie's secret, hex  @param days until the session ends whatever happens */
export async function begin(knex: Knex, hash: string, personId: string, days: number): Promise<void> {
  await knex("sessions").insert({
    id_hash: hash,
    person_id: personId,
    expires_at: knex.raw("now() + make_interval(days => ?)", [days]),
  });
}

/** The person of a live session, or undefined. */
export async function findPerson(knex: Knex, hash: string): Promise<PersonRow | undefined> {
  const row = await live(knex)
    .where({ id_hash: hash })
    .join("people", "people.id", "sessions.person_id")
    .first(
      "people.id",
      "people.name",
      "people.email",
      knex.raw(`last_seen_at < now() - interval '${NOTE_USE_EVERY}' as note`),
    );
  if (!row) return undefined;
  if (row.note) await knex("sessions").where({ id_hash: hash }).update({ last_seen_at: knex.fn.now() });
  return { id: row.id, name: row.name, email: row.email };
}

/** Ends a session; nothing happens where it has ended before. */
export async function end(knex: Knex, hash: string): Promise<void> {
  await knex("sessions").where({ id_hash: hash }).delete();
}

/** Ends all sessions of a person, and returns their hashes. */
export async function endAll(knex: Knex, personId: string): Promise<string[]> {
  const rows = await knex("sessions").where({ person_id: personId }).delete(["id_hash"]);
  return rows.map((row) => row.id_hash);
}

/** Deletes what has ended by itself. */
export async function sweep(knex: Knex): Promise<number> {
  return knex("sessions")
    .where("expires_at", "<=", knex.fn.now())
    .orWhereRaw(`last_seen_at < now() - interval '${IDLE_LIMIT}'`)
    .delete();
}

function live(knex: Knex): Knex.QueryBuilder {
  return knex("sessions")
    .where("expires_at", ">", knex.fn.now())
    .whereRaw(`last_seen_at >= now() - interval '${IDLE_LIMIT}'`);
}

import type { Knex } from "knex";
import { migrationSource } from "./migrations/index.ts";

/** Any fixed number: processes that migrate at the same moment take turns by it. */
const MIGRATION_LOCK = 7_300_141;

/**
 * Brings the database to the newest schema. Safe to call from many processes at once, and again.
 * @throws Error when the database was migrated by a newer version of the program than this one.
 */
export async function migrateToLatest(database: Knex): Promise<void> {
  const lock = await database.client.acquireConnection();
  try {
    await database.raw("select pg_advisory_lock(?)", [MIGRATION_LOCK]).connection(lock);
    await database.migrate.latest({ migrationSource });
  } finally {
    await database.raw("select pg_advisory_unlock(?)", [MIGRATION_LOCK]).connection(lock);
    await database.client.releaseConnection(lock);
  }
}

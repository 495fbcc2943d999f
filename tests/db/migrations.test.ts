import { readFileSync, statSync } from "node:fs";
import { expect, inject, onTestFinished, test } from "vitest";
import { connect } from "../../db/connection.server.ts";
import { migrateToLatest } from "../../db/migrate.server.ts";
import { migrationSource } from "../../db/migrations/index.ts";
import { dumpSchema } from "../../scripts/dump-schema.ts";
import { freshDatabase, freshDatabaseUrl } from "../support/database.ts";

async function emptyDatabaseUrl(): Promise<string> {
  const url = await freshDatabaseUrl();
  const database = connect(url);
  await database.migrate.rollback({ migrationSource }, true);
  await database.destroy();
  return url;
}

test("the migrations, run on an empty database, give the schema that is committed", async () => {
  const url = await freshDatabaseUrl();
  const committed = readFileSync(new URL("../../db/schema.sql", import.meta.url), "utf8");
  expect(await dumpSchema(url)).toBe(committed);
});

test("rolling all migrations back leaves no table of ours, and they run again", async () => {
  const database = connect(await emptyDatabaseUrl());
  onTestFinished(() => database.destroy());
  const left = await database("information_schema.tables")
    .where({ table_schema: "public" })
    .whereNot("table_name", "like", "knex_%");
  expect(left).toEqual([]);
  await migrateToLatest(database);
  expect(await database.schema.hasTable("papers")).toBe(true);
});

test("eight processes that migrate an empty database at once all succeed", async () => {
  const url = await emptyDatabaseUrl();
  const databases = Array.from({ length: 8 }, () => connect(url));
  onTestFinished(async () => {
    await Promise.all(databases.map((database) => database.destroy()));
  });
  await Promise.all(databases.map(migrateToLatest));
  expect(await databases[0]?.schema.hasTable("papers")).toBe(true);
});

test("a database migrated by a newer version is refused", async () => {
  const database = await freshDatabase();
  await database("knex_migrations").insert({ name: "9999_from_the_future", batch: 9, migration_time: new Date() });
  await expect(migrateToLatest(database)).rejects.toThrow(/9999_from_the_future/);
});

test("PostgreSQL runs as somebody else than root and listens on loopback only", async () => {
  const database = connect(inject("templateUrl").replace(/\/[^/]*$/, "/postgres"));
  onTestFinished(() => database.destroy());
  const listen: { rows: { listen_addresses: string }[] } = await database.raw("show listen_addresses");
  expect(listen.rows[0]?.listen_addresses).toBe("127.0.0.1");
  const pid: { rows: { pid: number }[] } = await database.raw("select pg_backend_pid() as pid");
  expect(statSync(`/proc/${pid.rows[0]?.pid}`).uid).not.toBe(0);
});

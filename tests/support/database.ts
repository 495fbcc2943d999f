import { randomUUID } from "node:crypto";
import type { Knex } from "knex";
import { inject, onTestFinished } from "vitest";
import type { TestProject } from "vitest/node";
import { connect } from "../../db/connection.server.ts";
import { migrateToLatest } from "../../db/migrate.server.ts";
import { ensureDatabase, startPostgres, temporaryClusterName } from "../../scripts/private-postgres.mjs";

declare module "vitest" {
  export interface ProvidedContext {
    /** A migrated, empty database, which nobody connects to: the template of each test file's own. */
    templateUrl: string;
  }
}

const TEMPLATE = "halfline_template";

/** vitest's global set-up: a private PostgreSQL of this run's own, with a migrated template. */
export default async function setUp(project: TestProject): Promise<() => Promise<void>> {
  const cluster = await startPostgres(temporaryClusterName(project.name), { temporary: true });
  const templateUrl = await ensureDatabase(cluster, TEMPLATE);
  const template = connect(templateUrl);
  await migrateToLatest(template);
  await template.destroy();

  project.provide("templateUrl", templateUrl);
  return () => cluster.stop();
}

/** URL of a new empty database with today's schema; it goes with the run's cluster. */
export async function freshDatabaseUrl(templateUrl: string = inject("templateUrl")): Promise<string> {
  const name = `halfline_${randomUUID().replaceAll("-", "")}`;
  const admin = connect(templateUrl.replace(/\/[^/]*$/, "/postgres"));
  try {
    await admin.raw("create database ?? template ??", [name, TEMPLATE]);
  } finally {
    await admin.destroy();
  }
  return templateUrl.replace(/\/[^/]*$/, `/${name}`);
}

/** A connection to a new database, closed at the end of the test (or pass `close` to do it in afterAll). */
export async function freshDatabase(close: (end: () => Promise<void>) => void = onTestFinished): Promise<Knex> {
  const database = connect(await freshDatabaseUrl());
  close(() => database.destroy());
  return database;
}

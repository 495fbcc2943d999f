/**
 * The database's schema as committed in db/schema.sql: `DATABASE_URL=… node --import tsx scripts/dump-schema.ts`
 * prints it. The tests compare it with what the migrations give.
 */
import { execFile } from "node:child_process";
import { pathToFileURL } from "node:url";
import { promisify } from "node:util";

/** `pg_dump` of the schema without knex's own tables, comments, settings and blank runs. */
export async function dumpSchema(url: string): Promise<string> {
  const { stdout } = await promisify(execFile)("pg_dump", [
    "--schema-only",
    "--no-owner",
    "--no-privileges",
    "--exclude-table=knex_*",
    url,
  ]);
  return `${stdout
    .split("\n")
    .filter((line) => !/^(--|SET |SELECT pg_catalog|\\(un)?restrict)/.test(line))
    .join("\n")
    .replace(/\n{3,}/g, "\n\n")
    .trim()}\n`;
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  const url = process.env.DATABASE_URL;
  if (!url) throw new Error("DATABASE_URL is not set. It should name a migrated database.");
  process.stdout.write(await dumpSchema(url));
}

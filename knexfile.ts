import type { Knex } from "knex";
import { migrationSource } from "./db/migrations/index.ts";

/** For knex's own command line; the program itself migrates through db/migrate.server.ts. */
const config: Knex.Config = {
  client: "pg",
  connection: process.env.DATABASE_URL,
  migrations: { migrationSource },
};

export default config;

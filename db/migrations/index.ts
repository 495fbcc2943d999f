import type { Knex } from "knex";
import * as ground from "./0001_ground.ts";
import * as longComputations from "./0002_long_computations.ts";

type Migration = { up(knex: Knex): Promise<void>; down(knex: Knex): Promise<void> };

/** Every migration, oldest first. A released one is never edited: write another. */
const MIGRATIONS: readonly (readonly [name: string, migration: Migration])[] = [
  ["0001_ground", ground],
  ["0002_long_computations", longComputations],
];

/** Migrations as code rather than files, so that the built server carries them with it. */
export const migrationSource: Knex.MigrationSource<string> = {
  getMigrations: async () => MIGRATIONS.map(([name]) => name),
  getMigrationName: (name) => name,
  getMigration: async (name) => {
    const found = MIGRATIONS.find(([known]) => known === name);
    if (!found) {
      throw new Error(`There is no migration named "${name}". Add it to the list in db/migrations/index.ts.`);
    }
    return found[1];
  },
};

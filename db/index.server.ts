import type { Knex } from "knex";
import { type Bound, bind } from "./bind.server.ts";
import * as members from "./members.server.ts";
import * as papers from "./papers.server.ts";
import * as people from "./people.server.ts";
import * as sessions from "./sessions.server.ts";

export type { Bound } from "./bind.server.ts";
export { bind } from "./bind.server.ts";
export { connect } from "./connection.server.ts";
export type { MemberRefusal, MemberRow, Role } from "./members.server.ts";
export { migrateToLatest } from "./migrate.server.ts";
export type { PaperRow, ShelfRow } from "./papers.server.ts";
export type { Identity, PersonRow } from "./people.server.ts";

/** All aggregates, bound to one connection pool. */
export interface Database {
  readonly people: Bound<typeof people>;
  readonly sessions: Bound<typeof sessions>;
  readonly papers: Bound<typeof papers>;
  readonly members: Bound<typeof members>;
  /** Resolves when the database answers. */
  answers(): Promise<void>;
}

export function openDatabase(knex: Knex): Database {
  return {
    people: bind(knex, people),
    sessions: bind(knex, sessions),
    papers: bind(knex, papers),
    members: bind(knex, members),
    answers: async () => {
      await knex.raw("select 1");
    },
  };
}

import type { Knex } from "knex";
import { type Bound, bind } from "./bind.server.ts";
import * as computations from "./computations.server.ts";
import * as members from "./members.server.ts";
import * as papers from "./papers.server.ts";
import * as parts from "./parts.server.ts";
import * as people from "./people.server.ts";
import * as results from "./results.server.ts";
import * as sessions from "./sessions.server.ts";
import { type Signal, send } from "./signals.server.ts";
import * as texts from "./texts.server.ts";

export type { UnfinishedWork } from "./computations.server.ts";
export { connect } from "./connection.server.ts";
export type { MemberRow, Role } from "./members.server.ts";
export { migrateToLatest } from "./migrate.server.ts";
export type { PaperRow, ShelfRow } from "./papers.server.ts";
export type { StoredPart } from "./parts.server.ts";
export type { Identity, PersonRow } from "./people.server.ts";
export type { Signal } from "./signals.server.ts";
export { SignalLine } from "./signals.server.ts";
export type { DocumentName, NewUpdate, StoredUpdate } from "./texts.server.ts";

/** All aggregates, bound to one connection pool. */
export interface Database {
  readonly people: Bound<typeof people>;
  readonly sessions: Bound<typeof sessions>;
  readonly papers: Bound<typeof papers>;
  readonly members: Bound<typeof members>;
  readonly texts: Bound<typeof texts>;
  readonly results: Bound<typeof results>;
  readonly parts: Bound<typeof parts>;
  readonly computations: Bound<typeof computations>;
  /** Tells every process that serves papers. */
  send(signal: Signal): Promise<void>;
  /** Resolves when the database answers. */
  answers(): Promise<void>;
}

/** Binds every aggregate to the pool; whoever opened the pool closes it. */
export function openDatabase(knex: Knex): Database {
  return {
    people: bind(knex, people),
    sessions: bind(knex, sessions),
    papers: bind(knex, papers),
    members: bind(knex, members),
    texts: bind(knex, texts),
    results: bind(knex, results),
    parts: bind(knex, parts),
    computations: bind(knex, computations),
    send: (signal) => send(knex, signal),
    answers: async () => {
      await knex.raw("select 1");
    },
  };
}

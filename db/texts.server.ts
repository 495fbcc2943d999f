import type { Knex } from "knex";
import { SIGNALS_CHANNEL } from "./signals.server.ts";

/**
 * The texts of papers as rows: a snapshot and the updates after it. Each paper has two documents, its text and what it
 * shows. Updates are Yjs update v1 bytes and are never read here.
 *
 * Rows of one document are appended under an advisory lock that is held to the commit, so they become visible in the
 * order of their ids: whoever has read up to id n has read every row up to n.
 */
export type DocumentName = "text" | "shown";

export interface StoredUpdate {
  readonly id: number;
  readonly update: Uint8Array;
}

export interface NewUpdate {
  readonly update: Uint8Array;
  /** null: the server itself wrote it. */
  readonly personId: string | null;
}

export interface Appended {
  /** Rows of other processes between the last one the caller knew and its own, oldest first. */
  readonly missed: readonly StoredUpdate[];
  /** Id of the last row appended. */
  readonly last: number;
}

type Row = { id: string; update: Buffer };

/**
 * Appends updates in one transaction and tells the other processes, once, by the id of the last.
 * Resolves after the commit: what it was given is then kept.
 * @param known id of the last row that the caller has read
 * @param sender name of the calling process, so that it can leave its own signal aside
 * @throws when the paper does not exist (foreign key) or the database cannot be reached: nothing is kept then
 */
export async function append(
  knex: Knex,
  paperId: string,
  doc: DocumentName,
  updates: readonly NewUpdate[],
  known: number,
  sender: string,
): Promise<Appended> {
  return knex.transaction(async (transaction) => {
    await lockDocument(transaction, paperId, doc);
    const missed = await after(transaction, paperId, doc, known);
    const rows: { id: string }[] = await transaction("paper_updates")
      .insert(
        updates.map(({ update, personId }) => ({
          paper_id: paperId,
          doc,
          update: Buffer.from(update.buffer, update.byteOffset, update.byteLength),
          person_id: personId,
        })),
      )
      .returning("id");
    const last = Math.max(...rows.map((row) => Number(row.id)));
    await transaction.raw("select pg_notify(?, ?)", [
      SIGNALS_CHANNEL,
      JSON.stringify({ signal: "updates", paperId, doc, last, sender }),
    ]);
    return { missed, last };
  });
}

/**
 * Everything after row `known`, oldest first; from 0, the whole document. A snapshot that others have folded meanwhile
 * stands in the list as one update under the id of the last row in it. One statement, hence one view of the table.
 */
export async function after(knex: Knex, paperId: string, doc: DocumentName, known: number): Promise<StoredUpdate[]> {
  const { rows }: { rows: Row[] } = await knex.raw(
    `select upto as id, state as update from paper_snapshots where paper_id = :paperId and doc = :doc and upto > :known
     union all
     select id, update from paper_updates where paper_id = :paperId and doc = :doc and id > :known
     order by id`,
    { paperId, doc, known },
  );
  return rows.map((row) => ({ id: Number(row.id), update: new Uint8Array(row.update) }));
}

/**
 * Puts `state` in the place of every row up to and with `upto`, in one transaction. Harmless when another process has
 * folded further already.
 */
export async function fold(
  knex: Knex,
  paperId: string,
  doc: DocumentName,
  state: Uint8Array,
  upto: number,
): Promise<void> {
  await knex.transaction(async (transaction) => {
    await lockDocument(transaction, paperId, doc);
    await transaction.raw(
      `insert into paper_snapshots (paper_id, doc, state, upto) values (:paperId, :doc, :state, :upto)
       on conflict (paper_id, doc) do update set state = excluded.state, upto = excluded.upto, created_at = now()
       where paper_snapshots.upto < excluded.upto`,
      { paperId, doc, state: Buffer.from(state.buffer, state.byteOffset, state.byteLength), upto },
    );
    await transaction("paper_updates").where({ paper_id: paperId, doc }).where("id", "<=", upto).delete();
  });
}

/** Taken before an id is drawn and held to the commit; see the head of this file. */
async function lockDocument(transaction: Knex.Transaction, paperId: string, doc: DocumentName): Promise<void> {
  await transaction.raw("select pg_advisory_xact_lock(hashtextextended(?, 0))", [`${doc}/${paperId}`]);
}

import * as Y from "yjs";
import type { Database, DocumentName, NewUpdate, StoredUpdate } from "../../db/index.server.ts";
import { addsNothing } from "./known.ts";

/** Where a room's rows live; `Database["texts"]` and a stand-in for it in tests. */
export type Store = Pick<Database["texts"], "append" | "after" | "fold">;

/** Who takes part in a room: a socket, or the server's own writer. */
export interface Peer {
  /** Something new is committed; sent to every peer but the one it came from. */
  receive(update: Uint8Array): void;
}

/** What a room did at one commit, for those who watch it. */
export interface Commit {
  /** In order of their coming; null: another process or the server itself wrote it. */
  readonly authors: readonly (Author | null)[];
}

export interface Author {
  readonly id: string;
  readonly name: string;
}

export interface RoomOptions {
  readonly paperId: string;
  readonly name: DocumentName;
  readonly store: Store;
  /** Name of this process in the signals. */
  readonly sender: string;
  /** Called after each commit, with the document as it is then. */
  readonly onCommit?: (commit: Commit, room: Room) => void;
  readonly onProblem: (error: unknown, where: string) => void;
}

interface Pending {
  readonly update: Uint8Array;
  readonly from: Peer;
  readonly author: Author | null;
  kept(): void;
  lost(error: unknown): void;
}

/** Rows after which the updates of a document are folded into its snapshot. */
const FOLD_EVERY = 50;
/** A document larger than this takes no more (bytes of all updates since it was loaded, and its state then). */
const LARGEST_DOCUMENT = 16 * 1024 * 1024;

/**
 * One document of one paper in this process. An update is committed before it is applied, acknowledged or passed on:
 *
 *     submit ──▶ queue ──▶ [ one transaction: rows missed + rows of the batch ] ──▶ apply ──▶ peers, acknowledgement
 *                               └─ fails: nothing is applied, `submit` rejects, the page still has its words
 *
 * The document is therefore never ahead of the database, and any other process finds in it what a peer has seen.
 */
export class Room {
  readonly doc = new Y.Doc();
  readonly paperId: string;
  readonly name: DocumentName;
  readonly #options: RoomOptions;
  readonly #peers = new Set<Peer>();
  #queue: Pending[] = [];
  #working: Promise<void> | null = null;
  #behind = false;
  #last = 0;
  #rows = 0;
  #bytes = 0;
  #applyingFrom: Peer | null = null;

  private constructor(options: RoomOptions) {
    this.#options = options;
    this.paperId = options.paperId;
    this.name = options.name;
    this.doc.on("update", (update: Uint8Array) => {
      for (const peer of this.#peers) if (peer !== this.#applyingFrom) peer.receive(update);
    });
  }

  static async load(options: RoomOptions): Promise<Room> {
    const room = new Room(options);
    room.#take(await options.store.after(options.paperId, options.name, 0));
    return room;
  }

  /** True when nothing was ever written. */
  get isEmpty(): boolean {
    return this.#last === 0;
  }

  join(peer: Peer): void {
    this.#peers.add(peer);
  }

  leave(peer: Peer): void {
    this.#peers.delete(peer);
  }

  /** True when `update` would make the document too large. */
  isTooLarge(update: Uint8Array): boolean {
    return this.#bytes + update.byteLength > LARGEST_DOCUMENT;
  }

  /** Resolves when the update is committed and applied; rejects when it could not be committed, and then it is not applied. */
  submit(update: Uint8Array, from: Peer, author: Author | null): Promise<void> {
    return new Promise((kept, lost) => {
      this.#queue.push({ update, from, author, kept, lost });
      this.#wake();
    });
  }

  /** Reads what other processes have committed since. */
  catchUp(last: number): void {
    if (last <= this.#last) return;
    this.#behind = true;
    this.#wake();
  }

  /** Resolves when nothing is queued. */
  async settled(): Promise<void> {
    while (this.#working) await this.#working;
  }

  #wake(): void {
    this.#working ??= this.#work().finally(() => {
      this.#working = null;
      if (this.#queue.length > 0) this.#wake();
    });
  }

  async #work(): Promise<void> {
    while (this.#queue.length > 0 || this.#behind) {
      const batch = this.#queue;
      this.#queue = [];
      this.#behind = false;
      try {
        await this.#commit(batch);
      } catch (error) {
        this.#options.onProblem(error, "commit");
        for (const pending of batch) pending.lost(error);
      }
      await this.#foldWhenDue();
    }
  }

  async #commit(batch: readonly Pending[]): Promise<void> {
    const { store, paperId, name, sender } = this.#options;
    const fresh = batch.filter((pending) => !addsNothing(this.doc, pending.update));
    if (fresh.length === 0) {
      if (batch.length === 0) this.#take(await store.after(paperId, name, this.#last), true);
    } else {
      const rows = runsByAuthor(fresh);
      const { missed, last } = await store.append(paperId, name, rows, this.#last, sender);
      this.#take(missed, true);
      for (const pending of fresh) this.#apply(pending.update, pending.from);
      this.#last = last;
      this.#rows += rows.length;
    }
    for (const pending of batch) pending.kept();
    if (fresh.length > 0) this.#options.onCommit?.({ authors: fresh.map(({ author }) => author) }, this);
  }

  #take(rows: readonly StoredUpdate[], tell = false): void {
    for (const row of rows) {
      this.#apply(row.update, null);
      this.#last = row.id;
    }
    this.#rows += rows.length;
    if (tell && rows.length > 0) this.#options.onCommit?.({ authors: [null] }, this);
  }

  #apply(update: Uint8Array, from: Peer | null): void {
    this.#applyingFrom = from;
    this.#bytes += update.byteLength;
    try {
      Y.applyUpdate(this.doc, update);
    } catch (error) {
      // It is committed and was readable; one update that cannot be integrated must not keep the others from the text.
      this.#options.onProblem(error, "apply");
    } finally {
      this.#applyingFrom = null;
    }
  }

  async #foldWhenDue(): Promise<void> {
    if (this.#rows < FOLD_EVERY) return;
    const { store, paperId, name } = this.#options;
    this.#rows = 0;
    try {
      const state = Y.encodeStateAsUpdate(this.doc);
      await store.fold(paperId, name, state, this.#last);
      this.#bytes = state.byteLength;
    } catch (error) {
      // The rows are still there; the next fold takes them along.
      this.#options.onProblem(error, "fold");
    }
  }
}

/** One row for each run of updates by the same person, so that the record keeps who wrote what. */
function runsByAuthor(batch: readonly Pending[]): NewUpdate[] {
  const runs: { personId: string | null; updates: Uint8Array[] }[] = [];
  for (const { update, author } of batch) {
    const personId = author?.id ?? null;
    const run = runs.at(-1);
    if (run && run.personId === personId) run.updates.push(update);
    else runs.push({ personId, updates: [update] });
  }
  return runs.map(({ personId, updates }) => ({ personId, update: Y.mergeUpdates(updates) }));
}

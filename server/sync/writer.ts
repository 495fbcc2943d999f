import * as Y from "yjs";
import type { Author, Peer, Room } from "./room.ts";

/**
 * The server as a peer of a room: it changes a document of its own, whose update then goes the way of every update
 * (committed, then applied and passed on).
 */
export class Writer implements Peer {
  readonly #room: Room;
  #doc: Y.Doc;

  constructor(room: Room) {
    this.#room = room;
    this.#doc = copyOf(room.doc);
    room.join(this);
  }

  receive(update: Uint8Array): void {
    Y.applyUpdate(this.#doc, update, this);
  }

  /** Resolves when the change is committed. @param change sees the document with all that this writer wrote before */
  async write(change: (doc: Y.Doc) => void, author: Author | null = null): Promise<void> {
    const doc = this.#doc;
    let update: Uint8Array | null = null;
    const listen = (bytes: Uint8Array) => {
      update = bytes;
    };
    doc.on("update", listen);
    try {
      doc.transact(() => change(doc));
    } finally {
      doc.off("update", listen);
    }
    if (update === null) return;
    try {
      await this.#room.submit(update, this, author);
    } catch (error) {
      // What was not kept must not stay in the copy either.
      this.#doc = copyOf(this.#room.doc);
      throw error;
    }
  }

  leave(): void {
    this.#room.leave(this);
    this.#doc.destroy();
  }
}

function copyOf(doc: Y.Doc): Y.Doc {
  const copy = new Y.Doc();
  Y.applyUpdate(copy, Y.encodeStateAsUpdate(doc));
  return copy;
}

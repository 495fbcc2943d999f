import { Awareness, applyAwarenessUpdate, encodeAwarenessUpdate, removeAwarenessStates } from "y-protocols/awareness";
import * as Y from "yjs";
import type { Admission } from "./admission.ts";
import { presenceFrame } from "./frames.ts";
import { certifyPresence } from "./presence.ts";

/** A page's socket, as far as company is concerned. */
export interface Companion {
  readonly admission: Admission;
  send(frame: Uint8Array): void;
}

/**
 * Who is in a paper's text just now, and where their carets are. Never stored.
 * Members are shown to each other under the names of their sessions; visitors of the specimen neither see nor are seen.
 */
export class Company {
  readonly #awareness: Awareness;
  readonly #doc = new Y.Doc();
  readonly #owners = new Map<number, object>();
  readonly #members = new Map<Companion, Set<number>>();

  constructor() {
    this.#awareness = new Awareness(this.#doc);
    this.#awareness.setLocalState(null);
    this.#awareness.on("update", (change: { added: number[]; updated: number[]; removed: number[] }) => {
      const clients = [...change.added, ...change.updated, ...change.removed];
      const frame = presenceFrame(encodeAwarenessUpdate(this.#awareness, clients));
      // Back to the sender as well: it tells it that the connection lives.
      for (const member of this.#members.keys()) member.send(frame);
    });
  }

  join(companion: Companion): void {
    if (companion.admission.role === null) return;
    this.#members.set(companion, new Set());
    this.greet(companion);
  }

  /** @throws Error when the presence cannot be read */
  hear(companion: Companion, presence: Uint8Array): void {
    const owned = this.#members.get(companion);
    const { visitor } = companion.admission;
    if (!owned || !visitor) return;
    const claims = {
      owner: (client: number) => this.#owners.get(client),
      claim: (client: number, owner: object) => this.#owners.set(client, owner),
    };
    const certified = certifyPresence(presence, companion, visitor, claims, owned);
    if (certified) applyAwarenessUpdate(this.#awareness, certified, companion);
  }

  /** Tells a member who is there. */
  greet(companion: Companion): void {
    const clients = [...this.#awareness.getStates().keys()];
    if (!this.#members.has(companion) || clients.length === 0) return;
    companion.send(presenceFrame(encodeAwarenessUpdate(this.#awareness, clients)));
  }

  leave(companion: Companion): void {
    const owned = this.#members.get(companion);
    if (!owned) return;
    this.#members.delete(companion);
    for (const client of owned) this.#owners.delete(client);
    removeAwarenessStates(this.#awareness, [...owned], companion);
    // A page that comes back begins with the clock it had.
    for (const client of owned) this.#awareness.meta.delete(client);
  }

  destroy(): void {
    this.#awareness.destroy();
    this.#doc.destroy();
  }
}

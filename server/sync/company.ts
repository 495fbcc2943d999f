import { Awareness, applyAwarenessUpdate, encodeAwarenessUpdate, removeAwarenessStates } from "y-protocols/awareness";
import * as Y from "yjs";
import type { Admission } from "./admission.ts";
import { presenceFrame } from "./frames.ts";
import { certifyPresence, clientOf } from "./presence.ts";

/** A page's socket, as far as company is concerned. */
export interface Companion {
  readonly admission: Admission;
  send(frame: Uint8Array): void;
}

/**
 * Tells the other processes of one page that is here, or (null) asks them who is there. They give it to
 * `hearElsewhere`, or call `answerElsewhere`, of the same paper's company.
 */
export type TellElsewhere = (presence: Uint8Array | null) => void;

/** Carets move with every key; other processes hear of them this often at most. */
const TELL_EVERY_MS = 400;

/** Owner of the client ids of pages at other processes, and origin of what comes from there. */
const ELSEWHERE = {};

/**
 * Who is in a paper's text just now, and where their carets are. Never stored.
 * Members are shown to each other under the names of their sessions; visitors of the specimen neither see nor are seen.
 */
export class Company {
  readonly #awareness: Awareness;
  readonly #doc = new Y.Doc();
  readonly #tellElsewhere: TellElsewhere;
  readonly #owners = new Map<number, object>();
  readonly #members = new Map<Companion, Set<number>>();
  readonly #untold = new Set<number>();
  #telling: NodeJS.Timeout | null = null;

  constructor(tellElsewhere: TellElsewhere) {
    this.#tellElsewhere = tellElsewhere;
    this.#awareness = new Awareness(this.#doc);
    this.#awareness.setLocalState(null);
    this.#awareness.on("update", (change: Record<"added" | "updated" | "removed", number[]>, origin: unknown) => {
      const clients = [...change.added, ...change.updated, ...change.removed];
      const frame = presenceFrame(encodeAwarenessUpdate(this.#awareness, clients));
      // Back to the sender as well: it tells it that the connection lives.
      for (const member of this.#members.keys()) member.send(frame);
      if (origin !== ELSEWHERE) this.#tellSoon(clients);
    });
  }

  join(companion: Companion): void {
    if (companion.admission.role === null) return;
    if (this.#members.size === 0) this.#tellElsewhere(null);
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

  /** One page at another process, certified there. */
  hearElsewhere(presence: Uint8Array): void {
    const client = clientOf(presence);
    // A page that has come over from there meanwhile is ours.
    if ((this.#owners.get(client) ?? ELSEWHERE) !== ELSEWHERE) return;
    applyAwarenessUpdate(this.#awareness, presence, ELSEWHERE);
    if (this.#awareness.states.has(client)) this.#owners.set(client, ELSEWHERE);
    else this.#owners.delete(client);
  }

  /** Another process asks who is here. */
  answerElsewhere(): void {
    this.#tellSoon([...this.#members.values()].flatMap((owned) => [...owned]));
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
    this.#tellNow();
    // A page that comes back begins with the clock it had.
    for (const client of owned) this.#awareness.meta.delete(client);
  }

  destroy(): void {
    if (this.#telling) clearTimeout(this.#telling);
    this.#awareness.destroy();
    this.#doc.destroy();
  }

  #tellSoon(clients: readonly number[]): void {
    for (const client of clients) this.#untold.add(client);
    this.#telling ??= setTimeout(() => this.#tellNow(), TELL_EVERY_MS);
  }

  #tellNow(): void {
    if (this.#telling) clearTimeout(this.#telling);
    this.#telling = null;
    const clients = [...this.#untold].filter((client) => this.#awareness.meta.has(client));
    this.#untold.clear();
    // One at a time: each fits into a signal.
    for (const client of clients) this.#tellElsewhere(encodeAwarenessUpdate(this.#awareness, [client]));
  }
}

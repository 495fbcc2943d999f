import type { DocumentName } from "../../db/index.server.ts";
import { Company, type TellElsewhere } from "./company.ts";
import { Room, type RoomOptions } from "./room.ts";
import { Writer } from "./writer.ts";

/** A room in use is kept, and for a while after, since a page that reloads comes back at once. */
const LINGER_MS = 30_000;

/** A loaded room with what hangs on it. */
export class OpenRoom {
  readonly room: Room;
  readonly company: Company;
  #writer: Writer | null = null;

  constructor(room: Room, tellElsewhere: TellElsewhere) {
    this.room = room;
    this.company = new Company(tellElsewhere);
  }

  /** The server's own hand in the room. */
  get writer(): Writer {
    this.#writer ??= new Writer(this.room);
    return this.#writer;
  }

  async close(): Promise<void> {
    await this.room.settled();
    this.#writer?.leave();
    this.company.destroy();
    this.room.doc.destroy();
  }
}

interface Entry {
  readonly opened: Promise<OpenRoom>;
  users: number;
  linger: NodeJS.Timeout | null;
}

export type RoomsOptions = Pick<RoomOptions, "store" | "sender" | "onCommit" | "onProblem"> & {
  readonly onLoad?: (room: Room) => void;
  readonly onUnload?: (room: Room) => void;
  /** Tells the other processes who is in a paper; see TellElsewhere. */
  readonly tellPresence: (paperId: string, presence: Uint8Array | null) => void;
};

/** The rooms of this process: each document of each paper is loaded once, however many use it. */
export class Rooms {
  readonly #options: RoomsOptions;
  readonly #entries = new Map<string, Entry>();

  constructor(options: RoomsOptions) {
    this.#options = options;
  }

  /** Loads the room if need be and keeps it until `release` is called as often as `open`. */
  async open(paperId: string, name: DocumentName): Promise<OpenRoom> {
    const id = idOf(paperId, name);
    let entry = this.#entries.get(id);
    if (!entry) {
      const opened = Room.load({ ...this.#options, paperId, name }).then((room) => {
        this.#options.onLoad?.(room);
        return new OpenRoom(room, (presence) => this.#options.tellPresence(paperId, presence));
      });
      entry = { opened, users: 0, linger: null };
      this.#entries.set(id, entry);
    }
    entry.users += 1;
    if (entry.linger) clearTimeout(entry.linger);
    entry.linger = null;
    try {
      return await entry.opened;
    } catch (error) {
      this.#entries.delete(id);
      throw error;
    }
  }

  release(paperId: string, name: DocumentName): void {
    const id = idOf(paperId, name);
    const entry = this.#entries.get(id);
    if (!entry) return;
    entry.users -= 1;
    if (entry.users > 0) return;
    entry.linger = setTimeout(() => void this.#close(id, entry), LINGER_MS);
    entry.linger.unref();
  }

  async using<T>(paperId: string, name: DocumentName, use: (open: OpenRoom) => T | Promise<T>): Promise<T> {
    const open = await this.open(paperId, name);
    try {
      return await use(open);
    } finally {
      this.release(paperId, name);
    }
  }

  /** Another process has committed row `last`: read it, where the room is loaded. */
  async heard(paperId: string, name: DocumentName, last: number): Promise<void> {
    const entry = this.#entries.get(idOf(paperId, name));
    if (entry) (await entry.opened).room.catchUp(last);
  }

  /** Another process tells who is in a paper there, or asks who is here. */
  async heardPresence(paperId: string, presence: Uint8Array | null): Promise<void> {
    const entry = this.#entries.get(idOf(paperId, "text"));
    if (!entry) return;
    const { company } = await entry.opened;
    if (presence) company.hearElsewhere(presence);
    else company.answerElsewhere();
  }

  /** After a break in the signals every room may be behind. */
  async catchUpAll(): Promise<void> {
    for (const entry of this.#entries.values()) (await entry.opened).room.catchUp(Number.POSITIVE_INFINITY);
  }

  /** Waits for what is queued and lets go of everything. */
  async close(): Promise<void> {
    await Promise.all([...this.#entries].map(([id, entry]) => this.#close(id, entry)));
  }

  async #close(id: string, entry: Entry): Promise<void> {
    if (entry.linger) clearTimeout(entry.linger);
    this.#entries.delete(id);
    const open = await entry.opened.catch(() => null);
    if (!open) return;
    this.#options.onUnload?.(open.room);
    await open.close();
  }
}

function idOf(paperId: string, name: DocumentName): string {
  return `${name}/${paperId}`;
}

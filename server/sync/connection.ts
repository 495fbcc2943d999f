import type { WebSocket } from "ws";
import { CLOSE } from "../../app/editor/protocol.ts";
import type { Admission } from "./admission.ts";
import type { Companion, Company } from "./company.ts";
import {
  checkUpdate,
  type Frame,
  HEARTBEAT_FRAME,
  keptFrame,
  missingFrame,
  readFrame,
  stateFrame,
  updateFrame,
} from "./frames.ts";
import { TokenBucket } from "./rate.ts";
import type { Peer, Room } from "./room.ts";

/** Frames and bytes that a page may send: a burst, and each second. Typing fast gives some ten frames a second. */
const FRAMES_BURST = 2_000;
const FRAMES_PER_SECOND = 200;
const BYTES_BURST = 24 * 1024 * 1024;
const BYTES_PER_SECOND = 1024 * 1024;
/** How often a page may ask for all it lacks, which is once a connection: a burst, and each second. */
const STATES_BURST = 20;
const STATES_PER_SECOND = 0.5;
/** Bytes of a frame of a page that does not write: it has little to say. */
const LARGEST_FRAME_OF_READER = 64 * 1024;
/** A page that reads so slowly that more than this waits for it is let go; it comes back and asks for what it lacks. */
const MOST_WAITING_BYTES = 32 * 1024 * 1024;
const HEARTBEAT_MS = 15_000;
/** Characters of a closing's reason: the protocol has room for 123 bytes. */
const LONGEST_REASON = 60;

/**
 * One page's socket in a room.
 *
 *     open ──frames──▶ open ──refused frame, lost role or session, server closing──▶ closing ──▶ closed (left the room)
 *
 * A page without the right to write is never asked for its state and is dropped when it sends an update.
 */
export class Connection implements Peer, Companion {
  readonly admission: Admission;
  /** The cookies it came with, by which its session is looked up again. */
  readonly cookie: string | undefined;
  readonly #socket: WebSocket;
  readonly #room: Room;
  readonly #company: Company | null;
  readonly #frames = new TokenBucket(FRAMES_BURST, FRAMES_PER_SECOND, Date.now());
  readonly #bytes = new TokenBucket(BYTES_BURST, BYTES_PER_SECOND, Date.now());
  readonly #states = new TokenBucket(STATES_BURST, STATES_PER_SECOND, Date.now());
  readonly #heartbeat: NodeJS.Timeout;
  readonly #onLeave: (connection: Connection) => void;
  #answered = true;
  #joined = false;
  #updatesKept = 0;
  #gone = false;

  constructor(
    socket: WebSocket,
    room: Room,
    company: Company | null,
    admission: Admission,
    cookie: string | undefined,
    onLeave: (connection: Connection) => void,
  ) {
    this.#socket = socket;
    this.#room = room;
    this.#company = company;
    this.admission = admission;
    this.cookie = cookie;
    this.#onLeave = onLeave;
    this.#heartbeat = setInterval(() => this.#beat(), HEARTBEAT_MS);
    socket.on("message", (data) => this.#hear(data as Buffer));
    socket.on("pong", () => {
      this.#answered = true;
    });
    socket.on("close", () => this.#leave());
    // A broken connection is followed by "close"; a frame above the size limit is closed by ws itself.
    socket.on("error", () => {});

    room.join(this);
    if (admission.writes) this.send(stateFrame(room.doc));
    company?.join(this);
  }

  receive(update: Uint8Array): void {
    this.send(updateFrame(update));
  }

  send(frame: Uint8Array): void {
    if (this.#socket.readyState !== this.#socket.OPEN) return;
    if (this.#socket.bufferedAmount > MOST_WAITING_BYTES) this.#socket.terminate();
    else this.#socket.send(frame);
  }

  close(code: number, reason: string): void {
    this.#leave();
    this.#socket.close(code, reason);
  }

  #hear(data: Buffer): void {
    if (this.#gone) return;
    const now = Date.now();
    if (!this.admission.writes && data.byteLength > LARGEST_FRAME_OF_READER) {
      this.close(CLOSE.tooLarge, "A page that only reads has less to say.");
      return;
    }
    if (!this.#frames.take(1, now) || !this.#bytes.take(data.byteLength, now)) {
      this.close(CLOSE.again, "Too much came at once.");
      return;
    }
    const frame = this.#understand(() => readFrame(new Uint8Array(data.buffer, data.byteOffset, data.byteLength)));
    if (frame) this.#answer(frame);
  }

  /** What `read` gives; null when the page sent something that cannot be read, and is closed for it. */
  #understand<T>(read: () => T): T | null {
    try {
      return read();
    } catch (error) {
      const words = error instanceof Error ? error.message : "";
      this.close(CLOSE.unreadable, `A frame could not be read. ${words}`.slice(0, LONGEST_REASON));
      return null;
    }
  }

  #answer(frame: Frame): void {
    switch (frame.frame) {
      case "state":
        if (this.#states.take(1, Date.now())) this.send(missingFrame(this.#room.doc, frame.stateVector));
        else this.close(CLOSE.again, "The whole text was asked for too often.");
        break;
      case "update":
        this.#takeUpdate(frame.update, frame.joining);
        break;
      case "presence":
        this.#understand(() => this.#company?.hear(this, frame.presence));
        break;
      case "askPresence":
        this.#company?.greet(this);
        break;
    }
  }

  #takeUpdate(update: Uint8Array, joining: boolean): void {
    const { writes, visitor } = this.admission;
    if (!writes || !visitor) {
      this.close(CLOSE.noAccess, "Only the authors of this paper write in it.");
      return;
    }
    if (!this.#understand(() => checkUpdate(update))) return;
    if (this.#room.isTooLarge(update)) {
      this.close(CLOSE.tooLarge, "The paper would become larger than is allowed.");
      return;
    }
    this.#room.submit(update, this, visitor).then(
      () => {
        if (joining) this.#joined = true;
        else this.#updatesKept += 1;
        this.send(keptFrame(this.#room.doc, this.#joined, this.#updatesKept));
      },
      // The page has its words still and offers them again when it is back.
      () => this.close(CLOSE.again, "The words could not be kept. They will be offered again."),
    );
  }

  #beat(): void {
    if (!this.#answered) {
      this.#socket.terminate();
      return;
    }
    this.#answered = false;
    this.#socket.ping();
    this.send(HEARTBEAT_FRAME);
  }

  #leave(): void {
    if (this.#gone) return;
    this.#gone = true;
    clearInterval(this.#heartbeat);
    this.#room.leave(this);
    this.#company?.leave(this);
    this.#onLeave(this);
  }
}

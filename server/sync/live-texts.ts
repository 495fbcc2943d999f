import { randomUUID } from "node:crypto";
import type * as Y from "yjs";
import type { CellWork, ParameterChange, ShownCell } from "../../app/cells/index.ts";
import type { PaperText, ShownPaper, TextService } from "../../app/context.ts";
import { BIBLIOGRAPHY_NAME, CLOSE, SHOWN_NAMES, TEXT_NAME } from "../../app/editor/protocol.ts";
import { type Database, type Signal, SignalLine } from "../../db/index.server.ts";
import { type Admission, admitVisitor, type Identify } from "./admission.ts";
import type { Connection } from "./connection.ts";
import { Rooms } from "./rooms.ts";
import { bibliographyOf, TextWatch, textOf } from "./watch.ts";

/** Sessions and roles of open sockets are looked up again this often, besides at once when a change is told. */
const RECHECK_MS = 60_000;

export interface LiveTextsOptions {
  readonly database: Database;
  /** Of the same database: one connection outside the pool hears the other processes. */
  readonly databaseUrl: string;
  readonly identify: Identify;
  readonly onProblem: (error: unknown, where: string) => void;
}

export type SignalListener = (signal: Signal) => void;
/** Called when a paper's "shown" document has been loaded by this process. */
export type ShownListener = (paperId: string) => void;

/** The live texts of all papers, as this process holds them, and the sockets that are open to them. */
export class LiveTexts implements TextService {
  /** Name of this process among those that serve the same papers. */
  readonly processName = randomUUID();
  readonly rooms: Rooms;
  readonly signals: SignalLine;
  readonly connections = new Set<Connection>();
  readonly #options: LiveTextsOptions;
  readonly #listeners = new Set<SignalListener>();
  readonly #telling = new Set<Promise<void>>();
  readonly #shownListeners = new Set<ShownListener>();
  readonly #recheck: NodeJS.Timeout;

  private constructor(options: LiveTextsOptions) {
    this.#options = options;
    const { database, onProblem } = options;
    const watch = new TextWatch({
      changed: (paperId, changes) => this.#recordChanges(paperId, changes),
      describe: (paperId, words) => database.papers.describe(paperId, words),
      onProblem,
    });
    this.rooms = new Rooms({
      store: database.texts,
      sender: this.processName,
      onLoad: (room) => {
        watch.begin(room);
        if (room.name === "shown") for (const listener of this.#shownListeners) listener(room.paperId);
      },
      onCommit: (commit, room) => watch.committed(commit, room),
      onUnload: (room) => watch.end(room),
      tellPresence: (paperId, presence) => {
        const words = presence && Buffer.from(presence).toString("base64");
        const told = this.send({ signal: "presence", paperId, presence: words })
          .catch((error) => onProblem(error, "presence"))
          .finally(() => this.#telling.delete(told));
        this.#telling.add(told);
      },
      onProblem,
    });
    this.signals = new SignalLine(options.databaseUrl, {
      signal: (signal) => this.#hear(signal),
      resumed: () => void this.rooms.catchUpAll().catch((error) => onProblem(error, "catching up")),
      problem: (error) => onProblem(error, "signals"),
    });
    this.#recheck = setInterval(() => void this.#recheckSockets(() => true), RECHECK_MS);
    this.#recheck.unref();
  }

  static async open(options: LiveTextsOptions): Promise<LiveTexts> {
    const texts = new LiveTexts(options);
    await texts.signals.open();
    return texts;
  }

  async read(paperId: string): Promise<PaperText> {
    return this.rooms.using(paperId, "text", ({ room }) => {
      if (room.isEmpty) throw new Error(`Paper ${paperId} has no text.`);
      return { text: textOf(room), bibliography: bibliographyOf(room) };
    });
  }

  /** True when nothing was ever written in the paper. */
  async isEmpty(paperId: string): Promise<boolean> {
    return this.rooms.using(paperId, "text", ({ room }) => room.isEmpty);
  }

  async create(paperId: string, text: PaperText, personId: string | null): Promise<void> {
    await this.rooms.using(paperId, "text", async ({ room, writer }) => {
      if (!room.isEmpty) throw new Error(`Paper ${paperId} has a text already.`);
      const author = personId === null ? null : { id: personId, name: "" };
      await writer.write((doc) => {
        doc.getText(TEXT_NAME).insert(0, text.text);
        doc.getText(BIBLIOGRAPHY_NAME).insert(0, text.bibliography);
      }, author);
    });
  }

  async shown(paperId: string): Promise<ShownPaper> {
    return this.rooms.using(paperId, "shown", ({ room }) => shownOf(room.doc));
  }

  /** Changes what a paper shows. Resolves when that is committed. */
  async show(paperId: string, change: (maps: ShownMaps) => void): Promise<void> {
    await this.rooms.using(paperId, "shown", ({ writer }) => writer.write((doc) => change(shownMaps(doc))));
  }

  async closeSockets(paperId: string, personId: string | null): Promise<void> {
    await this.#recheckSockets((connection) => isOn(connection, paperId, personId));
    await this.send({ signal: "access", paperId, personId });
  }

  async closeSession(sessionHash: string): Promise<void> {
    await this.#recheckSockets((connection) => connection.admission.visitor?.sessionHash === sessionHash);
    await this.send({ signal: "session", sessionHash });
  }

  /** Tells the other processes. */
  async send(signal: { readonly signal: string } & Readonly<Record<string, unknown>>): Promise<void> {
    await this.#options.database.send({ ...signal, sender: this.processName });
  }

  /** Hears what other processes tell, from now on. */
  listen(listener: SignalListener): void {
    this.#listeners.add(listener);
  }

  /** Is told of every "shown" document that this process loads from now on. */
  onShownLoaded(listener: ShownListener): void {
    this.#shownListeners.add(listener);
  }

  /** Closes the sockets, waits for what is being committed, and ends. */
  async close(): Promise<void> {
    clearInterval(this.#recheck);
    for (const connection of this.connections) connection.close(CLOSE.again, "The server closes for a moment.");
    await this.rooms.close();
    await Promise.all(this.#telling);
    await this.signals.close();
  }

  #hear(signal: Signal): void {
    if (signal.sender === this.processName) return;
    const { paperId, doc, last, personId, sessionHash, presence } = signal;
    if (signal.signal === "updates" && typeof paperId === "string" && (doc === "text" || doc === "shown")) {
      this.rooms
        .heard(paperId, doc, Number(last))
        .catch((error) => this.#options.onProblem(error, "updates of another process"));
    } else if (signal.signal === "presence" && typeof paperId === "string") {
      const words = typeof presence === "string" ? Uint8Array.from(Buffer.from(presence, "base64")) : null;
      this.rooms
        .heardPresence(paperId, words)
        .catch((error) => this.#options.onProblem(error, "presence of another process"));
    } else if (signal.signal === "access" && typeof paperId === "string") {
      const person = typeof personId === "string" ? personId : null;
      void this.#recheckSockets((connection) => isOn(connection, paperId, person));
    } else if (signal.signal === "session") {
      void this.#recheckSockets((connection) => connection.admission.visitor?.sessionHash === sessionHash);
    }
    for (const listener of this.#listeners) listener(signal);
  }

  async #recheckSockets(concerns: (connection: Connection) => boolean): Promise<void> {
    for (const connection of [...this.connections].filter(concerns)) {
      try {
        await this.#recheckSocket(connection);
      } catch (error) {
        // The database cannot be asked: what was true stays true until it can.
        this.#options.onProblem(error, "recheck");
      }
    }
  }

  async #recheckSocket(connection: Connection): Promise<void> {
    const { admission, cookie } = connection;
    const visitor = await this.#options.identify(cookie);
    if (admission.visitor && visitor?.sessionHash !== admission.visitor.sessionHash) {
      connection.close(CLOSE.signedOut, "The session has ended.");
      return;
    }
    const { papers } = this.#options.database;
    if (!(await papers.find(admission.paperId))) {
      connection.close(CLOSE.noSuchPaper, "The paper was deleted.");
      return;
    }
    const now = await admitVisitor(admission, visitor, papers);
    if (!now.admitted) connection.close(now.code, now.reason);
    else if (now.role !== admission.role) connection.close(CLOSE.roleChanged, "The role on this paper has changed.");
  }

  async #recordChanges(paperId: string, changes: Readonly<Record<string, ParameterChange>>): Promise<void> {
    await this.show(paperId, ({ changes: map }) => {
      for (const [name, change] of Object.entries(changes)) map.set(name, change);
    });
  }
}

/** The maps of a "shown" document. */
export interface ShownMaps {
  readonly cells: Y.Map<ShownCell>;
  readonly work: Y.Map<CellWork>;
  readonly changes: Y.Map<ParameterChange>;
}

function shownMaps(doc: Y.Doc): ShownMaps {
  return {
    cells: doc.getMap<ShownCell>(SHOWN_NAMES.cells),
    work: doc.getMap<CellWork>(SHOWN_NAMES.work),
    changes: doc.getMap<ParameterChange>(SHOWN_NAMES.changes),
  };
}

function shownOf(doc: Y.Doc): ShownPaper {
  const { cells, work, changes } = shownMaps(doc);
  return { cells: cells.toJSON(), work: work.toJSON(), changes: changes.toJSON() };
}

function isOn(connection: Connection, paperId: string, personId: string | null): boolean {
  const { admission }: { admission: Admission } = connection;
  return admission.paperId === paperId && (personId === null || admission.visitor?.id === personId);
}

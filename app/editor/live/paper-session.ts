import { Awareness } from "y-protocols/awareness";
import { WebsocketProvider } from "y-websocket";
import * as Y from "yjs";
import type { CellWork, ParameterChange, ShownCell } from "../../cells/index.ts";
import { type Kept, watchKept } from "../kept.ts";
import { BIBLIOGRAPHY_NAME, SHOWN_NAMES, SOCKET_PATHS, TEXT_NAME } from "../protocol.ts";
import { type Connection, closingOf } from "./connection.ts";
import { JoinedChanges } from "./joined-changes.ts";
import { followNetwork } from "./network.ts";
import { gatherOthersWords } from "./others-words.ts";
import { forgetPrivateCopy } from "./private-copies.ts";
import { openPrivateCopy } from "./private-copy.ts";

/** After a joining, how long the others' names are waited for, in ms. */
const NAMES_MS = 400;

/** What a paper shows, in the form in which pages and workers pass it on. */
export interface ShownRecords {
  readonly cells: Readonly<Record<string, ShownCell>>;
  readonly work: Readonly<Record<string, CellWork>>;
  readonly changes: Readonly<Record<string, ParameterChange>>;
}

export interface SessionOptions {
  readonly paperId: string;
  /** null: a visitor, who reads what `first` holds and has no socket. */
  readonly person: { readonly id: string; readonly name: string } | null;
  readonly writes: boolean;
  readonly first: { readonly text: string; readonly bibliography: string; readonly shown: ShownRecords };
  /** The text is here, from the server or from this machine. May be called more than once. */
  onText(): void;
  onConnection(connection: Connection): void;
  onKept(kept: Kept): void;
  onShown(shown: ShownRecords): void;
  onBibliography(): void;
  /** Names of the others whose pages are open. */
  onPeople(names: readonly string[]): void;
  /** What was written here while away, or by others meanwhile, was joined: a sentence that says how much by whom. */
  onJoined(words: string): void;
}

/** One page's hold on a paper: its text and what it shows, live, with a private copy for spells without connection. */
export interface PaperSession {
  readonly text: Y.Text;
  readonly bibliography: Y.Text;
  /** One's own edits of each, undone apart. */
  readonly undo: { readonly text: Y.UndoManager; readonly bibliography: Y.UndoManager };
  readonly awareness: Awareness;
  joinAgain(): void;
  end(): void;
}

export function openSession(options: SessionOptions): PaperSession {
  const doc = new Y.Doc();
  const text = doc.getText(TEXT_NAME);
  const bibliography = doc.getText(BIBLIOGRAPHY_NAME);
  const awareness = new Awareness(doc);
  const undo = { text: new Y.UndoManager(text), bibliography: new Y.UndoManager(bibliography) };
  bibliography.observe(options.onBibliography);
  const session = { text, bibliography, undo, awareness };
  const ending = () => {
    undo.text.destroy();
    undo.bibliography.destroy();
    awareness.destroy();
    doc.destroy();
  };
  if (options.person === null) {
    doc.transact(() => {
      text.insert(0, options.first.text);
      bibliography.insert(0, options.first.bibliography);
    });
    let ended = false;
    // As late as the answers of a live session, which come when its owner has it in hand.
    queueMicrotask(() => {
      if (ended) return;
      options.onConnection({ state: "still" });
      options.onShown(options.first.shown);
      options.onText();
    });
    const end = () => {
      ended = true;
      ending();
    };
    return { ...session, joinAgain: () => {}, end };
  }
  awareness.setLocalStateField("user", { name: options.person.name });
  const stops = [
    watchPeople(awareness, options.onPeople),
    joinText(options, options.person, doc, awareness),
    joinShown(options),
  ];
  return {
    ...session,
    joinAgain: () => {
      for (const { again } of stops) again();
    },
    end() {
      for (const { stop } of stops) stop();
      ending();
    },
  };
}

interface Tie {
  again(): void;
  stop(): void;
}

function joinText(options: SessionOptions, person: { readonly id: string }, doc: Y.Doc, awareness: Awareness): Tie {
  const copy = options.writes ? openPrivateCopy(options.paperId, person.id, doc) : null;
  const provider = new WebsocketProvider(socketBase() + SOCKET_PATHS.text, options.paperId, doc, {
    awareness,
    disableBc: true,
    connect: false,
  });
  const unwatch = watchKept(provider, options.onKept);
  const ungather = gatherOthersWords(provider);
  const unfollow = followNetwork(provider);
  const names = namesByClient(awareness);
  let everLive = false;
  let away = { since: new Date(), changes: new JoinedChanges() };
  let telling: ReturnType<typeof setTimeout> | undefined;
  provider.on("sync", (synced) => {
    if (!synced) return;
    const { changes } = away;
    // The others' names come after their words.
    if (everLive) telling = setTimeout(() => tellJoined(changes), NAMES_MS);
    everLive = true;
    away = { since: new Date(), changes: new JoinedChanges() };
    options.onConnection({ state: "live" });
    options.onText();
  });
  const tellJoined = (changes: JoinedChanges) => {
    const words = changes.words((client) => names.get(client));
    if (words !== null) options.onJoined(words);
  };
  for (const name of [TEXT_NAME, BIBLIOGRAPHY_NAME]) {
    doc.getText(name).observe((event, { origin }) => {
      if (everLive && origin !== provider && copy?.isOrigin(origin) !== true && !provider.synced)
        away.changes.noteOwn(event);
    });
  }
  doc.on("update", (update: Uint8Array, origin: unknown) => {
    if (everLive && origin === provider && !provider.synced) away.changes.noteOthers(update);
  });
  provider.on("connection-close", () => {
    // Counted from the loss, not from the last vain attempt.
    if (provider.wsUnsuccessfulReconnects === 0) away = { since: new Date(), changes: new JoinedChanges() };
    options.onConnection({ state: "away", since: away.since });
  });
  provider.on("closed", ({ code }) => {
    options.onConnection({ state: "closed", code });
    if (closingOf(code).forgets && copy !== null) {
      void copy.close().then(() => forgetPrivateCopy(options.paperId, person.id));
    }
  });
  // The private copy first, so that words from before a reload are in the first exchange.
  const begin = () => provider.connect();
  if (copy === null) begin();
  else {
    void Promise.race([copy.whenRead, patience()]).then(() => {
      if (doc.getText(TEXT_NAME).length > 0) options.onText();
      begin();
    });
  }
  return {
    again: () => provider.connect(),
    stop() {
      unwatch();
      ungather();
      unfollow();
      clearTimeout(telling);
      provider.destroy();
      void copy?.close();
    },
  };
}

function joinShown(options: SessionOptions): Tie {
  const doc = new Y.Doc();
  const maps = {
    cells: doc.getMap<ShownCell>(SHOWN_NAMES.cells),
    work: doc.getMap<CellWork>(SHOWN_NAMES.work),
    changes: doc.getMap<ParameterChange>(SHOWN_NAMES.changes),
  };
  let due = false;
  const tell = () => {
    if (due) return;
    due = true;
    queueMicrotask(() => {
      due = false;
      options.onShown({ cells: maps.cells.toJSON(), work: maps.work.toJSON(), changes: maps.changes.toJSON() });
    });
  };
  doc.on("update", tell);
  const provider = new WebsocketProvider(socketBase() + SOCKET_PATHS.shown, options.paperId, doc, { disableBc: true });
  provider.awareness.setLocalState(null);
  const unfollow = followNetwork(provider);
  return {
    again: () => provider.connect(),
    stop() {
      unfollow();
      provider.destroy();
      doc.destroy();
    },
  };
}

/** Who wrote as which client, of all who were here at any time since the page was opened. */
function namesByClient(awareness: Awareness): ReadonlyMap<number, string> {
  const names = new Map<number, string>();
  awareness.on("change", () => {
    for (const [client, state] of awareness.getStates()) {
      if (typeof state.user?.name === "string") names.set(client, state.user.name);
    }
  });
  return names;
}

function watchPeople(awareness: Awareness, onPeople: (names: readonly string[]) => void): Tie {
  let told = "";
  const tell = () => {
    const names = [...awareness.getStates()].flatMap(([client, state]) =>
      client !== awareness.clientID && typeof state.user?.name === "string" ? [state.user.name as string] : [],
    );
    const people = [...new Set(names)].sort();
    // Carets move with every letter; who is here seldom changes.
    const sign = JSON.stringify(people);
    if (sign !== told) onPeople(people);
    told = sign;
  };
  awareness.on("change", tell);
  return { again: () => {}, stop: () => awareness.off("change", tell) };
}

function socketBase(): string {
  return window.location.origin.replace(/^http/, "ws");
}

/** A browser that keeps its databases from pages must not keep the text from the person. */
function patience(): Promise<void> {
  return new Promise((resolve) => setTimeout(resolve, 1500));
}

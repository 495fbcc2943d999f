import { randomUUID } from "node:crypto";
import { createServer } from "node:http";
import type { AddressInfo } from "node:net";
import type { Knex } from "knex";
import { WebSocket as Socket } from "ws";
import { WebsocketProvider } from "y-websocket";
import * as Y from "yjs";
import { type Kept, watchKept } from "../../app/editor/kept.ts";
import { openDatabase, type Role } from "../../db/index.server.ts";
import { attachSockets, type Identify, LiveTexts } from "../../server/sync/index.ts";

/** A server that has nothing but the live texts. Its sessions are named outright in the cookie `session=<hash>`. */
export interface LiveServer {
  readonly url: string;
  readonly texts: LiveTexts;
  readonly problems: unknown[];
  close(): Promise<void>;
}

export async function startLiveServer(knex: Knex, databaseUrl: string, port = 0): Promise<LiveServer> {
  const database = openDatabase(knex);
  const problems: unknown[] = [];
  const onProblem = (error: unknown, where: string) => problems.push({ where, error });
  const identify: Identify = async (cookie) => {
    const hash = /(?:^|; )session=([\w-]+)/.exec(cookie ?? "")?.[1];
    const person = hash ? await database.sessions.findPerson(hash) : undefined;
    return person && hash ? { id: person.id, name: person.name, sessionHash: hash } : null;
  };
  const texts = await LiveTexts.open({ database, databaseUrl, identify, onProblem });
  const server = createServer((_request, response) => response.end());
  await new Promise<void>((done) => server.listen(port, "127.0.0.1", done));
  const origin = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  attachSockets(server, { texts, database, identify, isOwnOrigin: (asking) => asking === origin, onProblem });
  return {
    url: origin,
    texts,
    problems,
    close: async () => {
      await texts.close();
      server.closeAllConnections();
      await new Promise((done) => server.close(done));
    },
  };
}

export interface Invented {
  readonly id: string;
  readonly name: string;
  readonly session: string;
}

/** A person with a live session. */
export async function inventPerson(knex: Knex, name: string): Promise<Invented> {
  const rows: { id: string }[] = await knex("people").insert({ name }).returning("id");
  const id = rows[0]?.id ?? "";
  const session = randomUUID();
  await openDatabase(knex).sessions.begin(session, id, 1);
  return { id, name, session };
}

/** A paper with these members, the first its owner; its id. */
export async function inventPaper(
  knex: Knex,
  members: readonly (readonly [Invented, Role])[],
  specimen = false,
): Promise<string> {
  const id = randomUUID();
  await knex("papers").insert({ id, title: "Invented", specimen });
  if (members.length > 0) {
    await knex("members").insert(members.map(([{ id: person_id }, role]) => ({ paper_id: id, person_id, role })));
  }
  return id;
}

/** A page, as far as live texts are concerned. */
export class Page {
  readonly doc = new Y.Doc();
  readonly provider: WebsocketProvider;
  kept: Kept = { all: false, at: null };
  closed: { code: number; reason: string } | null = null;

  constructor(
    server: { url: string },
    paperId: string,
    session: string | null,
    {
      doc = "text",
      origin = server.url,
      socket = Socket,
      connect = true,
    }: { doc?: "text" | "shown"; origin?: string; socket?: typeof Socket; connect?: boolean } = {},
  ) {
    const headers = { origin, ...(session === null ? {} : { cookie: `session=${session}` }) };
    class OwnSocket extends socket {
      constructor(address: string | URL, protocols?: string | string[]) {
        super(address, protocols, { headers });
      }
    }
    this.provider = new WebsocketProvider(`${server.url.replace("http", "ws")}/sync/${doc}`, paperId, this.doc, {
      WebSocketPolyfill: OwnSocket as unknown as typeof WebSocket,
      disableBc: true,
      connect: false,
      maxBackoffTime: 200,
    });
    const onKept = (kept: Kept) => {
      this.kept = kept;
    };
    watchKept(this.provider, onKept, 0);
    this.provider.on("closed", (closed) => {
      this.closed = closed;
    });
    if (connect) this.provider.connect();
  }

  get text(): Y.Text {
    return this.doc.getText("text");
  }

  /** Everything written here is committed. */
  async allKept(): Promise<void> {
    await until(() => this.provider.synced && this.kept.all, "all of a page's words to be kept");
  }

  async synced(): Promise<this> {
    await until(() => this.provider.synced, "a page to have the text");
    return this;
  }

  async refused(): Promise<{ code: number; reason: string }> {
    await until(() => this.closed !== null, "a socket to be refused");
    return this.closed ?? { code: 0, reason: "" };
  }

  leave(): void {
    this.provider.destroy();
    this.doc.destroy();
  }
}

const PATIENCE_MS = 10_000;

/** Waits until `holds`. @throws Error naming `what` when it does not in time */
export async function until(
  holds: () => boolean | Promise<boolean>,
  what: string,
  patience = PATIENCE_MS,
): Promise<void> {
  const deadline = Date.now() + patience;
  while (!(await holds())) {
    if (Date.now() > deadline) throw new Error(`Waited ${patience} ms in vain for ${what}.`);
    await new Promise((done) => setTimeout(done, 5));
  }
}

import type { Knex } from "knex";
import { afterAll, beforeAll, beforeEach, expect, onTestFinished, test } from "vitest";
import { WebSocket } from "ws";
import * as Y from "yjs";
import { CLOSE } from "../../app/editor/protocol.ts";
import { connect } from "../../db/index.server.ts";
import { stateFrame, updateFrame } from "../../server/sync/frames.ts";
import { freshDatabaseUrl } from "../support/database.ts";
import {
  type Invented,
  inventPaper,
  inventPerson,
  type LiveServer,
  Page,
  startLiveServer,
  until,
} from "../support/live.ts";

let knex: Knex;
let server: LiveServer;
let owner: Invented;
let author: Invented;
let referee: Invented;
let reader: Invented;
let stranger: Invented;
let paperId: string;

beforeAll(async () => {
  const url = await freshDatabaseUrl();
  knex = connect(url);
  server = await startLiveServer(knex, url);
});

afterAll(async () => {
  await server.close();
  await knex.destroy();
});

beforeEach(async () => {
  [owner, author, referee, reader, stranger] = (await Promise.all(
    ["Owner", "Author", "Referee", "Reader", "Stranger"].map((name) => inventPerson(knex, name)),
  )) as [Invented, Invented, Invented, Invented, Invented];
  paperId = await inventPaper(knex, [
    [owner, "owner"],
    [author, "author"],
    [referee, "referee"],
    [reader, "reader"],
  ]);
  await server.texts.create(paperId, { text: "The words.", bibliography: "" }, owner.id);
});

function page(...args: ConstructorParameters<typeof Page> extends [unknown, ...infer Rest] ? Rest : never): Page {
  const opened = new Page(server, ...args);
  onTestFinished(() => opened.leave());
  return opened;
}

/** A socket that speaks for itself; resolves with the code it was closed with. */
function rawSocket(session: string, address = `/sync/text/${paperId}`): { socket: WebSocket; closed: Promise<number> } {
  const socket = new WebSocket(`${server.url.replace("http", "ws")}${address}`, {
    headers: { origin: server.url, cookie: `session=${session}` },
  });
  onTestFinished(() => socket.terminate());
  const closed = new Promise<number>((done) => {
    socket.on("close", (code) => done(code));
    socket.on("error", () => {});
  });
  return { socket, closed };
}

const REFUSED: readonly (readonly [string, () => string | null, number])[] = [
  ["nobody signed in", () => null, CLOSE.signedOut],
  ["a session that does not exist", () => "0123456789", CLOSE.signedOut],
  ["a stranger", () => stranger.session, CLOSE.noAccess],
];

test.each(REFUSED)("%s is refused", async (_, session, code) => {
  const { code: told } = await page(paperId, session()).refused();
  expect(told).toBe(code);
});

test("a paper that does not exist is refused in the words of one that is not open", async () => {
  const missing = await page("no-such-paper-1234", stranger.session).refused();
  const closed = await page(paperId, stranger.session).refused();
  expect(missing).toEqual(closed);
});

test("a page of another origin is refused, whoever is signed in, and so is one that tells none", async () => {
  expect((await page(paperId, owner.session, { origin: "https://elsewhere.example" }).refused()).code).toBe(4403);
  const socket = new WebSocket(`${server.url.replace("http", "ws")}/sync/text/${paperId}`, {
    headers: { cookie: `session=${owner.session}` },
  });
  const code = await new Promise((done) => socket.on("close", done));
  expect(code).toBe(4403);
});

test("an address that is no socket of ours is cut off", async () => {
  const { socket } = rawSocket(owner.session, "/elsewhere");
  await expect(new Promise((_, fail) => socket.on("error", fail))).rejects.toThrow();
});

test.each(["owner", "author"] as const)("an %s reads and writes", async (role) => {
  const writer = await page(paperId, { owner, author }[role].session).synced();
  writer.text.insert(0, "New: ");
  await writer.allKept();
  expect((await server.texts.read(paperId)).text).toBe("New: The words.");
});

test.each(["referee", "reader"] as const)("a %s reads, and is dropped when writing", async (role) => {
  const { session } = { referee, reader }[role];
  const quiet = await page(paperId, session).synced();
  expect(quiet.text.toString()).toBe("The words.");
  quiet.text.insert(0, "Forged: ");
  expect((await quiet.refused()).code).toBe(CLOSE.noAccess);
  expect((await server.texts.read(paperId)).text).toBe("The words.");
});

test("nobody writes what a paper shows, not even its owner", async () => {
  const forger = await page(paperId, owner.session, { doc: "shown" }).synced();
  forger.doc.getMap("cells").set("K", { key: "forged" });
  expect((await forger.refused()).code).toBe(CLOSE.noAccess);
  expect((await server.texts.shown(paperId)).cells).toEqual({});
});

test("what a paper shows reaches every page", async () => {
  const seen = await page(paperId, reader.session, { doc: "shown" }).synced();
  await server.texts.show(paperId, ({ work }) =>
    work.set("K", { state: "cancelled", key: "k", by: "Owner", at: "2026-01-01T00:00:00Z" }),
  );
  await until(() => seen.doc.getMap("work").has("K"), "the work to be seen");
});

test("a visitor reads the specimen and cannot write it", async () => {
  const specimen = await inventPaper(knex, [[owner, "owner"]], true);
  await server.texts.create(specimen, { text: "An example.", bibliography: "" }, null);
  const visitor = await page(specimen, null).synced();
  expect(visitor.text.toString()).toBe("An example.");
  visitor.text.insert(0, "Not ");
  expect((await visitor.refused()).code).toBe(CLOSE.noAccess);
  expect((await server.texts.read(specimen)).text).toBe("An example.");
});

test("the sockets of a removed member are closed", async () => {
  const writing = await page(paperId, author.session).synced();
  await knex("members").where({ paper_id: paperId, person_id: author.id }).delete();
  await server.texts.closeSockets(paperId, author.id);
  expect((await writing.refused()).code).toBe(CLOSE.noAccess);
});

test("an author who becomes a reader is told so, and writes no more", async () => {
  const demoted = await page(paperId, author.session).synced();
  const others = await page(paperId, owner.session).synced();
  await knex("members").where({ paper_id: paperId, person_id: author.id }).update({ role: "reader" });
  await server.texts.closeSockets(paperId, author.id);
  expect((await demoted.refused()).code).toBe(CLOSE.roleChanged);
  const again = await page(paperId, author.session).synced();
  again.text.insert(0, "Too late. ");
  expect((await again.refused()).code).toBe(CLOSE.noAccess);
  expect(others.closed).toBeNull();
  expect((await server.texts.read(paperId)).text).toBe("The words.");
});

test("the sockets of a session that ended are closed, those of the person's other session are not", async () => {
  const here = await page(paperId, owner.session).synced();
  const other = { ...owner, session: `${owner.session}-other` };
  await knex("sessions").insert({
    id_hash: other.session,
    person_id: owner.id,
    expires_at: new Date(Date.now() + 3_600_000),
  });
  const there = await page(paperId, other.session).synced();
  await knex("sessions").where({ id_hash: owner.session }).delete();
  await server.texts.closeSession(owner.session);
  expect((await here.refused()).code).toBe(CLOSE.signedOut);
  expect(there.provider.synced).toBe(true);
});

test("the sockets of a deleted paper are closed", async () => {
  const open = await page(paperId, owner.session).synced();
  await knex("papers").where({ id: paperId }).delete();
  await server.texts.closeSockets(paperId, null);
  expect((await open.refused()).code).toBe(CLOSE.noSuchPaper);
});

test.each([
  ["an unknown type", new Uint8Array([77, 0])],
  ["an update that is none", new Uint8Array([0, 2, 3, 255, 255, 255])],
  ["a frame cut short", new Uint8Array([0, 2, 50, 1])],
  ["bytes after the end", new Uint8Array([...updateFrame(new Uint8Array([0, 0])), 1])],
  ["an empty frame", new Uint8Array()],
])("%s closes the socket and leaves the paper as it was", async (_, bytes) => {
  const { socket, closed } = rawSocket(owner.session);
  socket.on("open", () => socket.send(bytes));
  expect(await closed).toBe(CLOSE.unreadable);
  expect((await server.texts.read(paperId)).text).toBe("The words.");
});

test("a flood of frames is stopped, and the page may come back", async () => {
  const { socket, closed } = rawSocket(owner.session);
  socket.on("open", () => {
    for (let i = 0; i < 4_000; i++) socket.send(updateFrame(Y.encodeStateAsUpdate(new Y.Doc())));
  });
  expect(await closed).toBe(CLOSE.again);
});

test("a reader's large frames, and asking for the whole text over and over, are stopped", async () => {
  const large = rawSocket(reader.session);
  large.socket.on("open", () => large.socket.send(updateFrame(new Uint8Array(100_000))));
  expect(await large.closed).toBe(CLOSE.tooLarge);
  const asking = rawSocket(reader.session);
  asking.socket.on("open", () => {
    for (let i = 0; i < 100; i++) asking.socket.send(stateFrame(new Y.Doc()));
  });
  expect(await asking.closed).toBe(CLOSE.again);
});

test("nobody appears under another's name or client id", async () => {
  const honest = await page(paperId, owner.session).synced();
  const liar = await page(paperId, referee.session).synced();
  liar.provider.awareness.setLocalStateField("user", { name: "Owner" });
  const seen = () => honest.provider.awareness.getStates().get(liar.doc.clientID)?.user;
  await until(() => seen() !== undefined, "the referee to appear");
  expect(seen()).toEqual({ name: "Referee" });

  honest.provider.awareness.setLocalStateField("cursor", { anchor: 1, head: 1 });
  const third = await page(paperId, author.session).synced();
  await until(() => third.provider.awareness.getStates().has(honest.doc.clientID), "the owner to appear");
  // The referee's page speaks for the owner's client, with a later clock.
  liar.provider.awareness.states.set(honest.doc.clientID, { user: { name: "Owner" }, cursor: null });
  liar.provider.awareness.meta.set(honest.doc.clientID, { clock: 1e6, lastUpdated: Date.now() });
  liar.provider.awareness.emit("update", [{ added: [], updated: [honest.doc.clientID], removed: [] }, "local"]);
  third.provider.awareness.setLocalStateField("cursor", { anchor: 2, head: 2 });
  await until(
    () => honest.provider.awareness.getStates().get(third.doc.clientID)?.cursor !== undefined,
    "a later presence",
  );
  expect(third.provider.awareness.getStates().get(honest.doc.clientID)).toEqual({
    user: { name: "Owner" },
    cursor: { anchor: 1, head: 1 },
  });
});

test("who leaves is seen to leave", async () => {
  const stays = await page(paperId, owner.session).synced();
  const goes = await page(paperId, author.session).synced();
  goes.provider.awareness.setLocalStateField("cursor", { anchor: 0, head: 0 });
  await until(() => stays.provider.awareness.getStates().has(goes.doc.clientID), "the author to appear");
  goes.provider.ws?.close();
  await until(() => !stays.provider.awareness.getStates().has(goes.doc.clientID), "the author to go");
});

import { expect, onTestFinished, test } from "vitest";
import { connect } from "../../db/index.server.ts";
import { freshDatabaseUrl } from "../support/database.ts";
import { inventPaper, inventPerson, Page, startLiveServer, until } from "../support/live.ts";

/** Two servers as two processes would be: nothing is shared but the database. */
async function twoServers() {
  const databaseUrl = await freshDatabaseUrl();
  const knexes = [connect(databaseUrl), connect(databaseUrl)] as const;
  const servers = [
    await startLiveServer(knexes[0], databaseUrl),
    await startLiveServer(knexes[1], databaseUrl),
  ] as const;
  const author = await inventPerson(knexes[0], "Author");
  const paperId = await inventPaper(knexes[0], [[author, "owner"]]);
  const pages = servers.map((server) => new Page(server, paperId, author.session));
  onTestFinished(async () => {
    for (const page of pages) page.leave();
    for (const server of servers) await server.close();
    for (const knex of knexes) await knex.destroy();
  });
  await Promise.all(pages.map((page) => page.synced()));
  const [first, second] = pages as [Page, Page];
  return { knex: knexes[0], servers, author, paperId, first, second };
}

test("pages at two servers come to the same text while both write, across snapshots", async () => {
  const { servers, first, second, knex, paperId } = await twoServers();
  for (let i = 0; i < 100; i++) {
    first.text.insert(0, `a${i} `);
    second.text.insert(second.text.length, `b${i} `);
    // One row at least for each turn, so that both servers fold while the other writes.
    await first.allKept();
  }
  await first.allKept();
  await second.allKept();
  await until(() => first.text.toString() === second.text.toString(), "equal texts");
  expect(first.text.toString().match(/[ab]\d+ /g)).toHaveLength(200);
  for (const server of servers) {
    expect((await server.texts.read(paperId)).text).toBe(first.text.toString());
    expect(server.problems).toEqual([]);
  }
  expect(await knex("paper_snapshots").where({ paper_id: paperId, doc: "text" })).toHaveLength(1);
});

test("a member removed at one server is out at the other, and so is an ended session", async () => {
  const { servers, knex, paperId, author, second } = await twoServers();
  const session = await knex("sessions").where({ person_id: author.id }).first("id_hash");
  await knex("sessions").where({ id_hash: session.id_hash }).delete();
  await servers[0].texts.closeSession(session.id_hash);
  expect((await second.refused()).code).toBe(4401);

  const other = await inventPerson(knex, "Other");
  await knex("members").insert({ paper_id: paperId, person_id: other.id, role: "author" });
  const page = new Page(servers[1], paperId, other.session);
  onTestFinished(() => page.leave());
  await page.synced();
  await knex("members").where({ person_id: other.id }).delete();
  await servers[0].texts.closeSockets(paperId, other.id);
  expect((await page.refused()).code).toBe(4403);
});

test("a server whose signals were cut off catches up when it hears again", async () => {
  const { knex, first, second, servers } = await twoServers();
  await knex.raw(
    "select pg_terminate_backend(pid) from pg_stat_activity where application_name = 'halfline signals' and datname = current_database()",
  );
  first.text.insert(0, "While nobody listened. ");
  await first.allKept();
  await until(() => second.text.toString() === "While nobody listened. ", "the other server to catch up");
  const reported = servers.flatMap(({ problems }) => problems) as { where: string }[];
  expect(reported.every(({ where }) => where === "signals")).toBe(true);
});

test("people at two servers see each other come, move and go", async () => {
  const { servers, knex, paperId, first, second } = await twoServers();
  const caretOf = (page: Page, at: Page) => at.provider.awareness.getStates().get(page.doc.clientID)?.cursor;
  first.provider.awareness.setLocalStateField("cursor", { anchor: 1, head: 1 });
  await until(() => caretOf(first, second) !== undefined, "the first caret");
  first.provider.awareness.setLocalStateField("cursor", { anchor: 2, head: 2 });
  await until(() => caretOf(first, second)?.anchor === 2, "the caret to move");
  expect(second.provider.awareness.getStates().get(first.doc.clientID)?.user).toEqual({ name: "Author" });

  const reader = await inventPerson(knex, "Late");
  await knex("members").insert({ paper_id: paperId, person_id: reader.id, role: "reader" });
  const late = new Page(servers[1], paperId, reader.session);
  onTestFinished(() => late.leave());
  await late.synced();
  await until(() => caretOf(first, late) !== undefined, "one who comes late to see the caret");
  first.provider.ws?.close();
  await until(() => caretOf(first, late) === undefined, "the caret to go");
});

import { type ChildProcess, spawn } from "node:child_process";
import { expect, onTestFinished, test } from "vitest";
import { connect } from "../../db/index.server.ts";
import { bundled } from "../support/bundled.ts";
import { freshDatabaseUrl } from "../support/database.ts";
import { inventPaper, inventPerson, Page, startLiveServer, until } from "../support/live.ts";

const ROUNDS = 4;
/** Each round starts a process. */
const PATIENCE_MS = 120_000;

async function startProcess(databaseUrl: string): Promise<{ child: ChildProcess; url: string }> {
  const child = spawn(process.execPath, [bundled("live-process.ts"), databaseUrl], {
    stdio: ["ignore", "pipe", "inherit"],
  });
  onTestFinished(() => {
    child.kill("SIGKILL");
  });
  const url = await new Promise<string>((done, fail) => {
    child.stdout?.once("data", (line: Buffer) => done(line.toString().trim()));
    child.once("exit", (code) => fail(new Error(`The server ended with ${code} before it listened.`)));
  });
  return { child, url };
}

test("an edit that was told as kept is found after the server is killed in that instant", {
  timeout: PATIENCE_MS,
}, async () => {
  const databaseUrl = await freshDatabaseUrl();
  const knex = connect(databaseUrl);
  onTestFinished(() => knex.destroy());
  const author = await inventPerson(knex, "Author");
  const paperId = await inventPaper(knex, [[author, "owner"]]);

  let expected = "";
  for (let round = 0; round < ROUNDS; round++) {
    const { child, url } = await startProcess(databaseUrl);
    const page = await new Page({ url }, paperId, author.session).synced();
    expect(page.text.toString(), `what round ${round} found`).toBe(expected);

    const words = `Round ${round}. `;
    page.text.insert(page.text.length, words);
    expect(page.kept.all).toBe(false);
    await until(() => page.kept.all, "the acknowledgement");
    child.kill("SIGKILL");
    expected += words;
    page.leave();
  }

  const last = await startLiveServer(knex, databaseUrl);
  onTestFinished(() => last.close());
  expect((await last.texts.read(paperId)).text).toBe(expected);
});

test("while the database refuses, nothing is told as kept, and nobody else sees it; then all of it is", async () => {
  const databaseUrl = await freshDatabaseUrl();
  const knex = connect(databaseUrl);
  const author = await inventPerson(knex, "Author");
  const paperId = await inventPaper(knex, [[author, "owner"]]);
  const server = await startLiveServer(knex, databaseUrl);
  const [writing, watching] = [
    new Page(server, paperId, author.session),
    new Page(server, paperId, author.session),
  ] as const;
  onTestFinished(async () => {
    writing.leave();
    watching.leave();
    await server.close();
    await knex.destroy();
  });
  await Promise.all([writing.synced(), watching.synced()]);

  await knex.raw("alter table paper_updates rename to paper_updates_away");
  writing.text.insert(0, "Not lost.");
  await until(() => server.problems.length > 0, "the commit to fail");
  expect(writing.kept.all).toBe(false);
  expect(watching.text.toString()).toBe("");

  await knex.raw("alter table paper_updates_away rename to paper_updates");
  await writing.allKept();
  await until(() => watching.text.toString() === "Not lost.", "the words to arrive");
  expect((await server.texts.read(paperId)).text).toBe("Not lost.");
});

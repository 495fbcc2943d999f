import type { Knex } from "knex";
import { afterAll, beforeAll, beforeEach, expect, onTestFinished, test } from "vitest";
import type { ParameterChange } from "../../app/cells/types.ts";
import { connect } from "../../db/index.server.ts";
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

const PAPER = `---
title: Reaching the shore
authors:
  - name: Inês Valadão
  - name: Tormod Hagelund
---

Words.

\`\`\`parameters
beta: 1
mu: {value: 1.90, min: 1.45, max: 4}
\`\`\`
`;

let knex: Knex;
let server: LiveServer;
let ines: Invented;
let tormod: Invented;
let paperId: string;

beforeAll(async () => {
  const url = await freshDatabaseUrl();
  knex = connect(url);
  server = await startLiveServer(knex, url);
  ines = await inventPerson(knex, "Inês");
  tormod = await inventPerson(knex, "Tormod");
});

afterAll(async () => {
  await server.close();
  await knex.destroy();
});

beforeEach(async () => {
  paperId = await inventPaper(knex, [
    [ines, "owner"],
    [tormod, "author"],
  ]);
  await server.texts.create(paperId, { text: PAPER, bibliography: "" }, null);
});

async function open(person: Invented): Promise<Page> {
  const page = new Page(server, paperId, person.session);
  onTestFinished(() => page.leave());
  return page.synced();
}

/** Puts `words` in the place of `old`, character by character, as it is typed. */
function retype(page: Page, old: string, words: string): void {
  const at = page.text.toString().indexOf(old);
  page.text.delete(at, old.length);
  [...words].forEach((letter, i) => {
    page.text.insert(at + i, letter);
  });
}

async function changes(): Promise<Readonly<Record<string, ParameterChange>>> {
  return (await server.texts.shown(paperId)).changes;
}

test("who gave a parameter another value, when and from what, is written by the server", async () => {
  const page = await open(tormod);
  const from = Date.now();
  retype(page, "1.90", "2.05");
  await until(async () => "mu" in (await changes()), "the change to be told");
  const { mu } = await changes();
  expect(mu).toMatchObject({ by: "Tormod", was: "1.90" });
  expect(Date.parse(mu?.at ?? "")).toBeGreaterThanOrEqual(from);
  expect(await changes()).not.toHaveProperty("beta");
});

test("changes by two people are told apart, however close", async () => {
  const [first, second] = [await open(ines), await open(tormod)];
  retype(first, "beta: 1", "beta: 1.5");
  await first.allKept();
  await until(() => second.text.toString().includes("beta: 1.5"), "the first change to arrive");
  retype(second, "1.90", "2.5");
  await until(async () => Object.keys(await changes()).length === 2, "both changes to be told");
  expect(await changes()).toMatchObject({ beta: { by: "Inês", was: "1" }, mu: { by: "Tormod", was: "1.90" } });
});

test("prose, notes and new parameters are no changes of a value", async () => {
  const page = await open(ines);
  page.text.insert(page.text.toString().indexOf("Words."), "More. ");
  retype(page, "max: 4}", "max: 4, note: away}\nD: 1/2");
  await page.allKept();
  await new Promise((done) => setTimeout(done, 900));
  expect(await changes()).toEqual({});
});

test("the shelf's title and authors follow the text", async () => {
  const described = () => knex("papers").where({ id: paperId }).first("title", "authors");
  await until(async () => (await described())?.title === "Reaching the shore", "the first title");
  expect((await described())?.authors).toBe("Inês Valadão, Tormod Hagelund");
  const page = await open(ines);
  retype(page, "the shore", "it");
  await until(async () => (await described())?.title === "Reaching it", "the new title");
  // A link to it needs words.
  retype(page, "title: Reaching it", "title: ''");
  await until(async () => (await described())?.title === "Untitled paper", "a name for what has no title");
});

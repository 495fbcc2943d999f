import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, expect, test } from "vitest";
import { openDatabase } from "../../db/index.server.ts";
import { prepareDemo } from "../../server/demo.ts";
import { type Computing, startComputing } from "../support/computing.ts";
import { until } from "../support/live.ts";

const PAPER = "---\ntitle: An example\nauthors:\n  - name: Inês\n---\n\n```formula F\nvalue: 1 + 1\n```\n";

let one: Computing;
let other: Computing;
const folder = mkdtempSync(join(tmpdir(), "halfline-specimen-"));

beforeAll(async () => {
  writeFileSync(join(folder, "paper.md"), PAPER);
  one = await startComputing();
  other = await startComputing({}, one.databaseUrl);
});

afterAll(async () => {
  await one.close();
  await other.close();
  rmSync(folder, { recursive: true });
});

function prepare({ knex, server, service }: Computing): Promise<void> {
  const database = openDatabase(knex);
  return prepareDemo({ database, texts: server.texts, compute: service, folder, provider: "github" });
}

test("two processes at once, and again later, set up one specimen, computed once", async () => {
  await Promise.all([prepare(one), prepare(other)]);
  await prepare(one);
  const database = openDatabase(one.knex);
  const specimen = await database.papers.findSpecimen();
  const id = specimen?.id ?? "";
  await Promise.all([one.service.settled(id), other.service.settled(id)]);

  expect(await one.server.texts.read(id)).toEqual({ text: PAPER, bibliography: "" });
  // What the other process computed comes to this one by itself.
  await until(async () => Object.keys((await one.server.texts.shown(id)).cells).join() === "F", "the result of F");
  expect(await one.knex("computations")).toHaveLength(1);
  const members = await database.members.list(id);
  expect(members.map(({ role }) => role).toSorted()).toEqual(["author", "owner", "reader", "referee"]);
  expect(await one.knex("people")).toHaveLength(5);
});

test("what people have made of the specimen stays at the next start", async () => {
  const database = openDatabase(one.knex);
  const id = (await database.papers.findSpecimen())?.id ?? "";
  await one.server.texts.show(id, ({ cells }) => cells.delete("F"));
  writeFileSync(join(folder, "paper.md"), "Another text.");
  await prepare(other);
  expect((await one.server.texts.read(id)).text).toBe(PAPER);
});

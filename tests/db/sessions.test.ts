import type { Knex } from "knex";
import { expect, test } from "vitest";
import { openDatabase } from "../../db/index.server.ts";
import { freshDatabase } from "../support/database.ts";

async function withSession(): Promise<{ knex: Knex; person: string; hash: string }> {
  const knex = await freshDatabase();
  const database = openDatabase(knex);
  const { id } = await database.people.signIn({
    provider: "github",
    subject: "1",
    login: "ines",
    name: "Inês",
    email: null,
  });
  await database.sessions.begin("a".repeat(64), id, 30);
  return { knex, person: id, hash: "a".repeat(64) };
}

test("a session leads to its person until it is ended", async () => {
  const { knex, person, hash } = await withSession();
  const { sessions } = openDatabase(knex);
  expect(await sessions.findPerson(hash)).toEqual({ id: person, name: "Inês", email: null });
  expect(await sessions.findPerson("b".repeat(64))).toBeUndefined();
  await sessions.end(hash);
  expect(await sessions.findPerson(hash)).toBeUndefined();
});

test.each([
  ["past its last day", { expires_at: "1 second" }],
  ["unused for more than a fortnight", { last_seen_at: "15 days" }],
])("a session %s is none, and is swept", async (_why, changed) => {
  const { knex, hash } = await withSession();
  const { sessions } = openDatabase(knex);
  expect(await sessions.sweep()).toBe(0);
  const [column, ago] = Object.entries(changed)[0] ?? [];
  await knex("sessions").update({ [String(column)]: knex.raw("now() - ?::interval", [String(ago)]) });
  expect(await sessions.findPerson(hash)).toBeUndefined();
  expect(await sessions.sweep()).toBe(1);
});

test("use is noted, but not at every use", async () => {
  const { knex, hash } = await withSession();
  const { sessions } = openDatabase(knex);
  const seen = async () => (await knex("sessions").first("last_seen_at")).last_seen_at.getTime();
  const begun = await seen();
  await sessions.findPerson(hash);
  expect(await seen()).toBe(begun);
  await knex("sessions").update({ last_seen_at: knex.raw("now() - interval '1 hour'") });
  await sessions.findPerson(hash);
  expect(await seen()).toBeGreaterThanOrEqual(begun);
});

test("all sessions of a person end together, and nobody else's", async () => {
  const { knex, person, hash } = await withSession();
  const database = openDatabase(knex);
  const other = await database.people.signIn({
    provider: "github",
    subject: "2",
    login: "tormod",
    name: "Tormod",
    email: null,
  });
  await database.sessions.begin("b".repeat(64), person, 30);
  await database.sessions.begin("c".repeat(64), other.id, 30);
  expect((await database.sessions.endAll(person)).sort()).toEqual([hash, "b".repeat(64)]);
  expect(await database.sessions.findPerson("c".repeat(64))).toMatchObject({ name: "Tormod" });
});

import { expect, test } from "vitest";
import { type Database, openDatabase } from "../../db/index.server.ts";
import { someone } from "../support/cast.ts";
import { freshDatabase } from "../support/database.ts";

const PAPER = { id: "paper-00001", title: "How many reach the shore?", authors: "Inês Valadão" };

async function withPaper(): Promise<Database> {
  const database = openDatabase(await freshDatabase());
  const ines = await someone(database, "Ines");
  await database.papers.create(PAPER, ines.id);
  return database;
}

test("who begins a paper owns it; others are nothing on it", async () => {
  const database = await withPaper();
  const ines = await someone(database, "Ines");
  const stranger = await someone(database, "Stranger");
  expect(await database.papers.findFor(PAPER.id, ines.id)).toMatchObject({ ...PAPER, role: "owner", specimen: false });
  expect(await database.papers.findFor(PAPER.id, stranger.id)).toMatchObject({ role: null });
  expect(await database.papers.findFor(PAPER.id, null)).toMatchObject({ role: null });
  expect(await database.papers.findFor("no-such-paper", ines.id)).toBeUndefined();
});

test("the shelf has one's own papers, the last changed first", async () => {
  const database = await withPaper();
  const ines = await someone(database, "Ines");
  const tormod = await someone(database, "Tormod");
  await database.papers.create({ id: "paper-00002", title: "Retreating fronts", authors: "Tormod" }, tormod.id);
  await database.members.add("paper-00002", ines.id, "referee");
  const titles = async () => (await database.papers.shelf(ines.id, "")).map(({ title }) => title);
  expect(await titles()).toEqual(["Retreating fronts", "How many reach the shore?"]);
  await database.papers.describe(PAPER.id, { title: "How many?", authors: "I. Valadão" });
  expect(await titles()).toEqual(["How many?", "Retreating fronts"]);
  expect(await database.papers.shelf(tormod.id, "")).toMatchObject([{ role: "owner", putBy: false, refereed: true }]);
});

test("the shelf finds words of title and authors in any case, and signs of patterns as they stand", async () => {
  const database = await withPaper();
  const ines = await someone(database, "Ines");
  await database.papers.create({ id: "paper-00003", title: "100% of a_b", authors: "Ruo-Lan Sim" }, ines.id);
  const found = async (words: string) => (await database.papers.shelf(ines.id, words)).map(({ id }) => id);
  expect(await found("REACH")).toEqual([PAPER.id]);
  expect(await found("valadão")).toEqual([PAPER.id]);
  expect(await found("ruo-lan")).toEqual(["paper-00003"]);
  expect(await found("0% of a_b")).toEqual(["paper-00003"]);
  expect(await found("%")).toEqual(["paper-00003"]);
  expect(await found("axb")).toEqual([]);
  expect(await found("\\")).toEqual([]);
});

test("the specimen is found by its flag", async () => {
  const database = await withPaper();
  expect(await database.papers.findSpecimen()).toBeUndefined();
  const ines = await someone(database, "Ines");
  await database.papers.create({ ...PAPER, id: "specimen-001", specimen: true }, ines.id);
  expect(await database.papers.findSpecimen()).toMatchObject({ id: "specimen-001", specimen: true });
});

test("a deleted paper is gone from every shelf", async () => {
  const database = await withPaper();
  const ines = await someone(database, "Ines");
  const tormod = await someone(database, "Tormod");
  await database.members.add(PAPER.id, tormod.id, "author");
  await database.papers.remove(PAPER.id);
  expect(await database.papers.shelf(ines.id, "")).toEqual([]);
  expect(await database.papers.shelf(tormod.id, "")).toEqual([]);
});

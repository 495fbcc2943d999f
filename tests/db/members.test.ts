import { expect, test } from "vitest";
import { openDatabase } from "../../db/index.server.ts";
import { someone } from "../support/cast.ts";
import { freshDatabase } from "../support/database.ts";

const PAPER = "paper-00001";

async function withPaper() {
  const database = openDatabase(await freshDatabase());
  const ines = await someone(database, "Ines Valadao");
  const tormod = await someone(database, "Tormod Hagelund");
  await database.papers.create({ id: PAPER, title: "T", authors: "A" }, ines.id);
  return { database, members: database.members, ines, tormod };
}

test("members are listed as they came, with their logins", async () => {
  const { members, ines, tormod } = await withPaper();
  expect(await members.add(PAPER, tormod.id, "author")).toBeNull();
  expect(await members.list(PAPER)).toEqual([
    { personId: ines.id, name: "Ines Valadao", login: "ines-valadao", role: "owner" },
    { personId: tormod.id, name: "Tormod Hagelund", login: "tormod-hagelund", role: "author" },
  ]);
});

test("nobody is added twice, nor loses a role by it", async () => {
  const { members, ines } = await withPaper();
  expect(await members.add(PAPER, ines.id, "reader")).toBe("already-there");
  expect(await members.list(PAPER)).toMatchObject([{ personId: ines.id, role: "owner" }]);
});

test("a paper keeps an owner, whatever is tried", async () => {
  const { members, ines, tormod } = await withPaper();
  expect(await members.changeRole(PAPER, ines.id, "author")).toBe("last-owner");
  expect(await members.remove(PAPER, ines.id)).toBe("last-owner");
  expect(await members.changeRole(PAPER, ines.id, "owner")).toBeNull();
  await members.add(PAPER, tormod.id, "owner");
  const both = await Promise.all([
    members.changeRole(PAPER, ines.id, "author"),
    members.changeRole(PAPER, tormod.id, "reader"),
  ]);
  expect(both.sort()).toEqual(["last-owner", null]);
  expect((await members.list(PAPER)).filter(({ role }) => role === "owner")).toHaveLength(1);
});

test("whoever is not there can be neither changed nor removed", async () => {
  const { members, tormod } = await withPaper();
  expect(await members.changeRole(PAPER, tormod.id, "author")).toBe("not-there");
  expect(await members.remove(PAPER, tormod.id)).toBe("not-there");
  expect(await members.list(PAPER)).toHaveLength(1);
});

test("each puts a paper by for themselves, and brings it back", async () => {
  const { database, members, ines, tormod } = await withPaper();
  await members.add(PAPER, tormod.id, "author");
  await members.putBy(PAPER, ines.id, true);
  expect(await database.papers.shelf(ines.id, "")).toMatchObject([{ putBy: true }]);
  expect(await database.papers.shelf(tormod.id, "")).toMatchObject([{ putBy: false }]);
  await members.putBy(PAPER, ines.id, false);
  expect(await database.papers.shelf(ines.id, "")).toMatchObject([{ putBy: false }]);
});

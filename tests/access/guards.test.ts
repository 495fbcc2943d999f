import { RouterContextProvider } from "react-router";
import { expect, test } from "vitest";
import { requirePaper, requirePerson } from "../../app/access/index.server.ts";
import { databaseContext, type Person, pageRequestContext, personContext } from "../../app/context.ts";
import { type Database, openDatabase } from "../../db/index.server.ts";
import { someone } from "../support/cast.ts";
import { freshDatabase } from "../support/database.ts";

function asked(database: Database, person: Person | null, page: boolean) {
  const context = new RouterContextProvider();
  context.set(databaseContext, database);
  context.set(personContext, person);
  context.set(pageRequestContext, page);
  return { request: new Request("http://localhost/papers/paper-00001/galley?x=1"), context };
}

/** Status of what the guard throws, with its words or where it leads. */
async function refused(guard: () => unknown): Promise<[number, string]> {
  try {
    await guard();
  } catch (thrown) {
    if (!(thrown instanceof Response)) throw thrown;
    const to = thrown.headers.get("Location");
    return [thrown.status, to ?? ((await thrown.json()) as { message: string }).message];
  }
  return [200, ""];
}

test("nobody is sent to sign in and back again, or told so where no page is", async () => {
  const database = openDatabase(await freshDatabase());
  const back = "/sign-in?returnTo=%2Fpapers%2Fpaper-00001%2Fgalley%3Fx%3D1";
  expect(await refused(() => requirePerson(asked(database, null, true)))).toEqual([302, back]);
  const [status, words] = await refused(() => requirePerson(asked(database, null, false)));
  expect([status, words]).toEqual([401, "You are not signed in. Sign in and try again."]);
  expect(await refused(() => requirePaper(asked(database, null, true), "paper-00001", "read"))).toEqual([302, back]);
});

test("to a stranger a paper that is not open looks like one that is not there", async () => {
  const database = openDatabase(await freshDatabase());
  const ines = await someone(database, "Ines");
  const stranger = await someone(database, "Stranger");
  await database.papers.create({ id: "paper-00001", title: "T", authors: "A" }, ines.id);
  for (const page of [true, false]) {
    for (const right of ["read", "write", "own"] as const) {
      const there = await refused(() => requirePaper(asked(database, stranger, page), "paper-00001", right));
      const notThere = await refused(() => requirePaper(asked(database, stranger, page), "paper-99999", right));
      expect(there).toEqual([404, "No such paper, or it is not open to you."]);
      expect(notThere).toEqual(there);
    }
  }
});

test("each may what their role allows", async () => {
  const database = openDatabase(await freshDatabase());
  const people = Object.fromEntries(
    await Promise.all(
      ["owner", "author", "referee", "reader"].map(async (role) => [role, await someone(database, role)] as const),
    ),
  );
  await database.papers.create({ id: "paper-00001", title: "T", authors: "A" }, people.owner?.id ?? "");
  for (const role of ["author", "referee", "reader"] as const) {
    await database.members.add("paper-00001", people[role]?.id ?? "", role);
  }
  const statuses = async (role: string) =>
    Promise.all(
      (["read", "write", "own"] as const).map(
        async (right) =>
          (await refused(() => requirePaper(asked(database, people[role] ?? null, true), "paper-00001", right)))[0],
      ),
    );
  expect(await statuses("owner")).toEqual([200, 200, 200]);
  expect(await statuses("author")).toEqual([200, 200, 403]);
  expect(await statuses("referee")).toEqual([200, 403, 403]);
  expect(await statuses("reader")).toEqual([200, 403, 403]);
});

test("the specimen is read by all, and changed by its authors alone", async () => {
  const database = openDatabase(await freshDatabase());
  const ines = await someone(database, "Ines");
  await database.papers.create({ id: "paper-00001", title: "T", authors: "A", specimen: true }, ines.id);
  const stranger = await someone(database, "Stranger");
  for (const person of [null, stranger]) {
    const access = await requirePaper(asked(database, person, true), "paper-00001", "read");
    expect(access).toMatchObject({ standing: "visitor", person });
  }
  expect((await refused(() => requirePaper(asked(database, stranger, true), "paper-00001", "write")))[0]).toBe(403);
  expect((await refused(() => requirePaper(asked(database, null, false), "paper-00001", "write")))[0]).toBe(401);
});

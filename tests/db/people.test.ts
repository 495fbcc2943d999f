import { expect, test } from "vitest";
import { openDatabase } from "../../db/index.server.ts";
import { freshDatabase } from "../support/database.ts";

const INES = { provider: "github", subject: "1", login: "ines", name: "Inês Valadão", email: "ines@litoral.example" };

test("the first sign-in makes a person, the second finds them", async () => {
  const { people } = openDatabase(await freshDatabase());
  const first = await people.signIn(INES);
  expect(first).toMatchObject({ name: "Inês Valadão", email: "ines@litoral.example" });
  expect(await people.signIn(INES)).toEqual(first);
});

test("two first sign-ins at the same moment make one person", async () => {
  const { people } = openDatabase(await freshDatabase());
  const both = await Promise.all([people.signIn(INES), people.signIn(INES), people.signIn(INES)]);
  expect(new Set(both.map((person) => person.id)).size).toBe(1);
});

test("login and address follow the provider, the name stays as it was set here", async () => {
  const { people } = openDatabase(await freshDatabase());
  const { id } = await people.signIn(INES);
  await people.rename(id, "I. Valadão");
  const again = await people.signIn({ ...INES, login: "valadao", name: "Other", email: "new@litoral.example" });
  expect(again).toEqual({ id, name: "I. Valadão", email: "new@litoral.example" });
  expect(await people.findByLogin("github", "VALADAO")).toMatchObject({ id });
  expect(await people.findByLogin("github", "ines")).toBeUndefined();
});

test("a login that another account has taken leads to that account", async () => {
  const { people } = openDatabase(await freshDatabase());
  await people.signIn(INES);
  const other = await people.signIn({ ...INES, subject: "2", login: "Ines", name: "Another Inês" });
  expect(await people.findByLogin("github", "ines")).toMatchObject({ id: other.id });
});

import type { Database, PersonRow } from "../../db/index.server.ts";

/** A person of a test, signed in at the provider under their own name. */
export function someone(database: Database, name: string): Promise<PersonRow> {
  const login = name.toLowerCase().replaceAll(" ", "-");
  return database.people.signIn({ provider: "github", subject: login, login, name, email: `${login}@test.example` });
}

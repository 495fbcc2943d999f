import { existsSync, readFileSync } from "node:fs";
import { join } from "node:path";
import type { Person } from "../app/context.ts";
import type { Database, Role } from "../db/index.server.ts";
import type { Computations } from "./compute/index.ts";
import { DEMO_PEOPLE, type DemoPerson } from "./fakes/index.ts";
import type { LiveTexts } from "./sync/index.ts";

export interface DemoParts {
  readonly database: Database;
  readonly texts: LiveTexts;
  readonly compute: Computations;
  /** Folder with paper.md and bibliography.bib. */
  readonly folder: string;
  /** What sign-in calls the provider whose accounts the demo people have. */
  readonly provider: string;
}

const SPECIMEN_ID = "specimen-paper";

/**
 * Sets the demo up: its people, the specimen paper with its members, and the paper's results. What is there already
 * stays as it is, so this may run at every start and in several processes.
 * Resolves when the paper may be opened; its results come as they are computed.
 */
export async function prepareDemo(parts: DemoParts): Promise<void> {
  const { database, texts, compute } = parts;
  // Another process that starts at the same moment is at it.
  if (!(await texts.signals.claim("demo"))) return;
  try {
    const members = await signUp(parts);
    const owner = members.find(({ role }) => role === "owner")?.person;
    if (!owner) throw new Error("Nobody of the demo's people owns the specimen paper.");
    if (!(await database.papers.find(SPECIMEN_ID))) {
      await database.papers.create({ id: SPECIMEN_ID, title: "", authors: "", specimen: true }, owner.id);
      for (const { person, role } of members) {
        if (role && role !== "owner") await database.members.add(SPECIMEN_ID, person.id, role);
      }
    }
    if (await texts.isEmpty(SPECIMEN_ID)) await texts.create(SPECIMEN_ID, readSpecimen(parts.folder), owner.id);
    const { cells, work } = await texts.shown(SPECIMEN_ID);
    if (Object.keys(cells).length === 0 && Object.keys(work).length === 0) {
      const text = await texts.read(SPECIMEN_ID);
      const { refused } = await compute.compute({ paperId: SPECIMEN_ID, person: owner, text, cells: "all" });
      if (refused) throw new Error(`The specimen paper was not computed. ${refused.reason}`);
    }
  } finally {
    await texts.signals.release("demo");
  }
}

async function signUp({ database, provider }: DemoParts): Promise<{ person: Person; role: Role | null }[]> {
  return Promise.all(
    DEMO_PEOPLE.map(async ({ subject, login, name, email, role }: DemoPerson) => ({
      person: await database.people.signIn({ provider, subject, login, name, email }),
      role,
    })),
  );
}

function readSpecimen(folder: string): { text: string; bibliography: string } {
  const read = (name: string) => readFileSync(join(folder, name), "utf8");
  return {
    text: read("paper.md"),
    bibliography: existsSync(join(folder, "bibliography.bib")) ? read("bibliography.bib") : "",
  };
}

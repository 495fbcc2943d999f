import type { Knex } from "knex";
import type { Role } from "./members.server.ts";

export interface PaperRow {
  readonly id: string;
  readonly title: string;
  readonly authors: string;
  readonly specimen: boolean;
  readonly changedAt: Date;
}

/** A paper as it stands on somebody's shelf. */
export interface ShelfRow extends PaperRow {
  readonly role: Role;
  readonly putBy: boolean;
  /** Referees are among its members. */
  readonly refereed: boolean;
}

const PAPER = {
  id: "papers.id",
  title: "papers.title",
  authors: "papers.authors",
  specimen: "papers.specimen",
  changedAt: "papers.changed_at",
};

/** A new paper and its owner, in one step. */
export async function create(
  knex: Knex,
  paper: { id: string; title: string; authors: string; specimen?: boolean },
  ownerId: string,
): Promise<void> {
  await knex.transaction(async (trx) => {
    await trx("papers").insert(paper);
    await trx("members").insert({ paper_id: paper.id, person_id: ownerId, role: "owner" });
  });
}

/** The paper's row, if there is such a paper; who may see it is not asked here. */
export async function find(knex: Knex, id: string): Promise<PaperRow | undefined> {
  return knex("papers").where({ id }).first(PAPER);
}

/** The paper and what `personId` is on it; role null for everybody who is not a member. */
export async function findFor(
  knex: Knex,
  id: string,
  personId: string | null,
): Promise<(PaperRow & { readonly role: Role | null }) | undefined> {
  return knex("papers")
    .joinRaw("left join members on members.paper_id = papers.id and members.person_id = ?::uuid", [personId])
    .where("papers.id", id)
    .first({ ...PAPER, role: "members.role" });
}

/** The open example, when it is set up. */
export async function findSpecimen(knex: Knex): Promise<PaperRow | undefined> {
  return knex("papers").where({ specimen: true }).orderBy("created_at").first(PAPER);
}

/** What the text says of itself; called when it changes. */
export async function describe(
  knex: Knex,
  id: string,
  words: { readonly title: string; readonly authors: string },
): Promise<void> {
  await knex("papers").where({ id }).update({ title: words.title, authors: words.authors, changed_at: knex.fn.now() });
}

/** Deletes a paper for ever, with its text, members and record. */
export async function remove(knex: Knex, id: string): Promise<void> {
  await knex("papers").where({ id }).delete();
}

/**
 * All papers of a person, the last changed first.
 * @param words found in title or authors, in any case; "" finds all
 */
export async function shelf(knex: Knex, personId: string, words: string): Promise<ShelfRow[]> {
  const query = knex("papers")
    .join("members", "members.paper_id", "papers.id")
    .where("members.person_id", personId)
    .orderBy("papers.changed_at", "desc")
    .select({
      ...PAPER,
      role: "members.role",
      putBy: knex.raw("members.put_by_at is not null"),
      refereed: knex.raw("exists (select 1 from members r where r.paper_id = papers.id and r.role = 'referee')"),
    });
  if (words !== "") {
    const pattern = `%${words.replace(/[\\%_]/g, "\\$&")}%`;
    query.whereRaw("(papers.title ilike ? or papers.authors ilike ?)", [pattern, pattern]);
  }
  return query;
}

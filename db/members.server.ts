import type { Knex } from "knex";

/** What somebody may do on a paper; see app/access/roles.ts for what each allows. */
export type Role = "owner" | "author" | "referee" | "reader";

export interface MemberRow {
  readonly personId: string;
  readonly name: string;
  readonly login: string;
  readonly role: Role;
}

/** Why a change of members was not made. */
export type MemberRefusal = "already-there" | "not-there" | "last-owner";

/** Everybody on a paper, in the order they came. */
export async function list(knex: Knex, paperId: string): Promise<MemberRow[]> {
  return knex("members")
    .join("people", "people.id", "members.person_id")
    .where("members.paper_id", paperId)
    .orderBy("members.added_at")
    .orderBy("people.name")
    .select({
      personId: "people.id",
      name: "people.name",
      role: "members.role",
      login: knex.raw("coalesce((select max(login) from identities i where i.person_id = people.id), '')"),
    });
}

/** Gives a person a role on a paper; refused when they have one, which then stays as it is. */
export async function add(
  knex: Knex,
  paperId: string,
  personId: string,
  role: Role,
): Promise<Extract<MemberRefusal, "already-there"> | null> {
  const inserted = await knex("members")
    .insert({ paper_id: paperId, person_id: personId, role })
    .onConflict(["paper_id", "person_id"])
    .ignore()
    .returning("role");
  return inserted.length === 1 ? null : "already-there";
}

/** Gives a member another role. A paper keeps at least one owner. */
export async function changeRole(
  knex: Knex,
  paperId: string,
  personId: string,
  role: Role,
): Promise<Exclude<MemberRefusal, "already-there"> | null> {
  return changeMember(knex, paperId, personId, role, (trx) =>
    trx("members").where({ paper_id: paperId, person_id: personId }).update({ role }),
  );
}

/** Takes a member off a paper. What they wrote stays, under their name. */
export async function remove(
  knex: Knex,
  paperId: string,
  personId: string,
): Promise<Exclude<MemberRefusal, "already-there"> | null> {
  return changeMember(knex, paperId, personId, null, (trx) =>
    trx("members").where({ paper_id: paperId, person_id: personId }).delete(),
  );
}

/** Puts a paper by for one person, or brings it back to the desk. */
export async function putBy(knex: Knex, paperId: string, personId: string, by: boolean): Promise<void> {
  await knex("members")
    .where({ paper_id: paperId, person_id: personId })
    .update({ put_by_at: by ? knex.fn.now() : null });
}

async function changeMember(
  knex: Knex,
  paperId: string,
  personId: string,
  becomes: Role | null,
  change: (trx: Knex.Transaction) => Promise<unknown>,
): Promise<Exclude<MemberRefusal, "already-there"> | null> {
  return knex.transaction(async (trx) => {
    // Two owners who step down at the same moment must not leave the paper without one.
    const members = await trx("members").where({ paper_id: paperId }).forUpdate().select("person_id", "role");
    const member = members.find((row) => row.person_id === personId);
    if (!member) return "not-there";
    const owners = members.filter((row) => row.role === "owner");
    if (member.role === "owner" && becomes !== "owner" && owners.length === 1) return "last-owner";
    await change(trx);
    return null;
  });
}

import type { MemberRow } from "../../../db/index.server.ts";
import type { Standing } from "../../access/index.ts";

export interface PeopleGroup {
  readonly name: string;
  /** What those under the heading may do. */
  readonly may: string;
  readonly members: readonly MemberRow[];
}

/**
 * The people of a paper under their headings, as far as the one who asks may know them: those who write know all,
 * the others know the authors and themselves.
 */
export function groupPeople(
  members: readonly MemberRow[],
  asker: { readonly standing: Standing; readonly personId: string | null },
): readonly PeopleGroup[] {
  const knowsAll = asker.standing === "owner" || asker.standing === "author";
  const known = members.filter(
    ({ role, personId }) => knowsAll || role === "owner" || role === "author" || personId === asker.personId,
  );
  const owners = known.filter(({ role }) => role === "owner");
  const authors = known.filter(({ role }) => role === "author");
  return [
    { name: "Authors", may: "write, change parameters, recompute", members: [...owners, ...authors] },
    { name: "Referees", may: "read the sheet and the galley", members: known.filter(({ role }) => role === "referee") },
    { name: "Readers", may: "read the sheet and the galley", members: known.filter(({ role }) => role === "reader") },
  ];
}

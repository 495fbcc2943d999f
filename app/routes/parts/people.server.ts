import { z } from "zod";
import { type Asked, refusal, requirePaper } from "../../access/index.server.ts";
import { databaseContext, servicesContext } from "../../context.ts";

/** What is wrong with the form, at its field; null when it was done. */
export type PeopleFault = { readonly at: "login" | "member"; readonly message: string } | null;

const role = z.enum(["owner", "author", "referee", "reader"]);
const shape = z.discriminatedUnion("intent", [
  z.object({ intent: z.literal("add"), login: z.string(), role }),
  z.object({ intent: z.literal("change"), member: z.uuid(), role }),
  z.object({ intent: z.literal("remove"), member: z.uuid() }),
  z.object({ intent: z.literal("leave") }),
]);

type Wish = z.infer<typeof shape>;

const LAST_OWNER = "A paper keeps at least one owner. Make somebody else an owner first.";
const GONE = "They are no longer on this paper.";

/** Adds, changes or removes people of a paper. Owners may all of it; everybody may take themselves off. */
export async function changePeople(
  asked: Asked,
  paperId: string,
  form: FormData,
): Promise<{ fault: PeopleFault; left: boolean }> {
  const read = shape.safeParse(Object.fromEntries(form));
  if (!read.success) throw refusal(400, "The form says nothing to be done.");
  const wish = read.data;
  if (wish.intent === "leave") {
    const { person, standing } = await requirePaper(asked, paperId, "read");
    if (!person || standing === "visitor") throw refusal(403, "You are not on this paper.");
    const fault = await removeMember(asked, paperId, person.id);
    return { fault, left: fault === null };
  }
  await requirePaper(asked, paperId, "own");
  return { fault: await changed(asked, paperId, wish), left: false };
}

async function changed(asked: Asked, paperId: string, wish: Exclude<Wish, { intent: "leave" }>): Promise<PeopleFault> {
  if (wish.intent === "add") return addMember(asked, paperId, wish.login, wish.role);
  if (wish.intent === "remove") return removeMember(asked, paperId, wish.member);
  const refused = await asked.context.get(databaseContext).members.changeRole(paperId, wish.member, wish.role);
  await readRoleAgain(asked, paperId, wish.member);
  return refused && { at: "member", message: refused === "last-owner" ? LAST_OWNER : GONE };
}

async function addMember(
  asked: Asked,
  paperId: string,
  written: string,
  as: z.infer<typeof role>,
): Promise<PeopleFault> {
  const { people, members } = asked.context.get(databaseContext);
  const login = written.trim().replace(/^@/, "");
  if (login === "") return { at: "login", message: "Write the name they sign in with on GitHub." };
  const person = await people.findByLogin("github", login);
  if (!person) {
    return { at: "login", message: `Nobody has signed in as “${login}” yet. Ask them to sign in once, then add them.` };
  }
  const refused = await members.add(paperId, person.id, as);
  if (refused) return { at: "login", message: `${person.name} is on this paper already. Change their role below.` };
  await readRoleAgain(asked, paperId, person.id);
  return null;
}

async function removeMember(asked: Asked, paperId: string, personId: string): Promise<PeopleFault> {
  const refused = await asked.context.get(databaseContext).members.remove(paperId, personId);
  if (refused === "last-owner") return { at: "member", message: LAST_OWNER };
  await readRoleAgain(asked, paperId, personId);
  return null;
}

/** Sockets that are open were admitted under the old role. */
async function readRoleAgain(asked: Asked, paperId: string, personId: string): Promise<void> {
  await asked.context.get(servicesContext).texts.closeSockets(paperId, personId);
}

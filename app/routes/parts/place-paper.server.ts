import { randomBytes } from "node:crypto";
import type { RouterContextProvider } from "react-router";
import { databaseContext, type PaperText, type Person, servicesContext } from "../../context.ts";

/** 72 bits: ids are not guessed, and need no look whether they are taken. */
const ID_BYTES = 9;

/** Puts a new paper with its first text on the owner's desk, and returns its id. */
export async function placePaper(
  context: Readonly<RouterContextProvider>,
  owner: Person,
  words: { readonly title: string; readonly authors: string },
  text: PaperText,
): Promise<string> {
  const { papers } = context.get(databaseContext);
  const id = randomBytes(ID_BYTES).toString("base64url");
  await papers.create({ id, ...words }, owner.id);
  try {
    await context.get(servicesContext).texts.create(id, text, owner.id);
  } catch (error) {
    // A paper without a text opens for nobody.
    await papers.remove(id);
    throw error;
  }
  return id;
}

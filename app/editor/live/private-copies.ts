/**
 * The copy of a paper's text that this browser keeps for a person, so that a reload or a spell without connection
 * loses nothing. Signing out removes it (the server asks the browser to clear what it stores), so does the loss of
 * access, and so does another person who opens a sheet here.
 */
const PREFIX = "halfline/";

/** Name of the browser database that holds the private copy of a paper's text. */
export function privateCopyName(paperId: string, personId: string): string {
  return `${PREFIX}${personId}/${paperId}`;
}

/** Removes the private copies of everyone but `personId`. Resolves when they are gone or were never there. */
export async function forgetPrivateCopies(personId: string): Promise<void> {
  if (typeof indexedDB === "undefined" || typeof indexedDB.databases !== "function") return;
  const keep = `${PREFIX}${personId}/`;
  const names = (await indexedDB.databases()).flatMap(({ name }) => (name?.startsWith(PREFIX) ? [name] : []));
  await Promise.all(names.filter((name) => !name.startsWith(keep)).map(removeDatabase));
}

/** Removes one paper's private copy. */
export function forgetPrivateCopy(paperId: string, personId: string): Promise<void> {
  return removeDatabase(privateCopyName(paperId, personId));
}

function removeDatabase(name: string): Promise<void> {
  return new Promise((resolve) => {
    const request = indexedDB.deleteDatabase(name);
    request.onsuccess = () => resolve();
    request.onerror = () => resolve();
    // Another tab has it open: it is removed when that tab closes.
    request.onblocked = () => resolve();
  });
}

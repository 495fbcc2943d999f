import * as Y from "yjs";

/**
 * True when the document has everything that the update says already: all its structs lie below the document's state
 * and all it deletes is deleted. A page that comes back repeats every deletion ever made; such rows are not kept twice.
 */
export function addsNothing(doc: Y.Doc, update: Uint8Array): boolean {
  const { structs, ds } = Y.decodeUpdate(update);
  for (const struct of structs) {
    // A gap within the update says nothing.
    if (struct instanceof Y.Skip) continue;
    if (struct.id.clock + struct.length > Y.getState(doc.store, struct.id.client)) return false;
  }
  for (const [client, ranges] of ds.clients) {
    for (const { clock, len } of ranges) if (!isDeleted(doc, client, clock, clock + len)) return false;
  }
  return true;
}

/** True when every item `from`..`to` of a client is in the document and deleted there. */
function isDeleted(doc: Y.Doc, client: number, from: number, to: number): boolean {
  if (to > Y.getState(doc.store, client)) return false;
  const structs = doc.store.clients.get(client) ?? [];
  for (let i = Y.findIndexSS(structs, from); i < structs.length; i++) {
    const struct = structs[i];
    if (!struct || struct.id.clock >= to) break;
    if (!struct.deleted) return false;
  }
  return true;
}

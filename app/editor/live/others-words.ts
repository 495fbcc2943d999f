import { peekVarUint, readVarUint, readVarUint8Array } from "lib0/decoding";
import { applyAwarenessUpdate } from "y-protocols/awareness";
import { messageYjsUpdate } from "y-protocols/sync";
import { messageAwareness, messageSync, type WebsocketProvider } from "y-websocket";
import * as Y from "yjs";

/** What the others write and where they stand comes into the page at most once in this time [ms]. */
const BETWEEN_MS = 120;

/**
 * Takes in what the others write together, instead of letter by letter: each change that comes costs the page as much as
 * a key of one's own, and five who write send thirty in a second. The first after a quiet spell is taken in at once.
 * What the server says of the text as a whole, when page and server are joined, is never kept waiting. Call it before
 * the provider connects.
 * @returns ends it; what waits is dropped, as with the provider
 */
export function gatherOthersWords(provider: WebsocketProvider): () => void {
  let updates: Uint8Array[] = [];
  let places: Uint8Array[] = [];
  let timer: ReturnType<typeof setTimeout> | undefined;
  let takenAt = Number.NEGATIVE_INFINITY;
  const takeIn = () => {
    clearTimeout(timer);
    timer = undefined;
    takenAt = Date.now();
    const [written, moved] = [updates, places];
    updates = [];
    places = [];
    // Carets first: they are drawn with the words that come in after them.
    for (const place of moved) applyAwarenessUpdate(provider.awareness, place, provider);
    if (written.length === 0) return;
    Y.transact(
      provider.doc,
      () => {
        for (const update of written) Y.applyUpdate(provider.doc, update, provider);
      },
      provider,
      false,
    );
  };
  const soon = () => {
    timer ??= setTimeout(takeIn, Math.max(0, takenAt + BETWEEN_MS - Date.now()));
  };
  const { [messageSync]: hearSync, [messageAwareness]: hearAwareness } = provider.messageHandlers;
  provider.messageHandlers[messageSync] = (encoder, decoder, of, emitSynced, type) => {
    if (provider.synced && peekVarUint(decoder) === messageYjsUpdate) {
      readVarUint(decoder);
      updates.push(readVarUint8Array(decoder));
      soon();
      return;
    }
    takeIn();
    hearSync?.(encoder, decoder, of, emitSynced, type);
  };
  provider.messageHandlers[messageAwareness] = (encoder, decoder, of, emitSynced, type) => {
    if (!provider.synced) {
      hearAwareness?.(encoder, decoder, of, emitSynced, type);
      return;
    }
    places.push(readVarUint8Array(decoder));
    soon();
  };
  // Whoever leaves with the connection must not come back out of what waited.
  provider.on("connection-close", takeIn);
  return () => {
    clearTimeout(timer);
    provider.off("connection-close", takeIn);
  };
}

import { IndexeddbPersistence } from "y-indexeddb";
import * as Y from "yjs";
import { privateCopyName } from "./private-copies.ts";

/** Updates are stored together at most so long after the first of them [ms]: one write for a burst of letters. */
const GATHER_MS = 1000;

/** The text's copy in this browser, which keeps what the server has not heard of yet. */
export interface PrivateCopy {
  /** What was in the copy is in the text; what is typed before stays as well. */
  readonly whenRead: Promise<unknown>;
  /** Whether an update came out of the copy. */
  isOrigin(origin: unknown): boolean;
  /** Stores what is gathered and lets go of the copy. */
  close(): Promise<void>;
}

/**
 * Opens the private copy of a paper's text. Its library writes each update by itself, which costs the page more than
 * the keystroke: here they are gathered, and written at once when the page is hidden or left.
 */
export function openPrivateCopy(paperId: string, personId: string, doc: Y.Doc): PrivateCopy {
  const copy = new IndexeddbPersistence(privateCopyName(paperId, personId), doc);
  doc.off("update", copy._storeUpdate);
  let gathered: Uint8Array[] = [];
  let timer: ReturnType<typeof setTimeout> | undefined;
  const store = () => {
    clearTimeout(timer);
    timer = undefined;
    if (gathered.length > 0) copy._storeUpdate(Y.mergeUpdates(gathered), null);
    gathered = [];
  };
  const gather = (update: Uint8Array, origin: unknown) => {
    if (origin === copy) return;
    gathered.push(update);
    timer ??= setTimeout(store, GATHER_MS);
  };
  doc.on("update", gather);
  window.addEventListener("pagehide", store);
  document.addEventListener("visibilitychange", store);
  return {
    whenRead: copy.whenSynced,
    isOrigin: (origin) => origin === copy,
    async close() {
      store();
      doc.off("update", gather);
      window.removeEventListener("pagehide", store);
      document.removeEventListener("visibilitychange", store);
      await copy.destroy();
    },
  };
}

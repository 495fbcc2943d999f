import { readVarUint, readVarUint8Array } from "lib0/decoding";
import type { WebsocketProvider } from "y-websocket";
import { MESSAGE_KEPT } from "./protocol.ts";

const CALM_MS = 250;

/** How far the server has committed what this page wrote. */
export interface Kept {
  /** True when everything written here is committed. False before the first answer and while there is no connection. */
  readonly all: boolean;
  /** When the last commit of this page's words was heard of; null before the first. */
  readonly at: Date | null;
}

/**
 * Watches which of the page's edits are committed. Call it before the provider connects.
 * @param onChange called when an edit is made and when one is acknowledged
 * @param calmMs so long after the last edit it is told that all is kept: not once for each letter, and never before it is so
 * @returns ends the watch
 */
export function watchKept(
  provider: WebsocketProvider,
  onChange: (kept: Kept) => void,
  calmMs: number = CALM_MS,
): () => void {
  let sent = 0;
  let kept = 0;
  let joined = false;
  let at: Date | null = null;
  let editedAt = Number.NEGATIVE_INFINITY;
  let timer: ReturnType<typeof setTimeout> | undefined;
  let told: Kept | null = null;
  const tell = () => {
    clearTimeout(timer);
    const all = joined && kept === sent;
    const calm = editedAt + calmMs - Date.now();
    if (all && calm > 0) {
      timer = setTimeout(tell, calm);
      return;
    }
    if (told?.all === all && told.at === at) return;
    told = { all, at };
    onChange(told);
  };

  const onStatus = ({ status }: { status: string }) => {
    if (status !== "connecting") {
      sent = 0;
      kept = 0;
      joined = false;
      tell();
    }
  };
  // The provider sends one frame for each update that did not come through it, while it is connected.
  const onUpdate = (_update: Uint8Array, origin: unknown) => {
    if (origin === provider) return;
    editedAt = Date.now();
    if (provider.wsconnected) sent += 1;
    tell();
  };
  provider.messageHandlers[MESSAGE_KEPT] = (_encoder, decoder) => {
    readVarUint8Array(decoder);
    joined = readVarUint(decoder) === 1;
    kept = readVarUint(decoder);
    at = new Date();
    tell();
  };

  provider.on("status", onStatus);
  provider.doc.on("update", onUpdate);
  return () => {
    clearTimeout(timer);
    provider.off("status", onStatus);
    provider.doc.off("update", onUpdate);
  };
}

import type { WebsocketProvider } from "y-websocket";

/** Longest wait for the server's answer when the browser says that it is offline [ms]. */
const PATIENCE_MS = 3000;

/**
 * Lets go of the server as soon as the browser knows that there is no network, and takes hold of it again with the
 * network. A socket alone notices its loss only when nothing has come for half a minute. A server on this very machine
 * answers without any network: it is kept.
 * @returns ends the watch
 */
export function followNetwork(
  provider: WebsocketProvider,
  answers: () => Promise<boolean> = serverAnswers,
): () => void {
  let left = false;
  let ended = false;
  const onOffline = async () => {
    if (!provider.wsconnected || (await answers())) return;
    if (ended || navigator.onLine || !provider.wsconnected) return;
    left = true;
    provider.disconnect();
  };
  const onOnline = () => {
    if (left) provider.connect();
    left = false;
  };
  window.addEventListener("offline", onOffline);
  window.addEventListener("online", onOnline);
  return () => {
    ended = true;
    window.removeEventListener("offline", onOffline);
    window.removeEventListener("online", onOnline);
  };
}

async function serverAnswers(): Promise<boolean> {
  try {
    const signal = AbortSignal.timeout(PATIENCE_MS);
    return (await fetch("/healthz", { method: "HEAD", cache: "no-store", signal })).ok;
  } catch {
    return false;
  }
}

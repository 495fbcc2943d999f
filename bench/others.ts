import WebSocket from "ws";
import { WebsocketProvider } from "y-websocket";
import * as Y from "yjs";
import { MESSAGE_KEPT, SOCKET_PATHS, TEXT_NAME } from "../app/editor/protocol.ts";
import type { ServedPaper } from "./served-paper.ts";

/** Between two letters of one of the others [ms]. */
const PACE_MS = 180;
/** Longest wait for one of them to have the text [ms]. */
const PATIENCE_MS = 30_000;

/** Others who write in the same paper at once, each in a paragraph of their own, with carets that move. */
export async function othersTyping(
  count: number,
  served: ServedPaper,
  cookie: string,
): Promise<{ readonly end: () => void }> {
  const headers = { cookie, origin: served.url };
  class OwnSocket extends WebSocket {
    constructor(address: string | URL, protocols?: string | string[]) {
      super(address, protocols, { headers });
    }
  }
  const paper = served.path.split("/").at(-1) ?? "";
  const ends = await Promise.all(
    Array.from({ length: count }, async (_, who) => {
      const doc = new Y.Doc();
      const provider = new WebsocketProvider(served.url.replace("http", "ws") + SOCKET_PATHS.text, paper, doc, {
        // The library asks for the browser's own class; ws has all that it uses.
        WebSocketPolyfill: OwnSocket as unknown as typeof globalThis.WebSocket,
        disableBc: true,
      });
      // What is committed is told to each that writes; nobody is asked here.
      provider.messageHandlers[MESSAGE_KEPT] = () => undefined;
      await synced(provider);
      const text = doc.getText(TEXT_NAME);
      const share = (who + 1) / (count + 2);
      let at = Y.createRelativePositionFromTypeIndex(text, placeIn(text.toString(), share));
      const timer = setInterval(() => {
        const index = Y.createAbsolutePositionFromRelativePosition(at, doc)?.index ?? 0;
        text.insert(index, "a");
        at = Y.createRelativePositionFromTypeIndex(text, index + 1);
        const caret = Y.relativePositionToJSON(at);
        provider.awareness.setLocalState({
          user: { name: `Other ${who + 1}` },
          cursor: { anchor: caret, head: caret },
        });
      }, PACE_MS);
      return () => {
        clearInterval(timer);
        provider.destroy();
        doc.destroy();
      };
    }),
  );
  return {
    end: () => {
      for (const end of ends) end();
    },
  };
}

/** Within the words of a paragraph. */
function placeIn(text: string, share: number): number {
  return text.indexOf("\n\nThe ", Math.floor(text.length * share)) + 6;
}

function synced(provider: WebsocketProvider): Promise<void> {
  return new Promise((done, fail) => {
    const timer = setTimeout(() => fail(new Error("One of the others was not let in.")), PATIENCE_MS);
    provider.once("sync", () => {
      clearTimeout(timer);
      done();
    });
  });
}

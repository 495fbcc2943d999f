import { createDecoder } from "lib0/decoding";
import * as encoding from "lib0/encoding";
import { afterEach, beforeEach, expect, test, vi } from "vitest";
import WebSocket from "ws";
import { Awareness, encodeAwarenessUpdate } from "y-protocols/awareness";
import { writeUpdate } from "y-protocols/sync";
import { WebsocketProvider } from "y-websocket";
import * as Y from "yjs";
import { gatherOthersWords } from "../../app/editor/live/others-words.ts";
import { MESSAGE_AWARENESS, MESSAGE_SYNC } from "../../app/editor/protocol.ts";

const ends: (() => void)[] = [];
beforeEach(() => vi.useFakeTimers());
afterEach(() => {
  for (const end of ends.splice(0)) end();
  vi.useRealTimers();
});

/** A page that is joined with a server, and somebody else who writes. */
function page() {
  const doc = new Y.Doc();
  const provider = new WebsocketProvider("ws://nowhere", "paper", doc, {
    connect: false,
    disableBc: true,
    // The library asks for the browser's own class, which Node 20 has not.
    WebSocketPolyfill: WebSocket as unknown as typeof globalThis.WebSocket,
  });
  const end = gatherOthersWords(provider);
  provider.synced = true;
  const other = new Y.Doc();
  const updates: Uint8Array[] = [];
  other.on("update", (update: Uint8Array) => updates.push(update));
  const hear = (type: number, write: (encoder: encoding.Encoder) => void) => {
    const encoder = encoding.createEncoder();
    write(encoder);
    const decoder = createDecoder(encoding.toUint8Array(encoder));
    provider.messageHandlers[type]?.(encoding.createEncoder(), decoder, provider, true, type);
  };
  let changes = 0;
  doc.getText("text").observe(({ transaction }) => {
    changes += 1;
    expect(transaction.origin).toBe(provider);
    expect(transaction.local).toBe(false);
  });
  ends.push(() => {
    end();
    provider.destroy();
  });
  return {
    provider,
    text: () => doc.getText("text").toString(),
    changes: () => changes,
    write(words: string) {
      other.getText("text").insert(other.getText("text").length, words);
      for (const update of updates.splice(0)) hear(MESSAGE_SYNC, (encoder) => writeUpdate(encoder, update));
    },
    stand(awareness: Awareness) {
      const update = encodeAwarenessUpdate(awareness, [awareness.clientID]);
      hear(MESSAGE_AWARENESS, (encoder) => encoding.writeVarUint8Array(encoder, update));
    },
  };
}

test("the first letter after a quiet spell comes in at once, a burst together", () => {
  const { write, text, changes } = page();
  write("a");
  vi.advanceTimersByTime(1);
  expect(text()).toBe("a");
  for (const letter of "bcdef") write(letter);
  vi.advanceTimersByTime(60);
  expect(text()).toBe("a");
  vi.advanceTimersByTime(100);
  expect(text()).toBe("abcdef");
  expect(changes()).toBe(2);
});

test("carets come in before the words that they stand behind", () => {
  const { provider, write, stand, text } = page();
  const awareness = new Awareness(new Y.Doc());
  awareness.setLocalState({ user: { name: "Inês" } });
  const order: string[] = [];
  provider.awareness.on("change", () => order.push("caret"));
  provider.doc.getText("text").observe(() => order.push("words"));
  write("a");
  stand(awareness);
  expect(order).toEqual([]);
  vi.advanceTimersByTime(1);
  expect(order).toEqual(["caret", "words"]);
  expect(text()).toBe("a");
  awareness.destroy();
});

test("with the connection goes nothing that has come", () => {
  const { provider, write, text } = page();
  write("a");
  vi.advanceTimersByTime(1);
  write("b");
  provider.emit("connection-close", [null, provider]);
  expect(text()).toBe("ab");
});

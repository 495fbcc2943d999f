import { createDecoder, hasContent, readVarUint, readVarUint8Array } from "lib0/decoding";
import { createEncoder, toUint8Array, writeVarUint, writeVarUint8Array } from "lib0/encoding";
import { writeSyncStep1, writeSyncStep2, writeUpdate } from "y-protocols/sync";
import * as Y from "yjs";
import { MESSAGE_AWARENESS, MESSAGE_KEPT, MESSAGE_QUERY_AWARENESS, MESSAGE_SYNC } from "../../app/editor/protocol.ts";

/** What a page may send. Bodies are copies: the socket's buffer is used again after the frame. */
export type Frame =
  /** "This is how far I am": answered with what is missing there. */
  | { readonly frame: "state"; readonly stateVector: Uint8Array }
  /** `joining`: the answer to our own state, otherwise an edit. */
  | { readonly frame: "update"; readonly update: Uint8Array; readonly joining: boolean }
  | { readonly frame: "presence"; readonly presence: Uint8Array }
  | { readonly frame: "askPresence" };

const SYNC_STEP_1 = 0;
const SYNC_STEP_2 = 1;
const SYNC_UPDATE = 2;

/**
 * Reads one frame. Decoder in, value out: nothing is applied, and an update's own bytes are not looked at yet
 * (`checkUpdate`), since that costs time that only a writer may take.
 * @throws Error when it is none of ours
 */
export function readFrame(bytes: Uint8Array): Frame {
  const decoder = createDecoder(bytes);
  const type = readVarUint(decoder);
  if (type === MESSAGE_QUERY_AWARENESS) return { frame: "askPresence" };
  if (type === MESSAGE_AWARENESS) return { frame: "presence", presence: readVarUint8Array(decoder).slice() };
  if (type !== MESSAGE_SYNC) throw new Error(`A frame of type ${type} is none that a page may send.`);

  const step = readVarUint(decoder);
  const body = readVarUint8Array(decoder).slice();
  if (hasContent(decoder)) throw new Error("A frame has bytes after its end.");
  if (step === SYNC_STEP_1) {
    Y.decodeStateVector(body);
    return { frame: "state", stateVector: body };
  }
  if (step !== SYNC_STEP_2 && step !== SYNC_UPDATE) throw new Error(`Sync step ${step} does not exist.`);
  return { frame: "update", update: body, joining: step === SYNC_STEP_2 };
}

/** True. @throws Error when the bytes are no update that can be read */
export function checkUpdate(update: Uint8Array): true {
  Y.decodeUpdate(update);
  return true;
}

/** "This is how far the server is." */
export function stateFrame(doc: Y.Doc): Uint8Array {
  const encoder = createEncoder();
  writeVarUint(encoder, MESSAGE_SYNC);
  writeSyncStep1(encoder, doc);
  return toUint8Array(encoder);
}

/** What a page that has `stateVector` lacks. */
export function missingFrame(doc: Y.Doc, stateVector: Uint8Array): Uint8Array {
  const encoder = createEncoder();
  writeVarUint(encoder, MESSAGE_SYNC);
  writeSyncStep2(encoder, doc, stateVector);
  return toUint8Array(encoder);
}

/** Something new in the document. */
export function updateFrame(update: Uint8Array): Uint8Array {
  const encoder = createEncoder();
  writeVarUint(encoder, MESSAGE_SYNC);
  writeUpdate(encoder, update);
  return toUint8Array(encoder);
}

/** Who is here and where their carets stand, as y-protocols encodes it. */
export function presenceFrame(presence: Uint8Array): Uint8Array {
  const encoder = createEncoder();
  writeVarUint(encoder, MESSAGE_AWARENESS);
  writeVarUint8Array(encoder, presence);
  return toUint8Array(encoder);
}

/** Says nothing about nobody: y-websocket takes a connection for dead after 30 s without a frame. */
export const HEARTBEAT_FRAME = presenceFrame(new Uint8Array([0]));

/** See MESSAGE_KEPT for the layout. */
export function keptFrame(doc: Y.Doc, joined: boolean, updates: number): Uint8Array {
  const encoder = createEncoder();
  writeVarUint(encoder, MESSAGE_KEPT);
  writeVarUint8Array(encoder, Y.encodeStateVector(doc));
  writeVarUint(encoder, joined ? 1 : 0);
  writeVarUint(encoder, updates);
  return toUint8Array(encoder);
}

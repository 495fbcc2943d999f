import { createDecoder, readVarString, readVarUint } from "lib0/decoding";
import { createEncoder, toUint8Array, writeVarString, writeVarUint } from "lib0/encoding";
import type { Author } from "./room.ts";

/** A page is one client; one that was reloaded in the same connection may bring a second. */
const MOST_CLIENTS = 4;
/** Characters of a page's state: where its caret is, and little more. Fits, as base64, into a signal (8,000 bytes). */
const LONGEST_STATE = 1_500;

/** Which client ids of a room belong to which connection: the first that speaks for an id has it. */
export interface Claims {
  owner(client: number): object | undefined;
  claim(client: number, owner: object): void;
}

/**
 * A page's presence as it may be passed on: only for its own client ids, and under the name of the person whose
 * session it is. What else a page says about itself (its caret) is passed on as it stands.
 * Layout of y-protocols: count, then for each client its id, its clock, and its state as JSON ("null": gone).
 * @returns null when nothing is left
 * @throws Error when it cannot be read or is too large
 */
export function certifyPresence(
  presence: Uint8Array,
  connection: object,
  person: Author,
  claims: Claims,
  owned: Set<number>,
): Uint8Array | null {
  const decoder = createDecoder(presence);
  const count = readVarUint(decoder);
  const kept: { client: number; clock: number; state: string }[] = [];
  for (let i = 0; i < count; i++) {
    const client = readVarUint(decoder);
    const clock = readVarUint(decoder);
    const state = readVarString(decoder);
    if (state.length > LONGEST_STATE) throw new Error(`A presence is longer than ${LONGEST_STATE} characters.`);
    const owner = claims.owner(client);
    if (owner !== undefined && owner !== connection) continue;
    if (owner === undefined) {
      if (owned.size >= MOST_CLIENTS) continue;
      claims.claim(client, connection);
      owned.add(client);
    }
    kept.push({ client, clock, state: certifyState(state, person) });
  }
  if (kept.length === 0) return null;

  const encoder = createEncoder();
  writeVarUint(encoder, kept.length);
  for (const { client, clock, state } of kept) {
    writeVarUint(encoder, client);
    writeVarUint(encoder, clock);
    writeVarString(encoder, state);
  }
  return toUint8Array(encoder);
}

/** The client that a presence of one client speaks of. */
export function clientOf(presence: Uint8Array): number {
  const decoder = createDecoder(presence);
  readVarUint(decoder);
  return readVarUint(decoder);
}

function certifyState(json: string, person: Author): string {
  const state: unknown = JSON.parse(json);
  if (state === null) return "null";
  if (typeof state !== "object" || Array.isArray(state)) throw new Error("A presence is not an object.");
  return JSON.stringify({ ...state, user: { name: person.name } });
}

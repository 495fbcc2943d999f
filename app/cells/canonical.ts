import { toHexString } from "lib0/buffer";
import { digest } from "lib0/hash/sha256";

/**
 * The canonical JSON text of a value: no white space, members sorted by the UTF-16 code units of their names, numbers and
 * strings as ECMAScript prints them. Members whose value is undefined are left out, as JSON.stringify does.
 * Source: RFC 8785 (JSON Canonicalization Scheme), sections 3.2.1 to 3.2.4.
 * @throws TypeError for what JSON cannot hold: NaN, infinities, lone surrogates, functions, big integers.
 */
export function canonicalJson(value: unknown): string {
  if (value === null || typeof value === "boolean") return String(value);
  if (typeof value === "number") return canonicalNumber(value);
  if (typeof value === "string") return canonicalString(value);
  if (Array.isArray(value)) return `[${value.map((item) => canonicalJson(item)).join(",")}]`;
  if (typeof value === "object") return canonicalObject(value);
  throw new TypeError(`Canonical JSON cannot hold a ${typeof value}.`);
}

/** Lower-case hexadecimal SHA-256 of the UTF-8 bytes of a text. Source: FIPS 180-4, by lib0. */
export function sha256(text: string): string {
  return toHexString(digest(new TextEncoder().encode(text)));
}

function canonicalNumber(value: number): string {
  if (!Number.isFinite(value)) throw new TypeError(`Canonical JSON cannot hold ${value}.`);
  return JSON.stringify(value);
}

function canonicalString(value: string): string {
  if (LONE_SURROGATE.test(value))
    throw new TypeError("Canonical JSON cannot hold half a character (a lone surrogate).");
  return JSON.stringify(value);
}

function canonicalObject(value: object): string {
  const members = Object.entries(value).filter(([, member]) => member !== undefined);
  members.sort(([a], [b]) => (a < b ? -1 : 1));
  return `{${members.map(([name, member]) => `${canonicalString(name)}:${canonicalJson(member)}`).join(",")}}`;
}

/** A high surrogate that no low one follows, or a low one that no high one precedes. */
const LONE_SURROGATE = /[\uD800-\uDBFF](?![\uDC00-\uDFFF])|(?<![\uD800-\uDBFF])[\uDC00-\uDFFF]/;

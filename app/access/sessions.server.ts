import { createHash, randomBytes } from "node:crypto";
import type { Database } from "../../db/index.server.ts";
import type { AppConfig, Person } from "../context.ts";
import { SESSION_LIFETIME_DAYS, sessionCookie } from "./cookies.server.ts";

const SECRET_BYTES = 32;

export interface Session {
  readonly person: Person;
  /** SHA-256 of the cookie's secret, hex: names the session without opening it. */
  readonly hash: string;
}

/** The live session of a `Cookie` header, or null. Also for sockets, which have no request of ours. */
export async function readSession(
  config: AppConfig,
  database: Database,
  cookieHeader: string | null | undefined,
): Promise<Session | null> {
  const hash = await sessionHash(config, cookieHeader);
  if (hash === null) return null;
  const person = await database.sessions.findPerson(hash);
  return person ? { person, hash } : null;
}

/**
 * Begins a session and ends the one the browser had, so that a session known before the sign-in is worth nothing after.
 * @returns the `Set-Cookie` header, and the hash of the session that has ended
 */
export async function beginSession(
  config: AppConfig,
  database: Database,
  personId: string,
  cookieHeader: string | null,
): Promise<{ readonly setCookie: string; readonly former: string | null }> {
  const former = await sessionHash(config, cookieHeader);
  if (former !== null) await database.sessions.end(former);
  const secret = randomBytes(SECRET_BYTES).toString("base64url");
  await database.sessions.begin(hashOf(secret), personId, SESSION_LIFETIME_DAYS);
  return { setCookie: await sessionCookie(config).serialize(secret), former };
}

/** Takes the session's cookie away, and with it the private copies of texts that the browser keeps for this person. */
export async function signedOutHeaders(config: AppConfig): Promise<Record<string, string>> {
  return {
    "Set-Cookie": await sessionCookie(config).serialize("", { maxAge: 0 }),
    "Clear-Site-Data": '"storage"',
  };
}

/** Hash of the session named by a `Cookie` header, live or not; null when it names none. */
export async function sessionHash(config: AppConfig, cookieHeader: string | null | undefined): Promise<string | null> {
  const secret: unknown = await sessionCookie(config).parse(cookieHeader ?? null);
  return typeof secret === "string" && secret !== "" ? hashOf(secret) : null;
}

function hashOf(secret: string): string {
  return createHash("sha256").update(secret).digest("hex");
}

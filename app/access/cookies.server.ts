import { type Cookie, createCookie } from "react-router";
import type { AppConfig } from "../context.ts";

type CookieConfig = Pick<AppConfig, "secureCookies" | "sessionSecret">;

/** A sign-in that is under way must come back within this time. */
export const ATTEMPT_LIFETIME_SECONDS = 10 * 60;
/** A session ends after this time whatever happens; idle ones end earlier, see db/sessions.server.ts. */
export const SESSION_LIFETIME_DAYS = 30;

/** Bears the session's secret. Not signed: 256 random bits are looked up, and mean nothing by themselves. */
export function sessionCookie(config: CookieConfig): Cookie {
  return createCookie(named("session", config), {
    ...attributes(config),
    maxAge: SESSION_LIFETIME_DAYS * 24 * 60 * 60,
  });
}

/** Bears the state and the code verifier from the start of a sign-in to its return, signed. */
export function attemptCookie(config: CookieConfig): Cookie {
  return createCookie(named("sign-in", config), {
    ...attributes(config),
    secrets: [config.sessionSecret],
    maxAge: ATTEMPT_LIFETIME_SECONDS,
  });
}

/** "light", "dark", or absent to follow the machine. Read by the page's root. */
export function themeCookie(config: CookieConfig): Cookie {
  return createCookie(named("theme", config), { ...attributes(config), maxAge: 365 * 24 * 60 * 60 });
}

/** `__Host-`: browsers take such a cookie from this very host only, and over TLS only. */
function named(name: string, config: CookieConfig): string {
  return config.secureCookies ? `__Host-halfline-${name}` : `halfline-${name}`;
}

function attributes(config: CookieConfig) {
  return { path: "/", httpOnly: true, sameSite: "lax", secure: config.secureCookies } as const;
}

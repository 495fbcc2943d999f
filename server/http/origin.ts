import type { RequestHandler } from "express";
import { refuse } from "./refusal.ts";

const SAFE_METHODS = new Set(["GET", "HEAD", "OPTIONS"]);
const LOOPBACK = new Set(["localhost", "127.0.0.1", "[::1]"]);

/** Says whether an `Origin` header names this program. */
export type OwnOrigin = (origin: string | undefined) => boolean;

/** On loopback the program has several names, and a port that is known once it listens. */
export function loopbackOrigin(port: () => number): OwnOrigin {
  return (origin) => {
    if (origin === undefined || !URL.canParse(origin)) return false;
    const url = new URL(origin);
    return url.protocol === "http:" && LOOPBACK.has(url.hostname) && Number(url.port || 80) === port();
  };
}

/** The one address at which people reach this program. */
export function exactOrigin(own: string): OwnOrigin {
  return (origin) => origin === own;
}

/**
 * Refuses every request that changes something and does not come from a page of ours: another site's page
 * could otherwise send one with this browser's cookies. React Router looks at the origin for pages, not for
 * resource routes; this looks at all.
 */
export function onlyFromOwnPages(isOwn: OwnOrigin): RequestHandler {
  return (request, response, next) => {
    if (SAFE_METHODS.has(request.method)) return next();
    const origin = request.get("Origin");
    const own = origin === undefined ? request.get("Sec-Fetch-Site") === "same-origin" : isOwn(origin);
    if (own) return next();
    refuse(request, response, 403, "This request does not come from a page of Halfline. Open the page and try again.");
  };
}

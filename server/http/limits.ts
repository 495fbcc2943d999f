import type { RequestHandler } from "express";
import { rateLimit } from "express-rate-limit";
import { refuse } from "./refusal.ts";

/** A paper's text with its bibliography, several times over. */
const LARGEST_BODY_BYTES = 4 * 1024 * 1024;
const MINUTE_MS = 60_000;

/** Refuses bodies that are too large, and those that do not say how large they are. */
export const boundedBodies: RequestHandler = (request, response, next) => {
  if (request.get("Transfer-Encoding") !== undefined) {
    return refuse(request, response, 411, "The request does not say how long it is.");
  }
  if (Number(request.get("Content-Length") ?? 0) > LARGEST_BODY_BYTES) {
    return refuse(request, response, 413, "The request is too large: 4 MiB are allowed.");
  }
  next();
};

/** At most `perMinute` attempts to sign in from one address. */
export function limitedSignIn(perMinute: number): RequestHandler {
  return rateLimit({
    windowMs: MINUTE_MS,
    limit: perMinute,
    standardHeaders: "draft-8",
    legacyHeaders: false,
    handler: (request, response) =>
      refuse(request, response, 429, "Too many attempts to sign in from your address. Wait a minute and try again."),
  });
}

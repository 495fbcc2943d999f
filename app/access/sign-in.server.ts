import { ArcticFetchError, generateCodeVerifier, OAuth2RequestError, UnexpectedResponseError } from "arctic";
import { redirect } from "react-router";
import { Authenticator } from "remix-auth";
import { z } from "zod";
import type { Identity } from "../../db/index.server.ts";
import type { AppConfig } from "../context.ts";
import { ATTEMPT_LIFETIME_SECONDS, attemptCookie } from "./cookies.server.ts";
import { githubStrategy } from "./github.server.ts";
import { safeReturnTo } from "./return-to.ts";

/**
 * A sign-in:  begin ──▶ at GitHub ──▶ complete ──▶ a person and where to go
 *                            │            ├──▶ stale: not begun here, begun anew elsewhere, or too long ago
 *                            └──▶ denied  ├──▶ unreachable: GitHub did not answer, or with a fault of its own
 *                                         └──▶ refused: GitHub did not accept the code
 */
export type SignInProblem = "denied" | "stale" | "unreachable" | "refused";

const attemptShape = z.object({
  state: z.string(),
  verifier: z.string(),
  returnTo: z.string(),
  begun: z.number(),
});

const LOOPBACK = new Set(["localhost", "127.0.0.1", "[::1]"]);

/** Sends the browser to GitHub. What the return needs travels in a signed cookie. */
export async function beginSignIn(config: AppConfig, request: Request, returnTo: unknown): Promise<Response> {
  const origin = originOf(config, request);
  const verifier = generateCodeVerifier();
  const authenticator = authenticatorFor(config, origin, verifier);
  const toGithub = await redirectOf(() =>
    authenticator.authenticate("github", new Request(`${origin}/sign-in/github`)),
  );
  const state = new URL(toGithub.headers.get("Location") ?? "").searchParams.get("state") ?? "";
  const attempt = { state, verifier, returnTo: safeReturnTo(returnTo, "/shelf"), begun: Date.now() };
  toGithub.headers.append("Set-Cookie", await attemptCookie(config).serialize(attempt));
  return toGithub;
}

/** Finishes a sign-in when GitHub sends the browser back. */
export async function completeSignIn(
  config: AppConfig,
  request: Request,
): Promise<{ identity: Identity; returnTo: string } | { problem: SignInProblem; cause: unknown }> {
  const cookie: unknown = await attemptCookie(config).parse(request.headers.get("Cookie"));
  const attempt = attemptShape.safeParse(cookie);
  const url = new URL(request.url);
  if (
    !attempt.success ||
    attempt.data.state !== url.searchParams.get("state") ||
    // The cookie's own age is the browser's word; this one is signed.
    Date.now() - attempt.data.begun > ATTEMPT_LIFETIME_SECONDS * 1000
  ) {
    return { problem: "stale", cause: "The state of the return is not that of an attempt of this browser." };
  }
  const authenticator = authenticatorFor(config, originOf(config, request), attempt.data.verifier);
  try {
    const identity = await authenticator.authenticate("github", request);
    return { identity, returnTo: safeReturnTo(attempt.data.returnTo, "/shelf") };
  } catch (error) {
    if (error instanceof Response) return { problem: "stale", cause: "There was no state." };
    return { problem: problemOf(error), cause: error };
  }
}

/** The `Set-Cookie` header that ends an attempt. */
export async function forgetAttempt(config: AppConfig): Promise<string> {
  return attemptCookie(config).serialize("", { maxAge: 0 });
}

function problemOf(error: unknown): SignInProblem {
  if (error instanceof OAuth2RequestError) return error.code === "access_denied" ? "denied" : "refused";
  if (error instanceof ArcticFetchError || error instanceof UnexpectedResponseError) return "unreachable";
  if (error instanceof ReferenceError || error instanceof RangeError) return "stale";
  return "refused";
}

function authenticatorFor(config: AppConfig, origin: string, verifier: string): Authenticator<Identity> {
  return new Authenticator<Identity>().use(githubStrategy(config, origin, verifier), "github");
}

/** A demo is reached as localhost or 127.0.0.1, and must come back to the one whose cookies it set. */
function originOf(config: AppConfig, request: Request): string {
  const { hostname, origin } = new URL(request.url);
  return config.standIn && LOOPBACK.has(hostname) ? origin : config.publicOrigin;
}

/** The strategy answers by throwing its redirect. */
async function redirectOf(authenticate: () => Promise<unknown>): Promise<Response> {
  try {
    await authenticate();
  } catch (thrown) {
    if (thrown instanceof Response) return redirect(thrown.headers.get("Location") ?? "", { headers: thrown.headers });
    throw thrown;
  }
  throw new Error("The sign-in did not lead to GitHub. Its strategy answers a request without a state by a redirect.");
}

import { createHash } from "node:crypto";
import { ArcticFetchError, GitHub, OAuth2Tokens, UnexpectedResponseError } from "arctic";
import { GitHubStrategy } from "remix-auth-github";
import { z } from "zod";
import type { Identity } from "../../db/index.server.ts";
import type { AppConfig } from "../context.ts";
import { ATTEMPT_LIFETIME_SECONDS } from "./cookies.server.ts";

/** GitHub waits no longer; a person would have gone by then. */
const PATIENCE_MS = 10_000;

const profileShape = z.object({ id: z.number().int(), login: z.string().min(1), name: z.string().nullish() });
const emailsShape = z.array(z.object({ email: z.string(), primary: z.boolean(), verified: z.boolean() }));

/**
 * GitHub's sign-in for one attempt, with PKCE.
 * One object an attempt, because the code verifier belongs to the attempt.
 * Source: RFC 7636; GitHub accepts `code_challenge` with S256 on its OAuth web flow.
 */
export function githubStrategy(config: AppConfig, origin: string, verifier: string): GitHubStrategy<Identity> {
  return new PkceGitHubStrategy(config, `${origin}/sign-in/github/callback`, verifier);
}

class PkceGitHubStrategy extends GitHubStrategy<Identity> {
  readonly #verifier: string;

  constructor(config: AppConfig, redirectURI: string, verifier: string) {
    const { clientId, clientSecret, signInBase, apiBase } = config.github;
    const cookie = {
      name: config.secureCookies ? "__Host-halfline-state" : "halfline-state",
      httpOnly: true,
      maxAge: ATTEMPT_LIFETIME_SECONDS,
      path: "/",
      sameSite: "Lax",
      ...(config.secureCookies ? ({ secure: true } as const) : {}),
    } as const;
    super({ clientId, clientSecret, redirectURI, scopes: ["read:user", "user:email"], cookie }, ({ tokens }) =>
      readIdentity(apiBase, tokens.accessToken()),
    );
    this.#verifier = verifier;
    this.client = new PkceGitHub(clientId, clientSecret, redirectURI, signInBase, verifier);
  }

  protected override authorizationParams(params: URLSearchParams): URLSearchParams {
    const extended = new URLSearchParams(params);
    extended.set("code_challenge", createHash("sha256").update(this.#verifier).digest("base64url"));
    extended.set("code_challenge_method", "S256");
    return extended;
  }
}

/** The package's client knows neither another address than GitHub's own nor the code verifier. */
class PkceGitHub extends GitHub {
  readonly #base: string;
  readonly #form: Readonly<Record<string, string>>;
  readonly #authorization: string;

  constructor(clientId: string, clientSecret: string, redirectUri: string, base: string, verifier: string) {
    super(clientId, clientSecret, redirectUri);
    this.#base = base;
    this.#form = { grant_type: "authorization_code", redirect_uri: redirectUri, code_verifier: verifier };
    this.#authorization = `Basic ${Buffer.from(`${clientId}:${clientSecret}`).toString("base64")}`;
  }

  override createAuthorizationURL(state: string, scopes: string[]): URL {
    const usual = super.createAuthorizationURL(state, scopes);
    return new URL(usual.pathname + usual.search, this.#base);
  }

  override async validateAuthorizationCode(code: string): Promise<OAuth2Tokens> {
    const answer = await ask(`${this.#base}/login/oauth/access_token`, {
      method: "POST",
      headers: { Accept: "application/json", Authorization: this.#authorization },
      body: new URLSearchParams({ ...this.#form, code }),
    });
    // A refusal comes with status 200 and without a token: `accessToken()` then throws.
    return new OAuth2Tokens((await answer.json()) as object);
  }
}

/** Who the token belongs to. Only an address that GitHub has verified is taken. */
async function readIdentity(apiBase: string, token: string): Promise<Identity> {
  const headers = {
    Accept: "application/vnd.github+json",
    Authorization: `Bearer ${token}`,
    "User-Agent": "Halfline",
  };
  const [profile, emails] = await Promise.all([
    ask(`${apiBase}/user`, { headers }).then(async (answer) => profileShape.parse(await answer.json())),
    ask(`${apiBase}/user/emails`, { headers }).then(async (answer) => emailsShape.parse(await answer.json())),
  ]);
  const email = emails.find((candidate) => candidate.primary && candidate.verified)?.email ?? null;
  return {
    provider: "github",
    subject: String(profile.id),
    login: profile.login,
    name: profile.name?.trim() || profile.login,
    email,
  };
}

async function ask(url: string, init: RequestInit): Promise<Response> {
  let answer: Response;
  try {
    answer = await fetch(url, { ...init, redirect: "error", signal: AbortSignal.timeout(PATIENCE_MS) });
  } catch (error) {
    throw new ArcticFetchError(error);
  }
  if (!answer.ok) {
    await answer.body?.cancel();
    throw new UnexpectedResponseError(answer.status);
  }
  return answer;
}

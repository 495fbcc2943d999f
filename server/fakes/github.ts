import { createHash, randomBytes, timingSafeEqual } from "node:crypto";
import { createServer, type Server } from "node:http";
import express from "express";
import { DEMO_PEOPLE, type DemoPerson } from "./people.ts";
import { refusalPage, signInPage } from "./sign-in-page.ts";

/** What the stand-in knows about the program that uses it. */
export interface StandInClient {
  readonly clientId: string;
  readonly clientSecret: string;
}

export interface StandIn {
  /** "http://127.0.0.1:41803" */
  readonly origin: string;
  close(): Promise<void>;
}

interface Grant {
  readonly person: DemoPerson;
  readonly redirectUri: string;
  readonly challenge: string;
  readonly until: number;
}

const CODE_LIFETIME_MS = 60_000;
const LOOPBACK = new Set(["127.0.0.1", "localhost", "[::1]"]);

/**
 * A stand-in for GitHub's sign-in on loopback, for demo and test: OAuth 2.0 authorization code with PKCE.
 * Strict where an attack would come through: a code works once, for a minute, for the redirect address and the
 * code challenge it was given for.
 * Source: RFC 6749 section 4.1, RFC 7636 section 4; paths and answers as GitHub documents them.
 */
export async function startGithubStandIn(client: StandInClient, port: number): Promise<StandIn> {
  const grants = new Map<string, Grant>();
  const tokens = new Map<string, DemoPerson>();
  const app = express();
  app.disable("x-powered-by");
  app.use((_request, response, next) => {
    response.set({
      "Cache-Control": "no-store",
      "Content-Security-Policy": "default-src 'none'; style-src 'unsafe-inline'; frame-ancestors 'none'",
      "Referrer-Policy": "no-referrer",
    });
    next();
  });
  const form = express.urlencoded({ extended: false, limit: "10kb" });

  app.get("/login/oauth/authorize", (request, response) => {
    const query = onlyText(request.query);
    const fault = faultOfAuthorization(query, client);
    if (fault) response.status(400).send(refusalPage(fault));
    else response.send(signInPage(query));
  });

  app.post("/login/oauth/authorize", form, (request, response) => {
    const query = onlyText(request.body);
    const fault = faultOfAuthorization(query, client);
    if (fault) {
      response.status(400).send(refusalPage(fault));
      return;
    }
    const back = new URL(query.redirect_uri ?? "");
    back.searchParams.set("state", query.state ?? "");
    const person = DEMO_PEOPLE.find((candidate) => candidate.subject === query.subject);
    if (person) {
      const code = randomBytes(20).toString("hex");
      grants.set(code, {
        person,
        redirectUri: query.redirect_uri ?? "",
        challenge: query.code_challenge ?? "",
        until: Date.now() + CODE_LIFETIME_MS,
      });
      back.searchParams.set("code", code);
    } else {
      back.searchParams.set("error", "access_denied");
      back.searchParams.set("error_description", "The person went back without signing in");
    }
    response.redirect(back.href);
  });

  app.post("/login/oauth/access_token", form, (request, response) => {
    const body = onlyText(request.body);
    const grant = grants.get(body.code ?? "");
    grants.delete(body.code ?? "");
    const basic = Buffer.from(`${client.clientId}:${client.clientSecret}`).toString("base64");
    // GitHub answers a refused token request with status 200.
    if (!equal(request.get("Authorization") ?? "", `Basic ${basic}`)) {
      response.json({ error: "incorrect_client_credentials", error_description: "Wrong client id or secret" });
    } else if (!grant || grant.until < Date.now() || grant.redirectUri !== body.redirect_uri) {
      response.json({ error: "bad_verification_code", error_description: "The code is wrong or has ended" });
    } else if (!equal(challengeOf(body.code_verifier ?? ""), grant.challenge)) {
      response.json({ error: "bad_verification_code", error_description: "The code verifier does not fit" });
    } else {
      const token = randomBytes(20).toString("hex");
      tokens.set(token, grant.person);
      response.json({ access_token: token, token_type: "bearer", scope: "read:user,user:email" });
    }
  });

  app.get("/user", (request, response) => {
    const person = tokens.get(bearerOf(request.get("Authorization")));
    if (person) response.json({ id: Number(person.subject), login: person.login, name: person.name });
    else response.status(401).json({ message: "Bad credentials" });
  });

  app.get("/user/emails", (request, response) => {
    const person = tokens.get(bearerOf(request.get("Authorization")));
    if (person) response.json([{ email: person.email, primary: true, verified: true }]);
    else response.status(401).json({ message: "Bad credentials" });
  });

  const server = createServer(app);
  return { origin: await listen(server, port), close: () => closed(server) };
}

/** Why the authorization may not go on, or null. Nothing is ever sent back to an address that was not accepted. */
function faultOfAuthorization(query: Readonly<Record<string, string>>, client: StandInClient): string | null {
  if (query.client_id !== client.clientId) return "The client id is not that of this Halfline.";
  if (query.response_type !== "code") return "The response type is not “code”.";
  if (!query.state) return "There is no state.";
  if (query.code_challenge_method !== "S256" || !query.code_challenge) return "There is no S256 code challenge.";
  const back = URL.canParse(query.redirect_uri ?? "") ? new URL(query.redirect_uri ?? "") : null;
  if (back?.protocol !== "http:" || !LOOPBACK.has(back.hostname)) return "The way back is not on this machine.";
  return null;
}

function onlyText(fields: unknown): Record<string, string> {
  const entries = Object.entries((fields ?? {}) as Record<string, unknown>);
  return Object.fromEntries(entries.filter((entry): entry is [string, string] => typeof entry[1] === "string"));
}

function challengeOf(verifier: string): string {
  return createHash("sha256").update(verifier).digest("base64url");
}

function equal(a: string, b: string): boolean {
  const digest = (text: string) => createHash("sha256").update(text).digest();
  return timingSafeEqual(digest(a), digest(b));
}

function bearerOf(header: string | undefined): string {
  return /^Bearer (\S+)$/i.exec(header ?? "")?.[1] ?? "";
}

function listen(server: Server, port: number): Promise<string> {
  return new Promise((done, fail) => {
    server.once("error", fail);
    server.listen(port, "127.0.0.1", () => {
      const address = server.address();
      if (address === null || typeof address === "string") fail(new Error("The stand-in has no port."));
      else done(`http://127.0.0.1:${address.port}`);
    });
  });
}

function closed(server: Server): Promise<void> {
  return new Promise((done) => {
    server.close(() => done());
    server.closeAllConnections();
  });
}

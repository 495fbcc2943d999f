import { afterAll, afterEach, beforeAll, expect, test, vi } from "vitest";
import { beginSignIn, completeSignIn } from "../../app/access/index.server.ts";
import type { AppConfig } from "../../app/context.ts";
import { DEMO_PEOPLE, type StandIn, startGithubStandIn } from "../../server/fakes/index.ts";
import { Browser, form, hiddenFields } from "../support/browser.ts";

const CLIENT = { clientId: "halfline-test", clientSecret: "s3cret" };
const OURS = "http://localhost:4180";
const INES = DEMO_PEOPLE[0];

let standIn: StandIn;
let config: AppConfig;

beforeAll(async () => {
  standIn = await startGithubStandIn(CLIENT, 0);
  config = {
    standIn: true,
    publicOrigin: OURS,
    secureCookies: false,
    sessionSecret: "a secret of this test alone",
    github: { ...CLIENT, signInBase: standIn.origin, apiBase: standIn.origin },
  };
});
afterAll(() => standIn.close());
afterEach(() => vi.useRealTimers());

interface Attempt {
  /** Address of the stand-in's page. */
  readonly authorize: URL;
  /** What our answer asked the browser to keep. */
  readonly cookies: string;
}

async function begin(returnTo = "/shelf", as: AppConfig = config): Promise<Attempt> {
  const answer = await beginSignIn(as, new Request(`${OURS}/sign-in/github`, { method: "POST" }), returnTo);
  expect(answer.status).toBe(302);
  const cookies = answer.headers.getSetCookie().map((cookie) => cookie.split(";")[0]);
  return { authorize: new URL(answer.headers.get("Location") ?? ""), cookies: cookies.join("; ") };
}

/** Lets a person (or nobody) sign in at the stand-in; returns the address the browser is sent back to. */
async function choose(authorize: URL, subject: string): Promise<URL> {
  const browser = new Browser();
  const page = await browser.ask(authorize.href);
  expect(page.status).toBe(200);
  const back = await browser.ask(
    `${standIn.origin}/login/oauth/authorize`,
    form({ ...hiddenFields(await page.text()), subject }),
  );
  return new URL(back.headers.get("Location") ?? "");
}

function complete(back: URL, cookies: string, as: AppConfig = config) {
  return completeSignIn(as, new Request(back, { headers: { Cookie: cookies } }));
}

test("a whole sign-in leads to the person and to where they wanted to go", async () => {
  const attempt = await begin("/papers/abc?line=3");
  expect(attempt.authorize.searchParams.get("code_challenge_method")).toBe("S256");
  expect(attempt.authorize.searchParams.get("redirect_uri")).toBe(`${OURS}/sign-in/github/callback`);
  const back = await choose(attempt.authorize, INES?.subject ?? "");
  expect(await complete(back, attempt.cookies)).toEqual({
    identity: { provider: "github", subject: "9001", login: INES?.login, name: INES?.name, email: INES?.email },
    returnTo: "/papers/abc?line=3",
  });
});

test("over TLS every cookie is for this host and for TLS alone", async () => {
  const secure = { ...config, standIn: false, publicOrigin: "https://halfline.example", secureCookies: true };
  const request = new Request("http://localhost:4180/sign-in/github", { method: "POST" });
  const answer = await beginSignIn(secure, request, "/shelf");
  const cookies = answer.headers.getSetCookie();
  expect(cookies.map((cookie) => cookie.split("=")[0]).sort()).toEqual([
    "__Host-halfline-sign-in",
    "__Host-halfline-state",
  ]);
  for (const cookie of cookies) expect(cookie).toMatch(/; Secure/i);
  const back = new URL(answer.headers.get("Location") ?? "").searchParams.get("redirect_uri");
  expect(back).toBe("https://halfline.example/sign-in/github/callback");
});

test("the way back to another site is forgotten at the beginning", async () => {
  const attempt = await begin("https://evil.test/");
  const back = await choose(attempt.authorize, "9001");
  expect(await complete(back, attempt.cookies)).toMatchObject({ returnTo: "/shelf" });
});

test("a code works once", async () => {
  const attempt = await begin();
  const back = await choose(attempt.authorize, "9001");
  expect(await complete(back, attempt.cookies)).toHaveProperty("identity");
  expect(await complete(back, attempt.cookies)).toMatchObject({ problem: "refused" });
});

test("the return of another attempt is not accepted", async () => {
  const mine = await begin();
  const others = await begin();
  const back = await choose(others.authorize, "9001");
  expect(await complete(back, mine.cookies)).toMatchObject({ problem: "stale" });
  expect(await complete(back, "")).toMatchObject({ problem: "stale" });
  back.searchParams.delete("state");
  expect(await complete(back, others.cookies)).toMatchObject({ problem: "stale" });
});

test("an attempt whose cookie was changed or signed by another is not accepted", async () => {
  const attempt = await begin();
  const back = await choose(attempt.authorize, "9001");
  const foreign = { ...config, sessionSecret: "another secret" };
  expect(await complete(back, attempt.cookies, foreign)).toMatchObject({ problem: "stale" });
});

test("an attempt ends after ten minutes", async () => {
  const attempt = await begin();
  const back = await choose(attempt.authorize, "9001");
  vi.useFakeTimers({ toFake: ["Date"], now: Date.now() + 11 * 60 * 1000 });
  expect(await complete(back, attempt.cookies)).toMatchObject({ problem: "stale" });
});

test("a stolen code is worth nothing without the verifier of its attempt", async () => {
  const victim = await begin();
  const stolen = await choose(victim.authorize, "9001");
  const thief = await begin();
  const back = await choose(thief.authorize, "9005");
  back.searchParams.set("code", stolen.searchParams.get("code") ?? "");
  expect(await complete(back, thief.cookies)).toMatchObject({ problem: "refused" });
});

test("whoever goes back without signing in is told so", async () => {
  const attempt = await begin();
  const back = await choose(attempt.authorize, "");
  expect(await complete(back, attempt.cookies)).toMatchObject({ problem: "denied" });
});

test("a provider that does not answer is told from one that refuses", async () => {
  const attempt = await begin();
  const back = await choose(attempt.authorize, "9001");
  const gone = { ...config, github: { ...config.github, signInBase: "http://127.0.0.1:1" } };
  expect(await complete(back, attempt.cookies, gone)).toMatchObject({ problem: "unreachable" });
  const wrong = { ...config, github: { ...config.github, clientSecret: "wrong" } };
  expect(await complete(back, attempt.cookies, wrong)).toMatchObject({ problem: "refused" });
});

test.each([
  ["another client", { client_id: "other" }],
  ["no code challenge", { code_challenge: "" }],
  ["a plain code challenge", { code_challenge_method: "plain" }],
  ["no state", { state: "" }],
  ["a way back to another machine", { redirect_uri: "http://evil.test/callback" }],
])("the stand-in refuses %s, and sends nobody anywhere", async (_what, changed) => {
  const { authorize } = await begin();
  for (const [name, value] of Object.entries(changed)) authorize.searchParams.set(name, value);
  const page = await fetch(authorize);
  expect(page.status).toBe(400);
  const posted = await new Browser().ask(
    `${standIn.origin}/login/oauth/authorize`,
    form({ ...Object.fromEntries(authorize.searchParams), subject: "9001" }),
  );
  expect(posted.status).toBe(400);
  expect(posted.headers.get("Location")).toBeNull();
});

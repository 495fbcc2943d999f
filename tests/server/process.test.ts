import { createServer } from "node:http";
import type { AddressInfo } from "node:net";
import { expect, test } from "vitest";
import { form } from "../support/browser.ts";
import { startBuiltServer } from "../support/built-server.ts";

test("asked to end, it ends with status 0 and frees its port", async () => {
  const own = await startBuiltServer();
  expect(await own.stop("SIGTERM")).toBe(0);
  await expect(fetch(`${own.url}/healthz`)).rejects.toThrow();
});

test("it ends too when the process that started it is killed", async () => {
  const own = await startBuiltServer();
  expect(await own.abandon()).toBe(0);
  await expect(fetch(`${own.url}/healthz`)).rejects.toThrow();
});

test("in production it leads to GitHub itself, with a code challenge, and has no stand-in", async () => {
  const port = await freePort();
  const production = await startBuiltServer({
    HALFLINE_MODE: "production",
    PUBLIC_URL: "http://localhost:9",
    SESSION_SECRET: "q8Zt3vLw1Xy7Kd0Rb5Nc9Hs2Fj4Gm6Pa",
    GITHUB_CLIENT_ID: "an-id",
    GITHUB_CLIENT_SECRET: "a-secret",
    PORT: String(port),
  });
  try {
    const at = `http://127.0.0.1:${port}`;
    const page = await fetch(at, { headers: { Accept: "text/html" } });
    expect(await page.text()).not.toContain("This is a demo");
    expect(page.headers.get("Content-Security-Policy")).toContain("form-action 'self' https://github.com");
    const answer = await fetch(`${at}/sign-in/github`, {
      ...form({ returnTo: "/shelf" }),
      headers: { Origin: "http://localhost:9" },
      redirect: "manual",
    });
    const to = new URL(answer.headers.get("Location") ?? "");
    expect(to.origin + to.pathname).toBe("https://github.com/login/oauth/authorize");
    expect(to.searchParams.get("client_id")).toBe("an-id");
    expect(to.searchParams.get("code_challenge_method")).toBe("S256");
    expect(to.searchParams.get("redirect_uri")).toBe("http://localhost:9/sign-in/github/callback");
    const own = await fetch(`${at}/sign-in/github`, { ...form({}), headers: { Origin: at }, redirect: "manual" });
    expect(own.status).toBe(403);
  } finally {
    await production.stop();
  }
});

test("it does not start in an environment that does not fit, and says all that is wrong", async () => {
  await expect(
    startBuiltServer({ HALFLINE_MODE: "production", PUBLIC_URL: "http://halfline.example" }),
  ).rejects.toThrow(/Halfline stopped[\s\S]*SESSION_SECRET[\s\S]*GITHUB_CLIENT_ID[\s\S]*PUBLIC_URL/);
});

function freePort(): Promise<number> {
  return new Promise((done) => {
    const probe = createServer();
    probe.listen(0, "127.0.0.1", () => {
      const { port } = probe.address() as AddressInfo;
      probe.close(() => done(port));
    });
  });
}

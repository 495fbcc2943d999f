import { createServer } from "node:http";
import type { AddressInfo } from "node:net";
import { pino } from "pino";
import { afterAll, beforeAll, expect, test } from "vitest";
import { type HttpParts, httpApp, loopbackOrigin } from "../../server/http/index.ts";

let base = "";
let healthy = true;
const logged: string[] = [];
const server = createServer();

beforeAll(async () => {
  await new Promise<void>((done) => server.listen(0, "127.0.0.1", done));
  const { port } = server.address() as AddressInfo;
  base = `http://127.0.0.1:${port}`;
  const parts: HttpParts = {
    pages: (request, response, next) => {
      if (request.path === "/broken") return next(new Error("secret words of the inside"));
      response.send(`${request.method} ${response.locals.nonce}`);
    },
    developmentFiles: null,
    clientFolder: "no-such-folder",
    isOwnOrigin: loopbackOrigin(() => port),
    signInOrigin: "https://github.example",
    signInsPerMinute: 3,
    sockets: () => [`ws://127.0.0.1:${port}`],
    tls: false,
    trustedProxies: 0,
    healthy: async () => {
      if (!healthy) throw new Error("connection refused");
    },
    log: pino({ level: "error" }, { write: (line) => void logged.push(line) }),
  };
  server.on("request", httpApp(parts));
});

afterAll(() => new Promise((done) => server.close(done)));

test("every page has a policy with a nonce of its own, and no other script or frame is let in", async () => {
  const [one, two] = await Promise.all([fetch(base), fetch(base)]);
  const policy = one.headers.get("Content-Security-Policy") ?? "";
  const nonce = (await one.text()).replace("GET ", "");
  expect(nonce.length).toBeGreaterThanOrEqual(24);
  expect(policy).toContain(`script-src 'self' 'nonce-${nonce}'`);
  expect(policy).toContain("default-src 'none'");
  expect(policy).toContain("frame-ancestors 'none'");
  expect(policy).toContain("form-action 'self' https://github.example");
  expect(policy).not.toMatch(/script-src[^;]*unsafe/);
  expect((await two.text()).replace("GET ", "")).not.toBe(nonce);
  expect(one.headers.get("X-Content-Type-Options")).toBe("nosniff");
  expect(one.headers.get("Referrer-Policy")).toBe("same-origin");
  expect(one.headers.get("X-Powered-By")).toBeNull();
});

test.each([
  ["no origin at all", {}, 403],
  ["another site", { Origin: "http://evil.test" }, 403],
  ["a hidden origin", { Origin: "null" }, 403],
  ["our host on another port", { Origin: "http://127.0.0.1:1" }, 403],
  ["https on our port", { Origin: "https://127.0.0.1" }, 403],
  ["a same-site page that is not ours", { "Sec-Fetch-Site": "same-site" }, 403],
  ["a page of ours, told by the browser", { "Sec-Fetch-Site": "same-origin" }, 200],
])("a request that changes something, from %s: %s", async (_from, headers, status) => {
  for (const method of ["POST", "PUT", "PATCH", "DELETE"]) {
    const answer = await fetch(`${base}/papers/x/compute`, { method, headers: headers as Record<string, string> });
    expect([method, answer.status]).toEqual([method, status]);
  }
});

test("a page of ours may change something under both names of loopback", async () => {
  const { port } = new URL(base);
  for (const host of ["127.0.0.1", "localhost"]) {
    const answer = await fetch(base, { method: "POST", headers: { Origin: `http://${host}:${port}` } });
    expect(answer.status).toBe(200);
  }
});

test("reading needs no origin", async () => {
  expect((await fetch(base, { headers: { Origin: "http://evil.test" } })).status).toBe(200);
});

test("bodies that are too large, or of no told length, are refused", async () => {
  const headers = { "Sec-Fetch-Site": "same-origin" };
  const large = await fetch(base, { method: "POST", headers, body: "x".repeat(5 * 1024 * 1024) });
  expect(large.status).toBe(413);
  const body = new ReadableStream({
    start(controller) {
      controller.enqueue(new TextEncoder().encode("x"));
      controller.close();
    },
  });
  const init = { method: "POST", headers, body, duplex: "half" };
  expect((await fetch(base, init as RequestInit)).status).toBe(411);
});

test("attempts to sign in are counted by address", async () => {
  const attempt = () =>
    fetch(`${base}/sign-in/github`, { method: "POST", headers: { "Sec-Fetch-Site": "same-origin" } });
  for (let count = 0; count < 3; count += 1) expect((await attempt()).status).toBe(200);
  const refused = await attempt();
  expect(refused.status).toBe(429);
  expect(((await refused.json()) as { message: string }).message).toContain("Wait a minute");
});

test("a fault of the inside is logged, and tells the asker nothing", async () => {
  const page = await fetch(`${base}/broken`, { headers: { Accept: "text/html" } });
  const words = await page.text();
  expect(page.status).toBe(500);
  expect(words).not.toContain("secret words");
  expect(words).not.toMatch(/ at .*\.ts/);
  expect(logged.some((line) => line.includes("secret words of the inside"))).toBe(true);
});

test("an asset that is not there is a short 404", async () => {
  const answer = await fetch(`${base}/assets/none.js`);
  expect(answer.status).toBe(404);
  expect(await answer.text()).not.toContain("no-such-folder");
});

test("healthz tells whether the database answers", async () => {
  expect((await fetch(`${base}/healthz`)).status).toBe(200);
  healthy = false;
  const sick = await fetch(`${base}/healthz`);
  expect(sick.status).toBe(503);
  expect(await sick.json()).toEqual({ healthy: false, message: "The database does not answer." });
  healthy = true;
});

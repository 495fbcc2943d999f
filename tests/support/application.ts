import { type ChildProcess, spawn } from "node:child_process";
import { createServer } from "node:net";
import { resolve } from "node:path";
import type { TestProject } from "vitest/node";
import { freshDatabaseUrl } from "./database.ts";

declare module "vitest" {
  export interface ProvidedContext {
    /** Where the built application listens, in demo mode, with the demo people and the specimen paper. */
    applicationUrl: string;
  }
}

const START_TIMEOUT_MS = 60_000;

/** vitest's global set-up after the database: the built server, as `npm start` runs it, on a database of its own. */
export default async function setUp(project: TestProject): Promise<() => Promise<void>> {
  const port = await freePort();
  const url = `http://127.0.0.1:${port}`;
  const server = spawn(process.execPath, ["build/index.js"], {
    cwd: resolve(import.meta.dirname, "../.."),
    env: {
      ...process.env,
      NODE_ENV: "production",
      HALFLINE_MODE: "demo",
      DATABASE_URL: await freshDatabaseUrl(project.getProvidedContext().templateUrl),
      PORT: String(port),
    },
    stdio: ["ignore", "pipe", "pipe"],
  });
  let output = "";
  for (const stream of [server.stdout, server.stderr]) {
    stream.on("data", (chunk) => {
      output = `${output}${chunk}`.slice(-20_000);
    });
  }
  await answering(`${url}/healthz`, server, () => output);
  project.provide("applicationUrl", url);
  return () => ended(server);
}

async function answering(url: string, server: ChildProcess, output: () => string): Promise<void> {
  const deadline = Date.now() + START_TIMEOUT_MS;
  for (;;) {
    if (server.exitCode !== null || Date.now() > deadline)
      throw new Error(`The application did not start:\n${output()}`);
    const response = await fetch(url).catch(() => null);
    if (response?.ok) return;
    await new Promise((done) => setTimeout(done, 100));
  }
}

function ended(server: ChildProcess): Promise<void> {
  if (server.exitCode !== null) return Promise.resolve();
  return new Promise((done) => {
    server.once("exit", () => done());
    server.kill("SIGTERM");
  });
}

function freePort(): Promise<number> {
  return new Promise((done, fail) => {
    const probe = createServer();
    probe.once("error", fail);
    probe.listen(0, "127.0.0.1", () => {
      const address = probe.address();
      probe.close(() => (address && typeof address === "object" ? done(address.port) : fail(new Error("no port"))));
    });
  });
}

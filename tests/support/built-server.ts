import { spawn } from "node:child_process";
import { existsSync } from "node:fs";
import { resolve } from "node:path";
import { freshDatabaseUrl } from "./database.ts";

export interface BuiltServer {
  readonly url: string;
  readonly databaseUrl: string;
  /** All it has printed on both streams. */
  output(): string;
  stop(signal?: NodeJS.Signals): Promise<number | null>;
  /** What the server sees when the process that started it is killed. Resolves with the server's status at its end. */
  abandon(): Promise<number | null>;
}

const START_TIMEOUT_MS = 60_000;
const root = resolve(import.meta.dirname, "../..");

/** The built server in test mode, with the stand-in for GitHub, on a free port and a database of its own. */
export async function startBuiltServer(variables: Readonly<Record<string, string>> = {}): Promise<BuiltServer> {
  if (!existsSync(resolve(root, "build/index.js"))) {
    throw new Error("There is no build. `npm run build` makes it; `npm test` does so by itself.");
  }
  const databaseUrl = await freshDatabaseUrl();
  const child = spawn(process.execPath, ["build/index.js"], {
    cwd: root,
    env: {
      ...process.env,
      NODE_ENV: "production",
      HALFLINE_MODE: "test",
      PORT: "0",
      DATABASE_URL: databaseUrl,
      ...variables,
    },
    stdio: ["ignore", "pipe", "pipe", "ipc"],
  });
  let output = "";
  const ended = new Promise<number | null>((done) => child.once("exit", done));
  const ready = new Promise<string>((done, fail) => {
    for (const stream of [child.stdout, child.stderr]) {
      stream?.on("data", (chunk) => {
        output += chunk;
        const url = /Halfline is ready: (\S+)/.exec(output)?.[1];
        if (url) done(url);
      });
    }
    ended.then(() => fail(new Error(`The server ended before it was ready:\n${output}`)));
    setTimeout(() => fail(new Error(`The server was not ready in time:\n${output}`)), START_TIMEOUT_MS).unref();
  });
  return {
    url: await ready,
    databaseUrl,
    output: () => output,
    stop: (signal = "SIGTERM") => {
      child.kill(signal);
      return ended;
    },
    abandon: () => {
      child.disconnect();
      return ended;
    },
  };
}

/**
 * `npm start`: the private database, then the application in demo mode. Ctrl-C, or the end of either, ends both.
 * With --dev the application is served from its sources and reloads as they change.
 */
import { spawn, spawnSync } from "node:child_process";
import { existsSync } from "node:fs";
import { dirname, join, resolve } from "node:path";
import { fileURLToPath } from "node:url";

const root = resolve(dirname(fileURLToPath(import.meta.url)), "..");
const dev = process.argv.includes("--dev");

// npm skips prestart where ignore-scripts is set; then the set-up is done here.
if (
  !existsSync(join(root, "node_modules/.halfline-lock")) ||
  (!dev && !existsSync(join(root, "build/.halfline-sources")))
) {
  const done = spawnSync("sh", ["scripts/bootstrap.sh", "start"], { cwd: root, stdio: "inherit" });
  if (done.status !== 0) process.exit(done.status ?? 1);
}

const { alreadyRunning, portIsFree } = await import("./one-at-a-time.mjs");
const port = Number(process.env.PORT ?? 4180);
const other = alreadyRunning(root);
if (other !== null)
  fail(`Halfline already runs from this folder (process ${other}). Stop that one first, with Ctrl-C in its window.`);
if (!(await portIsFree(port)))
  fail(`Port ${port} is in use by another program. Take another one:  PORT=${port + 1} npm start`);

const { startPostgres, ensureDatabase } = await import("./private-postgres.mjs");
const cluster = await startPostgres("postgres").catch((error) => fail(error.message));
const databaseUrl = await ensureDatabase(cluster, "halfline");

const command = dev ? ["--import", "tsx", "server/index.ts"] : ["build/index.js"];
const server = spawn(process.execPath, command, {
  cwd: root,
  // The channel tells the server when this process is killed, so that it does not stay behind on the port.
  stdio: ["inherit", "inherit", "inherit", "ipc"],
  env: {
    ...process.env,
    HALFLINE_MODE: "demo",
    DATABASE_URL: databaseUrl,
    NODE_ENV: dev ? "development" : "production",
  },
});

// The terminal sends Ctrl-C to the whole group; a signal sent to this process alone is handed on.
for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"])
  process.on(signal, () => server.kill(signal === "SIGINT" ? "SIGTERM" : signal));

server.on("exit", async (code, signal) => {
  await cluster.stop();
  process.exit(code ?? (signal === "SIGTERM" ? 0 : 1));
});

function fail(message) {
  process.stderr.write(`${message}\n`);
  process.exit(1);
}

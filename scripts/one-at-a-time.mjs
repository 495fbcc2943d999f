/** Two starts from one folder would share one database folder: the second is told of the first. */
import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { createServer } from "node:net";
import { join } from "node:path";

/** The process that runs from `root` now, or null; then this process is the one, until it ends. */
export function alreadyRunning(root) {
  const file = join(root, ".local/running");
  if (existsSync(file)) {
    const pid = readFileSync(file, "utf8").trim();
    const commandFile = `/proc/${pid}/cmdline`;
    if (existsSync(commandFile) && readFileSync(commandFile, "utf8").includes("start.mjs")) return pid;
  }
  mkdirSync(join(root, ".local"), { recursive: true });
  writeFileSync(file, String(process.pid));
  process.on("exit", () => rmSync(file, { force: true }));
  return null;
}

/** True if nothing listens on this port of loopback. */
export function portIsFree(port) {
  return new Promise((done) => {
    const probe = createServer();
    probe.once("error", () => done(false));
    probe.listen(port, "127.0.0.1", () => probe.close(() => done(true)));
  });
}

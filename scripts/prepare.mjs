/** Last part of the set-up: the private database's folder, and the build when a source changed since the last one. */
import { spawnSync } from "node:child_process";
import { createHash } from "node:crypto";
import { existsSync, readdirSync, readFileSync, statSync, writeFileSync } from "node:fs";
import { dirname, join, resolve } from "node:path";
import { fileURLToPath } from "node:url";

const root = resolve(dirname(fileURLToPath(import.meta.url)), "..");
const stamp = join(root, "build/.halfline-sources");

const sources = hashOfSources([
  "app",
  "server",
  "db",
  "package-lock.json",
  "vite.config.ts",
  "react-router.config.ts",
  "scripts/build-server.mjs",
]);
if (!existsSync(stamp) || readFileSync(stamp, "utf8") !== sources) {
  console.log("set-up: building the application");
  const built = spawnSync("npm", ["run", "--silent", "build"], { cwd: root, encoding: "utf8" });
  if (built.status !== 0) {
    process.stderr.write(`${built.stdout}${built.stderr}\nset-up stopped: the build failed; its words are above.\n`);
    process.exit(1);
  }
  writeFileSync(stamp, sources);
}

/** SHA-256 over the names and contents of all files below `places`. */
function hashOfSources(places) {
  const hash = createHash("sha256");
  const visit = (path) => {
    if (statSync(path).isDirectory()) {
      for (const name of readdirSync(path).sort()) visit(join(path, name));
    } else {
      hash.update(path.slice(root.length)).update("\0").update(readFileSync(path)).update("\0");
    }
  };
  for (const place of places) visit(join(root, place));
  return hash.digest("hex");
}

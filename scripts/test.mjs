/**
 * `npm test`: types, lint, then every test. Arguments go to vitest (`npm test -- --project unit tests/paper`).
 * The last line of the output is `N passed, N failed`.
 */
import { spawnSync } from "node:child_process";
import { existsSync } from "node:fs";
import { dirname, join, resolve } from "node:path";
import { fileURLToPath } from "node:url";

const root = resolve(dirname(fileURLToPath(import.meta.url)), "..");

if (!existsSync(join(root, "node_modules/.halfline-lock"))) {
  const done = spawnSync("sh", ["scripts/bootstrap.sh", "test"], { cwd: root, stdio: "inherit" });
  if (done.status !== 0) process.exit(done.status ?? 1);
}

for (const [name, script] of [
  ["types", "typecheck"],
  ["lint", "lint"],
]) {
  const check = spawnSync("npm", ["run", "--silent", script], { cwd: root, stdio: "inherit" });
  if (check.status !== 0) {
    console.error(`The ${name} do not pass; the tests were not begun.`);
    console.log("0 passed, 1 failed");
    process.exit(1);
  }
}

const tests = spawnSync(join(root, "node_modules/.bin/vitest"), ["run", ...process.argv.slice(2)], {
  cwd: root,
  stdio: "inherit",
});
process.exit(tests.status ?? 1);

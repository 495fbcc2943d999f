/**
 * Bundles the process: server/index.ts to build/index.js, and the worker of computations beside it.
 * After `react-router build`, which empties build/ and leaves the pages in build/server and build/client.
 */
import { existsSync } from "node:fs";
import { dirname, join, resolve } from "node:path";
import { fileURLToPath } from "node:url";
import { build } from "esbuild";

const root = resolve(dirname(fileURLToPath(import.meta.url)), "..");
const entries = ["server/index.ts", "server/compute/worker.ts"].filter((entry) => existsSync(join(root, entry)));

await build({
  absWorkingDir: root,
  entryPoints: entries,
  outbase: "server",
  outdir: "build",
  bundle: true,
  packages: "external",
  platform: "node",
  format: "esm",
  target: "node20",
  sourcemap: "linked",
  logLevel: "warning",
});

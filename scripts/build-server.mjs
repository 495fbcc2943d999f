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

/**
 * Packages of very many small modules, of which little is used: bundled, they load in a fraction of the time, and
 * each thread of computations loads them anew. All others stay outside: several of them look for files at run time.
 */
const BUNDLED = /^(mathjs|unified|remark-|mdast-|micromark-)/;

const packages = {
  name: "packages",
  setup({ onResolve }) {
    onResolve({ filter: /^[^./]/ }, ({ path, importer, kind }) => {
      if (kind === "entry-point" || BUNDLED.test(path) || importer.includes("/node_modules/")) return undefined;
      return { path, external: true };
    });
  },
};

await build({
  absWorkingDir: root,
  entryPoints: entries,
  outbase: "server",
  outdir: "build",
  bundle: true,
  plugins: [packages],
  platform: "node",
  format: "esm",
  target: "node20",
  sourcemap: "linked",
  logLevel: "warning",
});

import { renameSync } from "node:fs";
import { basename, resolve } from "node:path";
import { buildSync } from "esbuild";

/**
 * A file of tests/support as one file of JavaScript, for threads and processes of their own: they have no loader for
 * the sources, and start sooner. It stays where it is, since a thread may still be starting when its test is over.
 */
export function bundled(source: string): string {
  // Within the project, so that it finds the packages.
  const folder = resolve(import.meta.dirname, "../../node_modules/.cache/halfline");
  const outfile = resolve(folder, `${basename(source, ".ts")}.mjs`);
  const own = `${outfile}.${process.pid}`;
  buildSync({
    entryPoints: [resolve(import.meta.dirname, source)],
    outfile: own,
    bundle: true,
    packages: "external",
    platform: "node",
    format: "esm",
    target: "node20",
  });
  // At once, for test files that run beside this one.
  renameSync(own, outfile);
  return outfile;
}

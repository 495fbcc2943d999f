/**
 * Computes every cell of a paper without a browser, a server or a database:
 *   npm run compute -- FILE.md [--json] [--set name=value]...
 * FILE.md may also be a folder that holds paper.md. Its bibliography is FILE.bib, or bibliography.bib beside it.
 * Exit status: 0, or 1 when there is any problem; everything else is printed all the same.
 */
import { existsSync, readFileSync, statSync } from "node:fs";
import { dirname, join } from "node:path";
import { parseArgs } from "node:util";
import { reportAsText, reportPaper } from "../app/cells/index.ts";
import { readPaper } from "../app/paper/index.ts";

const USAGE = "Usage: npm run compute -- FILE.md [--json] [--set name=value]...";

function main(): number {
  const { values, positionals } = parseArgs({
    allowPositionals: true,
    options: { json: { type: "boolean", default: false }, set: { type: "string", multiple: true, default: [] } },
  });
  const [file, ...others] = positionals;
  if (file === undefined || others.length > 0) throw new Error(`One paper is computed at a time. ${USAGE}`);
  const { text, bibliography } = readFiles(file);
  const report = reportPaper(readPaper(text, bibliography), overridesFrom(values.set));
  process.stdout.write(values.json ? `${JSON.stringify(report, null, 2)}\n` : reportAsText(report));
  return report.problems.length === 0 ? 0 : 1;
}

function readFiles(path: string): { text: string; bibliography: string } {
  if (!existsSync(path)) throw new Error(`There is no file ${path}. ${USAGE}`);
  const file = statSync(path).isDirectory() ? join(path, "paper.md") : path;
  if (!existsSync(file)) throw new Error(`The folder ${path} holds no paper.md. ${USAGE}`);
  const beside = [file.replace(/\.[^./\\]*$/, ".bib"), join(dirname(file), "bibliography.bib")];
  const found = beside.find((candidate) => candidate !== file && existsSync(candidate));
  return { text: readFileSync(file, "utf8"), bibliography: found === undefined ? "" : readFileSync(found, "utf8") };
}

function overridesFrom(settings: readonly string[]): Record<string, string> {
  return Object.fromEntries(
    settings.map((setting) => {
      const at = setting.indexOf("=");
      if (at < 1 || at === setting.length - 1)
        throw new Error(`--set takes name=value, as --set mu=2, not ${setting}.`);
      return [setting.slice(0, at).trim(), setting.slice(at + 1)];
    }),
  );
}

try {
  process.exitCode = main();
} catch (error) {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
  process.exitCode = 1;
}

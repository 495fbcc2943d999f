import { execFile } from "node:child_process";
import { mkdtemp, readFile, rm, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { promisify } from "node:util";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { figureToPgfplots } from "../../app/figures/index.ts";
import { GALLERY } from "../figures/gallery.ts";

const run = promisify(execFile);
const TEX_TIME_MS = 180_000;
const WIDTHS_MM = [120, 76];

let folder = "";
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), "halfline-test-figures-"));
});
afterAll(() => rm(folder, { recursive: true, force: true }));

/** Each figure on a page of its own, as wide as it is, so that what stands out of its width shows in the page's size. */
async function printed(widthMm: number): Promise<{ readonly log: string; readonly pages: readonly string[] }> {
  const pictures: string[] = [];
  for (const [name, figure] of Object.entries(GALLERY)) {
    const dataFile = `${name}-${widthMm}.dat`;
    const text = (words: string) => words.replace(/%/g, "\\%");
    const { tex, data } = figureToPgfplots(figure, { dataFile, widthMm, setMath: (math) => math, setText: text });
    await writeFile(join(folder, dataFile), data);
    pictures.push(tex);
  }
  const main = [
    "\\documentclass[tikz, border=0pt]{standalone}",
    "\\usepackage[T1]{fontenc}\\usepackage{amssymb}\\usepackage{pgfplots}\\pgfplotsset{compat=1.18}",
    "\\begin{document}",
    ...pictures,
    "\\end{document}",
  ].join("\n");
  const file = `plates-${widthMm}`;
  await writeFile(join(folder, `${file}.tex`), main);
  await run("pdflatex", ["-interaction=nonstopmode", "-halt-on-error", `${file}.tex`], { cwd: folder, maxBuffer: 1e8 });
  const { stdout } = await run("pdfinfo", ["-f", "1", "-l", "99", `${file}.pdf`], { cwd: folder });
  const pages = stdout.split("\n").filter((line) => /^Page +\d+ size/.test(line));
  return { log: await readFile(join(folder, `${file}.log`), "utf8"), pages };
}

describe.each(WIDTHS_MM)("plates in print, %i mm wide", (widthMm) => {
  it(
    "are set by TeX without a complaint, and none is wider than it was to be",
    async () => {
      const { log, pages } = await printed(widthMm);
      expect(log).not.toMatch(/Overfull|undefined|Missing character|Dimension too large|NOTE: coordinate/i);
      expect(pages).toHaveLength(Object.keys(GALLERY).length);
      for (const page of pages) {
        const width = Number(/size: +([\d.]+)/.exec(page)?.[1]);
        // pdfinfo gives PostScript points. Labels are laid out by estimated widths, a little larger than TeX's.
        expect(width).toBeLessThanOrEqual((widthMm / 25.4) * 72 + 1);
        expect(width).toBeGreaterThan((widthMm / 25.4) * 72 * 0.7);
      }
    },
    TEX_TIME_MS,
  );
});

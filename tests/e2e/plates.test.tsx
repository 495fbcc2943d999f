import { readFile } from "node:fs/promises";
import { createRequire } from "node:module";
import AxeBuilder from "@axe-core/playwright";
import type { Browser, Page } from "playwright-core";
import { renderToStaticMarkup } from "react-dom/server";
import { afterAll, beforeAll, expect, test } from "vitest";
import { FigurePlate } from "../../app/figures/index.ts";
import { GALLERY } from "../figures/gallery.ts";
import { openBrowser } from "./people.ts";

const find = createRequire(import.meta.url).resolve;
/** A law of a thousand points is no different from one of nine for what is asked here, and takes long to go through. */
const { deepLaw: _deepLaw, ...PLATES } = GALLERY;

const FACES = [
  ["Commissioner", "@fontsource-variable/commissioner/files/commissioner-latin-wght-normal.woff2", "normal"],
  ["KaTeX_Math", "katex/dist/fonts/KaTeX_Math-Italic.woff2", "italic"],
  ["KaTeX_AMS", "katex/dist/fonts/KaTeX_AMS-Regular.woff2", "normal"],
] as const;

let browser: Browser;
let styles = "";
beforeAll(async () => {
  browser = await openBrowser();
  const faces = await Promise.all(
    FACES.map(async ([family, file, style]) => {
      const data = (await readFile(find(file))).toString("base64");
      return `@font-face { font-family: ${family}; font-style: ${style}; font-weight: 100 900; src: url(data:font/woff2;base64,${data}); }`;
    }),
  );
  styles = `${await readFile("app/ui/tokens.css", "utf8")}\n${faces.join("\n")}\nbody { margin: 0; background: var(--paper); color: var(--ink); --ui: Commissioner; }`;
});
afterAll(() => browser?.close());

async function shown(width: number, theme: "light" | "dark"): Promise<Page> {
  const context = await browser.newContext({ viewport: { width, height: 900 }, colorScheme: theme });
  const page = await context.newPage();
  const plates = Object.entries(PLATES).map(([name, figure]) => (
    <section key={name} aria-label={name}>
      <FigurePlate figure={{ ...figure, alternative: `What ${name} finds.` }} width={width} />
    </section>
  ));
  const body = renderToStaticMarkup(
    <main>
      <h1 style={{ position: "absolute", clipPath: "inset(50%)" }}>Plates</h1>
      {plates}
    </main>,
  );
  await page.setContent(
    `<!doctype html><html lang="en" data-theme="${theme}"><title>Plates</title><style>${styles}</style><body>${body}`,
  );
  await page.evaluate(() => document.fonts.ready);
  return page;
}

/** Texts of one plate that overlap or leave it, as the browser has set them. */
const textsAmiss = (page: Page): Promise<string[]> =>
  page.evaluate(() =>
    [...document.querySelectorAll("svg")].flatMap((svg) => {
      const plate = svg.getBoundingClientRect();
      const texts = [...svg.querySelectorAll("text")].map((text) => ({
        words: text.textContent ?? "",
        box: text.getBoundingClientRect(),
      }));
      const outside = texts.filter(({ box }) => box.left < plate.left - 1 || box.right > plate.right + 1);
      // The box of a text is as high as its line; letters fill its middle, so that lines may touch by a few pixels.
      const over = texts.flatMap((a, i) =>
        texts.slice(i + 1).flatMap((b) => {
          const width = Math.min(a.box.right, b.box.right) - Math.max(a.box.left, b.box.left);
          const height = Math.min(a.box.bottom, b.box.bottom) - Math.max(a.box.top, b.box.top);
          return width > 0.5 && height > 5 ? [`${a.words} | ${b.words}`] : [];
        }),
      );
      return [...outside.map(({ words }) => words), ...over];
    }),
  );

test.each([
  [660, "light"],
  [334, "dark"],
] as const)("plates %i wide, %s: no text overlaps, and axe finds nothing", async (width, theme) => {
  const page = await shown(width, theme);
  expect(await page.locator("svg").count()).toBe(Object.keys(PLATES).length);
  expect(await textsAmiss(page)).toEqual([]);
  // Common practice: axe-core's rules.
  const { violations } = await new AxeBuilder({ page }).analyze();
  expect(violations.map(({ id, nodes }) => [id, nodes.map(({ target }) => target.join(" "))])).toEqual([]);
  await page.context().close();
});

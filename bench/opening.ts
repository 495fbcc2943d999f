import { gzipSync } from "node:zlib";
import type { Browser, Page } from "playwright-core";
import { signedIn } from "../tests/e2e/people.ts";
import { openBrowser, openSheet } from "./browser.ts";
import { type ServedPaper, servePaper } from "./served-paper.ts";

/** Bounds that are asked for. */
const FIRST_TEXT_MS = 1000;
const LIVE_MS = 2500;
const LONG_TASK_MS = 50;
const SHIFT = 0.02;
const SHEET_KB = 450;
const GALLEY_KB = 170;

/** A notch of a wheel, and how often a hand turns it. */
const NOTCH_PX = 240;
const NOTCH_MS = 40;
/** Windows that are scrolled through. */
const WINDOWS = 30;

declare global {
  interface Window {
    /** Gathered from before the first script of the page. */
    seen: { shift: number; longest: number; live: number };
  }
}

/**
 * Opening a long paper whose cells are computed, and scrolling through it: when its text can be read, when it is live
 * (typeset, joined, what is in view drawn), what moves under the reader's eye, how long the page's thread is held, and
 * how much script is fetched before anything is used. Nothing is in the browser's caches.
 */
export async function printOpening(text: string): Promise<void> {
  const browser = await openBrowser();
  const served = await servePaper(text);
  try {
    const first = await openSheet(browser, served, { computed: true });
    await first.page.context().close();
    console.log(`\nopening ${Math.round(text.length / 1000)} kB`);
    await printSheet(browser, served);
    await printGalley(browser, served);
  } finally {
    await browser.close();
    await served.stop();
  }
}

async function printSheet(browser: Browser, served: ServedPaper): Promise<void> {
  const { page } = await signedIn(browser, served.url, served.owner);
  await page.waitForLoadState("networkidle");
  const scripts = weighScripts(page);
  await page.addInitScript(watch);
  await page.goto(served.path);
  await page.waitForFunction(() => window.seen.live > 0, undefined, { polling: 50 });
  await page.waitForTimeout(1500);
  const { firstText, seen } = await page.evaluate(() => ({
    firstText: performance.getEntriesByName("first-contentful-paint")[0]?.startTime ?? Number.NaN,
    seen: window.seen,
  }));
  printBound("to first readable text, ms", firstText, FIRST_TEXT_MS);
  printBound("to fully live, ms", seen.live, LIVE_MS);
  const { page: kilobytes, worker } = await scripts();
  printBound("what shifted while opening (CLS)", seen.shift, SHIFT);
  printBound("script of the sheet, gzip kB", kilobytes, SHEET_KB);
  console.log(`  and of its worker, which reads and computes: ${worker.toFixed(0)}`);
  await page.evaluate(() => {
    window.seen.longest = 0;
    window.seen.shift = 0;
  });
  await page.mouse.move(720, 500);
  for (let passed = 0; passed < WINDOWS * 1000; passed += NOTCH_PX) {
    await page.mouse.wheel(0, NOTCH_PX);
    await page.waitForTimeout(NOTCH_MS);
  }
  const after = await page.evaluate(() => window.seen);
  printBound("longest task while scrolling, ms", after.longest, LONG_TASK_MS);
  printBound("what shifted while scrolling (CLS)", after.shift, SHIFT);
  await page.context().close();
}

async function printGalley(browser: Browser, served: ServedPaper): Promise<void> {
  const { page } = await signedIn(browser, served.url, served.owner);
  await page.waitForLoadState("networkidle");
  const scripts = weighScripts(page);
  await page.goto(`${served.path}/galley`, { waitUntil: "networkidle" });
  printBound("script of the galley, gzip kB", (await scripts()).page, GALLEY_KB);
  await page.context().close();
}

/** Runs in the page, before its scripts. */
function watch(): void {
  window.seen = { shift: 0, longest: 0, live: 0 };
  new PerformanceObserver((list) => {
    for (const entry of list.getEntries()) window.seen.longest = Math.max(window.seen.longest, entry.duration);
  }).observe({ type: "longtask", buffered: true });
  new PerformanceObserver((list) => {
    for (const entry of list.getEntries()) {
      // Chromium's own entry, which TypeScript does not know.
      const { value, hadRecentInput } = entry as PerformanceEntry & { value: number; hadRecentInput: boolean };
      if (!hadRecentInput) window.seen.shift += value;
    }
  }).observe({ type: "layout-shift", buffered: true });
  new MutationObserver((_records, observer) => {
    const typeset = document.querySelector(".hl-text:not(.hl-untyped) .hl-title") !== null;
    const joined = /All changes kept/.test(document.querySelector(".hl-kept")?.textContent ?? "");
    if (!typeset || !joined || document.querySelector(".hl-text .hl-frame") !== null) return;
    window.seen.live = performance.now();
    observer.disconnect();
  }).observe(document, { subtree: true, childList: true, characterData: true, attributes: true });
}

/** What the page fetches of script from now on, in kB as it is sent compressed; its worker's apart. */
function weighScripts(page: Page): () => Promise<{ page: number; worker: number }> {
  const sizes: Promise<readonly [string, number]>[] = [];
  page.context().on("response", (response) => {
    const { pathname } = new URL(response.url());
    if (!pathname.endsWith(".js")) return;
    sizes.push(response.body().then((body) => [pathname, gzipSync(body, { level: 9 }).length / 1000] as const));
  });
  return async () => {
    const weighed = new Map(await Promise.all(sizes));
    const sum = (ofWorker: boolean) =>
      [...weighed].reduce((total, [path, size]) => (path.includes(".worker-") === ofWorker ? total + size : total), 0);
    return { page: sum(false), worker: sum(true) };
  };
}

function printBound(name: string, value: number, bound: number): void {
  const digits = bound < 1 ? 3 : 0;
  console.log(
    `${name.padEnd(44)} ${value.toFixed(digits).padStart(8)}  asked: ${bound}${value > bound ? ", missed" : ""}`,
  );
}

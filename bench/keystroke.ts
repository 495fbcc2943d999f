import { resolve } from "node:path";
import { build } from "esbuild";
import { type Browser, chromium } from "playwright-core";
import { signedIn } from "../tests/e2e/people.ts";
import { servePaper } from "./served-paper.ts";
import { type TypingTimes, typeInTheMiddle } from "./typing.ts";

/** The bound: a key on the sheet takes at most this many times what it takes in the bare editing component. */
const BOUND = 1.5;

/**
 * Keystroke to paint: the same letters are typed into the middle of the same long text, on the sheet of the built
 * application and in the editing component alone, in one browser that draws as often as it can.
 */
export async function printKeystrokes(text: string): Promise<void> {
  const browser = await chromium.launch({
    executablePath: process.env.CHROMIUM ?? "/usr/bin/chromium",
    // Else each time would be rounded up to the next sixtieth of a second.
    args: ["--no-sandbox", "--disable-dev-shm-usage", "--disable-frame-rate-limit", "--disable-gpu-vsync"],
  });
  try {
    const bare = await onBareEditor(browser, text);
    const sheet = await onSheet(browser, text);
    console.log(`\nkeystroke in ${Math.round(text.length / 1000)} kB, ms      median      95 %   script     all work`);
    printRow("bare editing component", bare);
    printRow("sheet", sheet);
    const ratio = sheet.median / bare.median;
    console.log(
      `Keystroke to paint, sheet / bare component: ${ratio.toFixed(2)} (bound ${BOUND}${ratio > BOUND ? ", exceeded" : ""})`,
    );
  } finally {
    await browser.close();
  }
}

async function onSheet(browser: Browser, text: string): Promise<TypingTimes> {
  const served = await servePaper(text);
  try {
    const { page } = await signedIn(browser, served.url, served.owner);
    await page.goto(served.path);
    await page.locator(".hl-text .hl-title").waitFor();
    const times = await typeInTheMiddle(page);
    await page.context().close();
    return times;
  } finally {
    await served.stop();
  }
}

async function onBareEditor(browser: Browser, text: string): Promise<TypingTimes> {
  const bundle = await build({
    entryPoints: [resolve(import.meta.dirname, "bare-editor.ts")],
    bundle: true,
    write: false,
    minify: true,
    format: "iife",
  });
  const page = await browser.newPage({ viewport: { width: 1440, height: 1000 } });
  await page.setContent("<!doctype html><title>Bare</title><body></body>");
  await page.addScriptTag({ content: bundle.outputFiles[0]?.text ?? "" });
  await page.evaluate((content) => window.openBareEditor(content), text);
  const times = await typeInTheMiddle(page);
  await page.close();
  return times;
}

function printRow(name: string, { median, p95, script, work }: TypingTimes): void {
  console.log(`${name.padEnd(28)} ${[median, p95, script, work].map((ms) => ms.toFixed(2).padStart(9)).join(" ")}`);
}

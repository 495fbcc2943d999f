import { resolve } from "node:path";
import { build } from "esbuild";
import type { Browser } from "playwright-core";
import { openBrowser, openSheet } from "./browser.ts";
import { othersTyping } from "./others.ts";
import { servePaper } from "./served-paper.ts";
import { type TypingTimes, typeInTheMiddle } from "./typing.ts";

/** Keystroke to paint on the sheet takes at most so many times what it takes in the bare editing component. */
const PAINT_RATIO = 1.5;
/** The sheet's own script takes at most so long for 95 of 100 keys [ms]. */
const SCRIPT_MS = 8;
const OTHERS = 5;

/**
 * Keystroke to paint: the same letters are typed into the middle of the same long text, on the sheet of the built
 * application, alone and while others type, and in the editing component alone, in one browser that draws as often as
 * it can.
 */
export async function printKeystrokes(text: string): Promise<void> {
  const browser = await openBrowser({ unpaced: true });
  try {
    const bare = await onBareEditor(browser, text);
    const { alone, among } = await onSheet(browser, text);
    console.log(
      `\nkeystroke in ${Math.round(text.length / 1000)} kB, ms        to paint     95 %   script     95 %     work     95 %`,
    );
    printRow("bare editing component", bare);
    printRow("sheet", alone, bare);
    printRow(`sheet, ${OTHERS} others typing`, among, bare);
  } finally {
    await browser.close();
  }
}

async function onSheet(browser: Browser, text: string): Promise<{ alone: TypingTimes; among: TypingTimes }> {
  const served = await servePaper(text);
  try {
    const { page, cookie } = await openSheet(browser, served, { computed: true });
    const alone = await typeInTheMiddle(page);
    const others = await othersTyping(OTHERS, served, cookie);
    const among = await typeInTheMiddle(page);
    others.end();
    await page.context().close();
    return { alone, among };
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

function printRow(name: string, times: TypingTimes, against?: TypingTimes): void {
  const { median, p95, script, work } = times;
  const columns = [median, p95, script.median, script.p95, work.median, work.p95];
  console.log(`${name.padEnd(28)} ${columns.map((ms) => ms.toFixed(2).padStart(8)).join(" ")}`);
  if (against === undefined) return;
  const ratio = median / against.median;
  console.log(
    `  to paint / bare: ${ratio.toFixed(2)}, asked ${PAINT_RATIO}${missed(ratio, PAINT_RATIO)}; script at 95 %: ${script.p95.toFixed(2)} ms, asked ${SCRIPT_MS}${missed(script.p95, SCRIPT_MS)}; work / bare: ${(work.median / against.work.median).toFixed(2)}`,
  );
}

function missed(value: number, bound: number): string {
  return value > bound ? " (missed)" : "";
}

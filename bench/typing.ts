import type { Page } from "playwright-core";

/** What typing costs on a page, in milliseconds. */
export interface TypingTimes {
  /** From the key's event to the moment after the next paint: half of the keys took less. */
  readonly median: number;
  /** Ninety-five of a hundred keys took less. */
  readonly p95: number;
  /** The page's own thread for each key: script, and all its work with layout; what follows later is counted too. */
  readonly script: number;
  readonly work: number;
}

declare global {
  interface Window {
    paintedAfter: number[];
  }
}

const KEYS = 100;
/** Between two keys: nine letters a second, a fast typist. */
const PACE_MS = 110;
/** After the last key, for what comes late. */
const REST_MS = 1000;

/** Types a hundred letters into a paragraph in the middle of the text that a page shows. */
export async function typeInTheMiddle(page: Page): Promise<TypingTimes> {
  await putCaret(page);
  // The first keys find code that has not been compiled.
  await page.keyboard.type("warm ", { delay: PACE_MS });
  await page.evaluate(() => {
    window.paintedAfter = [];
    addEventListener(
      "keydown",
      ({ timeStamp }) => {
        requestAnimationFrame(() => {
          const { port1, port2 } = new MessageChannel();
          port1.onmessage = () => window.paintedAfter.push(performance.now() - timeStamp);
          port2.postMessage(null);
        });
      },
      { capture: true },
    );
  });
  const session = await page.context().newCDPSession(page);
  await session.send("Performance.enable");
  const spent = async () => {
    const { metrics } = await session.send("Performance.getMetrics");
    const seconds = (name: string) => metrics.find((metric) => metric.name === name)?.value ?? Number.NaN;
    return { script: 1000 * seconds("ScriptDuration"), work: 1000 * seconds("TaskDuration") };
  };
  const before = await spent();
  await page.keyboard.type("larvae drift ".repeat(KEYS).slice(0, KEYS), { delay: PACE_MS });
  await page.waitForTimeout(REST_MS);
  const after = await spent();
  const times = (await page.evaluate(() => window.paintedAfter)).sort((a, b) => a - b);
  if (times.length !== KEYS) throw new Error(`${times.length} of ${KEYS} keys were painted.`);
  return {
    median: times[KEYS / 2] ?? Number.NaN,
    p95: times[Math.floor(KEYS * 0.95)] ?? Number.NaN,
    script: (after.script - before.script) / KEYS,
    work: (after.work - before.work) / KEYS,
  };
}

/** Half-way down, in the first paragraph that stands wholly in the window. */
async function putCaret(page: Page): Promise<void> {
  // What is passed gets its true height, so the middle moves: twice.
  for (let i = 0; i < 3; i++) {
    await page.evaluate(() => scrollTo(0, document.documentElement.scrollHeight / 2));
    await page.waitForTimeout(500);
  }
  const place = await page.evaluate(() => {
    const lines = [...document.querySelectorAll(".cm-line")].map((line) => ({
      words: line.textContent ?? "",
      box: line.getBoundingClientRect(),
    }));
    const found = lines.find(
      ({ words, box }) => words.startsWith("The ") && box.top > 100 && box.bottom < innerHeight - 100,
    );
    return found && { x: found.box.x + 15, y: found.box.y + 12, middle: scrollY > innerHeight };
  });
  if (!place?.middle) throw new Error("No paragraph stands in the middle of the paper.");
  await page.mouse.click(place.x, place.y);
  await page.waitForTimeout(500);
}

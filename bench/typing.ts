import type { CDPSession, Page } from "playwright-core";

/** What typing costs on a page, in milliseconds. */
export interface TypingTimes {
  /** From the key's event to the moment after the next paint: half of the keys took less. */
  readonly median: number;
  /** Ninety-five of a hundred keys took less. */
  readonly p95: number;
  /**
   * Script on the page's own thread for each key, with what follows later (an answer of the worker, a word of the server):
   * processor time, so that other programs on the machine do not count. Median and 95 %.
   */
  readonly script: { readonly median: number; readonly p95: number };
  /** All work of that thread, with style and layout. */
  readonly work: { readonly median: number; readonly p95: number };
}

const KEYS = 100;
/** Between two keys: nine letters a second, a fast typist. */
const PACE_MS = 110;

/** Types a hundred letters into a paragraph in the middle of the text that a page shows. */
export async function typeInTheMiddle(page: Page): Promise<TypingTimes> {
  await putCaret(page);
  // The first keys find code that has not been compiled.
  await page.keyboard.type("warm and warmer ", { delay: PACE_MS });
  const watch = await page.evaluateHandle(() => {
    const painted: number[] = [];
    const ending = new AbortController();
    addEventListener(
      "keydown",
      ({ timeStamp }) => {
        requestAnimationFrame(() => {
          const { port1, port2 } = new MessageChannel();
          port1.onmessage = () => painted.push(performance.now() - timeStamp);
          port2.postMessage(null);
        });
      },
      { capture: true, signal: ending.signal },
    );
    return { painted, ending };
  });
  const session = await page.context().newCDPSession(page);
  await session.send("Performance.enable", { timeDomain: "threadTicks" });
  const script: number[] = [];
  const work: number[] = [];
  let before = await spent(session);
  for (const letter of "larvae drift ".repeat(KEYS).slice(0, KEYS)) {
    await page.keyboard.press(letter === " " ? "Space" : letter);
    await page.waitForTimeout(PACE_MS);
    const after = await spent(session);
    script.push(after.script - before.script);
    work.push(after.work - before.work);
    before = after;
  }
  const times = await watch.evaluate(({ painted, ending }) => {
    ending.abort();
    return painted;
  });
  await session.detach();
  if (times.length !== KEYS) throw new Error(`${times.length} of ${KEYS} keys were painted.`);
  return { ...quantiles(times), script: quantiles(script), work: quantiles(work) };
}

async function spent(session: CDPSession): Promise<{ script: number; work: number }> {
  const { metrics } = await session.send("Performance.getMetrics");
  const milliseconds = (name: string) => {
    const value = metrics.find((metric) => metric.name === name)?.value;
    if (value === undefined) throw new Error(`The browser does not tell its ${name}.`);
    return 1000 * value;
  };
  return { script: milliseconds("ScriptDuration"), work: milliseconds("TaskDuration") };
}

function quantiles(times: readonly number[]): { median: number; p95: number } {
  const sorted = [...times].sort((a, b) => a - b);
  const at = (share: number) => sorted[Math.floor(sorted.length * share)] ?? Number.NaN;
  return { median: at(0.5), p95: at(0.95) };
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
      ({ words, box }) => words.startsWith("The ") && box.top > 130 && box.bottom < innerHeight - 100,
    );
    return found && { x: found.box.x + 15, y: found.box.y + 12, middle: scrollY > innerHeight };
  });
  if (!place?.middle) throw new Error("No paragraph stands in the middle of the paper.");
  await page.mouse.click(place.x, place.y);
  await page.waitForTimeout(500);
}

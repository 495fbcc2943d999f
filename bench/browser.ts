import { type Browser, chromium, type Page } from "playwright-core";
import { signedIn } from "../tests/e2e/people.ts";
import type { ServedPaper } from "./served-paper.ts";

/** The distribution's Chromium. `unpaced` draws as often as it can: else each time would be rounded up to a frame. */
export function openBrowser({ unpaced = false }: { readonly unpaced?: boolean } = {}): Promise<Browser> {
  return chromium.launch({
    executablePath: process.env.CHROMIUM ?? "/usr/bin/chromium",
    args: [
      "--no-sandbox",
      "--disable-dev-shm-usage",
      ...(unpaced ? ["--disable-frame-rate-limit", "--disable-gpu-vsync"] : []),
    ],
  });
}

export interface OpenedSheet {
  readonly page: Page;
  /** Of the owner's session. */
  readonly cookie: string;
}

const PATIENCE_MS = 120_000;

/** The served paper's sheet in a window of its owner's; `computed`: every cell has its result. */
export async function openSheet(
  browser: Browser,
  served: ServedPaper,
  { computed }: { readonly computed: boolean },
): Promise<OpenedSheet> {
  const { page, context } = await signedIn(browser, served.url, served.owner);
  const cookies = await context.cookies(served.url);
  const cookie = cookies.map(({ name, value }) => `${name}=${value}`).join("; ");
  await page.goto(served.path);
  await page.locator(".hl-text .hl-title").waitFor();
  if (computed) await computeAll(page);
  return { page, cookie };
}

/** Recomputes all, as a person does, and waits until nothing is out of date. */
async function computeAll(page: Page): Promise<void> {
  const tail = page.locator("footer.tail");
  await tail.getByText(/Errata none|Recompute all/).waitFor();
  const recompute = tail.getByRole("button", { name: "Recompute all" });
  if ((await recompute.count()) > 0) await recompute.click();
  await tail.getByText("Errata none").waitFor({ timeout: PATIENCE_MS });
}

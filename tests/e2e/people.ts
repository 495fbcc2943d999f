import { type Browser, type BrowserContext, chromium, type Page } from "playwright-core";

/** Chromium as the distribution installs it; without its sandbox, since tests may run as root. */
export function openBrowser(): Promise<Browser> {
  return chromium.launch({
    executablePath: process.env.CHROMIUM ?? "/usr/bin/chromium",
    args: ["--no-sandbox", "--disable-dev-shm-usage"],
  });
}

/** One person at a browser of their own, and everything amiss that their pages said. */
export interface Visitor {
  readonly page: Page;
  readonly context: BrowserContext;
  readonly complaints: string[];
}

const PATIENCE_MS = 60_000;

/** Opens a window in which nobody is signed in. */
export async function visitor(browser: Browser, application: string): Promise<Visitor> {
  const context = await browser.newContext({ baseURL: application, viewport: { width: 1440, height: 1000 } });
  context.setDefaultTimeout(PATIENCE_MS);
  const page = await context.newPage();
  const complaints: string[] = [];
  page.on("pageerror", (error) => complaints.push(`page error: ${error.message}`));
  page.on("console", (message) => {
    if (message.type() === "error" || message.type() === "warning") complaints.push(message.text());
  });
  return { page, context, complaints };
}

/** Signs one of the demo's people in through the stand-in for GitHub. */
export async function signedIn(browser: Browser, application: string, name: string): Promise<Visitor> {
  const someone = await visitor(browser, application);
  const { page } = someone;
  // Until the page's scripts have taken hold of it: a press on a button that is just being replaced is lost.
  await page.goto("/sign-in", { waitUntil: "networkidle" });
  await page.getByRole("button", { name: /GitHub/ }).click();
  await page.getByRole("button", { name }).click();
  await page.waitForURL("**/shelf");
  return someone;
}

/** The two authors of the specimen paper, each in a window of their own. */
export interface Authors {
  readonly ines: Visitor;
  readonly tormod: Visitor;
}

export async function bothAuthors(browser: Browser, application: string): Promise<Authors> {
  const [ines, tormod] = await Promise.all([
    signedIn(browser, application, "Inês Valadão"),
    signedIn(browser, application, "Tormod Hagelund"),
  ]);
  return { ines, tormod };
}

import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, expect, inject, test } from "vitest";
import { bothAuthors, openBrowser, type Visitor } from "./people.ts";
import { SheetOnPage } from "./sheet.ts";

/** What becomes of the words on this machine: without network, without access, and after signing out. */
const application = inject("applicationUrl");
const PATIENCE = { timeout: 30_000 };

let browser: Browser;
let ines: Visitor;
let tormod: Visitor;
let paper: string;

beforeAll(async () => {
  browser = await openBrowser();
  ({ ines, tormod } = await bothAuthors(browser, application));
  paper = await begunPaper(ines.page);
  await ines.page.goto(`${paper}/title-page`);
  await ines.page.getByLabel(/^Add by the name/).fill("tormod-hagelund");
  await ines.page.getByRole("button", { name: "Add", exact: true }).click();
  await ines.page.getByText("Tormod Hagelund").first().waitFor();
  for (const { page } of [ines, tormod]) await openedSheet(page);
});

afterAll(async () => {
  await browser?.close();
});

/** The address of a new paper. */
async function begunPaper(page: Page): Promise<string> {
  await page.goto("/shelf");
  await page.getByRole("button", { name: "Begin a paper" }).first().click();
  await page.waitForURL("**/papers/*");
  return new URL(page.url()).pathname;
}

async function openedSheet(page: Page): Promise<SheetOnPage> {
  await page.goto(paper);
  const sheet = new SheetOnPage(page);
  await sheet.isThere();
  await sheet.tail.getByText("All changes kept").waitFor();
  return sheet;
}

/** Writes a paragraph at the end of the text. */
async function write(page: Page, words: string): Promise<void> {
  await page.locator(".cm-content").first().focus();
  await page.keyboard.press("Control+End");
  await page.keyboard.press("Enter");
  await page.keyboard.type(words);
}

/** Names of the private copies in a browser. */
function privateCopies(page: Page): Promise<string[]> {
  return page.evaluate(async () => (await indexedDB.databases()).flatMap(({ name }) => name ?? []));
}

test("the loss of the network is said at once; on return both sides' words are joined, and told by whom", async () => {
  const tail = new SheetOnPage(ines.page).tail;
  await ines.context.setOffline(true);
  // Without the browser's own word it would take half a minute.
  await expect.poll(() => tail.textContent(), { timeout: 8000 }).toContain("No connection since");
  await write(ines.page, "Written while away.");
  await write(tormod.page, "Written meanwhile.");
  await expect.poll(() => new SheetOnPage(tormod.page).tail.textContent(), PATIENCE).toContain("All changes kept");
  await ines.context.setOffline(false);
  await expect.poll(() => tail.textContent(), PATIENCE).toMatch(/Connected\. \d+ changes? by you and \d+ by Tormod/);
  for (const { page } of [ines, tormod]) {
    for (const words of ["Written while away.", "Written meanwhile."]) {
      await page.locator(".hl-text .cm-line", { hasText: words }).waitFor();
    }
  }
});

test("who is taken off a paper keeps no copy of it on this machine", async () => {
  await expect.poll(() => privateCopies(tormod.page), PATIENCE).toContainEqual(expect.stringContaining("halfline/"));
  const theirs = await privateCopies(tormod.page);
  const ours = theirs.filter((name) => name.endsWith(paper.split("/").at(-1) ?? ""));
  expect(ours).toHaveLength(1);
  await ines.page.goto(`${paper}/title-page`);
  const row = ines.page.locator(".people-row", { hasText: "Tormod Hagelund" });
  await row.getByRole("link", { name: "Change role" }).click();
  await ines.page.getByRole("button", { name: "Take off the paper" }).click();
  await tormod.page.getByText("This paper is not open to you any more.").first().waitFor();
  await expect.poll(() => privateCopies(tormod.page), PATIENCE).not.toContain(ours[0]);
  // What stands on the sheet may still be read and copied.
  await tormod.page.locator(".hl-text .cm-line", { hasText: "Written meanwhile." }).waitFor();
});

test("signing out removes every private copy from this machine", async () => {
  const { page } = ines;
  await openedSheet(page);
  await expect.poll(() => privateCopies(page), PATIENCE).not.toEqual([]);
  await page.goto("/settings");
  await page.getByRole("button", { name: "Sign out", exact: true }).click();
  await page.waitForURL((url) => url.pathname === "/");
  await expect.poll(() => privateCopies(page), PATIENCE).toEqual([]);
});

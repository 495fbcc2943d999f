import AxeBuilder from "@axe-core/playwright";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, expect, inject, test } from "vitest";
import { openBrowser, signedIn, type Visitor } from "./people.ts";

const application = inject("applicationUrl");

let browser: Browser;
let author: Visitor;

beforeAll(async () => {
  browser = await openBrowser();
  author = await signedIn(browser, application, "Tormod Hagelund");
});

afterAll(async () => {
  await browser?.close();
});

/** Common practice: axe-core's rules; and nothing reaches beyond a narrow window. */
async function expectSound(page: Page): Promise<void> {
  await page.setViewportSize({ width: 390, height: 844 });
  const beyond = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
  expect(beyond).toBeLessThanOrEqual(0);
  const { violations } = await new AxeBuilder({ page }).analyze();
  expect(violations.map(({ id, nodes }) => [id, nodes.map(({ target }) => target.join(" "))])).toEqual([]);
  await page.setViewportSize({ width: 1440, height: 900 });
}

test("a paper is begun, put by and deleted for ever from the keyboard; Esc keeps it", async () => {
  const { page } = author;
  await page.goto("/shelf");
  await page.getByRole("button", { name: "Begin a paper" }).first().press("Enter");
  await page.waitForURL(/\/papers\//);
  const paper = new URL(page.url()).pathname;
  await page.goto("/shelf");
  const row = page.locator("li", { has: page.locator(`a[href="${paper}"]`) });
  await row.getByRole("button", { name: "Put by" }).press("Enter");
  await row.getByRole("link", { name: "Delete for ever" }).press("Enter");
  const dialog = page.getByRole("dialog", { name: "Delete for ever" });
  await dialog.waitFor();
  await expectSound(page);

  await page.keyboard.press("Escape");
  await dialog.waitFor({ state: "detached" });
  expect(await row.count()).toBe(1);

  await row.getByRole("link", { name: "Delete for ever" }).press("Enter");
  const title = dialog.getByLabel("Write the title, to be sure");
  // The dialog takes the focus: the title can be written at once.
  expect(await title.evaluate((field) => field === document.activeElement)).toBe(true);
  await page.keyboard.type("Something else");
  await page.keyboard.press("Enter");
  await dialog.getByRole("alert").waitFor();
  await title.fill("Untitled paper");
  await page.keyboard.press("Enter");
  await dialog.waitFor({ state: "detached" });
  expect(await row.count()).toBe(0);
});

test("the shelf finds what one looks for, and says when there is nothing", async () => {
  const { page } = author;
  await page.goto("/shelf");
  await page.getByLabel("Find a title or an author").fill("reach the SHORE");
  await page.keyboard.press("Enter");
  await page.waitForURL(/find=/);
  await page.getByRole("link", { name: "How many reach the shore?" }).waitFor();
  await page.goto("/shelf?find=zzz");
  expect(await page.getByText("No paper on the desk with").count()).toBe(1);
  await expectSound(page);
});

test("light or dark is chosen for good", async () => {
  const { page } = author;
  await page.emulateMedia({ colorScheme: "light" });
  await page.goto("/settings");
  const paper = () => page.evaluate(() => getComputedStyle(document.documentElement).backgroundColor);
  const light = await paper();
  await page.getByLabel("Light or dark").selectOption("dark");
  await page.getByRole("button", { name: "Keep these" }).click();
  await page.waitForFunction((was) => getComputedStyle(document.documentElement).backgroundColor !== was, light);
  await page.reload();
  expect(await paper()).not.toBe(light);
  await expectSound(page);
  await page.getByLabel("Light or dark").selectOption("machine");
  await page.getByRole("button", { name: "Keep these" }).click();
  await page.waitForFunction((was) => getComputedStyle(document.documentElement).backgroundColor === was, light);
});

test("a coauthor is added by login, given another role, and taken off", async () => {
  const { page } = author;
  await page.goto("/shelf");
  await page.getByRole("button", { name: "Begin a paper" }).first().click();
  await page.waitForURL(/\/papers\//);
  await page.goto(`${new URL(page.url()).pathname}/title-page`);
  const row = page.locator("li", { hasText: "Wanjiru Kamande" });
  await page.getByLabel("Add by the name they sign in with on GitHub").fill("wanjiru-kamande");
  await page.getByLabel("as", { exact: true }).selectOption("reader");
  await page.getByRole("button", { name: "Add", exact: true }).click();
  await row.waitFor();
  await row.getByRole("link", { name: "Change role" }).click();
  await page.getByLabel("Role of Wanjiru Kamande").selectOption("author");
  await expectSound(page);
  await row.getByRole("button", { name: "Change role" }).click();
  await page
    .locator("section", { has: page.getByRole("heading", { name: /^Authors/ }) })
    .getByText("Wanjiru")
    .last()
    .waitFor();
  await row.getByRole("link", { name: "Change role" }).click();
  await row.getByRole("button", { name: "Take off the paper" }).click();
  await row.waitFor({ state: "detached" });
});

test("what is not there is said on a page of our own", async () => {
  const { page } = author;
  const answer = await page.goto("/papers/AAAAAAAAAAAA");
  expect(answer?.status()).toBe(404);
  await page.getByText("No such paper, or it is not open to you.").waitFor();
  await expectSound(page);
});

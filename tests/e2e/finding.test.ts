import AxeBuilder from "@axe-core/playwright";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, expect, inject, test } from "vitest";
import { openBrowser, signedIn, type Visitor } from "./people.ts";
import { SheetOnPage } from "./sheet.ts";

/** Moving about a paper by the keys: the composing key, what stands above the tail line, and the narrow window's menu. */
const application = inject("applicationUrl");

let browser: Browser;
let ines: Visitor;
let page: Page;

beforeAll(async () => {
  browser = await openBrowser();
  ines = await signedIn(browser, application, "Inês Valadão");
  page = ines.page;
  await page.getByRole("link", { name: "How many reach the shore?" }).first().click();
  await page.waitForURL("**/papers/**");
  await new SheetOnPage(page).isThere();
});

afterAll(async () => {
  await browser?.close();
});

const text = () => page.getByRole("textbox", { name: "Text of the paper" });
const strip = (name: string) => page.getByRole("region", { name, exact: true });

async function compose(letter: string): Promise<void> {
  await page.keyboard.press("Control+;");
  await page.keyboard.press(letter);
}

async function violations(): Promise<string[]> {
  const { violations: found } = await new AxeBuilder({ page }).analyze();
  return found.map(({ id, nodes }) => `${id}: ${nodes.map(({ target }) => target.join(" ")).join(", ")}`);
}

test("the list of commands opens and closes by the keys, which then are where they were", async () => {
  await text().focus();
  await compose("?");
  await strip("Commands").waitFor();
  expect(await violations()).toEqual([]);
  await page.keyboard.press("Escape");
  await strip("Commands").waitFor({ state: "detached" });
  expect(await text().evaluate((element) => element === document.activeElement)).toBe(true);
});

test("the outline leads to a section, with the caret", async () => {
  await compose("o");
  const entry = strip("Outline").getByRole("button", { name: /Profiles past one/ });
  await entry.waitFor();
  expect(await violations()).toEqual([]);
  await entry.press("Enter");
  await page.locator(".hl-text .cm-line", { hasText: "Profiles past one" }).first().waitFor();
  await expect.poll(() => text().evaluate((element) => element === document.activeElement)).toBe(true);
});

test("what is found within a number's source opens it, and closes with the strip", async () => {
  await compose("s");
  await page.keyboard.type("K.mean]");
  await expect.poll(() => page.locator(".hl-found-here").textContent()).toBe("K.mean]");
  expect(await violations()).toEqual([]);
  await page.keyboard.press("Escape");
  await strip("Find").waitFor({ state: "detached" });
  expect(await page.locator(".hl-found").count()).toBe(0);
});

test("a narrow window has them all under More, and nothing stands wider than it", async () => {
  await page.setViewportSize({ width: 390, height: 844 });
  await page.getByRole("button", { name: "More", exact: true }).click();
  for (const name of [
    "Errata",
    "Outline",
    "Find",
    "Marks and strands",
    "Manual",
    "Light or dark",
    "Title page",
    "Galley",
  ])
    expect(await strip("Commands").getByRole("button", { name, exact: true }).isVisible(), name).toBe(true);
  expect(await violations()).toEqual([]);
  expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBe(390);
  await page.keyboard.press("Escape");
});

test("none of these pages complained", () => {
  expect(ines.complaints).toEqual([]);
});

import AxeBuilder from "@axe-core/playwright";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, expect, inject, test } from "vitest";
import { RULES } from "./axe-rules.ts";
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

async function violations(rules?: string[]): Promise<string[]> {
  const builder = new AxeBuilder({ page });
  const { violations: found } = await (rules === undefined ? builder : builder.withTags(rules)).analyze();
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

test("a working stands in the right margin beside its plate, beneath its caption where there is none, and Esc puts it away", async () => {
  await compose("s");
  await page.keyboard.type("counts K");
  await page.keyboard.press("Escape");
  const first = page.locator(".hl-working-first");
  await first.waitFor();
  const boxes = async () => {
    const [line, plate] = [await first.boundingBox(), await page.locator(".hl-open-cell .hl-plate").boundingBox()];
    if (line === null || plate === null) throw new Error("The working or its plate is not on the page.");
    return { line, plate };
  };
  const wide = await boxes();
  expect(wide.line.x).toBeGreaterThan(wide.plate.x + wide.plate.width);
  expect(wide.line.y).toBeLessThan(wide.plate.y + wide.plate.height);
  expect(await violations(RULES)).toEqual([]);
  await page.setViewportSize({ width: 1100, height: 1000 });
  await expect.poll(async () => (await boxes()).line.x).toBeLessThan(wide.line.x / 2);
  const narrow = await boxes();
  expect(narrow.line.y).toBeGreaterThanOrEqual(narrow.plate.y + narrow.plate.height);
  await page.setViewportSize({ width: 1440, height: 1000 });
  await page.keyboard.press("End");
  await page.keyboard.press("Escape");
  await first.waitFor({ state: "detached" });
  // The arrows lead into it from the text, and out again.
  await page.keyboard.press("ArrowUp");
  await page.keyboard.press("ArrowUp");
  await first.waitFor();
});

test("a section folds to a line that says what it holds, and opens for what is found in it", async () => {
  await compose("h");
  const fold = page.locator(".hl-fold");
  await fold.waitFor();
  expect(await fold.textContent()).toMatch(/^Section 2, 1 figure, \d+ lines/);
  await compose("s");
  await page.keyboard.type("counts K");
  await fold.waitFor({ state: "detached" });
  await page.keyboard.press("Escape");
  await page.keyboard.press("Escape");
});

test("LaTeX becomes the paper's own, told in the tail line; undo gives back what was pasted", async () => {
  await page.keyboard.press("Control+End");
  await page.keyboard.press("Enter");
  const latex = "See \\emph{this} and \\cite{kesten1978}.";
  await text().evaluate((element, plain) => {
    const data = new DataTransfer();
    data.setData("text/plain", plain);
    element.dispatchEvent(new ClipboardEvent("paste", { clipboardData: data, bubbles: true, cancelable: true }));
  }, latex);
  await page.locator(".tail", { hasText: "1 emphasis and 1 citation were converted." }).waitFor();
  const last = () => text().evaluate((element) => [...element.querySelectorAll(".cm-line")].at(-1)?.textContent ?? "");
  await expect.poll(last).toContain("See this and");
  await page.keyboard.press("Control+z");
  await expect.poll(last).toBe(latex);
  await page.keyboard.press("Control+z");
  await page.keyboard.press("Control+z");
});

test("the case sets at the caret what one types, and one undo takes it back", async () => {
  await compose("c");
  const field = page.getByRole("combobox", { name: "What is to be set" });
  await field.waitFor();
  await page.keyboard.type("tail of threshold");
  const chosen = page.getByRole("option", { selected: true });
  await expect.poll(() => chosen.textContent()).toContain("Tail");
  expect(await violations(RULES)).toEqual([]);
  await page.keyboard.press("Enter");
  await strip("The case").waitFor({ state: "detached" });
  const working = page.locator(".hl-text .cm-line", { hasText: "of: threshold" });
  await working.waitFor();
  expect(await page.evaluate(() => getSelection()?.toString())).toBe("x_0");
  await page.keyboard.press("Control+z");
  await working.waitFor({ state: "detached" });
});

test("a value is quoted by pointing at it, and the caret is after it", async () => {
  await compose("q");
  const place = page.locator(".hl-quote-layer :focus");
  await place.waitFor();
  expect(await violations(RULES)).toEqual([]);
  await page.keyboard.press("Enter");
  await strip("Quote a value").waitFor({ state: "detached" });
  const quoted = page.locator(".hl-source", { hasText: ":value[" });
  await quoted.waitFor();
  await page.locator("footer.tail", { hasText: "is quoted in line" }).waitFor();
  await page.keyboard.press("Control+z");
  await quoted.waitFor({ state: "detached" });
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

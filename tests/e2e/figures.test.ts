import AxeBuilder from "@axe-core/playwright";
import type { Browser, Locator, Page } from "playwright-core";
import { afterAll, beforeAll, expect, inject, test } from "vitest";
import { RULES } from "./axe-rules.ts";
import { openBrowser, signedIn, type Visitor } from "./people.ts";
import { SheetOnPage } from "./sheet.ts";

/** A figure on the sheet is read, taken away and given other axes; and every state of a cell is sound to axe, light and dark. */
const application = inject("applicationUrl");

const WORKING = "```counts K\nof: larvae\nstart: 1\nup_to: 30\n```";
const TEXT = `\`\`\`parameters
mu: {value: 1.6, min: 1.45, max: 4, step: 0.05, symbol: \\mu}
\`\`\`

The mean is :value[K.mean] and once more $x = \\value{larvae.decay}$; the check is of :value[K(2)].

\`\`\`process larvae
drift: mu
rate: 1
\`\`\`

${WORKING}

\`\`\`table t
rows: {n: [1, 2]}
columns: {exact: K(n)}
caption: Table of $K$.
\`\`\`

\`\`\`check amiss
that: mu > 3
\`\`\`

Last words.
`;

let browser: Browser;
let ines: Visitor;
let page: Page;
let sheet: SheetOnPage;

beforeAll(async () => {
  browser = await openBrowser();
  ines = await signedIn(browser, application, "Inês Valadão");
  page = ines.page;
  sheet = new SheetOnPage(page);
  await page.getByRole("button", { name: "Begin a paper" }).first().click();
  await page.waitForURL("**/papers/*");
  await sheet.isThere();
  const text = page.getByRole("textbox", { name: "Text of the paper" });
  await text.focus();
  await page.keyboard.press("Control+a");
  await page.keyboard.insertText(TEXT);
  await sheet.plate("Figure 1", "not computed");
});

afterAll(async () => {
  await browser?.close();
});

/** What comes by itself, if it comes within this time on a busy machine. */
function soon<T>(read: () => T) {
  return expect.poll(read, { timeout: 60_000 });
}

async function violations(): Promise<string[]> {
  const { violations: found } = await new AxeBuilder({ page }).withTags(RULES).analyze();
  return found.map(({ id, nodes }) => `${id}: ${nodes.map(({ target }) => target.join(" ")).join(", ")}`);
}

const figure = (state: string): Promise<Locator> => sheet.plate("Figure 1", state);

/** The text has no keys, so that nothing is open. */
const leaveText = () =>
  page.evaluate(() => document.activeElement instanceof HTMLElement && document.activeElement.blur());

const clipboard = (): Promise<string> => page.evaluate(() => navigator.clipboard.readText());

test("cells that are not computed yet are sound; then all but the check that fails are current", async () => {
  await leaveText();
  expect(await violations()).toEqual([]);
  await page.getByRole("button", { name: "Recompute all" }).click();
  await figure("current");
  await soon(() => sheet.tail.textContent()).toContain("check amiss to be mended");
});

test("the pointer reads what stands at a place of the figure, with its supported digits", async () => {
  const plate = await figure("current");
  const box = await plate.locator("svg").boundingBox();
  if (box === null) throw new Error("The figure is not drawn.");
  await page.mouse.move(box.x + box.width / 2, box.y + box.height / 2);
  // Six digits, as a number without `digits` has them (paper-language, section 3).
  await soon(() => plate.locator(".figure-reading-words").textContent()).toMatch(
    /^n = 1\d, P\(K = n\) = \d(\.\d{1,5})?(×10⁻[⁰¹²³⁴⁵⁶⁷⁸⁹]+)?$/,
  );
  expect(await violations()).toEqual([]);
});

test("the keys read it from the command on, and are where they were after Esc", async () => {
  const plate = await figure("current");
  const command = plate.getByRole("button", { name: "Read the figure, Figure 1" });
  await page.mouse.move(0, 0);
  expect(await command.isVisible()).toBe(false);
  await plate.getByRole("button", { name: "Show working, Figure 1" }).focus();
  await page.keyboard.press("Tab");
  await page.keyboard.press("Enter");
  const slider = plate.getByRole("slider");
  await soon(() => slider.getAttribute("aria-valuetext")).toMatch(/^n = 0, /);
  await page.keyboard.press("ArrowRight");
  await page.keyboard.press("ArrowRight");
  expect(await slider.getAttribute("aria-valuetext")).toMatch(/^n = 2, /);
  await page.keyboard.press("Escape");
  await slider.waitFor({ state: "detached" });
  expect(await command.evaluate((element) => element === document.activeElement)).toBe(true);
});

test("it is copied as SVG, PNG and CSV; what the clipboard refuses is offered as a file", async () => {
  await ines.context.grantPermissions(["clipboard-read", "clipboard-write"]);
  const plate = await figure("current");
  const press = async (name: string) => {
    await plate.hover();
    await plate.getByRole("button", { name: `${name}, Figure 1` }).click();
  };
  await press("Copy as SVG");
  await soon(clipboard).toMatch(/^<\?xml[^>]*>\s*<svg [\s\S]*<\/svg>\s*$/);
  await press("Copy points (CSV)");
  await soon(clipboard).toMatch(/^n,K\(n\),[^\n]*\r?\n0,0\.\d/);
  await press("Copy as PNG");
  const kinds = () => page.evaluate(async () => (await navigator.clipboard.read()).flatMap(({ types }) => types));
  await soon(kinds).toEqual(["image/png"]);
  await page.evaluate(() => {
    navigator.clipboard.write = () => Promise.reject(new Error("refused"));
  });
  await press("Copy as PNG");
  const file = page.waitForEvent("download");
  await plate.getByRole("link", { name: "Take Figure 1 as PNG as a file" }).click();
  expect((await file).suggestedFilename()).toBe("figure-1.png");
  expect(await violations()).toEqual([]);
  await press("Put away");
});

test("axes are tried on the sheet, refused at their field, written into the working, and taken back in one step", async () => {
  const plate = await figure("current");
  await plate.hover();
  await plate.getByRole("button", { name: "Set the axes, Figure 1" }).click();
  const strip = page.getByRole("region", { name: "Axes", exact: true });
  const across = strip.getByRole("group", { name: "Across, n" });
  await across.getByLabel("from").fill("10");
  await across.getByLabel("to", { exact: true }).fill("20");
  await soon(() => plate.locator("svg").textContent()).toContain("1011121314");
  await across.getByLabel("logarithmic").check();
  await across.getByLabel("from").fill("0");
  await soon(() => across.getByRole("status").textContent()).toContain("A logarithmic axis begins above 0");
  expect(await strip.getByRole("button", { name: "Set the axes" }).isDisabled()).toBe(true);
  expect(await violations()).toEqual([]);
  await across.getByLabel("linear").check();
  await across.getByLabel("from").fill("10");
  await page.keyboard.press("Enter");
  await strip.waitFor({ state: "detached" });
  await plate.getByRole("button", { name: "Show working, Figure 1" }).click();
  const working = async () => (await page.locator(".hl-working").allInnerTexts()).join("\n").trim();
  await soon(working).toBe(WORKING.replace("up_to: 30", "up_to: 30\naxes: {x: 10 to 20}"));
  await page.keyboard.press("Control+z");
  // The caret is where it was before, and the working closed with it.
  await plate.getByRole("button", { name: "Show working, Figure 1" }).click();
  await soon(working).toBe(WORKING);
});

test("out of date, tried, stood by and offline are sound, light and dark, and each says its words", async () => {
  await leaveText();
  const mu = sheet.parameter("mu");
  await mu.focus();
  await mu.press("ArrowRight");
  await soon(() => page.getByRole("region", { name: "Figure 1, tried privately" }).count()).toBe(1);
  expect(await violations()).toEqual([]);
  await mu.press("Enter");
  const stale = await figure("out of date");
  expect(await stale.textContent()).toContain("† Out of date.");
  await stale.getByRole("button", { name: "Let it stand, Figure 1" }).click();
  await figure("stands with an older result");
  await page.getByRole("button", { name: "Commands", exact: true }).click();
  await page.getByRole("button", { name: "Light or dark", exact: true }).click();
  await soon(() => sheet.tail.textContent()).toContain("Dark, on every page in this browser.");
  expect(await page.evaluate(() => getComputedStyle(document.body).colorScheme)).toBe("dark");
  await ines.context.setOffline(true);
  await soon(() => sheet.tail.textContent()).toContain("No connection since");
  expect(await violations()).toEqual([]);
  await ines.context.setOffline(false);
});

test("nothing was amiss on its pages but the connection that was taken", () => {
  expect(ines.complaints.filter((words) => !/ERR_INTERNET_DISCONNECTED|WebSocket/.test(words))).toEqual([]);
});

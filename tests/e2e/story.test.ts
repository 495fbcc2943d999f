import { execFileSync } from "node:child_process";
import { mkdtempSync, readFileSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import type { Browser, Locator } from "playwright-core";
import { afterAll, beforeAll, expect, inject, test } from "vitest";
import { bothAuthors, openBrowser, type Visitor } from "./people.ts";
import { SheetOnPage } from "./sheet.ts";

/**
 * The story of the product, as two authors live it: the specimen paper is open before both, one of them moves a
 * parameter, both see what is out of date, one recomputes, and figure, table, sentence and print follow for both.
 */
const application = inject("applicationUrl");
const START = 0.5;
const BETA = 1;

/**
 * The mean number that settle, to five digits. Computed by an independent method: the paper's first proposition gives
 * it in closed form, exp(-x (μ + sqrt(μ² - 2β))), without a trajectory or a law.
 */
function meanSettlers(mu: number): string {
  return Math.exp(-START * (mu + Math.sqrt(mu * mu - 2 * BETA))).toPrecision(5);
}

/** A printed number without the spaces between its digits. */
async function digits(number: Locator): Promise<string> {
  return ((await number.textContent()) ?? "").replace(/[\s\u2009\u202f]/g, "");
}

let browser: Browser;
let ines: Visitor;
let tormod: Visitor;
let sheet: SheetOnPage;
let other: SheetOnPage;

beforeAll(async () => {
  browser = await openBrowser();
  ({ ines, tormod } = await bothAuthors(browser, application));
  sheet = new SheetOnPage(ines.page);
  other = new SheetOnPage(tormod.page);
});

afterAll(async () => {
  await browser?.close();
});

test("the specimen paper opens from the shelf, typeset and current", async () => {
  for (const { page } of [ines, tormod]) {
    await page.getByRole("link", { name: "How many reach the shore?" }).first().click();
    await page.waitForURL("**/papers/**");
  }
  for (const each of [sheet, other]) {
    await each.isThere();
    await expect.poll(() => each.tail.textContent(), { timeout: 60_000 }).toContain("Errata none");
  }
  const mean = await sheet.numberAfter("a family sends");
  expect(await digits(mean)).toBe(meanSettlers(1.6));
});

test("while a parameter is tried, what follows shows on this page alone, and Esc puts it back", async () => {
  await sheet.plate("Figure 1", "current");
  const mu = sheet.parameter("mu");
  const { mouse, keyboard } = ines.page;
  const box = await mu.boundingBox();
  if (box === null) throw new Error("The rule is not drawn.");
  const [x, y] = [box.x + box.width / 2, box.y + box.height / 2];
  await mouse.move(x, y);
  await mouse.down();
  await mouse.move(x + 20, y, { steps: 4 });
  await sheet.plate("Figure 1", "tried privately");
  expect(await mu.textContent()).not.toBe("1.60");
  expect(await other.parameter("mu").textContent()).toBe("1.60");
  await keyboard.press("Escape");
  await mouse.up();
  await sheet.plate("Figure 1", "current");
  expect(await mu.textContent()).toBe("1.60");
});

test("a parameter that is set makes out of date what hangs from it, for both, with the cause", async () => {
  await (await sheet.plate("Figure 1", "current")).scrollIntoViewIfNeeded();
  const mu = sheet.parameter("mu");
  await mu.focus();
  await ines.page.keyboard.press("ArrowRight");
  await ines.page.keyboard.press("ArrowRight");
  await ines.page.keyboard.press("Enter");
  for (const each of [sheet, other]) {
    const plate = await each.plate("Figure 1", "out of date");
    await expect
      .poll(() => plate.textContent())
      .toMatch(/† Out of date\. Set with \S*μ\S* = 1\.60; \S*μ\S* is now 1\.70 \(Inês Valadão, \d\d:\d\d\)/);
    expect(await each.parameter("mu").textContent()).toBe("1.70");
    expect(await each.page.getByRole("region", { name: "Parameters" }).textContent()).toContain("was 1.60");
    const mean = await each.numberAfter("a family sends");
    expect(await mean.getAttribute("class")).toContain("hl-number-outOfDate");
    expect(await digits(mean)).toBe(meanSettlers(1.6));
    await expect.poll(() => each.tail.textContent()).toMatch(/Errata \d+/);
  }
});

test("recomputed, the figure, the table and the sentence are new, for both", async () => {
  const before = await (await other.plate("Figure 1", "out of date")).getByRole("img").getAttribute("aria-label");
  const rowsBefore = await (await other.plate("Table 1", "out of date")).getByRole("table").textContent();
  await sheet.command("Recompute all").click();
  for (const each of [sheet, other]) {
    await expect.poll(() => each.tail.textContent(), { timeout: 60_000 }).toContain("Errata none");
    const figure = (await each.plate("Figure 1", "current")).getByRole("img");
    await expect.poll(() => figure.getAttribute("aria-label")).not.toBe(before);
    const rows = (await each.plate("Table 1", "current")).getByRole("table");
    await expect.poll(() => rows.textContent()).not.toBe(rowsBefore);
    const mean = await each.numberAfter("a family sends");
    await expect.poll(() => digits(mean)).toBe(meanSettlers(1.7));
  }
});

test("what one writes appears before the other, with the name of who writes", async () => {
  const { page } = tormod;
  const sentence = page.locator(".hl-text .cm-line", { hasText: "How is the number of settlers" });
  await other.scrollUntil(sentence);
  // At the end of the words, where the caret meets no formula.
  const box = await sentence.boundingBox();
  if (box === null) throw new Error("The sentence is not drawn.");
  await page.mouse.click(box.x + 40, box.y + 10);
  await page.keyboard.type("Tormod was here. ");
  const seen = ines.page.locator(".hl-text .cm-line", { hasText: "Tormod was here." });
  await sheet.scrollUntil(seen);
  await expect.poll(() => ines.page.locator(".hl-remote-name").textContent()).toBe("Tormod Hagelund");
  await expect.poll(() => other.tail.textContent()).toMatch(/All changes kept, \d\d:\d\d/);
  // One's own edits alone are undone.
  await page.keyboard.press("Control+z");
  await expect.poll(() => seen.count()).toBe(0);
  expect(await other.parameter("mu").textContent()).toBe("1.70");
});

test("set back, results that are kept appear by themselves", async () => {
  const mu = sheet.parameter("mu");
  await mu.focus();
  await ines.page.keyboard.press("ArrowLeft");
  await ines.page.keyboard.press("ArrowLeft");
  await ines.page.keyboard.press("Enter");
  for (const each of [sheet, other]) {
    await expect.poll(() => each.parameter("mu").textContent()).toBe("1.60");
    await expect.poll(() => each.tail.textContent(), { timeout: 60_000 }).toContain("Errata none");
    const mean = await each.numberAfter("a family sends");
    await expect.poll(() => digits(mean)).toBe(meanSettlers(1.6));
  }
});

test("a typed value is one edit, and one undo takes it back", async () => {
  const mu = sheet.parameter("mu");
  await mu.focus();
  await ines.page.keyboard.type("2");
  await ines.page.keyboard.press("Enter");
  await expect.poll(() => mu.textContent()).toBe("2.00");
  await ines.page.locator(".hl-text .cm-content").focus();
  await ines.page.keyboard.press("Control+z");
  await expect.poll(() => mu.textContent()).toBe("1.60");
});

test("the print has the numbers of the sheet", async () => {
  const place = new URL(ines.page.url()).pathname;
  const folder = mkdtempSync(join(tmpdir(), "halfline-story-"));
  const zip = await ines.context.request.get(`${place}/latex.zip`);
  expect(zip.status()).toBe(200);
  writeFileSync(join(folder, "latex.zip"), await zip.body());
  const names = execFileSync(
    "python3",
    ["-c", "import sys,zipfile;print('\\n'.join(zipfile.ZipFile(sys.argv[1]).namelist()))", join(folder, "latex.zip")],
    { encoding: "utf8" },
  );
  expect(names).toMatch(/\.tex\b/);
  expect(names).toMatch(/\.bib\b/);
  const pdf = await ines.context.request.get(`${place}/paper.pdf`, { timeout: 120_000 });
  expect(pdf.status()).toBe(200);
  writeFileSync(join(folder, "paper.pdf"), await pdf.body());
  execFileSync("pdftotext", ["-layout", join(folder, "paper.pdf"), join(folder, "paper.txt")]);
  const printed = readFileSync(join(folder, "paper.txt"), "utf8");
  expect(printed.toLowerCase()).toContain("how many reach the shore?");
  expect(printed).toContain(meanSettlers(1.6));
});

test("no page complained", () => {
  expect({ ines: ines.complaints, tormod: tormod.complaints }).toEqual({ ines: [], tormod: [] });
});

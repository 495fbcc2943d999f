import AxeBuilder from "@axe-core/playwright";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, expect, inject, test } from "vitest";
import { RULES } from "./axe-rules.ts";
import { bothAuthors, openBrowser, type Visitor } from "./people.ts";
import { SheetOnPage } from "./sheet.ts";

/** Strands on a real page: where they are tied, what is lit, and that they stay right while two people write. */
const application = inject("applicationUrl");

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
  for (const { page } of [ines, tormod]) {
    await page.getByRole("link", { name: "How many reach the shore?" }).first().click();
    await page.waitForURL("**/papers/**");
  }
});

/** What comes by itself, if it comes within this time on a busy machine. */
function soon<T>(read: () => T) {
  return expect.poll(read, { timeout: 60_000 });
}

afterAll(async () => {
  await browser?.close();
});

/** How far the nearest tie stands below the line of the number after some words, in px. */
async function tieBelow(page: SheetOnPage, words: string): Promise<number> {
  const number = await page.numberAfter(words);
  return number.evaluate((element) => {
    const line = element.getBoundingClientRect().bottom;
    const ties = [...document.querySelectorAll(".hl-cord .hl-tie, .hl-cord .hl-tie-mark")];
    const away = ties.map((tie) => {
      const box = tie.getBoundingClientRect();
      return Math.abs((box.top + box.bottom) / 2 - line);
    });
    return Math.min(...away);
  });
}

/** A tie stands below its line; where several end there, they are spread by no more than a line's height. */
const NEAR_PX = 9;

test("the paper is current", async () => {
  for (const each of [sheet, other]) {
    await each.isThere();
    await soon(() => each.tail.textContent()).toContain("Errata none");
  }
});

test("a cord is tied to the line of the number that quotes its cell, and none of it is read out", async () => {
  await soon(() => tieBelow(sheet, "a family sends")).toBeLessThan(NEAR_PX);
  expect(await ines.page.locator(".hl-strands").getAttribute("aria-hidden")).toBe("true");
  const said = await (await sheet.numberAfter("a family sends")).evaluate((place) => place.parentElement?.textContent);
  expect(said).toContain("hangs from mu, beta and x_0, current");
});

test("while both write above it, it stays at its line, for both", async () => {
  const at = async (page: Page, words: string) => {
    const line = page.locator(".hl-text .cm-line", { hasText: words }).first();
    await new SheetOnPage(page).scrollUntil(line);
    const box = await line.boundingBox();
    if (box === null) throw new Error(`Not drawn: ${words}`);
    await page.mouse.click(box.x + 30, box.y + 10);
  };
  await at(ines.page, "From");
  await at(tormod.page, "This is branching Brownian motion");
  const typing = Promise.all([
    ines.page.keyboard.type("Inês writes here at some length, so that lines break. ", { delay: 30 }),
    tormod.page.keyboard.type("Tormod does so too, further up, and for as long. ", { delay: 30 }),
  ]);
  await typing;
  for (const each of [sheet, other]) {
    await soon(() => each.page.locator(".hl-text").textContent()).toContain("so that lines break. ");
    await soon(() => tieBelow(each, "a family sends")).toBeLessThan(NEAR_PX);
  }
  await ines.page.keyboard.press("Control+z");
  await tormod.page.keyboard.press("Control+z");
  for (const each of [sheet, other]) {
    await soon(() => tieBelow(each, "a family sends")).toBeLessThan(NEAR_PX);
  }
});

test("a number that is pointed at lights its cord, and the margin says what it is", async () => {
  const mean = await sheet.numberAfter("a family sends");
  await mean.hover();
  const gloss = ines.page.locator(".hl-strand-gloss");
  await soon(() => gloss.textContent()).toMatch(/K\.mean = 0\.\d+\s*from Figure 1, counts K/);
  expect(await ines.page.locator(".hl-cord.hl-lit").count()).toBe(1);
  expect(await ines.page.locator(".hl-strands-dim").count()).toBeGreaterThan(0);
  await ines.page.mouse.move(1300, 700);
  await soon(() => gloss.count()).toBe(0);
});

test("followed, it leads to its figure, then up to a parameter, and back to where one was", async () => {
  const mean = await sheet.numberAfter("a family sends");
  await mean.click();
  const follow = sheet.command("Follow the strand");
  await follow.click();
  const focused = () =>
    ines.page.evaluate(() => document.activeElement?.closest("section")?.getAttribute("aria-label"));
  await soon(focused).toBe("Figure 1, current");
  await follow.click();
  await soon(focused).toBe("Parameters");
  await ines.page.getByRole("button", { name: /^Back to line \d+$/ }).click();
  await ines.page.getByRole("button", { name: /^Back to line \d+$/ }).click();
  await soon(() => ines.page.locator(".hl-source").textContent()).toBe(":value[K.mean]{digits=5}");
});

test("a changed parameter's branches break, and ties of what is out of date are marked", async () => {
  const mu = sheet.parameter("mu");
  await mu.focus();
  await ines.page.keyboard.press("ArrowRight");
  await ines.page.keyboard.press("Enter");
  for (const each of [sheet, other]) {
    await each.plate("Figure 1", "out of date");
    await soon(() => each.page.locator(".hl-cord .hl-tie-mark").count()).toBeGreaterThan(0);
    expect(await each.page.locator(".hl-strand .hl-dashed").count()).toBeGreaterThan(0);
  }
  await mu.focus();
  await ines.page.keyboard.press("ArrowLeft");
  await ines.page.keyboard.press("Enter");
  for (const each of [sheet, other]) {
    await soon(() => each.tail.textContent()).toContain("Errata none");
    await soon(() => each.page.locator(".hl-cord .hl-tie-mark").count()).toBe(0);
  }
});

/** Writes at the end of the text, as one edit. */
async function writeAtEnd({ page }: Visitor, words: string): Promise<void> {
  await page.locator(".hl-text .cm-content").focus();
  await page.keyboard.press("Control+End");
  await page.keyboard.insertText(words);
}

test("what is said of a parameter is edited beneath the rule, and others see it", async () => {
  const { page } = ines;
  await page.getByRole("button", { name: /: change mu$/ }).click();
  await page.getByLabel("Scale from").fill("2*gama");
  await soon(() => page.locator(".hl-entry [aria-invalid]").count()).toBe(1);
  await page.getByLabel("Scale from").fill("1.2");
  await page.keyboard.press("Enter");
  await soon(() => other.parameter("mu").getAttribute("aria-valuemin")).toBe("1.2");
  await soon(() => page.evaluate(() => document.activeElement?.getAttribute("data-parameter"))).toBe("mu");
  expect(await page.locator(".hl-entry").count()).toBe(0);
});

test("a drift dragged across the border where a cell loses its answer says so at once, and Esc puts back", async () => {
  const { page } = ines;
  // Given absorption there is a limit law only where absorption of all is certain to be finite: above √(2β) = 1.414.
  await writeAtEnd(ines, "\n\n```yaglom limit\nof: larvae\n```\n");
  const mu = sheet.parameter("mu");
  const described = () =>
    mu.evaluate((value) => document.getElementById(value.getAttribute("aria-describedby") ?? "")?.textContent);
  await soon(described).toMatch(/ hang from it\. Below mu = 1\.414.* has no answer there\.$/);
  await mu.scrollIntoViewIfNeeded();
  const box = await page.locator(".hl-par", { has: mu }).locator(".hl-par-scale").boundingBox();
  if (box === null) throw new Error("The drift has no scale.");
  const at = (share: number): [number, number] => [box.x + share * box.width, box.y + box.height / 2];
  await page.mouse.move(...at((1.6 - 1.2) / 2.8));
  await page.mouse.down();
  await page.mouse.move(...at((1.5 - 1.2) / 2.8));
  await soon(() => mu.textContent()).toBe("1.50");
  expect(await page.locator(".hl-rule-word.hl-amiss").count()).toBe(0);
  await page.mouse.move(...at((1.3 - 1.2) / 2.8));
  // Within the frame of the hand, before anything is computed.
  expect(await page.locator(".hl-rule-word.hl-amiss").textContent()).toMatch(/^‡ Below .* has no answer there\.$/);
  await soon(() => page.locator("[role=status]").allTextContents()).toContainEqual(
    expect.stringMatching(/^Below mu = 1\.414.* has no answer there\.$/),
  );
  await page.keyboard.press("Escape");
  await page.mouse.up();
  await soon(() => mu.textContent()).toBe("1.60");
  await soon(() => page.locator(".hl-rule-word.hl-amiss").count()).toBe(0);
  await page.mouse.move(1300, 700);
});

test("parameters change places by the keys, which they keep, and all is undone step by step", async () => {
  const { page } = ines;
  const order = (each: SheetOnPage) =>
    each.page.locator(".hl-rule [data-parameter]").evaluateAll((all) => all.map((one) => one.dataset.parameter));
  const before = await order(sheet);
  await sheet.parameter("mu").focus();
  await page.keyboard.press("Alt+Shift+ArrowRight");
  await soon(() => order(other)).toEqual([before[1], "mu", ...before.slice(2)]);
  await soon(() => page.evaluate(() => document.activeElement?.getAttribute("data-parameter"))).toBe("mu");
  await page.locator(".hl-text .cm-content").focus();
  for (let step = 0; step < 3; step += 1) await page.keyboard.press("Control+z");
  await soon(() => order(other)).toEqual(before);
  await soon(() => other.parameter("mu").getAttribute("aria-valuemin")).toBe("1.45");
  await soon(() => other.tail.textContent()).toContain("Errata none");
  await page.evaluate(() => window.scrollTo(0, 0));
});

test("marks and strands can be put away, which is kept", async () => {
  const command = ines.page.getByRole("button", { name: /^Marks and strands:/ });
  await command.click();
  await command.click();
  expect(await command.textContent()).toBe("Marks and strands: hidden");
  await soon(() => ines.page.locator(".hl-strand").count()).toBe(0);
  await ines.page.reload();
  await sheet.isThere();
  await soon(() => command.textContent()).toBe("Marks and strands: hidden");
  await command.click();
  await soon(() => ines.page.locator(".hl-strand").count()).toBeGreaterThan(0);
});

test("axe finds nothing amiss with the strands, with a number lit, or with the slip", async () => {
  const mean = await sheet.numberAfter("a family sends");
  await mean.click();
  await soon(() => ines.page.locator(".hl-strand-gloss").count()).toBe(1);
  expect((await new AxeBuilder({ page: ines.page }).withTags(RULES).analyze()).violations).toEqual([]);
});

test("on a narrow page a tapped number raises a slip, and stays as it is set", async () => {
  const { page } = tormod;
  await page.setViewportSize({ width: 390, height: 844 });
  const mean = await other.numberAfter("a family sends");
  await mean.click();
  const slip = page.getByRole("dialog");
  await soon(() => slip.textContent()).toContain("K.mean");
  expect(await page.locator(".hl-source").count()).toBe(0);
  expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBe(390);
  expect((await new AxeBuilder({ page }).withTags(RULES).analyze()).violations).toEqual([]);
  await page.keyboard.press("Escape");
  await soon(() => slip.count()).toBe(0);
});

test("there a parameter's entry comes from below", async () => {
  const { page } = tormod;
  await page.getByRole("button", { name: /: change mu$/ }).click();
  await page.getByLabel("Value", { exact: true }).waitFor();
  const entry = page.locator(".hl-entry");
  await soon(() => entry.evaluate((place) => Math.round(place.getBoundingClientRect().bottom))).toBe(844);
  expect((await new AxeBuilder({ page }).withTags(RULES).analyze()).violations).toEqual([]);
  await page.keyboard.press("Escape");
  await soon(() => entry.count()).toBe(0);
});

test("no page complained", () => {
  expect({ ines: ines.complaints, tormod: tormod.complaints }).toEqual({ ines: [], tormod: [] });
});

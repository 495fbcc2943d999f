import AxeBuilder from "@axe-core/playwright";
import type { Browser } from "playwright-core";
import { afterAll, beforeAll, expect, inject, test } from "vitest";
import { RULES } from "./axe-rules.ts";
import { openBrowser, signedIn, type Visitor, visitor } from "./people.ts";
import { SheetOnPage } from "./sheet.ts";

/** On every place of the product, in both themes. */
const application = inject("applicationUrl");

let browser: Browser;
let author: Visitor;
let stranger: Visitor;

beforeAll(async () => {
  browser = await openBrowser();
  author = await signedIn(browser, application, "Inês Valadão");
  stranger = await visitor(browser, application);
});

afterAll(async () => {
  await browser?.close();
});

const PLACES = [
  { name: "welcome", path: "/", asAuthor: false },
  { name: "sign-in", path: "/sign-in", asAuthor: false },
  { name: "manual", path: "/manual", asAuthor: false },
  { name: "shelf", path: "/shelf", asAuthor: true },
  { name: "sheet", path: "/specimen", asAuthor: true },
  { name: "sheet of a visitor", path: "/specimen", asAuthor: false },
] as const;

for (const { name, path, asAuthor } of PLACES) {
  test.each(["light", "dark"] as const)(`${name}, %s: nothing stands in anybody's way`, async (colorScheme) => {
    const { page } = asAuthor ? author : stranger;
    await page.emulateMedia({ colorScheme });
    await page.goto(path);
    if (path === "/specimen") await new SheetOnPage(page).isThere();
    await expectNoBarrier(page);
  });
}

test.each(["light", "dark"] as const)(
  "title page, galley and plate, %s: nothing stands in anybody's way",
  async (colorScheme) => {
    const { page } = author;
    await page.emulateMedia({ colorScheme });
    await page.goto("/specimen");
    const paper = new URL(page.url()).pathname;
    for (const place of ["title-page", "galley", "plates/w"]) {
      await page.goto(`${paper}/${place}`);
      await expectNoBarrier(page);
    }
  },
);

test("a sheet is worked from the keyboard: Tab reaches the rule and the text, and leaves it", async () => {
  const { page } = author;
  await page.goto("/specimen");
  const sheet = new SheetOnPage(page);
  await sheet.isThere();
  const reached: string[] = [];
  for (let k = 0; k < 40 && !reached.includes("end"); k += 1) {
    await page.keyboard.press("Tab");
    reached.push(
      await page.evaluate(() => {
        const at = document.activeElement;
        if (at?.getAttribute("role") === "spinbutton") return "rule";
        if (at?.classList.contains("cm-content")) return "text";
        return at?.closest("footer.tail, .hl-bibliography") ? "end" : "elsewhere";
      }),
    );
  }
  expect(reached).toEqual(expect.arrayContaining(["rule", "text", "end"]));
});

test("a visitor tries parameters of the specimen, sees all follow, and nothing is kept", async () => {
  const { page } = stranger;
  await page.emulateMedia({ colorScheme: "light" });
  await page.goto("/specimen");
  const sheet = new SheetOnPage(page);
  await sheet.isThere();
  await page.getByText("nothing is kept", { exact: false }).first().waitFor();
  const mu = sheet.parameter("mu");
  await mu.focus();
  await page.keyboard.press("ArrowRight");
  await page.keyboard.press("Enter");
  await sheet.plate("Figure 1", "tried privately");
  expect(await mu.textContent()).toBe("1.65");
  await page.reload();
  await sheet.isThere();
  expect(await sheet.parameter("mu").textContent()).toBe("1.60");
  expect(await sheet.command("Recompute all").count()).toBe(0);
});

async function expectNoBarrier(page: Visitor["page"]): Promise<void> {
  const { violations } = await new AxeBuilder({ page }).withTags(RULES).analyze();
  expect(
    violations.map(({ id, help, nodes }) => ({
      id,
      help,
      where: nodes.slice(0, 3).map(({ target }) => target.join(" ")),
    })),
  ).toEqual([]);
}

import type { Locator, Page } from "playwright-core";

/** The sheet as a person finds it on a page, by the names and words that stand there. */
export class SheetOnPage {
  readonly page: Page;
  readonly tail: Locator;

  constructor(page: Page) {
    this.page = page;
    this.tail = page.locator("footer.tail");
  }

  /** Until the text is typeset. */
  async isThere(): Promise<void> {
    await this.page.locator(".hl-text .hl-title").waitFor();
  }

  parameter(name: string): Locator {
    return this.page.getByRole("spinbutton", { name: new RegExp(`^${name}\\b`) });
  }

  command(name: string): Locator {
    return this.page.getByRole("button", { name, exact: true });
  }

  /** A plate in a state: `Figure 1`, `current`. Scrolled to, since what is far off is not drawn. */
  async plate(title: string, state: string): Promise<Locator> {
    const plate = this.page.getByRole("region", { name: `${title}, ${state}`, exact: true });
    await this.scrollUntil(plate);
    return plate;
  }

  /** The first bound number after some words of the text. */
  async numberAfter(words: string): Promise<Locator> {
    const line = this.page.locator(".hl-text .cm-line", { hasText: words });
    await this.scrollUntil(line);
    const place = await line.evaluate((element, sought) => {
      const walker = document.createTreeWalker(element, NodeFilter.SHOW_TEXT);
      let passed = "";
      let found = false;
      const numbers = [...element.querySelectorAll(".hl-number")];
      for (let node = walker.nextNode(); node !== null; node = walker.nextNode()) {
        const holder = node.parentElement?.closest(".hl-number");
        if (found && holder) return numbers.indexOf(holder);
        passed += node.textContent;
        if (passed.replace(/\s+/g, " ").includes(sought)) found = true;
      }
      return -1;
    }, words);
    if (place < 0) throw new Error(`No number stands after “${words}”.`);
    return line.locator(".hl-number").nth(place);
  }

  /** Scrolls down the paper until something is drawn, from the top. */
  async scrollUntil(wanted: Locator): Promise<void> {
    const deadline = Date.now() + 30_000;
    for (let y = 0; Date.now() < deadline; ) {
      if ((await wanted.count()) > 0) {
        await wanted.first().scrollIntoViewIfNeeded();
        return;
      }
      const height = await this.page.evaluate(() => document.documentElement.scrollHeight);
      y = y > height ? 0 : y + 700;
      await this.page.evaluate((to) => window.scrollTo(0, to), y);
      await this.page.waitForTimeout(150);
    }
    throw new Error(`Not on the sheet: ${wanted}`);
  }
}

// @vitest-environment jsdom
import { act } from "react";
import { afterEach, beforeAll, beforeEach, expect, test } from "vitest";
import { QuoteStrip } from "../../../app/editor/quoting/quote-strip.tsx";
import { likeABrowser } from "../dom.ts";
import { sheetAtHand } from "../keys/at-hand.ts";
import { mount } from "../mounted.tsx";
import { SAMPLE } from "../sample.ts";

const TEXT = SAMPLE.replace("up_to: 6\n", "up_to: 6\nshow: [figure, table]\n");

beforeAll(() => {
  likeABrowser();
  Object.assign(globalThis, { IS_REACT_ACT_ENVIRONMENT: true });
});

let at: ReturnType<typeof sheetAtHand>;
let page: Awaited<ReturnType<typeof mount>>;
beforeEach(async () => {
  await act(async () => {
    at = sheetAtHand(TEXT);
  });
  // As on the sheet: the text stands in a column, over which the places lie.
  at.view.dom.parentElement?.classList.add("hl-column");
  at.view.dom.classList.add("hl-text");
  await act(async () => at.view.dispatch({ selection: { anchor: TEXT.indexOf("The mean") + 8 } }));
  at.sheet.strips.set({ open: "quote" });
  page = await mount(<QuoteStrip sheet={at.sheet} />);
});
afterEach(async () => {
  await page.end();
  await act(async () => at.end());
  document.body.replaceChildren();
});

const entries = () => [...document.querySelectorAll<HTMLElement>(".hl-quote-entry")];
const entry = (formula: string) => entries().find((each) => each.ariaLabel?.startsWith(`Quote ${formula},`));
const curve = () => document.querySelector<HTMLElement>(".hl-quote-layer [role=slider]");
const words = () => page.place.querySelector(".hl-quote-words")?.textContent ?? "";
const text = () => at.view.state.doc.toString();
/** First moment e^{-λ}, λ = μ + √(μ² − 2β), μ = 1.6, β = 1, from 1: Harris, The Theory of Branching Processes (1963). */
const MEAN = Math.exp(-(1.6 + Math.sqrt(0.56)));

test("each number of a table is a place, by its formula and what it is", () => {
  const formulas = entries().map(({ ariaLabel }) => ariaLabel?.replace(/^Quote (.*), .*$/, "$1"));
  expect(formulas).toContain("K(3)");
  expect(formulas).toContain("K.above(3)");
  expect(new Set(formulas).size).toBe(formulas.length);
});

test("the present value is shown of what has the keys, and Enter quotes it where the caret is", async () => {
  await act(async () => entry("K(3)")?.focus());
  // P(K = 3) from 1 at μ = 1.6, β = 1, as the binding text of the language has it.
  expect(words()).toContain("K(3) 0.00182142");
  expect(words()).toContain("to be quoted in line 16.");
  await act(async () => entry("K(3)")?.click());
  expect(text()).toBe(TEXT.replace("The mean", "The mean:value[K(3)]"));
  expect(at.view.state.selection.main.head).toBe(TEXT.indexOf("The mean") + "The mean:value[K(3)]".length);
  expect(at.sheet.strips.get().open).toBeNull();
  expect(at.asked.tell).toHaveBeenCalledWith("K(3), 0.00182142, is quoted in line 16.");
});

test("a curve is gone along by the keys", async () => {
  await act(async () => curve()?.focus());
  expect(curve()?.getAttribute("aria-valuetext")).toBe("K(0)");
  await page.key(curve() ?? document.body, "ArrowRight");
  await page.key(curve() ?? document.body, "ArrowRight");
  expect(curve()?.getAttribute("aria-valuetext")).toBe("K(2)");
  await page.key(curve() ?? document.body, "Enter");
  expect(text()).toContain("The mean:value[K(2)]");
});

test("values of a cell are had by its name, also where it prints nothing", async () => {
  await page.press("larvae");
  const values = page.place.querySelector("[aria-label^='Values of']");
  expect(values?.textContent).toContain("critical drift 1.41421");
  await page.press("K");
  await page.press("mean");
  expect(text()).toContain("The mean:value[K.mean]");
  expect(at.asked.tell).toHaveBeenCalledWith(expect.stringContaining(`K.mean, ${MEAN.toPrecision(6)}`));
});

test("its formula may be written instead", async () => {
  await page.press("Write the formula");
  expect(text()).toContain("The mean:value[]");
  expect(at.sheet.strips.get().open).toBeNull();
});

test("in a working a value is its formula alone", async () => {
  await act(async () => at.view.dispatch({ selection: { anchor: TEXT.indexOf("up_to: 6") + "up_to: 6".length } }));
  await act(async () => entry("K(3)")?.click());
  expect(text()).toContain("up_to: 6K(3)");
});

test("what is put away leaves no places behind", async () => {
  expect(entries().length).toBeGreaterThan(0);
  await page.draw(null);
  expect(entries()).toEqual([]);
  expect(text()).toBe(TEXT);
});

// @vitest-environment jsdom
import { act } from "react";
import { afterEach, beforeAll, beforeEach, describe, expect, test } from "vitest";
import { nextBox } from "../../../app/editor/case/arrows.ts";
import { CaseStrip } from "../../../app/editor/case/case-strip.tsx";
import { commandsFor } from "../../../app/editor/keys/commands.ts";
import { likeABrowser } from "../dom.ts";
import { sheetAtHand } from "../keys/at-hand.ts";
import { mount } from "../mounted.tsx";
import { SAMPLE } from "../sample.ts";

beforeAll(() => {
  likeABrowser();
  Object.assign(globalThis, { IS_REACT_ACT_ENVIRONMENT: true });
});

let at: ReturnType<typeof sheetAtHand>;
let page: Awaited<ReturnType<typeof mount>>;
beforeEach(async () => {
  await act(async () => {
    at = sheetAtHand(SAMPLE);
  });
  await act(async () => at.view.dispatch({ selection: { anchor: SAMPLE.indexOf("The mean") + 3 } }));
  at.sheet.strips.set({ open: "case" });
  page = await mount(<CaseStrip sheet={at.sheet} />);
});
afterEach(async () => {
  await page.end();
  await act(async () => at.end());
  document.body.replaceChildren();
});

const field = () => {
  const found = page.place.querySelector<HTMLInputElement>("input[role=combobox]");
  if (found === null) throw new Error("The case has no field.");
  return found;
};
const chosen = () => page.place.querySelector("[role=option][aria-selected=true]")?.querySelector("b")?.textContent;
const text = () => at.view.state.doc.toString();
const group = (name: string) => page.place.querySelector(`fieldset[aria-label="${name}"]`);

test("what one types is chosen, and Enter sets it below the paragraph with what to change first chosen", async () => {
  expect(page.place.querySelector(".hl-case-line")?.textContent).toBe("to be set at line 16");
  await page.type(field(), "tail of larvae");
  expect(chosen()).toBe("Tail");
  expect(page.place.querySelector("[role=option][aria-selected=true]")?.id).toBe(
    field().getAttribute("aria-activedescendant"),
  );
  await page.key(field(), "Enter");
  expect(text()).toContain(":ref[kpp] and :ref[K].\n\n```tail T\nof: larvae\nstart: 1\n");
  const { from, to } = at.view.state.selection.main;
  expect(at.view.state.sliceDoc(from, to)).toBe("1");
  expect(at.sheet.strips.get().open).toBeNull();
  expect(at.view.hasFocus).toBe(true);
  expect(at.asked.tell).toHaveBeenCalledWith("Tail is set at line 19; what to change first is chosen.");
});

test("numbers have their present values, and are set in the sentence", async () => {
  await page.type(field(), "K.mean");
  expect(chosen()).toBe("K.mean");
  // e^{-λ}, λ = 1.6 + √(1.6² − 2): Harris, The Theory of Branching Processes (1963), first moment.
  const shown = group("Numbers")?.querySelector("[aria-selected=true] .hl-case-value")?.textContent ?? "";
  expect(Number(shown)).toBeCloseTo(Math.exp(-(1.6 + Math.sqrt(0.56))), 6);
  await page.key(field(), "Enter");
  expect(text()).toContain("The:value[K.mean] mean is");
});

test("what is not asked for keeps its place among cells and surroundings, and cannot be chosen", async () => {
  const kinds = () => [...(group("Cells")?.querySelectorAll("b") ?? [])].map(({ textContent }) => textContent);
  const before = kinds();
  await page.type(field(), "cite kesten");
  expect(chosen()).toBe("kesten1978");
  expect(kinds()).toEqual(before);
  expect(group("Cells")?.querySelectorAll("[aria-disabled=true]").length).toBe(before.length);
  await act(async () => group("Cells")?.querySelector<HTMLElement>("[role=option]")?.click());
  expect(text()).toBe(SAMPLE);
});

test("the arrows go on from the best answer, and along the line of the field until they are used", async () => {
  await page.type(field(), "s0");
  const best = chosen();
  await page.key(field(), "ArrowLeft");
  expect(chosen()).toBe(best);
  await page.key(field(), "ArrowDown");
  expect(chosen()).toBeTruthy();
  await page.type(field(), "theorem");
  expect(chosen()).toBe("Theorem");
});

test("nothing is set while nothing is chosen, and what nobody knows is said to be unknown", async () => {
  await page.key(field(), "Enter");
  expect(text()).toBe(SAMPLE);
  expect(at.asked.say).toHaveBeenCalledWith(expect.stringContaining("Nothing is chosen"));
  await page.type(field(), "zygote");
  expect(page.place.querySelector("[role=status]")?.textContent).toContain("Nothing here is called that");
});

test("those who only read are not offered it", () => {
  expect(commandsFor(false).map(({ id }) => id)).not.toContain("case");
  expect(commandsFor(true).find(({ id }) => id === "case")).toMatchObject({ letter: "c", words: "Open the case" });
});

describe("the arrows", () => {
  /** Two rows of three, and a wide box to their right. */
  const boxes = [0, 1, 2, 3, 4, 5].map((place) => {
    const [left, top] = [(place % 3) * 100, Math.floor(place / 3) * 50];
    return { left, right: left + 100, top, bottom: top + 50 };
  });
  const wide = [...boxes, { left: 300, right: 500, top: 0, bottom: 100 }];

  test("lead to the neighbour in their direction", () => {
    expect(nextBox(wide, 0, "ArrowRight")).toBe(1);
    expect(nextBox(wide, 1, "ArrowDown")).toBe(4);
    expect(nextBox(wide, 4, "ArrowUp")).toBe(1);
    expect(nextBox(wide, 5, "ArrowRight")).toBe(6);
    expect(nextBox(wide, 6, "ArrowLeft")).toBe(2);
  });

  test("stay where there is none, and begin at the first", () => {
    expect(nextBox(wide, 0, "ArrowUp")).toBe(0);
    expect(nextBox(wide, 3, "ArrowLeft")).toBe(3);
    expect(nextBox(wide, -1, "ArrowDown")).toBe(0);
    expect(nextBox([], -1, "ArrowDown")).toBe(-1);
  });

  test("reach every box from every other", () => {
    for (const from of wide.keys()) {
      const reached = new Set([from]);
      for (const at of reached)
        for (const arrow of ["ArrowUp", "ArrowDown", "ArrowLeft", "ArrowRight"] as const)
          reached.add(nextBox(wide, at, arrow));
      expect(reached.size).toBe(wide.length);
    }
  });
});

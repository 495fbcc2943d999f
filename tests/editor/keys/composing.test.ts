// @vitest-environment jsdom
import { afterEach, beforeAll, beforeEach, describe, expect, test } from "vitest";
import { bindingOf, bindingWords, FIRST_BINDING, keepBinding, readBinding } from "../../../app/editor/keys/binding.ts";
import { commandOf, commandsFor, SHEET_COMMANDS } from "../../../app/editor/keys/commands.ts";
import { pressComposing, pressEscape } from "../../../app/editor/keys/composing.ts";
import { erratumFrom } from "../../../app/editor/keys/errata-walk.ts";
import { quoteRefused, quoteValue } from "../../../app/editor/keys/quote.ts";
import type { Erratum } from "../../../app/editor/model/types.ts";
import { likeABrowser } from "../dom.ts";
import { SAMPLE } from "../sample.ts";
import { sheetAtHand } from "./at-hand.ts";

beforeAll(likeABrowser);

let at: ReturnType<typeof sheetAtHand>;
beforeEach(() => {
  at = sheetAtHand(SAMPLE);
});
afterEach(() => {
  at.end();
  document.body.replaceChildren();
  localStorage.clear();
});

const press = (key: string, held: KeyboardEventInit = {}) =>
  pressComposing(new KeyboardEvent("keydown", { key, ...held }), at.sheet);
const compose = (letter: string, held: KeyboardEventInit = {}) => {
  expect(press(";", { ctrlKey: true })).toBe(true);
  return press(letter, held);
};
const caretIn = (words: string) => at.view.dispatch({ selection: { anchor: SAMPLE.indexOf(words) + 2 } });

describe("the table of commands", () => {
  test("no two have one name or one letter", () => {
    const letters = SHEET_COMMANDS.flatMap(({ letter }) => letter ?? []);
    expect(new Set(letters).size).toBe(letters.length);
    expect(new Set(SHEET_COMMANDS.map(({ id }) => id)).size).toBe(SHEET_COMMANDS.length);
  });

  test("who may not write is not offered what changes the paper", () => {
    const offered = commandsFor(false).map(({ id }) => id);
    for (const id of ["recompute", "recompute-all", "let-stand", "quote", "rename"]) expect(offered).not.toContain(id);
    expect(offered).toContain("find");
    expect(commandOf("r", false)).toBeNull();
  });

  test("a letter's other case is taken where it has no command of its own", () => {
    expect(commandOf("R", true)?.id).toBe("recompute");
    expect(commandOf("e", true)?.id).toBe("next-erratum");
    expect(commandOf("E", true)?.id).toBe("previous-erratum");
    expect(commandOf("?", true)?.id).toBe("commands");
  });
});

describe("the composing key", () => {
  test("waits for one letter and gives its command", () => {
    expect(press("g")).toBe(false);
    expect(compose("g")).toBe(true);
    expect(at.asked.leaveFor).toHaveBeenCalledExactlyOnceWith("/papers/p/galley");
    expect(press("g")).toBe(false);
    expect(at.asked.leaveFor).toHaveBeenCalledTimes(1);
  });

  test("what is held with the letter does not end the waiting", () => {
    press(";", { ctrlKey: true });
    expect(press("Shift", { shiftKey: true })).toBe(false);
    expect(press("?", { shiftKey: true })).toBe(true);
    expect(at.sheet.strips.get()).toMatchObject({ open: "commands", composing: false });
  });

  test("Esc and the key itself leave it, and give nothing", () => {
    for (const leave of [() => press("Escape"), () => press(";", { ctrlKey: true })]) {
      press(";", { ctrlKey: true });
      expect(leave()).toBe(true);
      expect(press("g")).toBe(false);
    }
    expect(at.asked.leaveFor).not.toHaveBeenCalled();
  });

  test("a sign without a command is not written, and that is said", () => {
    expect(compose("%")).toBe(true);
    expect(at.asked.tell).toHaveBeenCalledWith("No command has the letter %; ? lists them.");
  });

  test("a cell's command is for the cell at the caret, and is refused with the reason elsewhere", () => {
    caretIn("up_to: 6");
    compose("r");
    expect(at.asked.recompute).toHaveBeenCalledTimes(1);
    expect(at.asked.recompute.mock.calls[0]?.[0]).toMatchObject({ slot: "K" });
    compose("t");
    expect(at.asked.letStand).not.toHaveBeenCalled();
    expect(at.asked.tell).toHaveBeenLastCalledWith("Figure 1 is not out of date.");
    caretIn("The mean");
    compose("r");
    expect(at.asked.recompute).toHaveBeenCalledTimes(1);
    expect(at.asked.tell).toHaveBeenLastCalledWith(
      "There is no cell at the caret: put it in a working, or go to a plate with Tab.",
    );
  });

  test("a working is shown and put away in turn; a plate that has the keys is the cell at hand", () => {
    caretIn("up_to: 6");
    compose("w");
    expect(at.asked.putAway).toHaveBeenCalledExactlyOnceWith("K");
    caretIn("The mean");
    at.view.contentDOM.querySelector<HTMLElement>('.hl-cell[data-slot="K"] button')?.focus();
    compose("w");
    expect(at.asked.showWorking).toHaveBeenCalledExactlyOnceWith("K");
  });

  test("a value is quoted by pointing; its formula may be written, in prose and in mathematics in the way of each", () => {
    caretIn("The mean");
    compose("q");
    expect(at.sheet.strips.get().open).toBe("quote");
    expect(at.view.state.doc.toString()).toBe(SAMPLE);
    quoteValue(at.sheet.desk, at.view);
    expect(at.view.state.doc.toString()).toContain("Th:value[]e mean");
    expect(at.view.state.sliceDoc(0, at.view.state.selection.main.head).endsWith("Th:value[")).toBe(true);
    at.view.dispatch({ selection: { anchor: at.view.state.doc.toString().indexOf("\\E[K]") + 2 } });
    quoteValue(at.sheet.desk, at.view);
    expect(at.view.state.doc.toString()).toContain("\\E\\value{}[K]");
    expect(quoteRefused(at.view)).toBe("");
    at.view.dispatch({ selection: { anchor: at.view.state.doc.toString().indexOf("up_to: 6") } });
    expect(quoteRefused(at.view)).not.toBe("");
  });

  test("Esc puts the strip away; with none open it brings Cancel under the keys", () => {
    const pressEsc = () => pressEscape(new KeyboardEvent("keydown", { key: "Escape" }), at.sheet);
    at.sheet.strips.set({ open: "outline" });
    expect(pressEsc()).toBe(true);
    expect(at.sheet.strips.get().open).toBeNull();
    expect(pressEsc()).toBe(false);
    const cancel = document.body.appendChild(document.createElement("button"));
    cancel.className = "hl-cancel-all";
    expect(pressEsc()).toBe(true);
    expect(document.activeElement).toBe(cancel);
  });
});

describe("another composing key", () => {
  test("is kept for each person on this machine", () => {
    const chosen = bindingOf(new KeyboardEvent("keydown", { key: "J", ctrlKey: true, altKey: true }));
    if ("refused" in chosen) throw new Error(chosen.refused);
    expect(bindingWords(chosen)).toBe("Ctrl Alt J");
    keepBinding("ines", chosen);
    expect(readBinding("ines")).toEqual(chosen);
    expect(readBinding("tormod")).toEqual(FIRST_BINDING);
    at.sheet.strips.set({ binding: chosen });
    expect(press(";", { ctrlKey: true })).toBe(false);
    expect(press("j", { ctrlKey: true, altKey: true })).toBe(true);
  });

  test("cannot be a key of writing or of moving about", () => {
    for (const [key, held] of [
      ["a", {}],
      ["Tab", { ctrlKey: true }],
      ["Escape", {}],
    ] as const) {
      expect(bindingOf(new KeyboardEvent("keydown", { key, ...held }))).toHaveProperty("refused");
    }
    expect(bindingOf(new KeyboardEvent("keydown", { key: "F8" }))).not.toHaveProperty("refused");
  });

  test("what is kept amiss is not taken", () => {
    for (const kept of ["{", "3", '{"key":""}', '{"key":";","ctrl":1,"alt":false,"meta":false}']) {
      localStorage.setItem("halfline composing key ines", kept);
      expect(readBinding("ines")).toEqual(FIRST_BINDING);
    }
  });
});

test("errata are walked in the order of the text, both ways, and around its end", () => {
  const erratum = (from: number): Erratum => ({ from, line: from, mark: "†", what: "cell", title: `Figure ${from}` });
  const errata = [erratum(10), erratum(20), erratum(30)];
  const walked = (place: number, direction: 1 | -1) => erratumFrom(errata, place, direction)?.from;
  expect([walked(-1, 1), walked(10, 1), walked(30, 1)]).toEqual([10, 20, 10]);
  expect([walked(-1, -1), walked(30, -1), walked(10, -1)]).toEqual([30, 20, 30]);
  expect(erratumFrom([], 5, 1)).toBeNull();
});

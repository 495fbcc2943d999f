// @vitest-environment jsdom
import { act } from "react";
import { createRoot, type Root } from "react-dom/client";
import { afterEach, beforeAll, beforeEach, expect, test, vi } from "vitest";
import { FindStrip } from "../../../app/editor/finding/find-strip.tsx";
import { RenameStrip } from "../../../app/editor/finding/rename-strip.tsx";
import { SHEET_COMMANDS } from "../../../app/editor/keys/commands.ts";
import { SheetStrip } from "../../../app/editor/keys/sheet-strip.tsx";
import { likeABrowser } from "../dom.ts";
import { SAMPLE } from "../sample.ts";
import { sheetAtHand } from "./at-hand.ts";

beforeAll(() => {
  likeABrowser();
  Object.assign(globalThis, { IS_REACT_ACT_ENVIRONMENT: true });
});

let root: Root;
let place: HTMLElement;
let at: ReturnType<typeof sheetAtHand>;
beforeEach(() => {
  act(() => {
    at = sheetAtHand(SAMPLE, { computing: false });
  });
  place = document.body.appendChild(document.createElement("div"));
  root = createRoot(place);
});
afterEach(async () => {
  act(() => root.unmount());
  // Plates leave in a moment of their own.
  await act(async () => at.end());
  document.body.replaceChildren();
  vi.useRealTimers();
});

const button = (name: string) =>
  [...place.querySelectorAll("button")].find(({ textContent }) => textContent === name) ?? null;
const press = (name: string) => act(() => button(name)?.click());
function type(label: string, value: string): void {
  const field = [...place.querySelectorAll("label")].find(({ textContent }) => textContent?.startsWith(label));
  const input = field?.querySelector("input");
  if (input == null) throw new Error(`No field is called ${label}.`);
  // React hears of what is written past its own property.
  Object.getOwnPropertyDescriptor(HTMLInputElement.prototype, "value")?.set?.call(input, value);
  act(() => void input.dispatchEvent(new Event("input", { bubbles: true })));
}

test("the list has every command by name and letter; Close gives the keys back to where they were", () => {
  const before = document.body.appendChild(document.createElement("button"));
  before.focus();
  at.sheet.strips.set({ open: "commands" });
  act(() => root.render(<SheetStrip sheet={at.sheet} personId="ines" />));
  for (const { words, letter, id } of SHEET_COMMANDS) {
    if (id === "commands") continue;
    const entry = button(words)?.closest("li");
    expect(entry?.querySelector("kbd")?.textContent, words).toBe(letter ?? "");
  }
  expect(document.activeElement?.textContent).toBe("Another key");
  press("Close");
  expect(place.querySelector("section")).toBeNull();
  expect(document.activeElement).toBe(before);
});

test("another composing key is chosen by pressing it, and a plain key is refused with the reason", () => {
  at.sheet.strips.set({ open: "commands" });
  act(() => root.render(<SheetStrip sheet={at.sheet} personId="ines" />));
  press("Another key");
  const asking = button("Press the new key");
  const key = (init: KeyboardEventInit) =>
    act(() => void asking?.dispatchEvent(new KeyboardEvent("keydown", { bubbles: true, cancelable: true, ...init })));
  key({ key: "a" });
  expect(place.textContent).toContain("A plain key is for writing.");
  key({ key: "k", altKey: true });
  expect(at.sheet.strips.get().binding).toEqual({ key: "k", ctrl: false, alt: true, meta: false });
  expect(place.querySelector("kbd")?.textContent).toBe("Alt K");
  press("Back to Ctrl ;");
  expect(place.querySelector("kbd")?.textContent).toBe("Ctrl ;");
});

test("errata are a list that leads to each of them", () => {
  const errata = [
    { from: 40, line: 9, mark: "†" as const, what: "cell" as const, title: "Figure 1" },
    { from: 60, line: 12, mark: "‡" as const, what: "number" as const, title: "a number" },
  ];
  const { model } = at.store.get();
  if (model === null) throw new Error("The sheet was not read.");
  at.store.set({ model: { ...model, errata } });
  at.sheet.strips.set({ open: "errata" });
  act(() => root.render(<SheetStrip sheet={at.sheet} personId={null} />));
  press("Figure 1 is out of date");
  expect(at.asked.showPlate).toHaveBeenCalledExactlyOnceWith(40);
  press("a number in line 12 has no value");
  expect(at.asked.goTo).toHaveBeenCalledExactlyOnceWith(60);
  act(() => at.store.set({ model: { ...model, errata: [] } }));
  expect(place.textContent).toContain("Errata none. Every number is current.");
});

test("find takes the keys at its field, and outline at its first place once it is read", async () => {
  at.sheet.strips.set({ open: "find" });
  act(() => root.render(<SheetStrip sheet={at.sheet} personId={null} />));
  expect(document.activeElement?.matches("input.hl-strip-field")).toBe(true);
  await act(async () => {
    at.sheet.strips.set({ open: "outline" });
    await import("../../../app/editor/finding/reading-strips.ts");
    await new Promise((done) => setTimeout(done, 50));
  });
  expect(document.activeElement?.textContent).toBe("1 Model");
  press("1 Model");
  expect(at.sheet.strips.get().open).toBeNull();
  await vi.waitFor(() => expect(at.asked.goTo).toHaveBeenCalledExactlyOnceWith(SAMPLE.indexOf("## Model")));
});

test("find: counts as one types, walks, replaces all, and closes what it had opened", () => {
  act(() => root.render(<FindStrip sheet={at.sheet} />));
  type("Find", "larvae");
  expect(place.textContent).toContain("1 of 3");
  press("Next");
  expect(place.textContent).toContain("2 of 3");
  expect(at.view.contentDOM.querySelector(".hl-found-here")?.textContent).toBe("larvae");
  type("Replace with", "brood");
  press("Replace all");
  expect(at.view.state.doc.toString()).not.toContain("larvae");
  expect(at.asked.tell).toHaveBeenCalledWith("3 places replaced, as one step to undo.");
  expect(place.textContent).toContain("not found");
  act(() => root.render(null));
  expect(at.view.contentDOM.querySelector(".hl-found")).toBeNull();
});

test("rename: says in how many places, refuses with the reason, and changes them as one edit", () => {
  vi.useFakeTimers();
  act(() => at.view.dispatch({ selection: { anchor: SAMPLE.indexOf("of: larvae") + 6 } }));
  act(() => root.render(<RenameStrip sheet={at.sheet} />));
  type("New name", "K");
  act(() => vi.advanceTimersByTime(400));
  expect(place.textContent).toContain("K is the name of a cell already");
  expect(button("Rename")?.disabled).toBe(true);
  type("New name", "brood");
  act(() => vi.advanceTimersByTime(400));
  expect(place.textContent).toContain("A cell, in 3 places.");
  press("Rename");
  const text = at.view.state.doc.toString();
  expect(text).toContain("```process brood");
  expect(text).toContain("of: brood");
  expect(text).toContain(":value[brood.decay]{digits=8}");
  expect(at.asked.tell).toHaveBeenCalledWith("larvae is brood now, in 3 places; one step to undo.");
});

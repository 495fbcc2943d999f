// @vitest-environment jsdom
import { act } from "react";
import { createRoot, type Root } from "react-dom/client";
import { afterEach, beforeAll, beforeEach, describe, expect, test, vi } from "vitest";
import { placesOf } from "../../app/editor/rule/readers.tsx";
import { moveOnRule, ParameterEntry, valueFault } from "../../app/editor/rule/reading-rule.ts";
import { likeABrowser } from "./dom.ts";
import { sheetAtHand } from "./keys/at-hand.ts";
import { SAMPLE } from "./sample.ts";

const TEXT = SAMPLE.replace("beta: 1\n", "beta: 1 # rate\nspare: 3\n");

beforeAll(() => {
  likeABrowser();
  Object.assign(globalThis, { IS_REACT_ACT_ENVIRONMENT: true });
});

let at: ReturnType<typeof sheetAtHand>;
let root: Root;
let place: HTMLElement;
let tryParameter: ReturnType<typeof vi.fn<(name: string, source: string | null) => void>>;

beforeEach(() => {
  vi.useFakeTimers();
  act(() => {
    at = sheetAtHand(TEXT);
  });
  tryParameter = vi.fn();
  Object.assign(at.sheet.desk, { tryParameter });
  place = document.body.appendChild(document.createElement("div"));
  root = createRoot(place);
});
afterEach(async () => {
  act(() => root.unmount());
  vi.useRealTimers();
  // Plates leave in a moment of their own.
  await act(async () => at.end());
  document.body.replaceChildren();
});

function open(name: string | null): void {
  at.sheet.strips.set({ open: "parameter", about: name });
  act(() => root.render(<ParameterEntry sheet={at.sheet} name={name} />));
}

function field(label: string): HTMLInputElement {
  const found = [...place.querySelectorAll("label")].find(({ textContent }) => textContent === label);
  const input = document.getElementById(found?.htmlFor ?? "");
  if (!(input instanceof HTMLInputElement)) throw new Error(`There is no field ${label}.`);
  return input;
}

function write(label: string, text: string): void {
  const set = Object.getOwnPropertyDescriptor(HTMLInputElement.prototype, "value")?.set;
  const input = field(label);
  act(() => {
    set?.call(input, text);
    input.dispatchEvent(new Event("input", { bubbles: true }));
  });
}

function rest(): void {
  act(() => {
    vi.advanceTimersByTime(300);
  });
}

function enter(): void {
  act(() => place.querySelector("form")?.requestSubmit());
}

function press(words: string): void {
  const found = [...place.querySelectorAll("button")].find(({ textContent }) => textContent === words);
  if (found === undefined) throw new Error(`There is no command ${words}.`);
  act(() => found.click());
}

/** What stands against a field, as it is described. */
function fault(label: string): string {
  const described = field(label).getAttribute("aria-describedby")?.split(" ") ?? [];
  return described.map((id) => document.getElementById(id)?.textContent ?? "").find((text) => /^‡/.test(text)) ?? "";
}

const text = () => at.view.state.doc.toString();

describe("an entry", () => {
  test("holds what is said of a parameter; Enter sets what was changed, and nothing else", () => {
    open("mu");
    expect(
      ["Value", "Unit", "Scale from", "Scale to", "Step", "Symbol", "Note", "Standard error"].map(
        (each) => field(each).value,
      ),
    ).toEqual(["1.6", "", "1.45", "4", "0.05", "\\mu", "drift", ""]);
    write("Note", "drift, offshore");
    write("Unit", "m/d");
    // Somebody else changes what is not touched here.
    act(() =>
      at.view.dispatch({ changes: { from: text().indexOf("1.6"), to: text().indexOf("1.6") + 3, insert: "1.7" } }),
    );
    enter();
    expect(text()).toContain(
      "mu: {value: 1.7, min: 1.45, max: 4, step: 0.05, symbol: \\mu, note: 'drift, offshore', unit: m/d}",
    );
    expect(at.sheet.strips.get().open).toBeNull();
    expect(at.asked.tell).toHaveBeenLastCalledWith("mu is changed; one step to undo.");
  });

  test("left as it was it changes nothing", () => {
    open("mu");
    enter();
    expect([text(), at.sheet.strips.get().open, at.asked.tell.mock.calls]).toEqual([TEXT, null, []]);
  });

  test("says what a formula comes to, and tries it privately until it ends", () => {
    open("mu");
    write("Value", "sqrt(2*beta) + 0.5");
    expect(tryParameter).not.toHaveBeenCalled();
    rest();
    // 1.914213…: √2 + 0.5.
    expect(place.textContent).toContain("= 1.91421");
    expect(tryParameter.mock.calls).toEqual([["mu", "sqrt(2*beta) + 0.5"]]);
    write("Value", "sqrt(2*bta) + 0.5");
    rest();
    expect(fault("Value")).toBe("‡ bta is not a parameter of this paper. Did you mean beta?");
    expect(tryParameter).toHaveBeenLastCalledWith("mu", null);
    write("Value", "2");
    rest();
    expect(tryParameter).toHaveBeenLastCalledWith("mu", "2");
    act(() => root.render(null));
    expect(tryParameter).toHaveBeenLastCalledWith("mu", null);
    expect(text()).toBe(TEXT);
  });

  test("is not set while something stands against it, which takes the keys", () => {
    open("mu");
    write("Scale to", "1");
    enter();
    act(() => {
      vi.advanceTimersByTime(50);
    });
    expect(fault("Scale to")).toContain("upwards");
    expect(document.activeElement).toBe(field("Scale to"));
    expect([text(), at.sheet.strips.get().open]).toEqual([TEXT, "parameter"]);
  });

  test("of a new parameter: its name is looked at as it is written, Enter adds it", () => {
    open(null);
    write("Name", "mu");
    rest();
    expect(fault("Name")).toBe("‡ mu is the name of a parameter already; another name would do.");
    write("Name", "L");
    rest();
    expect([fault("Name"), fault("Value")]).toEqual(["", ""]);
    enter();
    expect(fault("Value")).toContain("needs a value");
    write("Value", "2*mu");
    write("Note", "length");
    enter();
    expect(text()).toContain("spare: 3\nL: {value: 2*mu, note: length}\n```");
    expect(at.asked.tell).toHaveBeenLastCalledWith("L is a parameter now; one step to undo.");
  });

  test("shows how a symbol is set, and refuses one that cannot be", () => {
    open("beta");
    write("Symbol", "\\beta_{");
    rest();
    expect(fault("Symbol")).toContain("cannot be set");
    enter();
    expect(text()).toBe(TEXT);
    write("Symbol", "b_{\\infty}");
    rest();
    expect(fault("Symbol")).toBe("");
    expect(place.querySelector(".hl-entry-symbol .katex")).not.toBeNull();
    enter();
    expect(text()).toContain("beta: {value: 1, symbol: 'b_{\\infty}'} # rate");
  });

  test("of one that is gone says so", () => {
    open("gone");
    expect(place.textContent).toBe("gone is not a parameter of this paper any more.");
  });
});

describe("commands of an entry", () => {
  test("Remove takes out what nothing reads", () => {
    open("spare");
    press("Remove");
    expect(text()).toBe(TEXT.replace("spare: 3\n", ""));
    expect(at.sheet.strips.get().open).toBeNull();
  });

  test("Remove is refused with what still reads it, and goes there", () => {
    open("mu");
    press("Remove");
    expect(place.querySelector("[role=alert]")?.textContent).toBe(
      "‡ mu is still read, and stays until nothing reads it. Go to line 20, process larvae.",
    );
    expect(text()).toBe(TEXT);
    press("process larvae");
    expect(at.asked.goTo.mock.calls).toEqual([[TEXT.indexOf("drift: mu") + 7]]);
    expect(at.sheet.strips.get().open).toBeNull();
  });

  test("Earlier and Later move it and leave the entry open; at an end it is said", () => {
    open("beta");
    press("Later");
    expect(text()).toContain("spare: 3\nbeta: 1 # rate\n```");
    expect(at.asked.tell).toHaveBeenLastCalledWith("beta stands later; one step to undo.");
    press("Later");
    expect(at.asked.tell).toHaveBeenLastCalledWith("beta is the last parameter.");
    press("Earlier");
    expect([text(), at.sheet.strips.get().open]).toEqual([TEXT, "parameter"]);
  });

  test("Rename opens the strip for it with the name", () => {
    open("mu");
    press("Rename");
    expect(at.sheet.strips.get()).toMatchObject({ open: "rename", about: "mu" });
  });

  test("what hangs from it is told", () => {
    open("mu");
    expect(place.textContent).toContain("Figure 1 and 2 numbers hang from it.");
  });
});

test("a value typed on the rule is judged by the paper", () => {
  expect(valueFault(at.sheet, "mu", "sqrt(2*beta) + 0.1")).toBe("");
  expect(valueFault(at.sheet, "mu", "2*(beta")).toContain("bracket");
  expect(valueFault(at.sheet, "mu", "K.mean")).toContain("K");
  expect(valueFault(at.sheet, "beta", "2*beta")).toContain("reads itself");
});

test("a parameter that is moved keeps the keys", () => {
  const handle = place.appendChild(document.createElement("span"));
  handle.tabIndex = 0;
  handle.dataset.parameter = "beta";
  const rule = document.body.appendChild(document.createElement("div"));
  rule.className = "hl-rule";
  rule.append(handle);
  handle.focus();
  moveOnRule(at.sheet, "beta", -1);
  expect(text()).toContain("beta: 1 # rate\nmu: {");
  // As when the rule is drawn in its new order.
  handle.remove();
  rule.prepend(handle);
  expect(document.activeElement).toBe(document.body);
  vi.advanceTimersByTime(40);
  expect(document.activeElement).toBe(handle);
  rule.remove();
});

test("each cell and each line that reads is named once", () => {
  const cells = [
    { from: 10, to: 20, kind: "counts", title: "Figure 1" },
    { from: 0, to: 5, kind: "parameters", title: "parameters" },
  ];
  const readers = [3, 12, 14, 30, 31].map((at) => ({ at, line: at < 30 ? 1 : 4 }));
  expect(placesOf({ readers }, cells)).toEqual([
    { at: 3, words: "line 1" },
    { at: 12, words: "Figure 1" },
    { at: 30, words: "line 4" },
  ]);
});

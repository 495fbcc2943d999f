// @vitest-environment jsdom
import { act } from "react";
import { createRoot, type Root } from "react-dom/client";
import { afterEach, beforeAll, beforeEach, expect, test, vi } from "vitest";
import type { BorderFace, Borders } from "../../app/editor/model/borders.ts";
import type { ParameterFace } from "../../app/editor/model/types.ts";
import { ParameterRule } from "../../app/editor/parts/parameter-rule.tsx";
import { likeABrowser } from "./dom.ts";

const MU: ParameterFace = {
  name: "mu",
  symbol: "\\mu",
  source: "1.6",
  value: 1.6,
  shown: "1.60",
  plain: true,
  min: 1.45,
  max: 4,
  step: 0.05,
  unit: "",
  note: "drift",
  was: null,
  wasShown: "",
  overridden: false,
  hangs: "Figure 1 and 2 numbers hang from it",
};

beforeAll(() => {
  likeABrowser();
  Object.assign(globalThis, { IS_REACT_ACT_ENVIRONMENT: true });
  Element.prototype.setPointerCapture = () => {};
});

let root: Root;
let place: HTMLElement;
const onTry = vi.fn<(name: string, source: string | null) => void>();
const onSay = vi.fn<(words: string) => void>();
let borders: Borders = {};
const onSet = vi.fn<(name: string, source: string) => void>();
const onJudge = vi.fn<(name: string, source: string) => Promise<string>>();
const editing = { change: vi.fn(), add: vi.fn(), move: vi.fn() };
let writes = true;

beforeEach(() => {
  vi.useFakeTimers();
  onTry.mockReset();
  onSet.mockReset();
  onSay.mockReset();
  onJudge.mockReset().mockResolvedValue("");
  for (const asked of Object.values(editing)) asked.mockReset();
  writes = true;
  borders = {};
  place = document.body.appendChild(document.createElement("div"));
  root = createRoot(place);
});
afterEach(() => {
  act(() => root.unmount());
  place.remove();
  vi.useRealTimers();
});

function draw(...parameters: ParameterFace[]): void {
  act(() =>
    root.render(
      <ParameterRule
        parameters={parameters}
        borders={borders}
        onTry={onTry}
        onSet={onSet}
        onJudge={onJudge}
        editing={writes ? editing : null}
        onSay={onSay}
      />,
    ),
  );
}

function handle(): HTMLElement {
  const found = place.querySelector<HTMLElement>("[role=spinbutton]");
  if (found === null) throw new Error("There is no value to hold.");
  return found;
}

function press(key: string, held: KeyboardEventInit = {}): void {
  const target = place.querySelector("input") ?? handle();
  act(() => {
    target.dispatchEvent(new KeyboardEvent("keydown", { key, bubbles: true, cancelable: true, ...held }));
  });
}

function type(text: string): void {
  const field = place.querySelector("input");
  if (field === null) throw new Error("There is no field.");
  const set = Object.getOwnPropertyDescriptor(HTMLInputElement.prototype, "value")?.set;
  act(() => {
    set?.call(field, text);
    field.dispatchEvent(new Event("input", { bubbles: true }));
  });
}

test("a value says what it is, where it stands and between what", () => {
  draw(MU);
  expect(handle().getAttribute("aria-label")).toBe("mu, drift");
  expect(handle().getAttribute("aria-valuenow")).toBe("1.6");
  expect(handle().getAttribute("aria-valuetext")).toBe("1.60");
  expect([handle().getAttribute("aria-valuemin"), handle().getAttribute("aria-valuemax")]).toEqual(["1.45", "4"]);
});

test("arrows try a step, Alt a tenth, Ctrl ten", () => {
  draw(MU);
  press("ArrowRight");
  expect(onTry).toHaveBeenLastCalledWith("mu", "1.65");
  press("ArrowRight", { altKey: true });
  expect(onTry).toHaveBeenLastCalledWith("mu", "1.655");
  press("ArrowRight", { ctrlKey: true });
  expect(onTry).toHaveBeenLastCalledWith("mu", "2.15");
  expect(handle().textContent).toBe("2.15");
  expect(onSet).not.toHaveBeenCalled();
});

test("Enter sets what is tried, once", () => {
  draw(MU);
  press("ArrowRight");
  press("Enter");
  act(() => vi.advanceTimersByTime(5000));
  expect(onSet.mock.calls).toEqual([["mu", "1.65"]]);
});

test("a rest of the keys sets a burst of steps as one edit", () => {
  draw(MU);
  for (let k = 0; k < 4; k += 1) press("ArrowRight");
  act(() => vi.advanceTimersByTime(5000));
  expect(onSet.mock.calls).toEqual([["mu", "1.8"]]);
});

test("Esc puts back, and nothing is set", () => {
  draw(MU);
  press("ArrowRight");
  press("Escape");
  act(() => vi.advanceTimersByTime(5000));
  expect(onTry).toHaveBeenLastCalledWith("mu", null);
  expect(handle().textContent).toBe("1.60");
  expect(onSet).not.toHaveBeenCalled();
});

test("digits open the field; Enter sets a formula as well; Esc closes it", async () => {
  draw(MU);
  press("2");
  expect(place.querySelector("input")?.value).toBe("2");
  type("sqrt(2)");
  press("Enter");
  await act(async () => {});
  expect(onJudge.mock.calls).toEqual([["mu", "sqrt(2)"]]);
  expect(onSet.mock.calls).toEqual([["mu", "sqrt(2)"]]);
  press("3");
  press("Escape");
  expect(place.querySelector("input")).toBeNull();
  expect(onSet).toHaveBeenCalledTimes(1);
});

test("a plain number stands at once; nothing is asked about it", () => {
  draw(MU);
  press("2");
  press("Enter");
  expect([onSet.mock.calls, onJudge.mock.calls]).toEqual([[["mu", "2"]], []]);
});

test("a formula that cannot stand stays in its field, which says why, until it is written otherwise", async () => {
  const fault = "`bta` is not a parameter of this paper. Did you mean `beta`?";
  onJudge.mockResolvedValue(fault);
  draw(MU);
  press("2");
  type("2*bta");
  press("Enter");
  await act(async () => {});
  const field = place.querySelector("input");
  expect([field?.value, field?.getAttribute("aria-invalid")]).toEqual(["2*bta", "true"]);
  expect(document.getElementById(field?.getAttribute("aria-describedby") ?? "")?.textContent).toBe(fault);
  expect([word(), onSay.mock.calls]).toEqual([`‡ ${fault}`, [[fault]]]);
  type("2*beta");
  expect([field?.getAttribute("aria-invalid"), word()]).toEqual([null, null]);
  expect(onSet).not.toHaveBeenCalled();
  press("Escape");
  expect(handle().textContent).toBe("1.60");
});

test("an answer to what was put back meanwhile sets nothing", async () => {
  let answer = (_: string) => {};
  onJudge.mockReturnValue(new Promise((resolve) => (answer = resolve)));
  draw(MU);
  press("2");
  type("sqrt(2)");
  press("Enter");
  press("Escape");
  await act(async () => answer(""));
  expect(onSet).not.toHaveBeenCalled();
});

test("Alt and Shift with an arrow move the parameter, and try nothing", () => {
  draw(MU);
  press("ArrowLeft", { altKey: true, shiftKey: true });
  press("ArrowRight", { altKey: true, shiftKey: true });
  expect(editing.move.mock.calls).toEqual([
    ["mu", -1],
    ["mu", 1],
  ]);
  expect(onTry).not.toHaveBeenCalled();
});

test("for one who writes, the note opens the entry, and there is a command to add", () => {
  draw(MU, { ...MU, name: "beta", note: "" }, { ...MU, name: "x", note: "start", plain: false, source: "2*mu" });
  const buttons = [...place.querySelectorAll("button")];
  expect(buttons.map((button) => [button.textContent, button.getAttribute("aria-label")])).toEqual([
    ["drift", "drift: change mu"],
    ["Describe", "Describe: change beta"],
    ["start = 2*mu", "start = 2*mu: change x"],
    ["Add", "Add a parameter"],
  ]);
  act(() => buttons[1]?.click());
  act(() => buttons[3]?.click());
  expect([editing.change.mock.calls, editing.add.mock.calls.length]).toEqual([[["beta"]], 1]);
});

test("for one who reads, notes are words and nothing is edited, and values are tried", () => {
  writes = false;
  draw(MU);
  expect(place.querySelector("button")).toBeNull();
  expect(place.querySelector(".hl-par-note")?.textContent).toBe("drift");
  press("ArrowRight", { altKey: true, shiftKey: true });
  expect(editing.move).not.toHaveBeenCalled();
  press("ArrowRight");
  expect(onTry).toHaveBeenLastCalledWith("mu", "1.65");
});

test("a trial gives way when the text has another value", () => {
  draw(MU);
  press("ArrowRight");
  expect(handle().textContent).toBe("1.65");
  draw({ ...MU, source: "3", value: 3, shown: "3.00" });
  expect(handle().textContent).toBe("3.00");
});

test("a formula is not stepped, but may be typed over", () => {
  draw({ ...MU, source: "sqrt(beta)", plain: false, value: 1, shown: "1.00" });
  press("ArrowRight");
  expect(onTry).not.toHaveBeenCalled();
  press("Enter");
  expect(place.querySelector("input")?.value).toBe("sqrt(beta)");
});

test("the rule remembers what things were set with", () => {
  draw({ ...MU, source: "2", value: 2, shown: "2.00", was: 1.6, wasShown: "1.60" });
  expect(place.querySelector(".hl-par-was")?.textContent).toBe(" was 1.60");
  expect(place.querySelectorAll(".hl-par-scale path")).toHaveLength(3);
});

test("a paper without parameters has no rule", () => {
  draw();
  expect(place.querySelector(".hl-rule")).toBeNull();
});

test("a drag tries on the way and sets when it is let go", () => {
  draw(MU);
  const scale = place.querySelector(".hl-par-scale");
  if (scale === null) throw new Error("There is no scale.");
  scale.getBoundingClientRect = () => new DOMRect(0, 0, 255, 16);
  const point = (kind: string, clientX: number) =>
    act(() => {
      scale.dispatchEvent(new MouseEvent(kind, { clientX, button: 0, bubbles: true, cancelable: true }));
    });
  point("pointerdown", 15);
  expect(onTry).toHaveBeenLastCalledWith("mu", "1.6");
  point("pointermove", 55);
  expect(onTry).toHaveBeenLastCalledWith("mu", "2");
  expect(onSet).not.toHaveBeenCalled();
  point("pointerup", 55);
  expect(onSet.mock.calls).toEqual([["mu", "2"]]);
});

/** The critical drift of binary branching at rate 1: √2. */
const CRITICAL: BorderFace = {
  at: Math.SQRT2,
  open: "below",
  shown: "1.414",
  why: "the drift is critical in larvae",
  below: { holds: "K is infinite with positive probability", without: [] },
  above: { holds: "K is finite", without: [] },
};
const WIDE: ParameterFace = { ...MU, min: 1 };

/** What stands beneath the rule; mathematics has its source within, which is left out. */
function word(): string | null {
  const found = place.querySelector(".hl-rule-word")?.cloneNode(true);
  if (!(found instanceof Element)) return null;
  for (const hidden of found.querySelectorAll(".katex-mathml")) hidden.remove();
  return found.textContent;
}

test("a border is marked on the scale, and described with the value", () => {
  borders = { mu: [CRITICAL] };
  draw(WIDE);
  const mark = place.querySelector(".hl-par-border");
  expect(mark?.getAttribute("x1")).toBe(`${(((Math.SQRT2 - 1) / 3) * 100).toFixed(3)}%`);
  const description = handle().getAttribute("aria-describedby") ?? "";
  expect(document.getElementById(description)?.textContent).toBe(
    "Figure 1 and 2 numbers hang from it. Below mu = 1.414, where the drift is critical in larvae, K is infinite with positive probability.",
  );
  expect(word()).toBeNull();
});

test("while a value is attended to, a line tells what its borders are", () => {
  borders = { mu: [CRITICAL] };
  draw(WIDE);
  act(() => handle().focus());
  expect(word()).toBe(
    "Below μ = 1.414, where the drift is critical in larvae, K is infinite with positive probability.",
  );
  act(() => handle().blur());
  expect(word()).toBeNull();
  const box = place.querySelector(".hl-par");
  act(() => box?.dispatchEvent(new Event("pointerenter")));
  expect(word()).toContain("1.414");
  act(() => box?.dispatchEvent(new Event("pointerleave")));
  expect(word()).toBeNull();
});

test("a step across a border says so at once, and aloud once; a step back ends it", () => {
  borders = { mu: [CRITICAL] };
  draw({ ...WIDE, source: "1.5", value: 1.5 });
  press("ArrowLeft");
  expect([word(), onSay.mock.calls.length]).toEqual([null, 0]);
  press("ArrowLeft");
  const words = "Below mu = 1.414, where the drift is critical in larvae, K is infinite with positive probability.";
  expect(handle().textContent).toBe("1.40");
  expect(word()).toBe(words.replace("mu", "μ"));
  expect(onSay.mock.calls).toEqual([[words]]);
  press("ArrowLeft");
  expect(onSay).toHaveBeenCalledTimes(1);
  press("Escape");
  expect(word()).toBeNull();
});

test("where cells lose their answer the line is marked and names them", () => {
  borders = { mu: [{ ...CRITICAL, below: { ...CRITICAL.below, without: ["Figure 1", "Table 2"] } }] };
  draw({ ...WIDE, source: "1.45", value: 1.45 });
  press("ArrowLeft");
  expect(place.querySelector(".hl-rule-word.hl-amiss")).not.toBeNull();
  expect(word()).toBe(
    "‡ Below μ = 1.414, where the drift is critical in larvae, K is infinite with positive probability. Figure 1 and Table 2 have no answer there.",
  );
});

test("what is pointed at has the line before what has the keys, which has it again afterwards", () => {
  const other: BorderFace = { ...CRITICAL, at: 2, shown: "2", open: "above" };
  borders = { mu: [CRITICAL], beta: [other] };
  draw(WIDE, { ...WIDE, name: "beta", symbol: "\\beta", value: 1 });
  act(() => handle().focus());
  const second = place.querySelectorAll(".hl-par")[1];
  act(() => second?.dispatchEvent(new Event("pointerenter")));
  expect(word()).toContain("Above β = 2");
  act(() => second?.dispatchEvent(new Event("pointerleave")));
  expect(word()).toContain("Below μ = 1.414");
});

test("a parameter without borders tells what hangs from it alone", () => {
  draw(WIDE);
  act(() => handle().focus());
  const description = handle().getAttribute("aria-describedby") ?? "";
  expect([word(), document.getElementById(description)?.textContent]).toEqual([
    null,
    "Figure 1 and 2 numbers hang from it.",
  ]);
});

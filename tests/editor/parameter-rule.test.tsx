// @vitest-environment jsdom
import { act } from "react";
import { createRoot, type Root } from "react-dom/client";
import { afterEach, beforeAll, beforeEach, expect, test, vi } from "vitest";
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
};

beforeAll(() => {
  likeABrowser();
  Object.assign(globalThis, { IS_REACT_ACT_ENVIRONMENT: true });
  Element.prototype.setPointerCapture = () => {};
});

let root: Root;
let place: HTMLElement;
const onTry = vi.fn<(name: string, source: string | null) => void>();
const onSet = vi.fn<(name: string, source: string) => void>();

beforeEach(() => {
  vi.useFakeTimers();
  onTry.mockReset();
  onSet.mockReset();
  place = document.body.appendChild(document.createElement("div"));
  root = createRoot(place);
});
afterEach(() => {
  act(() => root.unmount());
  place.remove();
  vi.useRealTimers();
});

function draw(...parameters: ParameterFace[]): void {
  act(() => root.render(<ParameterRule parameters={parameters} onTry={onTry} onSet={onSet} />));
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

test("digits open the field; Enter sets a formula as well; Esc closes it", () => {
  draw(MU);
  press("2");
  expect(place.querySelector("input")?.value).toBe("2");
  type("sqrt(2)");
  press("Enter");
  expect(onSet.mock.calls).toEqual([["mu", "sqrt(2)"]]);
  press("3");
  press("Escape");
  expect(place.querySelector("input")).toBeNull();
  expect(onSet).toHaveBeenCalledTimes(1);
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

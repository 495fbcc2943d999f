// @vitest-environment jsdom
import { act } from "react";
import { expect, test, vi } from "vitest";
import { aRuleForEach, draw, handle, MU, onSet, onTry, press, rule } from "./rule-on-page.tsx";

aRuleForEach();

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
  expect(rule.place.querySelector("input")?.value).toBe("sqrt(beta)");
});

test("the rule remembers what things were set with", () => {
  draw({ ...MU, source: "2", value: 2, shown: "2.00", was: 1.6, wasShown: "1.60" });
  expect(rule.place.querySelector(".hl-par-was")?.textContent).toBe(" was 1.60");
  expect(rule.place.querySelectorAll(".hl-par-scale path")).toHaveLength(3);
});

test("a paper without parameters has no rule", () => {
  draw();
  expect(rule.place.querySelector(".hl-rule")).toBeNull();
});

test("a drag tries on the way and sets when it is let go", () => {
  draw(MU);
  const scale = rule.place.querySelector(".hl-par-scale");
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

// @vitest-environment jsdom
import { act } from "react";
import { expect, test } from "vitest";
import type { BorderFace } from "../../app/editor/model/borders.ts";
import type { ParameterFace } from "../../app/editor/model/types.ts";
import { aRuleForEach, draw, handle, MU, onSay, press, rule, word } from "./rule-on-page.tsx";

aRuleForEach();

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

test("a border is marked on the scale, and described with the value", () => {
  rule.borders = { mu: [CRITICAL] };
  draw(WIDE);
  const mark = rule.place.querySelector(".hl-par-border");
  expect(mark?.getAttribute("x1")).toBe(`${(((Math.SQRT2 - 1) / 3) * 100).toFixed(3)}%`);
  const description = handle().getAttribute("aria-describedby") ?? "";
  expect(document.getElementById(description)?.textContent).toBe(
    "Figure 1 and 2 numbers hang from it. Below mu = 1.414, where the drift is critical in larvae, K is infinite with positive probability.",
  );
  expect(word()).toBeNull();
});

test("while a value is attended to, a line tells what its borders are", () => {
  rule.borders = { mu: [CRITICAL] };
  draw(WIDE);
  act(() => handle().focus());
  expect(word()).toBe(
    "Below μ = 1.414, where the drift is critical in larvae, K is infinite with positive probability.",
  );
  act(() => handle().blur());
  expect(word()).toBeNull();
  const box = rule.place.querySelector(".hl-par");
  act(() => box?.dispatchEvent(new Event("pointerenter")));
  expect(word()).toContain("1.414");
  act(() => box?.dispatchEvent(new Event("pointerleave")));
  expect(word()).toBeNull();
});

test("a step across a border says so at once, and aloud once; a step back ends it", () => {
  rule.borders = { mu: [CRITICAL] };
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
  rule.borders = { mu: [{ ...CRITICAL, below: { ...CRITICAL.below, without: ["Figure 1", "Table 2"] } }] };
  draw({ ...WIDE, source: "1.45", value: 1.45 });
  press("ArrowLeft");
  expect(rule.place.querySelector(".hl-rule-word.hl-amiss")).not.toBeNull();
  expect(word()).toBe(
    "‡ Below μ = 1.414, where the drift is critical in larvae, K is infinite with positive probability. Figure 1 and Table 2 have no answer there.",
  );
});

test("what is pointed at has the line before what has the keys, which has it again afterwards", () => {
  const other: BorderFace = { ...CRITICAL, at: 2, shown: "2", open: "above" };
  rule.borders = { mu: [CRITICAL], beta: [other] };
  draw(WIDE, { ...WIDE, name: "beta", symbol: "\\beta", value: 1 });
  act(() => handle().focus());
  const second = rule.place.querySelectorAll(".hl-par")[1];
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

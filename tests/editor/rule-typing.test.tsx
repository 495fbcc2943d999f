// @vitest-environment jsdom
import { act } from "react";
import { expect, test } from "vitest";
import {
  aRuleForEach,
  draw,
  editing,
  handle,
  MU,
  onJudge,
  onSay,
  onSet,
  onTry,
  press,
  rule,
  type,
  word,
} from "./rule-on-page.tsx";

aRuleForEach();

test("digits open the field; Enter sets a formula as well; Esc closes it", async () => {
  draw(MU);
  press("2");
  expect(rule.place.querySelector("input")?.value).toBe("2");
  type("sqrt(2)");
  press("Enter");
  await act(async () => {});
  expect(onJudge.mock.calls).toEqual([["mu", "sqrt(2)"]]);
  expect(onSet.mock.calls).toEqual([["mu", "sqrt(2)"]]);
  press("3");
  press("Escape");
  expect(rule.place.querySelector("input")).toBeNull();
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
  const field = rule.place.querySelector("input");
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
  const buttons = [...rule.place.querySelectorAll("button")];
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
  rule.writes = false;
  draw(MU);
  expect(rule.place.querySelector("button")).toBeNull();
  expect(rule.place.querySelector(".hl-par-note")?.textContent).toBe("drift");
  press("ArrowRight", { altKey: true, shiftKey: true });
  expect(editing.move).not.toHaveBeenCalled();
  press("ArrowRight");
  expect(onTry).toHaveBeenLastCalledWith("mu", "1.65");
});

import { act } from "react";
import { createRoot, type Root } from "react-dom/client";
import { afterEach, beforeAll, beforeEach, vi } from "vitest";
import type { Borders } from "../../app/editor/model/borders.ts";
import type { ParameterFace } from "../../app/editor/model/types.ts";
import { ParameterRule } from "../../app/editor/parts/parameter-rule.tsx";
import { likeABrowser } from "./dom.ts";

/** The drift as the rule shows it. */
export const MU: ParameterFace = {
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

export const onTry = vi.fn<(name: string, source: string | null) => void>();
export const onSet = vi.fn<(name: string, source: string) => void>();
export const onSay = vi.fn<(words: string) => void>();
export const onJudge = vi.fn<(name: string, source: string) => Promise<string>>();
export const editing = { change: vi.fn(), add: vi.fn(), move: vi.fn() };

/** What a test may set before it draws. */
export const rule: { place: HTMLElement; borders: Borders; writes: boolean } = {
  place: document.body,
  borders: {},
  writes: true,
};
let root: Root;

/** Gives each test of a file a rule of its own, for one who writes, and time that stands still. */
export function aRuleForEach(): void {
  beforeAll(() => {
    likeABrowser();
    Object.assign(globalThis, { IS_REACT_ACT_ENVIRONMENT: true });
    Element.prototype.setPointerCapture = () => {};
  });
  beforeEach(() => {
    vi.useFakeTimers();
    for (const asked of [onTry, onSet, onSay, ...Object.values(editing)]) asked.mockReset();
    onJudge.mockReset().mockResolvedValue("");
    Object.assign(rule, { place: document.body.appendChild(document.createElement("div")), borders: {}, writes: true });
    root = createRoot(rule.place);
  });
  afterEach(() => {
    act(() => root.unmount());
    rule.place.remove();
    vi.useRealTimers();
  });
}

/** Draws the rule with parameters. */
export function draw(...parameters: ParameterFace[]): void {
  act(() =>
    root.render(
      <ParameterRule
        parameters={parameters}
        borders={rule.borders}
        onTry={onTry}
        onSet={onSet}
        onJudge={onJudge}
        editing={rule.writes ? editing : null}
        onSay={onSay}
      />,
    ),
  );
}

/** The value of the first parameter. */
export function handle(): HTMLElement {
  const found = rule.place.querySelector<HTMLElement>("[role=spinbutton]");
  if (found === null) throw new Error("There is no value to hold.");
  return found;
}

/** Presses a key in the field, or on the value where none is open. */
export function press(key: string, held: KeyboardEventInit = {}): void {
  const target = rule.place.querySelector("input") ?? handle();
  act(() => {
    target.dispatchEvent(new KeyboardEvent("keydown", { key, bubbles: true, cancelable: true, ...held }));
  });
}

/** Writes something else in the field. */
export function type(text: string): void {
  const field = rule.place.querySelector("input");
  if (field === null) throw new Error("There is no field.");
  const set = Object.getOwnPropertyDescriptor(HTMLInputElement.prototype, "value")?.set;
  act(() => {
    set?.call(field, text);
    field.dispatchEvent(new Event("input", { bubbles: true }));
  });
}

/** What stands beneath the rule; mathematics has its source within, which is left out. */
export function word(): string | null {
  const found = rule.place.querySelector(".hl-rule-word")?.cloneNode(true);
  if (!(found instanceof Element)) return null;
  for (const hidden of found.querySelectorAll(".katex-mathml")) hidden.remove();
  return found.textContent;
}

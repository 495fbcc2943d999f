import { act, type ReactNode } from "react";
import { createRoot } from "react-dom/client";

/** Something of the sheet's on a page of its own, as a person finds it: by names and words. */
export async function mount(node: ReactNode) {
  const place = document.body.appendChild(document.createElement("div"));
  const root = createRoot(place);
  const draw = (drawn: ReactNode) => act(async () => root.render(drawn));
  await draw(node);
  const button = (name: string) => {
    const found = [...place.querySelectorAll("button")].find(({ textContent }) => textContent === name);
    if (found === undefined) throw new Error(`No button is called ${name}.`);
    return found;
  };
  return {
    place,
    draw,
    button,
    names: () => [...place.querySelectorAll("button")].map(({ textContent }) => textContent),
    press: (name: string) => act(async () => button(name).click()),
    type: (input: HTMLInputElement, value: string) => {
      // React hears of what is written past its own property.
      Object.getOwnPropertyDescriptor(HTMLInputElement.prototype, "value")?.set?.call(input, value);
      return act(async () => void input.dispatchEvent(new Event("input", { bubbles: true })));
    },
    key: (target: Element, key: string) =>
      act(
        async () => void target.dispatchEvent(new KeyboardEvent("keydown", { key, bubbles: true, cancelable: true })),
      ),
    end: () => act(async () => root.unmount()),
  };
}

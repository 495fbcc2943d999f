import type { NumberFace } from "../model/types.ts";
import { QUOTES } from "./quoted.ts";
import type { Lit } from "./types.ts";

/** What a pointer or the focus is on. */
type Target =
  | { readonly on: "number"; readonly element: Element }
  | { readonly on: "cell"; readonly slot: string }
  | { readonly on: "parameter"; readonly place: number };

/** A plate is lit only when the pointer rests on it so long [ms]: it is large, and one passes over it. */
const REST_MS = 150;

/**
 * What is lit: what the pointer is on, else what the keys are on, else what was followed to, else the number whose
 * source is open under the caret.
 */
export class Lights {
  private readonly onChange: () => void;
  private pointed: Target | null = null;
  private focused: Target | null = null;
  private followed: Target | null = null;
  private timer: ReturnType<typeof setTimeout> | undefined;
  private readonly listening = new AbortController();

  constructor(sheet: HTMLElement, onChange: () => void) {
    this.onChange = onChange;
    const { signal } = this.listening;
    sheet.addEventListener("pointerover", (event) => event.pointerType !== "touch" && this.point(event.target), {
      signal,
    });
    sheet.addEventListener("pointerleave", () => this.point(null), { signal });
    sheet.addEventListener("focusin", (event) => this.focus(event.target), { signal });
    sheet.addEventListener("focusout", () => this.focus(null), { signal });
    for (const name of ["pointerdown", "keydown"] as const) {
      sheet.addEventListener(name, ({ target }) => isCommand(target) || this.letGo(), { signal, capture: true });
    }
  }

  /** What is lit is what the pointer is on. */
  get underPointer(): boolean {
    return this.pointed !== null;
  }

  end(): void {
    clearTimeout(this.timer);
    this.listening.abort();
  }

  /** Lights a cell, or the number set in an element, until a key or the pointer is pressed. */
  hold(what: string | Element): void {
    this.followed = typeof what === "string" ? { on: "cell", slot: what } : { on: "number", element: what };
    this.onChange();
  }

  /** Ends what `hold` began. */
  letGo(): void {
    if (this.followed === null) return;
    this.followed = null;
    this.onChange();
  }

  /** @param idOf the id under which an element's number is among `quotes` */
  litAmong(
    quotes: readonly { readonly id: string; readonly faces: readonly NumberFace[] }[],
    idOf: (element: Element) => string,
  ): Lit | null {
    const pointed = this.pointed ?? this.focused;
    const target = pointed ?? this.followed;
    if (target === null) {
      const open = quotes.find(({ id }) => id === "open");
      return open === undefined ? null : { lit: "number", ...open, pointed: false };
    }
    switch (target.on) {
      case "number": {
        const quote = quotes.find(({ id }) => id === idOf(target.element));
        return quote === undefined ? null : { lit: "number", ...quote, pointed: pointed !== null };
      }
      case "cell":
        return { lit: "cord", slot: target.slot, pointed: pointed !== null };
      case "parameter":
        return { lit: "strand", place: target.place, pointed: true };
    }
  }

  private point(at: EventTarget | null): void {
    const target = targetOf(at);
    if (isSame(target, this.pointed)) return;
    clearTimeout(this.timer);
    const take = () => {
      this.pointed = target;
      this.onChange();
    };
    if (target?.on === "cell") this.timer = setTimeout(take, REST_MS);
    else take();
  }

  private focus(at: EventTarget | null): void {
    const byKeys = at instanceof Element && at.matches(":focus-visible") && !at.matches(".cm-content");
    const target = byKeys ? targetOf(at) : null;
    if (isSame(target, this.focused)) return;
    this.focused = target;
    this.onChange();
  }
}

/** Commands about what is lit are no reason to let it go. */
function isCommand(target: EventTarget | null): boolean {
  return target instanceof Element && target.closest(".tail, .hl-slip") !== null;
}

function targetOf(at: EventTarget | null): Target | null {
  if (!(at instanceof Element)) return null;
  const number = at.closest(`[${QUOTES}]`);
  if (number !== null) return { on: "number", element: number };
  const slot = at.closest<HTMLElement>(".hl-cell[data-slot]")?.dataset.slot;
  if (slot !== undefined) return { on: "cell", slot };
  const parameter = at.closest(".hl-par");
  if (parameter === null) return null;
  return { on: "parameter", place: [...(parameter.parentElement?.children ?? [])].indexOf(parameter) };
}

function isSame(a: Target | null, b: Target | null): boolean {
  return whatOf(a) === whatOf(b);
}

function whatOf(target: Target | null): Element | string | number | null {
  if (target === null) return null;
  if (target.on === "number") return target.element;
  return target.on === "cell" ? target.slot : target.place;
}

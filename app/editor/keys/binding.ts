/** A key with what is held while it is pressed. `key` is as the event says it, letters in lower case. */
export interface Binding {
  readonly key: string;
  readonly ctrl: boolean;
  readonly alt: boolean;
  readonly meta: boolean;
}

/** `Ctrl ;` until a person chooses another. */
export const FIRST_BINDING: Binding = { key: ";", ctrl: true, alt: false, meta: false };

type Pressed = Pick<KeyboardEvent, "key" | "ctrlKey" | "altKey" | "metaKey">;

/** Pressed alone these only hold. */
const HELD = new Set(["Shift", "Control", "Alt", "Meta", "AltGraph", "CapsLock", "Fn", "Dead", "Process"]);

export function isHeld(event: Pick<KeyboardEvent, "key">): boolean {
  return HELD.has(event.key);
}

/** Shift is not looked at: on some keyboards it is part of the sign itself. */
export function meets({ key, ctrl, alt, meta }: Binding, event: Pressed): boolean {
  return lower(event.key) === key && event.ctrlKey === ctrl && event.altKey === alt && event.metaKey === meta;
}

/** The binding that a person has pressed, or why it cannot be the composing key. */
export function bindingOf(event: Pressed): Binding | { readonly refused: string } {
  const { key, ctrlKey: ctrl, altKey: alt, metaKey: meta } = event;
  if (WANTED_ELSEWHERE.has(key)) {
    return { refused: `${key} has its own meaning everywhere. Take Ctrl or Alt with a sign or a letter.` };
  }
  if (!(ctrl || alt || meta) && !/^F\d+$/.test(key)) {
    return { refused: "A plain key is for writing. Take Ctrl or Alt with it, or one of F1 to F12." };
  }
  return { key: lower(key), ctrl, alt, meta };
}

const WANTED_ELSEWHERE = new Set(["Escape", "Tab", "Enter", "Backspace", "Delete"]);

/** "Ctrl ;" */
export function bindingWords({ key, ctrl, alt, meta }: Binding): string {
  const name = key === " " ? "Space" : key.length === 1 ? key.toUpperCase() : key;
  return [...(ctrl ? ["Ctrl"] : []), ...(alt ? ["Alt"] : []), ...(meta ? ["Meta"] : []), name].join(" ");
}

/** What a person chose on this machine; the first binding where nothing was chosen or nothing can be kept. */
export function readBinding(personId: string | null): Binding {
  try {
    const kept: unknown = JSON.parse(localStorage.getItem(placeOf(personId)) ?? "null");
    return isBinding(kept) ? kept : FIRST_BINDING;
  } catch {
    return FIRST_BINDING;
  }
}

export function keepBinding(personId: string | null, binding: Binding): void {
  try {
    localStorage.setItem(placeOf(personId), JSON.stringify(binding));
  } catch {
    // A browser that keeps nothing: the choice holds while the page is open.
  }
}

function isBinding(kept: unknown): kept is Binding {
  if (typeof kept !== "object" || kept === null) return false;
  const { key, ctrl, alt, meta } = kept as Partial<Record<keyof Binding, unknown>>;
  return typeof key === "string" && key !== "" && [ctrl, alt, meta].every((each) => typeof each === "boolean");
}

function lower(key: string): string {
  return key.length === 1 ? key.toLowerCase() : key;
}

function placeOf(personId: string | null): string {
  return `halfline composing key ${personId ?? "of a visitor"}`;
}

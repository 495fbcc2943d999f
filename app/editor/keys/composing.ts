import { isHeld, meets } from "./binding.ts";
import { commandOf, give } from "./commands.ts";
import type { SheetAtHand } from "./types.ts";

/**
 * The composing key: pressed, it waits for one letter and gives the command of that letter. Esc leaves it, and so does
 * the key itself; a sign that is no command's is said to be none, and is not written.
 * @returns whether the key was taken
 */
export function pressComposing(event: KeyboardEvent, sheet: SheetAtHand): boolean {
  if (event.isComposing || isHeld(event)) return false;
  const { composing, binding } = sheet.strips.get();
  if (!composing) {
    if (!meets(binding, event)) return false;
    sheet.strips.set({ composing: true });
    sheet.desk.say("A letter, or question mark for the list.");
    return true;
  }
  sheet.strips.set({ composing: false });
  if (event.key === "Escape" || meets(binding, event)) return true;
  const command = commandOf(event.key, sheet.writes);
  if (command !== null) give(command, sheet);
  else
    sheet.desk.tell(`No command has ${event.key.length === 1 ? `the letter ${event.key}` : event.key}; ? lists them.`);
  return true;
}

/**
 * Esc where nothing nearer has taken it: puts the strip away; while something is computed, brings *Cancel* under the
 * keys.
 * @returns whether there was anything to leave
 */
export function pressEscape(event: KeyboardEvent, sheet: SheetAtHand): boolean {
  if (event.key !== "Escape" || event.isComposing || event.defaultPrevented) return false;
  if (sheet.strips.get().open !== null) {
    sheet.strips.set({ open: null });
    return true;
  }
  const cancel = document.querySelector<HTMLElement>(".hl-cancel-all");
  if (cancel === null || cancel === document.activeElement) return false;
  cancel.focus();
  return true;
}

/**
 * The browser's own key for finding, within the text: only what is in view of a long text is on the page, so that the
 * browser would not find the rest.
 */
export function pressFind(event: KeyboardEvent, sheet: SheetAtHand): boolean {
  const wanted = event.key.toLowerCase() === "f" && event.ctrlKey !== event.metaKey && !event.altKey && !event.shiftKey;
  if (!wanted || !sheet.view.dom.contains(document.activeElement)) return false;
  sheet.strips.set({ open: "find" });
  return true;
}

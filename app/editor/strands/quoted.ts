import type { NumberFace } from "../model/types.ts";

/** Marks the elements in which bound numbers are set, so that they can be found among all that is drawn. */
export const QUOTES = "data-quotes";

const faces = new WeakMap<Element, readonly NumberFace[]>();

/** Notes which numbers an element quotes: one, or all those of a formula. */
export function noteQuotes(element: Element, quoted: readonly NumberFace[]): void {
  if (quoted.length === 0) return;
  faces.set(element, quoted);
  element.setAttribute(QUOTES, "");
}

/** The numbers that an element quotes; none where it is no place of a number. */
export function quotedIn(element: Element): readonly NumberFace[] {
  return faces.get(element) ?? [];
}

import { type RefObject, useCallback, useEffect, useState } from "react";
import type { Desk } from "../live/desk.ts";
import { QUOTES } from "./quoted.ts";
import { elementAt, numberAt } from "./tapped-number.ts";
import type { StrandWatch } from "./watch.ts";

interface Tapped {
  readonly element: Element;
  /** Where its number stands in the text; null: in a plate or a formula. */
  readonly at: number | null;
}

/** The number that was tapped; while the page is narrow taps on numbers do not reach the text. */
export function useTapped(
  desk: Desk,
  watch: StrandWatch,
  sheet: RefObject<HTMLElement | null>,
  narrow: boolean,
): { readonly element: Element | null; forget(): void } {
  const [tapped, setTapped] = useState<Tapped | null>(null);
  const forget = useCallback(() => setTapped(null), []);
  useEffect(() => {
    const place = sheet.current;
    if (!narrow || place === null) return;
    const ended = new AbortController();
    const onNumber = (event: Event) => {
      const element = event.target instanceof Element ? event.target.closest(`.hl-text [${QUOTES}]`) : null;
      if (element === null || desk.view === null) return;
      event.preventDefault();
      event.stopPropagation();
      if (event.type !== "click") return;
      setTapped({ element, at: numberAt(desk.view, element)?.from ?? null });
      watch.lights.hold(element);
    };
    for (const name of ["mousedown", "click"])
      place.addEventListener(name, onNumber, { capture: true, signal: ended.signal });
    return () => ended.abort();
  }, [narrow, sheet, desk, watch]);
  // A number that changes is set anew: what stands in its place is then meant.
  useEffect(() => {
    if (tapped === null) return;
    return watch.store.watch(() => {
      if (tapped.element.isConnected) return;
      const element = desk.view === null || tapped.at === null ? null : elementAt(desk.view, tapped.at);
      setTapped(element === null ? null : { ...tapped, element });
      if (element !== null) watch.lights.hold(element);
    });
  }, [tapped, desk, watch]);
  return {
    element: tapped?.element ?? null,
    forget,
  };
}

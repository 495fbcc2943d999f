import { type RefObject, useEffect, useState, useSyncExternalStore } from "react";
import type { Desk } from "../live/desk.ts";
import { showsTheSame } from "../live/same-sheet.ts";
import { type StrandsView, StrandWatch } from "./watch.ts";

const NOTHING = () => {};

/** Watches the strands of a sheet from when its text is here to when it is left. */
export function useStrandWatch(
  desk: Desk | null,
  sheet: RefObject<HTMLElement | null>,
  personId: string | null,
): StrandWatch | null {
  const [watch, setWatch] = useState<StrandWatch | null>(null);
  const ready = useSyncExternalStore(
    (onChange) => desk?.store.watch(onChange) ?? NOTHING,
    () => desk?.store.get().ready ?? false,
  );
  useEffect(() => {
    const view = desk?.view ?? null;
    const column = view?.dom.closest<HTMLElement>(".hl-column") ?? null;
    if (!ready || desk === null || view === null || column === null || sheet.current === null) return;
    const begun = new StrandWatch(view, column, sheet.current, () => desk.store.get().model, personId);
    let seen = desk.store.get().model;
    const endWatch = desk.store.watch(() => {
      const { model } = desk.store.get();
      if (model !== seen && model !== null && !showsTheSame(seen, model)) begun.ask();
      seen = model;
    });
    setWatch(begun);
    return () => {
      endWatch();
      begun.end();
      setWatch(null);
    };
  }, [desk, ready, sheet, personId]);
  return watch;
}

/** Watches a part of what is drawn; `choose` must give the same object while nothing has changed. */
export function useStrands<T>(watch: StrandWatch, choose: (view: StrandsView) => T): T {
  return useSyncExternalStore(
    (onChange) => watch.store.watch(onChange),
    () => choose(watch.store.get()),
  );
}

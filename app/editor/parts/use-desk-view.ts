import { useSyncExternalStore } from "react";
import type { Desk, DeskView } from "../live/desk.ts";

/** Watches a part of what the desk shows; `choose` must give the same object while nothing has changed. */
export function useDeskView<T>(desk: Desk, choose: (view: DeskView) => T): T {
  return useSyncExternalStore(
    (onChange) => desk.store.watch(onChange),
    () => choose(desk.store.get()),
  );
}

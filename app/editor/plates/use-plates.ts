import { useSyncExternalStore } from "react";
import type { Store } from "../live/store.ts";
import type { PlatesView } from "./types.ts";

/** A part of what becomes of the plates; drawn anew when that part is another. */
export function usePlates<T>(plates: Store<PlatesView>, choose: (view: PlatesView) => T): T {
  const now = () => choose(plates.get());
  return useSyncExternalStore(plates.watch, now, now);
}

import type { StrandsMode } from "./types.ts";

const ORDER: readonly StrandsMode[] = ["shown", "lit", "hidden"];

/** What the tail line calls each. */
export const MODE_WORDS: Readonly<Record<StrandsMode, string>> = {
  shown: "shown",
  lit: "only the lit one",
  hidden: "hidden",
};

export function modeAfter(mode: StrandsMode): StrandsMode {
  return ORDER[(ORDER.indexOf(mode) + 1) % ORDER.length] ?? "shown";
}

/** What a person chose on this machine; shown where nothing was chosen or nothing can be kept. */
export function readMode(personId: string | null): StrandsMode {
  try {
    const kept = localStorage.getItem(keyOf(personId));
    return ORDER.find((mode) => mode === kept) ?? "shown";
  } catch {
    return "shown";
  }
}

export function keepMode(personId: string | null, mode: StrandsMode): void {
  try {
    localStorage.setItem(keyOf(personId), mode);
  } catch {
    // A browser that keeps nothing: the choice holds while the page is open.
  }
}

function keyOf(personId: string | null): string {
  return `halfline strands ${personId ?? "of a visitor"}`;
}

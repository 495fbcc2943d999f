import type { Scene, SceneCell } from "./types.ts";

/** What of the strands is lit: it keeps its full colour while all else stands back. */
export interface Lighting {
  strand(place: number): boolean;
  cord(cell: Pick<SceneCell, "slot" | "strands">): boolean;
  /** Whether a strand that is lit is itself what is pointed out, and not only on the way to it. */
  meant(place: number): boolean;
}

/** A strand lights all that hangs from it; a cord or a number lights all that it hangs from. */
export function lightingOf({ lit, cells }: Pick<Scene, "lit" | "cells">): Lighting {
  if (lit === null) return { strand: () => false, cord: () => false, meant: () => false };
  switch (lit.lit) {
    case "strand": {
      const isIt = (place: number) => place === lit.place;
      return { strand: isIt, cord: ({ strands }) => strands.includes(lit.place), meant: isIt };
    }
    case "cord": {
      const strands = cells.find(({ slot }) => slot === lit.slot)?.strands ?? [];
      return { strand: (place) => strands.includes(place), cord: ({ slot }) => slot === lit.slot, meant: () => false };
    }
    case "number": {
      const { faces } = lit;
      return {
        strand: (place) => faces.some(({ strands }) => strands.includes(place)),
        cord: ({ slot }) => faces.some(({ cells }) => cells.includes(slot)),
        meant: (place) => faces.some(({ reads }) => reads.includes(place)),
      };
    }
  }
}

import type { SceneCell } from "./types.ts";

/** Where the strands of a cell enter it, and where its cord begins [px]. */
export interface Entries {
  readonly ys: readonly number[];
  readonly ring: number;
  /** The entries stand too close for a letter at each: letters in a row. */
  readonly tight: boolean;
  /** They stand so close that a letter has to be small. */
  readonly small: boolean;
}

/** Between two entries, between the last one and the ring [px]. */
const GAP = 13;
const RING_GAP = 28;
/** A letter needs this much height. */
const LETTER = 9;
/** What stands above a caption is a figure when it is at least so high. */
const FIGURE = 70;
/** How far entries may stand beyond a cell of one line. */
const BEYOND = 10;

/** Beside a figure strands enter beside its upper part, and the cord begins at the caption; else it begins below them. */
export function entriesOf(box: NonNullable<SceneCell["box"]>, strands: number, quoted: boolean): Entries {
  const { top, bottom, caption } = box;
  if (caption - top > FIGURE) {
    const gap = Math.min(GAP, (caption - top - 44) / Math.max(1, strands));
    return { ys: rising(top + 30, gap, strands), ring: caption, ...closeness(gap) };
  }
  if (strands === 0) return { ys: [], ring: caption, ...closeness(GAP) };
  const gap = Math.min(GAP, (bottom - top + 2 * BEYOND) / (strands + Number(quoted)));
  if (gap < GAP) {
    const first = top - BEYOND + gap / 2;
    return { ys: rising(first, gap, strands), ring: first + gap * strands, ...closeness(gap) };
  }
  const ys = rising(top + 6, gap, strands);
  const last = ys.at(-1) ?? top;
  return { ys, ring: Math.max(last + GAP, Math.min(bottom, last + RING_GAP)), ...closeness(GAP) };
}

function rising(first: number, gap: number, count: number): number[] {
  return Array.from({ length: count }, (_, k) => first + gap * k);
}

function closeness(gap: number): Pick<Entries, "tight" | "small"> {
  return { tight: gap < LETTER, small: gap < GAP };
}

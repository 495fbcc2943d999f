import type { NumberFace } from "./types.ts";

/**
 * Classes of a number that is set within a formula: its state, and the colours of the strands of the first two parameters
 * that it hangs from. They travel in the formula's TeX, as `\htmlClass`.
 */
export function boundClasses({ state, strands }: Pick<NumberFace, "state" | "strands">): string {
  const [first, second = first] = strands;
  const colours =
    first === undefined || second === undefined ? "" : ` hl-first-${place(first)} hl-second-${place(second)}`;
  return `hl-bound hl-bound-${state}${colours}`;
}

/** From the seventh parameter on colours repeat. */
const place = (strand: number) => (strand % 6) + 1;

/** All that `boundClasses` gives, and nothing else. */
export const BOUND_CLASSES = /^hl-bound hl-bound-[A-Za-z]+(?: hl-first-[1-6] hl-second-[1-6])?$/;

/**
 * An author's TeX in which numbers are bound, without commands that give classes: a number that is typed must not look
 * bound. No shorter and no longer, since places within it are known; what stands there instead is no command of TeX.
 */
export function withoutClasses(tex: string): string {
  return tex.replaceAll("\\html", "\\HTML");
}

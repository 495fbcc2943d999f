import type { LabelRun } from "./label.ts";

/**
 * Widths of text are estimated, since a plate is laid out on the server too, where nothing can be measured. Advances in em of
 * the interface face and of the math italic, rounded up, so that room is left rather than wanting.
 */
const NARROW = /[ilj.,:;'′|!()[\]\u2009\u2005 ]/u;
const WIDE = /[mwMW@%∞→≤≥≈∼]/u;

/** Size of math italics relative to the text around them: the italic face looks smaller. */
export const VARIABLE_SCALE = 1.32;
/** Size of raised and lowered text. */
export const SHIFTED_SCALE = 0.78;

function advance(char: string): number {
  if (/[\u0300-\u036f\u20d7]/u.test(char)) return 0;
  if (NARROW.test(char)) return 0.3;
  if (WIDE.test(char)) return 0.86;
  return /\p{Lu}/u.test(char) ? 0.68 : 0.58;
}

/** Estimated width of a label. @param size font size in the unit of the result */
export function runsWidth(runs: readonly LabelRun[], size: number): number {
  let width = 0;
  for (const run of runs) {
    const scale = (run.shift === "base" ? 1 : SHIFTED_SCALE) * (run.style === "variable" ? 1.12 : 1);
    for (const char of run.text) width += advance(char) * scale * size;
  }
  return width;
}

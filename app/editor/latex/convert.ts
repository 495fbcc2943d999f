import { looksLikeLatex } from "./look.ts";
import { parseLatex } from "./nodes.ts";
import { written } from "./prose.ts";
import { type Converted, Gathered } from "./writer.ts";

/** LaTeX as a paper writes it. */
export interface Conversion {
  readonly text: string;
  readonly counts: ReadonlyMap<Converted, number>;
  /** What stayed as it was, since it is not sure what it would be: names of macros and surroundings. */
  readonly left: readonly string[];
  /** TeX of all formulas. */
  readonly formulas: readonly string[];
}

/**
 * Converts what is sure: sections, emphases, citations, references, footnotes, lists, plain tables, displays, theorems and
 * their like, quotes, dashes and accents. All else stays as it was.
 * @param around the text into which it comes
 * @returns null where nothing would be converted
 */
export function convertLatex(source: string, around: string): Conversion | null {
  if (!looksLikeLatex(source)) return null;
  const gathered = new Gathered(source, around, written);
  const prose = written(parseLatex(source).content, source.length, gathered);
  if (gathered.counts.size === 0) return null;
  const text = [prose, ...gathered.footnotes].join("\n\n");
  return { text, counts: gathered.counts, left: [...gathered.left], formulas: gathered.formulas };
}

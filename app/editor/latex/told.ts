import { unknownMacro } from "../../ui/math.ts";
import { counted, listed } from "../parts/words.ts";
import type { Conversion } from "./convert.ts";
import type { Converted } from "./writer.ts";

/** How many names are told one by one. */
const NAMED = 3;
/** How many kinds of things are counted one by one, the most frequent first. */
const KINDS = 4;

/**
 * What a conversion did, what it left as it was, and which macros of its formulas the paper does not know.
 * @param macros those of the paper's front matter
 */
export function conversionWords(conversion: Conversion, macros: Readonly<Record<string, string>>): string {
  const counts = [...conversion.counts].sort(([, a], [, b]) => b - a);
  const more = counts.slice(KINDS).reduce((sum, [, count]) => sum + count, 0);
  const things = [
    ...counts.slice(0, KINDS).map(([what, count]) => counted(count, what, MANY[what])),
    ...(more === 0 ? [] : [counted(more, "other thing")]),
  ];
  const one = conversion.counts.size === 1 && [...conversion.counts.values()][0] === 1;
  const unknown = [...new Set(conversion.formulas.flatMap((tex) => unknownMacro(tex, macros) ?? []))];
  return [
    `${listed(things)} ${one ? "was" : "were"} converted.`,
    ...(conversion.left.length === 0 ? [] : [`As it was stays ${namesOf(conversion.left)}.`]),
    ...(unknown.length === 0 ? [] : [`The paper has no macro ${namesOf(unknown)}: its front matter may define it.`]),
  ].join(" ");
}

const MANY: Readonly<Partial<Record<Converted, string>>> = { emphasis: "emphases" };

function namesOf(names: readonly string[]): string {
  return listed(names.length > NAMED ? [...names.slice(0, NAMED - 1), `${names.length - NAMED + 1} more`] : names);
}

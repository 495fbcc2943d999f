import type { Problem } from "../paper/index.ts";
import { nearestSpelling } from "../spelling/index.ts";

/** Names of parameters, cells, columns and dummies: letters, digits and underscores, starting with a letter. */
export function isName(text: string): boolean {
  return /^[A-Za-z][A-Za-z0-9_]*$/.test(text);
}

/** " Did you mean `gamma`?", or nothing when no candidate is near. */
export function didYouMean(text: string, candidates: Iterable<string>): string {
  const nearest = nearestSpelling(text, candidates);
  return nearest === null ? "" : ` Did you mean \`${nearest}\`?`;
}

/** The nearest candidate in place of a stretch of the text, to be accepted as it stands. */
export function nearestFix(
  text: string,
  candidates: Iterable<string>,
  place: { from: number; to: number },
): Problem["fix"] {
  const insert = nearestSpelling(text, candidates);
  return insert === null ? undefined : { label: `Write ${insert}`, from: place.from, to: place.to, insert };
}

/** `a`, `b` and `c`, in code marks. */
export function listOfNames(names: Iterable<string>, joint: "and" | "or" = "and"): string {
  const marked = [...names].map((name) => `\`${name}\``);
  if (marked.length <= 1) return marked[0] ?? "nothing";
  return `${marked.slice(0, -1).join(", ")} ${joint} ${marked.at(-1)}`;
}

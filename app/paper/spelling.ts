import { nearestSpelling } from "../spelling/index.ts";

/** " Did you mean “…”?", or nothing when no candidate is near: the end of a message. */
export function didYouMean(word: string, candidates: Iterable<string>): string {
  const nearest = nearestSpelling(word, candidates);
  return nearest === null || nearest === word ? "" : ` Did you mean “${nearest}”?`;
}

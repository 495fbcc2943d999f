import { SearchQuery } from "@codemirror/search";
import type { Text } from "@codemirror/state";

/** What is looked for in the text. */
export interface Sought {
  readonly words: string;
  readonly matchCase: boolean;
  readonly wholeWords: boolean;
  /** `words` is a regular expression. */
  readonly isPattern: boolean;
}

/** One place of the text where it stands. `groups` are those of a pattern, the whole match first. */
export interface Match {
  readonly from: number;
  readonly to: number;
  readonly groups: readonly string[];
}

export interface Matches {
  readonly matches: readonly Match[];
  /** There are more than are listed. */
  readonly more: boolean;
  /** Why nothing can be looked for; "" where it could. */
  readonly fault: string;
}

/** So many places are listed at most. */
export const MOST_MATCHES = 10_000;

export const NO_MATCHES: Matches = { matches: [], more: false, fault: "" };

/** All places of a text where something stands, hidden sources included. Empty matches of a pattern are left out. */
export function findMatches(doc: Text, { words, matchCase, wholeWords, isPattern }: Sought): Matches {
  if (words === "") return NO_MATCHES;
  const query = new SearchQuery({
    search: words,
    caseSensitive: matchCase,
    wholeWord: wholeWords,
    regexp: isPattern,
    literal: true,
  });
  if (!query.valid) return { ...NO_MATCHES, fault: patternFault(words) };
  const matches: Match[] = [];
  const cursor = query.getCursor(doc);
  for (let next = cursor.next(); next.done !== true; next = cursor.next()) {
    const { from, to } = next.value;
    if (from === to) continue;
    if (matches.length === MOST_MATCHES) return { matches, more: true, fault: "" };
    matches.push({ from, to, groups: "match" in next.value ? groupsOf(next.value.match) : [] });
  }
  return { matches, more: false, fault: "" };
}

/** What is written in a match's place: of a pattern, `$1` is its first group, `$&` the whole match, `$$` a dollar. */
export function replacementOf(match: Match, replacement: string, { isPattern }: Pick<Sought, "isPattern">): string {
  if (!isPattern) return replacement;
  return replacement.replace(/\$(\$|&|\d+)/g, (written, name: string) => {
    if (name === "$") return "$";
    return match.groups[name === "&" ? 0 : Number(name)] ?? written;
  });
}

function groupsOf(match: unknown): readonly string[] {
  return Array.isArray(match) ? match.map((group: unknown) => (typeof group === "string" ? group : "")) : [];
}

function patternFault(words: string): string {
  try {
    new RegExp(words, "gmu");
    return "This pattern cannot be looked for.";
  } catch (error) {
    const reason = error instanceof Error ? error.message.replace(/^.*: /, "") : String(error);
    return `The pattern cannot be read: ${reason.charAt(0).toLowerCase()}${reason.slice(1)}.`;
  }
}

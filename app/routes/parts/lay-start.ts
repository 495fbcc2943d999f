import { UNTITLED } from "../../paper/index.ts";
import { emptyPaper } from "./new-paper.ts";
import { STARTING_POINTS, startingPoint } from "./starts.ts";

export const STARTS = STARTING_POINTS.map(({ id, words }) => ({ id, words }));

/**
 * A paper whose body is empty with a starting point laid into it: title, authors and whatever else its front matter says
 * stay its own. null where the paper has parameters of its own by now, which would go.
 */
export function layStart(
  id: string,
  text: string,
  author: string,
): { readonly text: string; readonly bibliography: string } | null {
  const { front, body } = taken(text);
  const untouched = taken(emptyPaper(author)).body.trim();
  if (body.trim() !== "" && body.trim() !== untouched) return null;
  const start = startingPoint(id);
  const begun = taken(start.text(author));
  return { text: `---\n${joined(front, begun.front)}\n---\n${begun.body}`, bibliography: start.bibliography };
}

/** Front matter and the rest of a text. */
function taken(text: string): { readonly front: string; readonly body: string } {
  const found = /^---[ \t]*\n([\s\S]*?)\n(?:---|\.\.\.)[ \t]*(?:\n|$)/.exec(text);
  return found === null ? { front: "", body: text } : { front: found[1] ?? "", body: text.slice(found[0].length) };
}

/** The entries of the first, and those of the second that it has not; a title that says nothing gives way. */
function joined(own: string, other: string): string {
  const kept = entriesOf(own);
  if ((kept.get("title") ?? "").replace(/^title:\s*/, "").trim() === UNTITLED) kept.delete("title");
  const names = [...new Set([...entriesOf(other).keys(), ...kept.keys()])];
  return names.map((name) => kept.get(name) ?? entriesOf(other).get(name) ?? "").join("\n");
}

/** Entries of the outermost map with their lines, by key. */
function entriesOf(yaml: string): Map<string, string> {
  const entries = new Map<string, string>();
  let key = "";
  for (const line of yaml.split("\n")) {
    const begun = /^([^\s#:-][^:]*):/.exec(line)?.[1];
    if (begun !== undefined) key = begun;
    if (key === "" && line.trim() === "") continue;
    const before = entries.get(key);
    entries.set(key, before === undefined ? line : `${before}\n${line}`);
  }
  return entries;
}

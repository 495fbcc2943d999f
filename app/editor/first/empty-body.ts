import type { Text } from "@codemirror/state";

/** Longer than any text whose body is empty need be, in characters: those are not looked at. */
const LONGEST = 4_000;

/** Whether a paper has no words and no cells yet but its parameters: front matter and comments are none of its body. */
export function hasEmptyBody(doc: Pick<Text, "length" | "toString">): boolean {
  if (doc.length > LONGEST) return false;
  return (
    doc
      .toString()
      .replace(/^---[ \t]*\n[\s\S]*?\n(?:---|\.\.\.)[ \t]*(?:\n|$)/, "")
      .replace(/^(`{3,}|~{3,})[ \t]*parameters\b.*\n[\s\S]*?^\1[ \t]*$/gm, "")
      .replace(/<!--[\s\S]*?-->/g, "")
      .trim() === ""
  );
}

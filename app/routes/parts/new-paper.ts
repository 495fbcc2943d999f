import { isMap, isScalar, parseDocument } from "yaml";
import { UNTITLED } from "../../paper/index.ts";

/** The text of an empty paper: a title, its author and one parameter. The sheet itself says where to write. */
export function emptyPaper(author: string): string {
  return `---
title: ${UNTITLED}
authors:
  - name: ${quotedInYaml(author)}
---

\`\`\`parameters
beta: {value: 1, min: 0, max: 4, step: 0.05, symbol: \\beta, note: branching rate}
\`\`\`

`;
}

/** The text of a copy: the same but for its title, "Copy of …". A text without a title in its front matter is left as it is. */
export function copyOf(text: string): { text: string; title: string | null } {
  const front = /^---[ \t]*\r?\n([\s\S]*?)\r?\n---[ \t]*(?:\r?\n|$)/.exec(text);
  const source = front?.[1];
  if (source === undefined) return { text, title: null };
  const { contents } = parseDocument(source, { schema: "failsafe" });
  const title = isMap(contents) ? contents.get("title", true) : null;
  if (!isScalar(title) || !title.range) return { text, title: null };
  const copied = `Copy of ${String(title.value).trim()}`;
  const offset = text.indexOf(source);
  const [from, to] = title.range;
  // A folded title reaches over the end of its last line.
  const end = from + source.slice(from, to).trimEnd().length;
  return { text: text.slice(0, offset + from) + quotedInYaml(copied) + text.slice(offset + end), title: copied };
}

/** Words as YAML, whatever is in them: between single quotes a backslash is a backslash. */
export function quotedInYaml(words: string): string {
  return `'${words.replace(/\s+/g, " ").replaceAll("'", "''")}'`;
}

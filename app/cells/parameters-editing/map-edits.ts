import type { Yaml, YamlEntry } from "../../paper/index.ts";
import type { TextEdit } from "../text-edits.ts";
import { type Around, endOf, scalarEdit, scalarText } from "./scalar.ts";

/** A map of a cell's body, in braces or with an entry a line. */
export type YamlMap = Extract<Yaml, { yaml: "map" }>;

/** How a map is written. */
export function aroundOf(text: string, map: YamlMap): Around {
  return text.charAt(map.from) === "{" ? "flow" : "block";
}

/** A further entry after a map's last, written as the author writes them: on the same line, or on one of its own. */
export function addedEntry(text: string, map: YamlMap, entry: string): TextEdit {
  const last = map.entries.at(-1);
  const flow = aroundOf(text, map) === "flow";
  if (last === undefined) {
    const at = flow ? map.from + 1 : map.from;
    return { from: at, to: at, insert: flow ? entry : `${entry}\n` };
  }
  const at = flow ? endOf(text, last.value) : lineEnd(text, endOf(text, last.value));
  const own = startsLine(text, last) && /^\s*(?:\n|$)/.test(text.slice(at));
  if (!flow) return { from: at, to: at, insert: `\n${indentOf(text, last)}${entry}` };
  return { from: at, to: at, insert: own ? `,\n${indentOf(text, last)}${entry}` : `, ${entry}` };
}

/** Takes an entry out of a map that keeps others. A comment behind it on its line stays. */
export function removedEntry(text: string, map: YamlMap, entry: YamlEntry): readonly TextEdit[] {
  const at = map.entries.indexOf(entry);
  const [before, after] = [map.entries[at - 1], map.entries[at + 1]];
  const to = endOf(text, entry.value);
  if (aroundOf(text, map) === "block") {
    const comment = /^[ \t]+(?=#)/.exec(text.slice(to));
    if (comment !== null && !text.slice(entry.keyFrom, to).includes("\n"))
      return [cut(entry.keyFrom, to + comment[0].length)];
    return [cut(startsLine(text, entry) ? lineStart(text, entry.keyFrom) : entry.keyFrom, nextLine(text, to))];
  }
  if (after !== undefined) return [cut(entry.keyFrom, after.keyFrom)];
  if (before === undefined) return [cut(entry.keyFrom, to)];
  const from = endOf(text, before.value);
  const between = text.slice(from, entry.keyFrom);
  const comma = from + between.indexOf(",");
  return between.includes("#") && comma >= from ? [cut(comma, comma + 1), cut(entry.keyFrom, to)] : [cut(from, to)];
}

/** What an entry is to say: a text, or YAML that is written as it stands, a list in brackets for one. */
export type EntryAsked = string | { readonly yaml: string };

/**
 * The edits by which entries of a map say something else, in rising order; what is not asked for stays as it is written.
 * @param asked what they are to say by key; "" takes an entry away
 */
export function changedEntries(text: string, map: YamlMap, asked: ReadonlyMap<string, EntryAsked>): TextEdit[] {
  const edits: TextEdit[] = [];
  const added: string[] = [];
  const around = aroundOf(text, map);
  for (const [field, words] of asked) {
    const entry = map.entries.find(({ key }) => key === field);
    if (entry === undefined) added.push(...(words === "" ? [] : [`${field}: ${writtenAs(words, around)}`]));
    else if (typeof words !== "string") edits.push(verbatimEdit(text, entry.value, words.yaml));
    else if (words !== "") edits.push(scalarEdit(text, entry.value, words, around));
  }
  const removed = map.entries.filter(({ key }) => asked.get(key) === "");
  edits.push(...removals(text, map, removed));
  const left = map.entries.filter((entry) => !removed.includes(entry));
  if (added.length > 0) edits.push(...additions(text, { ...map, entries: left }, added));
  return edits.sort((a, b) => a.from - b.from || a.to - b.to);
}

function writtenAs(asked: EntryAsked, around: Around): string {
  return typeof asked === "string" ? scalarText(asked, around) : asked.yaml;
}

function verbatimEdit(text: string, value: Yaml, yaml: string): TextEdit {
  const to = endOf(text, value);
  const gap = text.charAt(value.from - 1) === ":" ? " " : "";
  return { from: value.from, to, insert: gap + yaml };
}

/** Entries are taken out one after the other, from the last: what stands between two that go is named once. */
function removals(text: string, map: YamlMap, removed: readonly YamlEntry[]): TextEdit[] {
  const edits: TextEdit[] = [];
  let left = map.entries;
  for (const entry of [...removed].reverse()) {
    edits.push(...removedEntry(text, { ...map, entries: left }, entry));
    left = left.filter((each) => each !== entry);
  }
  return edits;
}

function additions(text: string, map: YamlMap, added: readonly string[]): TextEdit[] {
  const first = added[0] ?? "";
  const edit = addedEntry(text, map, first);
  const between = edit.insert.slice(0, edit.insert.length - first.length);
  return [
    {
      ...edit,
      insert:
        edit.insert +
        added
          .slice(1)
          .map((entry) => between + entry)
          .join(""),
    },
  ];
}

/** The whole lines of an entry in a body with an entry a line, with comments directly above it. */
export function linesOf(text: string, entry: YamlEntry): { readonly from: number; readonly to: number } {
  const indent = indentOf(text, entry);
  let from = lineStart(text, entry.keyFrom);
  for (;;) {
    const above = lineStart(text, Math.max(0, from - 1));
    if (above === from || !text.startsWith(`${indent}#`, above)) break;
    from = above;
  }
  return { from, to: nextLine(text, endOf(text, entry.value)) };
}

/** What stands before an entry's key on its line. */
export function indentOf(text: string, entry: Pick<YamlEntry, "keyFrom">): string {
  return text.slice(lineStart(text, entry.keyFrom), entry.keyFrom);
}

/** Whether an entry is the first of its line. */
export function startsLine(text: string, entry: Pick<YamlEntry, "keyFrom">): boolean {
  return /^[\s>]*$/.test(indentOf(text, entry));
}

export function lineStart(text: string, at: number): number {
  return text.lastIndexOf("\n", at - 1) + 1;
}

export function lineEnd(text: string, at: number): number {
  const end = text.indexOf("\n", at);
  return end < 0 ? text.length : end;
}

/** Where the line after the one of a place begins. */
export function nextLine(text: string, at: number): number {
  return Math.min(text.length, lineEnd(text, at) + 1);
}

function cut(from: number, to: number): TextEdit {
  return { from, to, insert: "" };
}

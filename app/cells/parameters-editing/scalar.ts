import type { Yaml } from "../../paper/index.ts";
import type { TextEdit } from "../text-edits.ts";

/** Where a scalar stands: in braces or brackets, commas and brackets would end it. */
export type Around = "block" | "flow";

/** A text in one line, as a YAML scalar that reads back as it: plain where YAML would not cut it, else in single quotes. */
export function scalarText(words: string, around: Around): string {
  const text = oneLine(words);
  return isPlain(text, around) ? text : quoted(text);
}

/** The edit that writes other words in the place of a scalar; what the author has quoted stays quoted. */
export function scalarEdit(text: string, node: Yaml, words: string, around: Around): TextEdit {
  const { from } = node;
  const to = endOf(text, node);
  const mark = text.charAt(from);
  const line = oneLine(words);
  let insert = scalarText(words, around);
  if (to > from && mark === "'") insert = quoted(line);
  if (to > from && mark === '"' && !/["\\]/.test(line)) insert = `"${line}"`;
  // After `key:` alone there is no space yet.
  const gap = to === from && text.charAt(from - 1) === ":" ? " " : "";
  return { from, to, insert: gap + insert };
}

/** Where a value's own characters end: a text on lines of its own runs to the next entry. */
export function endOf(text: string, node: Yaml): number {
  let to = node.to;
  while (to > node.from && /\s/.test(text.charAt(to - 1))) to -= 1;
  return to;
}

function oneLine(words: string): string {
  return words.replace(/[\s\p{Cc}\ufeff]+/gu, " ").trim();
}

function quoted(text: string): string {
  return `'${text.replaceAll("'", "''")}'`;
}

function isPlain(text: string, around: Around): boolean {
  if (text === "" || /^(?:[,[\]{}#&*!|>'"%@`]|[-?:](?:\s|$)|-{3}|\.{3})/.test(text)) return false;
  if (/:(?:\s|$)|\s#/.test(text)) return false;
  // An open bracket looks as if YAML had cut a formula at the next comma.
  return around === "block" || (!/[,[\]{}]|^[?:]/.test(text) && text.split("(").length === text.split(")").length);
}

import type { Text } from "@codemirror/state";

/** What a line of the text is by the marks that stand above it. */
export type Standing = "prose" | "working" | "frontMatter" | "comment" | "display";

const FENCE = /^ {0,3}(`{3,}|~{3,})/;
const RULE = /^---[ \t]*$/;

/**
 * Where a line stands, read from the head of the text down: its own opening mark counts, so that the first line of a
 * working is of the working. Some tenths of a millisecond for a long paper; asked at a key, never while drawing.
 */
export function standingOf(doc: Text, lineNumber: number): Standing {
  let fence = "";
  let standing: Standing = "prose";
  let number = 0;
  for (const line of doc.iterLines(1, lineNumber + 1)) {
    number += 1;
    const last = number === lineNumber;
    if (standing === "prose") {
      const opening = FENCE.exec(line)?.[1];
      if (number === 1 && RULE.test(line) && closesFrontMatter(doc)) standing = "frontMatter";
      else if (opening !== undefined) [standing, fence] = ["working", opening];
      else if (line.lastIndexOf("<!--") > line.lastIndexOf("-->")) standing = "comment";
      else if (oddDisplays(line)) standing = "display";
    } else if (!last && closes(standing, line, fence)) standing = "prose";
  }
  return standing;
}

function closes(standing: Standing, line: string, fence: string): boolean {
  switch (standing) {
    case "working":
      return line.trim().startsWith(fence) && line.trim().replaceAll(fence.charAt(0), "") === "";
    case "frontMatter":
      return RULE.test(line);
    case "comment":
      return line.includes("-->");
    default:
      // A display does not outlast its block.
      return line.trim() === "" || oddDisplays(line);
  }
}

function oddDisplays(line: string): boolean {
  return (line.match(/\$\$/g)?.length ?? 0) % 2 === 1;
}

function closesFrontMatter(doc: Text): boolean {
  if (doc.lines < 2) return false;
  for (const line of doc.iterLines(2)) if (RULE.test(line)) return true;
  return false;
}

/** The lines of the block in which a line stands, from the last blank line on to it. */
export function blockAbove(doc: Text, lineNumber: number): string[] {
  const lines: string[] = [];
  for (let number = lineNumber; number >= 1; number -= 1) {
    const { text } = doc.line(number);
    if (text.trim() === "") break;
    lines.unshift(text);
  }
  return lines;
}

/** A list's item or a quote: indentation, mark, and the space after it. */
const ITEM = /^([ \t]*)([-*+]|\d{1,9}[.)])([ \t]+|$)/;
const QUOTE = /^([ \t]*)>[ \t]?/;
/** The second line of a table. */
const TABLE_RULE = /^[ \t]*\|?[ \t]*:?-+:?[ \t]*(\|[ \t]*:?-+:?[ \t]*)+\|?[ \t]*$/;

/** Whether a block of prose is a list, a quote or a table, in which a line break counts. */
export function breaksCount(block: readonly string[]): boolean {
  return block.some((line, at) => ITEM.test(line) || QUOTE.test(line) || (at > 0 && TABLE_RULE.test(line)));
}

/**
 * What a new line after this one begins with in a list or a quote; null: it goes on with nothing.
 * "": the item is empty, and Enter ends the list.
 */
export function continuation(line: string): string | null {
  const quote = QUOTE.exec(line);
  if (quote !== null) return line.trim() === ">" ? "" : quote[0].replace(/>[ \t]?$/, "> ");
  const item = ITEM.exec(line);
  if (item === null) return null;
  const [whole, indent = "", mark = "", gap = ""] = item;
  if (line.slice(whole.length).trim() === "") return "";
  const next = /^\d/.test(mark) ? `${Number.parseInt(mark, 10) + 1}${mark.slice(-1)}` : mark;
  return `${indent}${next}${gap === "" ? " " : gap}`;
}

import { cellAround, inMath } from "./place.ts";

/**
 * The line that closes what the line of a place opens, where nothing below closes it yet: a cell, surroundings, a
 * display, or rows within one. null where Enter is a plain new line. The place is at its line's end.
 */
export function closingLine(text: string, offset: number): string | null {
  const lineFrom = text.lastIndexOf("\n", offset - 1) + 1;
  const line = text.slice(lineFrom, offset);
  const after = text.slice(offset);
  if (!/^[ \t]*(?:\n|$)/.test(after)) return null;
  const fence = /^( {0,3})(`{3,})[ \t]*[A-Za-z_]+(?:[ \t]+\w+)?[ \t]*$/.exec(line);
  if (fence !== null) {
    const [, indent = "", mark = ""] = fence;
    return cellAround(text, lineFrom) === null && !closesNext(after, mark) ? `${indent}${mark}` : null;
  }
  if (cellAround(text, lineFrom) !== null) return null;
  const surroundings = /^(:{3,})[a-z]+/.exec(line);
  if (surroundings !== null) return openSurroundings(text) > 0 ? (surroundings[1] ?? ":::") : null;
  const block = text.slice(Math.max(0, text.lastIndexOf("\n\n", offset - 1)), offset);
  const rest = after.split(/\n[ \t]*\n/, 1)[0] ?? "";
  if (/^[ \t]*\$\$[ \t]*$/.test(line)) return inMath(block) && !rest.includes("$$") ? "$$" : null;
  const begun = /\\begin\{([a-zA-Z]+\*?)\}[^\\]*$/.exec(line)?.[1];
  if (begun === undefined || !inMath(block)) return null;
  return count(rest, `\\end{${begun}}`) > count(rest, `\\begin{${begun}}`) ? null : `\\end{${begun}}`;
}

/** Whether the next fence below closes this one, as a cell's own does; another cell's opening does not. */
function closesNext(after: string, mark: string): boolean {
  const next = /^ {0,3}(`{3,})[ \t]*(.*)$/m.exec(after);
  return next !== null && (next[1] ?? "").length >= mark.length && (next[2] ?? "").trim() === "";
}

/** How many surroundings of a text nothing closes. Lines within cells are not its. */
function openSurroundings(text: string): number {
  let [open, within] = [0, ""];
  for (const line of text.split("\n")) {
    const fence = /^ {0,3}(`{3,})/.exec(line)?.[1];
    if (fence !== undefined) within = within === "" ? fence : line.trim() === within ? "" : within;
    else if (within === "" && /^:{3,}[a-z]/.test(line)) open += 1;
    else if (within === "" && /^:{3,}\s*$/.test(line)) open = Math.max(0, open - 1);
  }
  return open;
}

function count(text: string, part: string): number {
  return text.split(part).length - 1;
}

/** Where a block may stand, and the lines that part it from what is around it. */
export interface Gap {
  readonly from: number;
  readonly to: number;
  readonly before: string;
  readonly after: string;
}

interface Line {
  readonly from: number;
  readonly to: number;
  readonly blank: boolean;
  /** Nothing that spans several lines is open here: no front matter, cell, display or comment. */
  readonly free: boolean;
  /** How many surroundings are open. */
  readonly depth: number;
  /** Closes surroundings. */
  readonly closes: boolean;
}

/**
 * The place for a block at or after a place of a text: a blank line, the end of surroundings unless the block is to stand
 * outside of them, or the end of the text.
 */
export function gapAfter(text: string, offset: number, outermost: boolean): Gap {
  const lines = linesOf(text);
  const here = lines.findIndex(({ to }) => offset <= to);
  const at = lines.findIndex(
    ({ blank, free, depth, closes }, place) =>
      place >= here && free && (outermost ? blank && depth === 0 : blank || (closes && depth > 0)),
  );
  const line = lines[at];
  if (line === undefined) {
    return { from: text.length, to: text.length, before: text === "" ? "" : "\n\n", after: "\n" };
  }
  const [above, below] = [lines[at - 1], lines[at + 1]];
  const before = above === undefined || above.blank ? "" : "\n";
  if (!line.blank) return { from: line.from, to: line.from, before, after: "\n\n" };
  return { from: line.from, to: line.to, before, after: below === undefined || !below.blank ? "\n" : "" };
}

function linesOf(text: string): Line[] {
  let from = 0;
  let within: RegExp | null = /^---[ \t]*\n/.test(text) ? /^(?:---|\.\.\.)[ \t]*$/ : null;
  let depth = 0;
  return text.split("\n").map((line, number) => {
    const start = from;
    from += line.length + 1;
    const isOpen = within !== null;
    const begins = within === null ? openedBy(line) : null;
    if (within !== null && number > 0 && within.test(line)) within = null;
    else if (within === null) within = begins;
    const closes = !isOpen && begins === null && /^:{3,}[ \t]*$/.test(line);
    const depthHere = depth;
    if (!isOpen && begins === null) {
      if (/^:{3,}[a-z]/.test(line)) depth += 1;
      else if (closes) depth = Math.max(0, depth - 1);
    }
    return { from: start, to: from - 1, blank: line.trim() === "", free: !isOpen, depth: depthHere, closes };
  });
}

/** What ends that which a line opens over several lines; null where it opens nothing. */
function openedBy(line: string): RegExp | null {
  const fence = /^ {0,3}(`{3,}|~{3,})/.exec(line)?.[1];
  if (fence !== undefined) return new RegExp(`^ {0,3}${fence}[ \\t]*$`);
  if ((line.split("$$").length - 1) % 2 === 1) return /\$\$/;
  if (line.includes("<!--") && !line.slice(line.indexOf("<!--")).includes("-->")) return /-->/;
  return null;
}

/** A stretch of a text that can be parsed on its own. */
export interface Piece {
  readonly from: number;
  readonly text: string;
  readonly frontMatter: boolean;
}

/**
 * Cuts a text before lines that begin a new block for certain: after a blank line, not indented, no item of a list, not
 * within front matter, a fenced block or a comment. Pieces are parsed each on its own, and remembered, so that an edit
 * costs the parsing of one piece.
 */
export function cutIntoPieces(text: string): Piece[] {
  const pieces: Piece[] = [];
  let from = 0;
  const body = frontMatterEnd(text);
  const cut = (to: number) => {
    if (to > from) pieces.push({ from, text: text.slice(from, to), frontMatter: to <= body });
    from = to;
  };
  cut(body);
  let fence: string | null = null;
  let blank = true;
  for (let start = body; start < text.length; ) {
    const newline = text.indexOf("\n", start);
    const end = newline < 0 ? text.length : newline + 1;
    const line = text.slice(start, end).replace(/[\r\n]+$/, "");
    if (fence !== null) {
      if (closesFence(line, fence)) fence = null;
      blank = false;
      start = end;
      continue;
    }
    if (blank && beginsBlock(line)) cut(start);
    blank = /^[ \t]*$/.test(line);
    if (/^ {0,3}<!--/.test(line)) {
      const close = text.indexOf("-->", text.indexOf("<!--", start) + 2);
      if (close >= 0) {
        const after = text.indexOf("\n", close);
        const next = after < 0 ? text.length : after + 1;
        // Words after a comment's end make it part of a paragraph, which a blank line would have ended: cut no more.
        if (/\S/.test(text.slice(close + 3, next)) && /\n[ \t]*\r?\n/.test(text.slice(start, close))) break;
        start = next;
        continue;
      }
    }
    fence = opensFence(line);
    start = end;
  }
  cut(text.length);
  return pieces;
}

/** End of the front matter with its closing line; 0 when there is none. */
function frontMatterEnd(text: string): number {
  const bom = text.startsWith("\uFEFF") ? 1 : 0;
  const opening = /---[ \t]*(?:\r\n?|\n)/y;
  opening.lastIndex = bom;
  if (!opening.test(text)) return 0;
  const closing = /^---[ \t]*(?:\r\n?|\n|$)/gm;
  closing.lastIndex = opening.lastIndex;
  return closing.exec(text) === null ? 0 : closing.lastIndex;
}

/** Deepest nesting of quotes and lists that is parsed: the parser's work grows with the cube of it. */
const deepest = 40;

/** Whether quotes and lists are nested beyond what is parsed. */
export function nestsTooDeeply(piece: string): boolean {
  const marks = /(?:>|(?:[-+*]|\d{1,9}[.)])(?=[ \t]|$))[ \t]*/y;
  const indents: number[] = [];
  for (const line of piece.split("\n")) {
    marks.lastIndex = line.length - line.trimStart().length;
    const indent = marks.lastIndex;
    let count = 0;
    while (count <= deepest && marks.test(line)) count++;
    if (count === 0) continue;
    while ((indents.at(-1) ?? -1) >= indent) indents.pop();
    indents.push(indent);
    if (count + indents.length > deepest) return true;
  }
  return false;
}

function beginsBlock(line: string): boolean {
  return /^[^\s]/.test(line) && !/^(?:[-+*]|\d{1,9}[.)])(?:[ \t]|$)/.test(line);
}

function opensFence(line: string): string | null {
  const backticks = /^ {0,3}(`{3,})[^`]*$/.exec(line)?.[1];
  return backticks ?? /^ {0,3}(~{3,})/.exec(line)?.[1] ?? null;
}

function closesFence(line: string, fence: string): boolean {
  const run = /^ {0,3}(`{3,}|~{3,})[ \t]*$/.exec(line)?.[1];
  return run !== undefined && run.charAt(0) === fence.charAt(0) && run.length >= fence.length;
}

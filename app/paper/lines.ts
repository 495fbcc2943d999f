import type { Span } from "./types.ts";

/** The lines of a text, for turning offsets into line numbers in logarithmic time. Lines end with LF, CR LF or CR. */
export class Lines {
  /** Offset of each line's first character. */
  private readonly starts: number[];
  readonly length: number;

  constructor(text: string) {
    this.length = text.length;
    this.starts = [0];
    for (const ending of text.matchAll(/\r\n?|\n/g)) this.starts.push(ending.index + ending[0].length);
  }

  /** Line of an offset, counted from 1; offsets outside the text belong to the first or last line. */
  lineAt(offset: number): number {
    let low = 0;
    let high = this.starts.length;
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if ((this.starts[middle] ?? 0) <= offset) low = middle;
      else high = middle;
    }
    return low + 1;
  }

  /** Offset of the first character of a line (counted from 1). */
  startOf(line: number): number {
    return this.starts[Math.min(Math.max(line, 1), this.starts.length) - 1] ?? 0;
  }

  span(from: number, to: number): Span {
    return { from, to, line: this.lineAt(from), lastLine: this.lineAt(Math.max(from, to - 1)) };
  }
}

/** Line of an offset in a text, counted from 1. For many offsets of one text make a `Lines`. */
export function lineAt(text: string, offset: number): number {
  return new Lines(text.slice(0, Math.max(0, offset))).lineAt(offset);
}

/**
 * Where the indices of `value` stand in `source`, when `value` is `source` with indentation, quote marks or the like
 * left out. Exact where the two are equal; otherwise found by matching characters in order.
 */
export function sourceMap(value: string, source: string): (index: number) => number {
  if (value === source) return (index) => index;
  const places: number[] = [];
  let at = 0;
  for (const character of value.split("")) {
    const found = character.trim() === "" ? -1 : source.indexOf(character, at);
    places.push(found < 0 ? at : found);
    if (found >= 0) at = found + 1;
  }
  return (index) => places[index] ?? at;
}

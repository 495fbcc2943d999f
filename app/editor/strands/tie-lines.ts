import type { Scene, SceneQuote } from "./types.ts";

/** Where a cord or a strand is tied to a line, and the numbers of that line which it holds. */
export interface TieLine {
  /** Of the first number it holds. */
  readonly id: string;
  readonly y: number;
  readonly quotes: readonly SceneQuote[];
}

/** Ties by what they end: the cord of a slot, or the strand of a place. */
export interface TieLines {
  readonly cords: ReadonlyMap<string, readonly TieLine[]>;
  readonly strands: ReadonlyMap<number, readonly TieLine[]>;
}

/** Numbers whose lines lie closer than this stand on one line [px]. */
const SAME_LINE = 6;
/** Several ties of one line stand above each other: so far apart, and in so much height [px]. */
const APART = 7;
const HEIGHT = 22;

/** One tie for each line and what is tied to it; several on one line are spread above each other. */
export function tieLinesOf(quotes: Scene["quotes"]): TieLines {
  const cords = new Map<string, TieLine[]>();
  const strands = new Map<number, TieLine[]>();
  for (const line of linesOf(quotes)) {
    const y = Math.max(...line.map((quote) => quote.y));
    const slots = [...new Set(line.flatMap(({ cells }) => cells))];
    const places = [...new Set(line.flatMap(({ reads }) => reads))].sort((a, b) => b - a);
    const count = slots.length + places.length;
    const apart = Math.min(APART, HEIGHT / Math.max(1, count - 1));
    slots.forEach((slot, k) => {
      const held = line.filter(({ cells }) => cells.includes(slot));
      push(cords, slot, { id: held[0]?.id ?? slot, y: y - apart * k, quotes: held });
    });
    places.forEach((place, k) => {
      const held = line.filter(({ reads }) => reads.includes(place));
      push(strands, place, { id: held[0]?.id ?? `${place}`, y: y - apart * (slots.length + k), quotes: held });
    });
  }
  return { cords, strands };
}

function linesOf(quotes: readonly SceneQuote[]): SceneQuote[][] {
  const lines: SceneQuote[][] = [];
  let last = Number.NEGATIVE_INFINITY;
  for (const quote of [...quotes].sort((a, b) => a.y - b.y)) {
    if (quote.y - last > SAME_LINE) lines.push([]);
    lines.at(-1)?.push(quote);
    last = quote.y;
  }
  return lines;
}

function push<K>(into: Map<K, TieLine[]>, key: K, line: TieLine): void {
  const known = into.get(key);
  if (known === undefined) into.set(key, [line]);
  else known.push(line);
}

import type { RangeSet, Text } from "@codemirror/state";
import type { CellFace, NumberFace } from "../model/types.ts";
import { counted } from "../parts/words.ts";
import type { Place } from "../text/places.ts";

/** A section's heading where it stands now. */
export interface Heading {
  /** The start of its line. */
  readonly at: number;
  /** 1 for `#`. */
  readonly level: number;
  /** "3.1"; "" where it has none. */
  readonly number: string;
}

/** The headings of a text, in its order, as its last answer has them. */
export function headingsOf(places: RangeSet<Place>, doc: Text): readonly Heading[] {
  const headings: Heading[] = [];
  for (const cursor = places.iter(); cursor.value !== null; cursor.next()) {
    const { piece } = cursor.value;
    const { from } = cursor;
    const last = headings.at(-1);
    if (piece.piece === "lines") {
      const level = /^hl-heading hl-heading-(\d)$/.exec(piece.dress)?.[1];
      if (level !== undefined) headings.push({ at: doc.lineAt(from).from, level: Number(level), number: "" });
    } else if (piece.piece === "dressed" && last?.at === from && piece.before?.content === "words") {
      const [run] = piece.before.runs;
      if (run?.run === "text") headings[headings.length - 1] = { ...last, number: run.text };
    }
  }
  return headings;
}

/** The heading of the section in which a place is; null: it stands before the first. */
export function headingAbove(headings: readonly Heading[], at: number, doc: Text): Heading | null {
  const lineStart = doc.lineAt(at).from;
  return headings.findLast((heading) => heading.at <= lineStart) ?? null;
}

/** The lines beneath a heading, down to the next one of its level or above; null where there is nothing beneath it. */
export function linesBeneath(
  heading: Heading,
  headings: readonly Heading[],
  doc: Text,
): { readonly from: number; readonly to: number } | null {
  const next = headings.find(({ at, level }) => at > heading.at && level <= heading.level);
  const first = doc.lineAt(heading.at).number + 1;
  let last = next === undefined ? doc.lines : doc.lineAt(next.at).number - 1;
  // The blank lines before the next heading stay, as the white between two sections.
  while (last >= first && doc.line(last).text.trim() === "") last -= 1;
  return last < first ? null : { from: doc.line(first).from, to: doc.line(last).to };
}

/** What lies within some lines: the cells, and the numbers that are bound. */
export interface Held {
  readonly slots: readonly string[];
  readonly numbers: readonly NumberFace[];
}

export function heldIn(places: RangeSet<Place>, from: number, to: number): Held {
  const slots: string[] = [];
  const numbers: NumberFace[] = [];
  places.between(from, to, (_from, _to, { piece }) => {
    if (piece.piece === "cell") slots.push(piece.slot);
    else if (piece.piece === "set") {
      if (piece.content.content === "number") numbers.push(piece.content.number);
      else if ("numbers" in piece.content) numbers.push(...(piece.content.numbers ?? []));
    }
  });
  return { slots, numbers };
}

/** "Section 3, 2 figures, 1 table, 41 lines, † 1 out of date". */
export function heldWords(number: string, faces: readonly CellFace[], lines: number): string {
  const parts = faces.flatMap((face) => face.parts);
  const figures = parts.filter(({ part }) => part === "figure").length;
  const tables = parts.length - figures;
  const stale = faces.filter(({ state }) => state === "outOfDate" || state === "cancelled").length;
  const failed = faces.filter(({ state, finding }) => state === "failed" || finding?.isGrave === true).length;
  return [
    number === "" ? "This section" : `Section ${number}`,
    ...(figures === 0 ? [] : [counted(figures, "figure")]),
    ...(tables === 0 ? [] : [counted(tables, "table")]),
    counted(lines, "line"),
    ...(stale === 0 ? [] : [`† ${stale} out of date`]),
    ...(failed === 0 ? [] : [`‡ ${failed} to be mended`]),
  ].join(", ");
}

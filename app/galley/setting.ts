import type { FootnoteDefinition, RootContent } from "mdast";
import { type PaperNode, walk } from "../paper/index.ts";
import type { Note, SetPaper } from "../print/index.ts";

/** What every part of a galley needs: the paper as set, its macros, and the order of its footnotes. */
export interface Setting {
  readonly set: SetPaper;
  readonly macros: Readonly<Record<string, string>>;
  readonly footnotes: ReadonlyMap<string, NumberedFootnote>;
}

export interface NumberedFootnote {
  readonly number: number;
  readonly definition: FootnoteDefinition;
}

/** Footnotes are numbered by their first mark, through the whole paper. */
export function makeSetting(set: SetPaper): Setting {
  const definitions = new Map(
    set.paper.root.children.flatMap((node) =>
      node.type === "footnoteDefinition" ? [[node.identifier, node] as const] : [],
    ),
  );
  const footnotes = new Map<string, NumberedFootnote>();
  walk(set.paper.root.children, (node) => {
    const definition = node.type === "footnoteReference" ? definitions.get(node.identifier) : undefined;
    if (definition && !footnotes.has(definition.identifier))
      footnotes.set(definition.identifier, { number: footnotes.size + 1, definition });
  });
  return { set, macros: set.paper.front.macros, footnotes };
}

/** What stands at the foot of one galley: notes to what is out of date, and footnotes, marked in it. */
export interface Foot {
  readonly notes: readonly Note[];
  readonly footnotes: readonly NumberedFootnote[];
}

/** Each footnote stands at the foot of the galley that marks it first. */
export function footOf(nodes: readonly RootContent[], setting: Setting, seen: Set<string>): Foot {
  const notes: Note[] = [];
  const footnotes: NumberedFootnote[] = [];
  const first = (key: string) => !seen.has(key) && seen.add(key) !== undefined;
  walk(nodes, (node) => {
    for (const note of notesOf(node, setting)) if (first(note.mark)) notes.push(note);
    const footnote = node.type === "footnoteReference" ? setting.footnotes.get(node.identifier) : undefined;
    if (footnote && first(`footnote ${footnote.number}`)) footnotes.push(footnote);
  });
  return { notes, footnotes };
}

function notesOf(node: PaperNode, { set }: Setting): readonly Note[] {
  const numbers =
    node.type === "boundNumber"
      ? [node.number]
      : node.type === "inlineMath" || node.type === "math"
        ? (node.data?.numbers ?? []).map(({ number }) => number)
        : [];
  return numbers.flatMap((number) => set.number(number).note ?? []);
}

/** Where links lead: to what has a label, to a cited work, to a footnote. */
export const anchor = {
  label: (label: string) => `at-${encodeURIComponent(label)}`,
  work: (key: string) => `work-${encodeURIComponent(key)}`,
  footnote: (number: number) => `footnote-${number}`,
  note: (mark: string) => `note-${mark.length}`,
};

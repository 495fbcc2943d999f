import type { Range, Text } from "@codemirror/state";
import { Decoration } from "@codemirror/view";
import type { CellFace, Content, Piece } from "../model/types.ts";
import { CellWidget } from "./cell-widget.tsx";
import { wholeLines } from "./places.ts";
import { SPACE, type WidgetStore } from "./widgets.ts";
import { WorkingHead } from "./working-head.ts";

/** What decorating needs of the answer: the widgets kept from the one before, and the cells' faces. */
export interface Workshop {
  readonly store: WidgetStore;
  readonly faces: ReadonlyMap<string, CellFace>;
}

type Marks = Range<Decoration>[];
type PieceOf<Name extends Piece["piece"]> = Extract<Piece, { piece: Name }>;

/**
 * How a kind of piece is drawn while the caret is elsewhere (`closed`) and while it is in it (`opened`).
 * What `closed` gives with `piece` in its spec is taken away while the piece is open; the rest stays.
 */
interface Drawing<P extends Piece> {
  closed(piece: P, doc: Text, workshop: Workshop): Marks;
  opened(piece: P, from: number, to: number, doc: Text, workshop: Workshop): Marks;
}

/** Class of the blank line between two blocks. */
export const BLANK = "hl-blank";

const DRAWINGS: { readonly [Name in Piece["piece"]]: Drawing<PieceOf<Name>> } = {
  set: {
    closed(piece, doc, { store }) {
      const { from, to } = piece.block ? wholeLines(doc, piece.from, piece.to) : piece;
      if (from === to) return [];
      const widget = store.widget(piece.content, piece.block);
      const set = Decoration.replace({ widget, block: piece.block, piece, of: piece }).range(from, to);
      return piece.block ? [set] : [set, ...together(piece, doc)];
    },
    opened(piece, from, to, doc, { store }) {
      if (!piece.block) return from === to ? [] : [Decoration.mark({ class: "hl-source" }).range(from, to)];
      const preview = PREVIEWED.has(piece.content.content)
        ? [
            Decoration.widget({ widget: store.widget(piece.content, true), block: true, side: 1 }).range(
              doc.lineAt(to).to,
            ),
          ]
        : [];
      return [...lines(doc, from, to, "hl-source-line"), ...ownSize(doc, from, to), ...preview];
    },
  },
  dressed: {
    closed(piece, _doc, { store }) {
      const made: Marks = [];
      if (piece.inTo > piece.inFrom && piece.dress !== "") {
        made.push(dress(piece).range(piece.inFrom, piece.inTo));
      }
      if (piece.inFrom > piece.from) {
        const widget = piece.before === undefined ? undefined : store.widget(piece.before, false);
        made.push(Decoration.replace({ widget, piece, of: piece }).range(piece.from, piece.inFrom));
      }
      if (piece.to > piece.inTo) made.push(Decoration.replace({ piece, of: piece }).range(piece.inTo, piece.to));
      return made;
    },
    opened(piece, from, to) {
      const head = Math.min(piece.inFrom - piece.from, to - from);
      const tail = Math.min(piece.to - piece.inTo, to - from - head);
      const mark = Decoration.mark({ class: "hl-mark" });
      return [...(head > 0 ? [mark.range(from, from + head)] : []), ...(tail > 0 ? [mark.range(to - tail, to)] : [])];
    },
  },
  lines: {
    closed: (piece, doc) => lines(doc, piece.from, piece.to, piece.dress, piece),
    opened: () => [],
  },
  cell: {
    closed(piece, doc, { faces }) {
      const face = faces.get(piece.slot);
      if (face === undefined) return [];
      const { from, to } = wholeLines(doc, piece.from, piece.to);
      return [
        Decoration.replace({ widget: new CellWidget(face, false), block: true, piece, of: piece }).range(from, to),
      ];
    },
    opened(piece, from, to, doc, { faces }) {
      const face = faces.get(piece.slot);
      if (face === undefined) return [];
      const top = doc.lineAt(from).from;
      const plate = Decoration.widget({ widget: new CellWidget(face, true), block: true, side: -2 });
      const head = Decoration.widget({ widget: new WorkingHead(face.title, piece.slot), block: true, side: -1 });
      return [plate.range(top), head.range(top), ...working(doc, from, to)];
    },
  },
  join: {
    closed: (piece) => [Decoration.replace({ widget: SPACE, of: piece }).range(piece.from, piece.to)],
    opened: () => [],
  },
  blank: {
    closed: (piece, doc) => [Decoration.line({ class: BLANK, of: piece }).range(doc.lineAt(piece.from).from)],
    opened: () => [],
  },
  parameter: { closed: () => [], opened: () => [] },
};

/**
 * All that is drawn of pieces while the caret is outside of them. Each mark has `of` in its spec, the piece it belongs to.
 */
export function closedDecorations(pieces: readonly Piece[], doc: Text, workshop: Workshop): Marks {
  return pieces.flatMap((piece) =>
    piece.to > doc.length || piece.from > piece.to ? [] : drawing(piece).closed(piece, doc, workshop),
  );
}

/** What is drawn of a piece in which the caret is; from..to is where it stands now. */
export function openedDecorations(piece: Piece, from: number, to: number, doc: Text, workshop: Workshop): Marks {
  return drawing(piece).opened(piece, from, to, doc, workshop);
}

function drawing<P extends Piece>(piece: P): Drawing<P> {
  // Each name has the drawing of its own piece by the type of DRAWINGS; indexing by a union loses it.
  return DRAWINGS[piece.piece] as unknown as Drawing<P>;
}

function dress(piece: PieceOf<"dressed">): Decoration {
  return piece.url === undefined
    ? Decoration.mark({ class: piece.dress, of: piece })
    : Decoration.mark({ class: piece.dress, of: piece, attributes: { title: piece.url, "data-url": piece.url } });
}

/** No line ends between what is set and the bracket or stop beside it; browsers would break there. */
function together(piece: PieceOf<"set">, doc: Text): Marks {
  if (piece.to - piece.from > LONGEST_TOGETHER) return [];
  const before = OPENING.test(doc.sliceString(Math.max(0, piece.from - 1), piece.from)) ? 1 : 0;
  const after = CLOSING.test(doc.sliceString(piece.to, piece.to + 1)) ? 1 : 0;
  if (before + after === 0) return [];
  // Inclusive, so that the mark begins before what is set and not after it.
  return [
    Decoration.mark({ class: "hl-together", inclusive: true, of: piece }).range(piece.from - before, piece.to + after),
  ];
}

/** Length of source, in characters. What is longer may have to break within. */
const LONGEST_TOGETHER = 40;
const OPENING = /[([{“‘„«]/;
const CLOSING = /[.,;:!?)\]}’”»–-]/;

function lines(doc: Text, from: number, to: number, className: string, of?: Piece): Marks {
  const made: Marks = [];
  const mark = Decoration.line({ class: className, of });
  for (let at = doc.lineAt(from); ; at = doc.line(at.number + 1)) {
    made.push(mark.range(at.from));
    if (at.to >= to || at.number === doc.lines) return made;
  }
}

/**
 * Marks the text of lines that are smaller than the prose. The editor guesses how high the lines out of sight are from
 * one short line of plain text that it finds on the page, and must not find one of these.
 */
function ownSize(doc: Text, from: number, to: number): Marks {
  const made: Marks = [];
  const last = doc.lineAt(to).number;
  for (let number = doc.lineAt(from).number; number <= last; number += 1) {
    const line = doc.line(number);
    if (line.length > 0) made.push(OWN_SIZE.range(line.from, line.to));
  }
  return made;
}

const OWN_SIZE = Decoration.mark({ class: "hl-own-size" });

/** The lines of an open working, numbered from its first, without its fences' weight; kind, keys and remarks told apart. */
function working(doc: Text, from: number, to: number): Marks {
  const first = doc.lineAt(from).number;
  const last = doc.lineAt(to).number;
  const made: Marks = ownSize(doc, from, to);
  for (let number = first; number <= last; number += 1) {
    const line = doc.line(number);
    const place = number === first ? " hl-working-first" : number === last ? " hl-working-last" : "";
    made.push(
      Decoration.line({
        class: `hl-working${place}`,
        attributes: { "data-working-line": String(number - first + 1) },
      }).range(line.from),
    );
    for (const [expression, dressed] of number === first ? FENCE_WORDS : WORKING_WORDS) {
      const found = expression.exec(line.text);
      const word = found?.[1] ?? "";
      if (found === null || word === "") continue;
      const begin = line.from + found.index + found[0].length - word.length;
      made.push(dressed.range(begin, begin + word.length));
    }
  }
  return made;
}

const KIND = Decoration.mark({ class: "hl-kind" });
const KEY = Decoration.mark({ class: "hl-key" });
const REMARK = Decoration.mark({ class: "hl-comment" });
/** What is told apart in a working: the last group of each is the word. */
const FENCE_WORDS: readonly (readonly [RegExp, Decoration])[] = [[/^ {0,3}(?:`{3,}|~{3,})[ \t]*([\w-]+[^`]*)$/, KIND]];
const WORKING_WORDS: readonly (readonly [RegExp, Decoration])[] = [
  [/^[ \t]*(?:- )?([\w.\\]+)(?=:(?: |$))/, KEY],
  [/(?:^|[ \t])(#.*)$/, REMARK],
];

/** Contents that stay visible beneath their source while it is edited. */
const PREVIEWED: ReadonlySet<Content["content"]> = new Set(["display"]);

import type { CellView, Finding } from "../../cells/index.ts";
import type { LanguageWords, PaperNames } from "./knowledge.ts";

/**
 * What the page's worker makes of a paper for the sheet: everything that is typeset, by its place in the text.
 * Plain JSON (and typed arrays), so that it can be posted; nothing in it knows of the editor.
 *
 * Life: text ──worker: read, plan, evaluate──▶ SheetModel ──page: decorations──▶ sheet. An answer that is late is
 * moved through the changes made since (text/sheet-field.ts).
 */
export interface SheetModel {
  /** Counts the questions; an answer to an older one than the last applied is dropped. */
  readonly version: number;
  readonly front: FrontFace;
  readonly macros: Readonly<Record<string, string>>;
  /** Everything typeset, or what of it is new since an earlier answer. */
  readonly pieces: PieceDelta;
  readonly parameters: readonly ParameterFace[];
  readonly cells: readonly CellFace[];
  /** Views that changed since the last answer, by slot; null: nothing to show any more. */
  readonly views: Readonly<Record<string, ShownView | null>>;
  readonly problems: readonly ProblemFace[];
  readonly bibliography: readonly BibliographyFace[];
  /** Keys of results which the paper shows and the worker has not. */
  readonly wanted: readonly string[];
  /** What is out of date or failed, for the tail line and to walk through. */
  readonly errata: readonly Erratum[];
  /** What may be written: of the language, and of this paper. */
  readonly words: LanguageWords;
  readonly names: PaperNames;
  /** Set while parameters are tried privately. */
  readonly preview: boolean;
}

/**
 * The pieces in order of `from` (they may nest, as a heading holds math, but never cross), told as a change of those of
 * the answer `base` (0: of none): the first `head` and the last `tail` of them stay, `middle` comes between.
 */
export interface PieceDelta {
  readonly number: number;
  readonly base: number;
  readonly head: number;
  readonly tail: number;
  readonly middle: readonly Piece[];
  /** Where each of all the pieces begins now. */
  readonly starts: Int32Array;
}

/** Text set in line: what a caption, a title or an entry of the bibliography consists of. */
export type Run =
  | { readonly run: "text"; readonly text: string }
  /** `numbers`: those that are bound in it. */
  | { readonly run: "math"; readonly tex: string; readonly numbers?: readonly NumberFace[] }
  | { readonly run: "number"; readonly number: NumberFace }
  | { readonly run: "code"; readonly text: string }
  | { readonly run: "emphasis" | "strong" | "deleted"; readonly runs: readonly Run[] }
  | { readonly run: "link"; readonly url: string; readonly runs: readonly Run[] };

/** What is typeset in place of its source. */
export type Content =
  | { readonly content: "math"; readonly tex: string; readonly numbers?: readonly NumberFace[] }
  | {
      readonly content: "display";
      readonly tex: string;
      readonly number: string;
      readonly numbers?: readonly NumberFace[];
    }
  | { readonly content: "number"; readonly number: NumberFace }
  /** A reference or a citation. `amiss`: it leads nowhere. */
  | { readonly content: "pointer"; readonly text: string; readonly amiss: boolean }
  | { readonly content: "words"; readonly runs: readonly Run[]; readonly dress: string }
  | {
      readonly content: "grid";
      readonly head: readonly (readonly Run[])[];
      readonly rows: readonly (readonly Run[])[][];
      readonly align: readonly (string | null)[];
    }
  | { readonly content: "image"; readonly name: string; readonly caption: string }
  | { readonly content: "title"; readonly front: FrontFace };

export type Piece =
  /** Typeset in place of from..to; `block` takes whole lines. The source shows while the caret touches it. */
  | {
      readonly piece: "set";
      readonly from: number;
      readonly to: number;
      readonly block: boolean;
      readonly content: Content;
    }
  /** Source that stays, dressed by a class from inFrom to inTo, its marks hidden unless the caret touches from..to. */
  | {
      readonly piece: "dressed";
      readonly from: number;
      readonly to: number;
      readonly inFrom: number;
      readonly inTo: number;
      readonly dress: string;
      readonly url?: string;
      /** Set in place of the mark before the text: a section's number, an item's mark. */
      readonly before?: Content;
    }
  /** A class on every line from..to. */
  | { readonly piece: "lines"; readonly from: number; readonly to: number; readonly dress: string }
  | { readonly piece: "cell"; readonly from: number; readonly to: number; readonly slot: string }
  /** A line break within a paragraph, with the indentation after it; set as a space. */
  | { readonly piece: "join"; readonly from: number; readonly to: number }
  /** The blank line between two blocks, at its start. */
  | { readonly piece: "blank"; readonly from: number; readonly to: number }
  /** Not shown: where the rule edits a parameter. */
  | { readonly piece: "parameter"; readonly from: number; readonly to: number; readonly name: string };

export interface FrontFace {
  /** null: the paper has no front matter. */
  readonly from: number | null;
  readonly to: number;
  readonly title: readonly Run[];
  readonly authors: readonly { readonly name: string; readonly affiliation: string }[];
  readonly abstract: readonly Run[];
  readonly keywords: readonly string[];
}

export type NumberState = "current" | "outOfDate" | "stands" | "computing" | "waiting" | "failed" | "empty" | "preview";

export interface NumberFace {
  /** Supported digits; "" where there is no value. */
  readonly known: string;
  /** Digits which the error does not support: grey. */
  readonly unknown: string;
  readonly rest: string;
  /** As in the text. */
  readonly formula: string;
  /** How many digits the error supports; null: all of them, or it is no number. */
  readonly good: number | null;
  readonly state: NumberState;
  /** Slots of the cells it reads: their cords end at it. */
  readonly cells: readonly string[];
  /** Places in the rule of the parameters it reads itself: their strands end at it. */
  readonly reads: readonly number[];
  /** Places of its parameters in the rule: the colours of its underline. */
  readonly strands: readonly number[];
  /** "from Figure 1, hangs from mu and beta, current": what is said besides the digits. */
  readonly said: string;
}

export interface ParameterFace {
  readonly name: string;
  /** TeX */
  readonly symbol: string;
  /** As in the text. */
  readonly source: string;
  /** Its value as a double, or null when it has none. */
  readonly value: number | null;
  /** As shown on the rule. */
  readonly shown: string;
  /** A plain number in the text, so that it can be stepped and dragged. */
  readonly plain: boolean;
  readonly min: number | null;
  readonly max: number | null;
  readonly step: number | null;
  readonly unit: string;
  readonly note: string;
  /** Value with which something out of date was set, or null. */
  readonly was: number | null;
  readonly wasShown: string;
  readonly overridden: boolean;
  /** "Figure 1, Table 2 and 5 numbers hang from it". */
  readonly hangs: string;
}

export type CellStateName =
  | "current"
  | "outOfDate"
  | "stands"
  | "computing"
  | "waiting"
  | "failed"
  | "cancelled"
  | "empty"
  | "preview";

export interface CellFace {
  readonly id: string;
  readonly slot: string;
  readonly kind: string;
  readonly name: string | null;
  readonly from: number;
  readonly to: number;
  readonly line: number;
  /** "Figure 1", "Table 2"; for a cell that prints nothing its kind and name: "process larvae". */
  readonly title: string;
  /** What appears, each under its title; empty: nothing does. */
  readonly parts: readonly { readonly part: "figure" | "table" | "points"; readonly title: string }[];
  readonly caption: readonly Run[];
  readonly state: CellStateName;
  /** Sentences on the state, with math where a parameter is named; the design's words. */
  readonly words: readonly Run[];
  /** Method, parameters, solver, time, who and when; of the result that is shown. */
  readonly provenance: readonly Run[];
  /** What its result says of itself; `isGrave`: it needs attention, as a check that fails does. */
  readonly finding: Finding | null;
  readonly progress: { readonly done: number; readonly total: number } | null;
  readonly failureLine: number | null;
  /** How long the solver took the last time; null when not known. */
  readonly seconds: number | null;
  readonly hasResult: boolean;
  /** Could be computed: its working is sound. */
  readonly sound: boolean;
  /** Present key, to ask whether a result is kept under it. */
  readonly key: string | null;
  /** Places in the rule of the parameters it hangs from, in the order of the rule. */
  readonly strands: readonly number[];
  /** "hangs from mu and beta": what the strands show, for whoever listens; "" where it hangs from none. */
  readonly hangs: string;
  /** Those of them whose change has put it out of date. */
  readonly changed: readonly number[];
  /** For waiting: the cell it needs. */
  readonly needs: { readonly title: string; readonly slot: string } | null;
  /** Of the view to draw; equal signs, equal view. */
  readonly viewSign: string;
}

export interface ShownView {
  readonly sign: string;
  readonly view: CellView;
  /** Why there is nothing to draw although there is a result: the view could not be made. */
  readonly fault?: string;
}

export interface ProblemFace {
  readonly from: number;
  readonly to: number;
  readonly line: number;
  readonly severity: "error" | "warning";
  readonly message: string;
  readonly slot: string | null;
  readonly fix: { readonly label: string; readonly from: number; readonly to: number; readonly insert: string } | null;
}

export interface BibliographyFace {
  readonly key: string;
  readonly number: number;
  readonly runs: readonly Run[];
}

export interface Erratum {
  readonly from: number;
  readonly line: number;
  readonly mark: "†" | "‡";
  /** "Table 1", "a number" */
  readonly what: "cell" | "number" | "problem";
  readonly title: string;
}

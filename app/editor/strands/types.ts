import type { CellStateName, NumberFace, NumberState } from "../model/types.ts";

/**
 * What hangs where, and how it is drawn. Lengths are px of the column of text: x from its left edge, so that the margin
 * is negative, y from its top; what scrolls with the text keeps its numbers.
 *
 *     page ──measure──▶ Scene ──layout──▶ Picture ──▶ one drawing behind the text
 *
 * A *strand* is one parameter: it leaves its index on the rule, takes a lane and branches to each cell that hangs from
 * it. A *cord* is one result: its parameters' strands twisted together, from an open ring at its cell to a *tie* on each
 * line that quotes it.
 */
export interface Scene {
  readonly frame: Frame;
  /** What is drawn: the part of the column in view, with some room. */
  readonly top: number;
  readonly bottom: number;
  /** Where the view itself begins, or up to a step above: counts of bundles stand a step below it. */
  readonly stepTop: number;
  /** In the order of the rule. */
  readonly strands: readonly SceneStrand[];
  /** Cells that stand on the page, wherever they are. */
  readonly cells: readonly SceneCell[];
  /** Numbers that stand on the page. */
  readonly quotes: readonly SceneQuote[];
  readonly lit: Lit | null;
  readonly mode: StrandsMode;
  /** Lanes that cords had before, by slot: a cord stays in its lane while it is in view. */
  readonly lanes: ReadonlyMap<string, number>;
  /** Motion is not wanted: a cord whose cell is being computed does not twist. */
  readonly still: boolean;
}

export interface SceneStrand {
  readonly place: number;
  /** Something hangs from it further down than the page is drawn. */
  readonly below: boolean;
}

export interface SceneCell {
  readonly slot: string;
  readonly state: CellStateName;
  readonly strands: readonly number[];
  /** What is drawn entering it, where that is not `strands`: all that enters a folded section does so at its first cell. */
  readonly enters?: readonly number[];
  readonly changed: readonly number[];
  /** Share of the work that is done, from 0 to 1; null when there is none under way. */
  readonly done: number | null;
  /** Where it stands; null: not on the page, but quoted there. */
  readonly box: { readonly top: number; readonly bottom: number; readonly caption: number } | null;
  /** Its ring or one of its ties is further up, or down, than the page is drawn. */
  readonly above: boolean;
  readonly below: boolean;
  readonly quoted: boolean;
}

export interface SceneQuote {
  readonly id: string;
  /** Of the line under the number, and where the number begins. */
  readonly y: number;
  readonly left: number;
  readonly cells: readonly string[];
  readonly reads: readonly number[];
  readonly state: NumberState;
}

/** What is lit. `pointed`: by the pointer, or by the keys on the rule or a plate; everything else then stands back. */
export type Lit =
  | { readonly lit: "strand"; readonly place: number; readonly pointed: boolean }
  | { readonly lit: "cord"; readonly slot: string; readonly pointed: boolean }
  | { readonly lit: "number"; readonly id: string; readonly faces: readonly NumberFace[]; readonly pointed: boolean };

export type StrandsMode = "shown" | "lit" | "hidden";

/** The margin in which strands are drawn, by its width. */
export interface Frame {
  readonly size: "wide" | "middle" | "narrow";
  /** Where branches and ties end, before the text. */
  readonly edge: number;
  /** Lane of each parameter by its place; what is bundled shares the outermost one. */
  readonly strandLanes: readonly number[];
  /** Places that share the outermost lane; empty: none do. */
  readonly bundled: readonly number[];
  /** Outermost and innermost lanes of cords, and how far apart they stand at most. */
  readonly cordLanes: { readonly outer: number; readonly inner: number; readonly gap: number; readonly most: number };
  readonly letters: boolean;
  /** Left edge and width of the gloss, or null where there is no room for one. */
  readonly gloss: { readonly left: number; readonly width: number } | null;
}

export type Mark = "" | "†" | "‡";

/** A tie's or a branch's end. */
export interface End {
  /** Stays the same while it moves. */
  readonly id: string;
  readonly x: number;
  readonly y: number;
  readonly mark: Mark;
  readonly faint: boolean;
}

export interface StrandDrawing {
  readonly place: number;
  readonly lit: boolean;
  /** It is itself what is pointed out. */
  readonly meant: boolean;
  readonly solid: string;
  readonly dashed: string;
  readonly dots: readonly { readonly x: number; readonly y: number }[];
  readonly ties: readonly End[];
  readonly letters: readonly { readonly id: string; readonly x: number; readonly y: number; readonly small: boolean }[];
}

/** One strand of a cord: where it runs beneath the others, and where above them. */
export interface Ply {
  readonly id: string;
  /** Place of its parameter; null: the cord hangs from no parameter. */
  readonly place: number | null;
  readonly under: string;
  readonly over: string;
  readonly loose: string;
}

export interface CordDrawing {
  readonly slot: string;
  readonly lit: boolean;
  /** The middle of the cord, for its ground. */
  readonly course: string;
  readonly plies: readonly Ply[];
  /** How the loose part is drawn. */
  readonly loose: "none" | "dashed" | "solid" | "dotted";
  readonly ring: { readonly x: number; readonly y: number; readonly open: boolean } | null;
  readonly ties: readonly End[];
  /** Across the cord: how far the work is. */
  readonly bar: { readonly x: number; readonly y: number; readonly upright: boolean } | null;
  /** Two red bars: the cord is cut. */
  readonly cut: { readonly x: number; readonly y: number; readonly upright: boolean } | null;
}

/** Many unlit strands or cords as one. */
export interface BundleDrawing {
  readonly course: string;
  readonly rings: readonly { readonly id: string; readonly x: number; readonly y: number }[];
  readonly ties: readonly End[];
  readonly count: { readonly x: number; readonly y: number; readonly words: string };
}

export interface Picture {
  readonly frame: Frame;
  readonly top: number;
  readonly bottom: number;
  readonly strands: readonly StrandDrawing[];
  readonly strandBundle: BundleDrawing | null;
  readonly cords: readonly CordDrawing[];
  readonly cordBundle: BundleDrawing | null;
  /** Paths from ties to the number that is lit. */
  readonly hairlines: readonly string[];
  /** Where the gloss stands, and where the line from it to its cord ends; null: at the head of the margin. */
  readonly gloss: { readonly y: number; readonly to: number | null } | null;
  /** Everything unlit stands back. */
  readonly dim: boolean;
  /** Lowest place that each strand reaches, by its place; −∞: it reaches none. */
  readonly reach: readonly number[];
  readonly lanes: ReadonlyMap<string, number>;
}

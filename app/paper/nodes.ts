import type { Node, Parent, PhrasingContent, RootContent } from "mdast";
import type { Math as DisplayMath, InlineMath } from "mdast-util-math";
import type { BibliographyEntry, BoundNumber, Cell, Target } from "./types.ts";

/** Theorem-like surroundings, all counted together within a section; a proof is not counted. */
export type EnvironmentName =
  | "definition"
  | "assumption"
  | "theorem"
  | "lemma"
  | "proposition"
  | "corollary"
  | "conjecture"
  | "remark"
  | "example"
  | "proof";

/** A part of a cell that appears in the paper, with its number. */
export interface PrintedPart {
  readonly part: "figure" | "table" | "points";
  readonly noun: "Figure" | "Table";
  readonly number: string;
}

export interface CellNode extends Node {
  type: "cell";
  cell: Cell;
  /** What it prints, in the order of `show`; empty when it prints nothing. */
  parts: readonly PrintedPart[];
  /** The caption, read; empty when there is none. */
  caption: PhrasingContent[];
}

export interface EnvironmentNode extends Parent {
  type: "environment";
  environment: EnvironmentName;
  title: PhrasingContent[];
  label: string | null;
  /** "2.1"; null for a proof. */
  number: string | null;
  children: RootContent[];
}

/** `:ref[label]`; target is null when nothing printed has that label (there is a problem saying so). */
export interface ReferenceNode extends Node {
  type: "reference";
  label: string;
  target: Target | null;
}

/** `:cite[…]`; keys that the bibliography lacks have no entry. */
export interface CitationNode extends Node {
  type: "citation";
  keys: readonly string[];
  entries: readonly BibliographyEntry[];
  at: string | null;
  as: "number" | "text";
}

/** `:value[…]` in prose. */
export interface BoundNumberNode extends Node {
  type: "boundNumber";
  number: BoundNumber;
}

/** A number inside math; `from`..`to` are indices in the math node's `value`. */
export interface NumberInMath {
  readonly from: number;
  readonly to: number;
  readonly number: BoundNumber;
}

export type { DisplayMath, InlineMath };

declare module "mdast" {
  interface RootContentMap {
    cell: CellNode;
    environment: EnvironmentNode;
    reference: ReferenceNode;
    citation: CitationNode;
    boundNumber: BoundNumberNode;
  }
  interface BlockContentMap {
    cell: CellNode;
    environment: EnvironmentNode;
  }
  interface PhrasingContentMap {
    reference: ReferenceNode;
    citation: CitationNode;
    boundNumber: BoundNumberNode;
  }
  interface HeadingData {
    /** Label of `{#label}`, and the section's number ("2", "2.1"); null number: not numbered (not at the top level). */
    label?: string | null;
    number?: string | null;
  }
  interface ParagraphData {
    /** Goes on after a display without a blank line between: no new paragraph in print. */
    continues?: boolean;
  }
}

declare module "mdast-util-math" {
  interface MathData {
    numbers?: readonly NumberInMath[];
    /** Equation number and label of a display with `\label`; the label's text is left in `value` (see `mathTex`). */
    label?: string;
    number?: string;
  }
  interface InlineMathData {
    numbers?: readonly NumberInMath[];
  }
}

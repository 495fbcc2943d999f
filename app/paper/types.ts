import type { PhrasingContent, Root, RootContent } from "mdast";

/** Offsets in UTF-16 units of the paper's text; lines count from 1. */
export interface Span {
  readonly from: number;
  readonly to: number;
  readonly line: number;
  readonly lastLine: number;
}

/** Something wrong in the text, at its place, with the way out in `message`; `fix` may be accepted as it stands. */
export interface Problem {
  readonly from: number;
  readonly to: number;
  readonly line: number;
  readonly severity: "error" | "warning";
  readonly message: string;
  /** Offsets and line are the bibliography's, not the paper's text's. */
  readonly where?: "bibliography";
  /** The cell (by id) whose working this is about, if any. */
  readonly cell?: string;
  readonly fix?: { readonly label: string; readonly from: number; readonly to: number; readonly insert: string };
}

export interface Author {
  readonly name: string;
  readonly affiliation?: string;
  readonly email?: string;
  readonly orcid?: string;
}

export interface FrontMatter {
  readonly title: string;
  readonly authors: readonly Author[];
  readonly abstract: string;
  readonly keywords: readonly string[];
  readonly msc: readonly string[];
  readonly macros: Readonly<Record<string, string>>;
  readonly span: Span | null;
  /** Title and abstract read as Markdown: their math, references, citations and numbers are the paper's. */
  readonly titleNodes: readonly PhrasingContent[];
  readonly abstractNodes: readonly RootContent[];
}

/** A node of a cell's YAML body, read by the failsafe schema: every scalar is its source text. Offsets are the paper's. */
export type Yaml =
  | {
      readonly yaml: "scalar";
      readonly text: string;
      readonly quoted: boolean;
      readonly from: number;
      readonly to: number;
      readonly line: number;
    }
  | {
      readonly yaml: "list";
      readonly items: readonly Yaml[];
      readonly from: number;
      readonly to: number;
      readonly line: number;
    }
  | {
      readonly yaml: "map";
      readonly entries: readonly YamlEntry[];
      readonly from: number;
      readonly to: number;
      readonly line: number;
    };

export interface YamlEntry {
  readonly key: string;
  readonly keyFrom: number;
  readonly keyTo: number;
  readonly line: number;
  readonly value: Yaml;
}

/** A fenced block whose info string is a kind and a name, with its body read but not yet checked. */
export interface Cell {
  /** The name, or `kind@line` for an unnamed cell and for one whose name an earlier cell has. */
  readonly id: string;
  /** The name, or `kind#k` (k-th unnamed cell of its kind): stays while lines are inserted above. */
  readonly slot: string;
  readonly kind: string;
  readonly name: string | null;
  /** The whole block, fences included. */
  readonly span: Span;
  /** The body between the fences. */
  readonly bodyFrom: number;
  readonly bodyTo: number;
  /** null when the body could not be read; the reason is among the problems. */
  readonly body: Extract<Yaml, { yaml: "map" }> | null;
}

/** `:value[...]{...}` in prose or `\value[...]{...}` in math. */
export interface BoundNumber {
  readonly id: number;
  readonly span: Span;
  /** The formula, verbatim from the source, and where it stands. */
  readonly formula: string;
  readonly formulaFrom: number;
  readonly options: {
    readonly digits?: number;
    readonly decimals?: number;
    readonly as?: "plain" | "scientific" | "percent";
    readonly withError?: boolean;
    readonly withUnit?: boolean;
  };
  readonly inMath: boolean;
}

/** What a label names. `number` is as printed: "2.1", "(3)" without its brackets "3", "2" for Figure 2. */
export interface Target {
  readonly label: string;
  readonly noun:
    | "Section"
    | "equation"
    | "Figure"
    | "Table"
    | "Definition"
    | "Assumption"
    | "Theorem"
    | "Lemma"
    | "Proposition"
    | "Corollary"
    | "Conjecture"
    | "Remark"
    | "Example";
  readonly number: string;
  readonly span: Span;
}

export interface BibliographyEntry {
  readonly key: string;
  readonly type: string;
  /** Lower-case names; values in TeX as written, their pieces joined. */
  readonly fields: Readonly<Record<string, string>>;
  /** Where the entry stands in the bibliography. */
  readonly span: Span;
  /** Number in the printed list (cited entries, by first author's name then year), or null when not cited. */
  readonly number: number | null;
}

/**
 * A paper as read: everything the text says before anything is computed.
 * `root` is an mdast tree whose nodes carry positions, with these nodes of ours (see nodes.ts):
 * `cell`, `environment`, `reference`, `citation`, `boundNumber`, and mdast-util-math's `math` / `inlineMath`.
 */
export interface Paper {
  readonly text: string;
  readonly front: FrontMatter;
  readonly root: Root;
  readonly cells: readonly Cell[];
  readonly numbers: readonly BoundNumber[];
  readonly targets: ReadonlyMap<string, Target>;
  readonly bibliography: readonly BibliographyEntry[];
  readonly problems: readonly Problem[];
}

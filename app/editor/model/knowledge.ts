/**
 * What may be written in a paper, with a line on each: for suggestions, and for the gloss on what is under the caret.
 * The worker makes it from the definitions that check a paper (reading/knowledge.ts).
 */
export interface Knowledge {
  readonly words: LanguageWords;
  readonly names: PaperNames;
}

/** A word of the language or of the paper, and what it means. */
export interface Word {
  readonly name: string;
  readonly meaning: string;
}

/** What the language has for every paper alike. */
export interface LanguageWords {
  readonly kinds: readonly KindWords[];
  /** Keys that every kind has, or every kind with a figure. */
  readonly presentation: readonly (KeyWord & { readonly figuresOnly: boolean })[];
  readonly functions: readonly (Word & { readonly form: string })[];
  readonly numberAttributes: readonly { readonly form: string; readonly meaning: string }[];
  readonly environments: readonly Word[];
}

export interface KeyWord extends Word {
  readonly required: boolean;
  readonly fallback: string | null;
}

export interface KindWords extends Word {
  readonly label: string;
  /** The body's keys are names of the author's own; `keys` are those of the map that each may take. */
  readonly ownKeys: boolean;
  readonly keys: readonly KeyWord[];
  readonly parts: readonly string[];
  /** How the case sets a cell of the kind. */
  readonly offered: { readonly name: string; readonly line: string; readonly words: string; readonly body: string };
}

/** What one paper has named. */
export interface PaperNames {
  readonly parameters: readonly ParameterWord[];
  readonly cells: readonly CellWords[];
  readonly labels: readonly LabelWords[];
  readonly citations: readonly Word[];
}

export interface ParameterWord extends Word {
  /** TeX */
  readonly symbol: string;
}

export interface CellWords {
  readonly name: string;
  readonly kind: string;
  /** "Figure 2, counts" */
  readonly title: string;
  readonly values: readonly Word[];
  /** `member` is "" for the cell itself; `form`: "K(n)", "K.above(n)". */
  readonly callables: readonly { readonly member: string; readonly form: string; readonly meaning: string }[];
}

export interface LabelWords {
  readonly label: string;
  /** "Figure 2", "equation (3)": what a reference to it prints. */
  readonly text: string;
  /** Its caption, title or formula, with mathematics in dollars; "" where it has none. */
  readonly about: string;
}

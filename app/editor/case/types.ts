import type { Knowledge } from "../model/knowledge.ts";
import type { ValueNow } from "../model/messages.ts";
import type { CellFace, ParameterFace } from "../model/types.ts";

/** What the case knows of the paper when it is asked. */
export interface CaseKnowledge extends Knowledge {
  readonly parameters: readonly ParameterFace[];
  readonly cells: readonly Pick<CellFace, "name" | "kind" | "state" | "strands">[];
  /** What the paper's results are now, by formula. */
  readonly values: ReadonlyMap<string, ValueNow>;
  /** Every name written in a working, which a new cell or label must not take. */
  readonly taken: ReadonlySet<string>;
}

/** In the order in which they lie in the case, always. */
export const COMPARTMENTS = ["cells", "surroundings", "numbers", "parameters", "references", "citations"] as const;
export type CompartmentName = (typeof COMPARTMENTS)[number];

/** What is put into the text. `select`: the stretch of it that one will want to change first. */
export type Setting =
  /** Stands by itself, between blank lines. `outermost`: not within surroundings. */
  | { readonly set: "block"; readonly text: string; readonly select: Stretch; readonly outermost: boolean }
  /** A formula: quoted in a sentence and in mathematics, written as it is in a working. */
  | { readonly set: "number"; readonly formula: string; readonly select: Stretch | null }
  | { readonly set: "inline"; readonly text: string }
  /** A mark in the sentence, and the note's words below the paragraph. */
  | { readonly set: "footnote"; readonly label: string };

export interface Stretch {
  readonly from: number;
  readonly to: number;
}

/** One thing that can be set. */
export interface Offer {
  /** Unlike that of any other: "cell tail", "number K.s0". */
  readonly id: string;
  readonly compartment: CompartmentName;
  readonly title: string;
  /** A few words beside the title, with mathematics in dollars. */
  readonly line: string;
  /** All that is to be said of it, likewise. */
  readonly words: string;
  /** What it would be here: "of larvae", "K.mean against mu"; "" where there is nothing to say. */
  readonly here: string;
  /** Its present value, for numbers. */
  readonly value: ValueNow | null;
  readonly setting: Setting;
  /** How well it is what is asked for; 0: it is not. */
  readonly score: number;
}

export interface Compartment {
  readonly name: CompartmentName;
  readonly title: string;
  /** Of cells and surroundings all, in their places; of the rest those asked for. */
  readonly offers: readonly Offer[];
  /** How many more are asked for than `offers` has. */
  readonly more: number;
}

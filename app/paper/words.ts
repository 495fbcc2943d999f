import type { EnvironmentName } from "./nodes.ts";

/** A word of the language with its meaning, for completion and the guide. */
export interface PaperWord {
  readonly name: string;
  /** How it is written; `…` marks what is to be filled in. */
  readonly form: string;
  readonly meaning: string;
}

const environmentMeanings: Readonly<Record<EnvironmentName, string>> = {
  definition: "What a term means.",
  assumption: "What is taken for granted from here on.",
  theorem: "A main result.",
  lemma: "A result used to prove another.",
  proposition: "A result.",
  corollary: "What follows from a result.",
  conjecture: "What is believed and not proved.",
  remark: "An observation.",
  example: "A case worked out.",
  proof: "A proof, closed by its box; it has no number. In brackets: of what.",
};

/** The words of prose: surroundings, marks among words, entries of the front matter, attributes. */
export const PAPER_WORDS: {
  readonly environments: readonly PaperWord[];
  readonly directives: readonly PaperWord[];
  readonly frontMatter: readonly PaperWord[];
  readonly numberAttributes: readonly PaperWord[];
  readonly citationAttributes: readonly PaperWord[];
} = {
  environments: Object.entries(environmentMeanings).map(([name, meaning]) => ({
    name,
    form: name === "proof" ? ":::proof[of …]\n…\n:::" : `:::${name}[…]{#…}\n…\n:::`,
    meaning,
  })),
  directives: [
    {
      name: "value",
      form: ":value[…]",
      meaning: "A number computed from a formula, as K(3) or tail.s0; no one types it.",
    },
    { name: "ref", form: ":ref[…]", meaning: "A reference to a label: a section, equation, theorem, figure or table." },
    { name: "cite", form: ":cite[…]", meaning: "A citation by keys of the bibliography." },
  ],
  frontMatter: [
    { name: "title", form: "title: …", meaning: "The title, with math in dollars." },
    { name: "authors", form: "authors:\n  - name: …", meaning: "Each with name, affiliation, email, orcid." },
    { name: "abstract", form: "abstract: |\n  …", meaning: "The abstract; numbers in it may be bound." },
    { name: "keywords", form: "keywords: […]", meaning: "A list." },
    { name: "msc", form: "msc: […]", meaning: "Codes of the Mathematics Subject Classification." },
    { name: "macros", form: "macros:\n  \\E: \\mathbb{E}", meaning: "TeX macros for the page and for print alike." },
  ],
  numberAttributes: [
    {
      name: "digits",
      form: "digits=6",
      meaning: "Significant digits; those that the error does not support are not printed.",
    },
    { name: "decimals", form: "decimals=2", meaning: "Digits after the decimal point." },
    { name: "as", form: "as=scientific", meaning: "plain, scientific or percent." },
    { name: "with", form: "with=se", meaning: "The standard error in brackets: 11.4(3)." },
    { name: "unit", form: "unit=yes", meaning: "The unit of a parameter after the number." },
  ],
  citationAttributes: [
    { name: "at", form: 'at="…"', meaning: 'The place in the work: at="Theorem 1.2".' },
    { name: "as", form: "as=text", meaning: "“Kesten (1978)” in the sentence in place of a number in brackets." },
  ],
};

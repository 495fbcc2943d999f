import { type Asked, answers } from "./asked.ts";
import { chosen } from "./cell-offers.ts";
import { namesTaken, takeName } from "./names.ts";
import type { CaseKnowledge, Offer } from "./types.ts";

/** What stands around words: how it is written, with its label free and what one changes first between ‹ and ›. */
interface Surrounding {
  readonly name: string;
  readonly title: string;
  readonly words: string;
  readonly synonyms: string;
  readonly outermost: boolean;
  text(label: string): string;
}

const PROSE: readonly Surrounding[] = [
  {
    name: "section",
    title: "Section",
    words: "a numbered heading",
    synonyms: "heading chapter title",
    outermost: true,
    text: (label) => `## ‹Heading› {#${label}}`,
  },
  {
    name: "subsection",
    title: "Subsection",
    words: "a heading below it",
    synonyms: "heading",
    outermost: true,
    text: (label) => `### ‹Heading› {#${label}}`,
  },
  {
    name: "equation",
    title: "Equation",
    words: "displayed, numbered",
    synonyms: "display formula mathematics tex",
    outermost: false,
    text: (label) => `$$\n‹a = b› \\label{${label}}\n$$`,
  },
];

const ENVIRONMENT_WORDS: Readonly<Record<string, string>> = {
  definition: "what a word means",
  assumption: "what is taken for granted",
  theorem: "a main result",
  lemma: "a step on the way",
  proposition: "a result",
  corollary: "what follows",
  conjecture: "not proved yet",
  remark: "an aside",
  example: "a case of it",
  proof: "an argument",
};

/** Environments, sections, equations and footnotes. */
export function surroundingOffers(asked: Asked, knowledge: CaseKnowledge): Offer[] {
  const environments = knowledge.words.environments.map(
    ({ name }): Surrounding => ({
      name,
      title: name.charAt(0).toUpperCase() + name.slice(1),
      words: ENVIRONMENT_WORDS[name] ?? "numbered in its section",
      synonyms: name === "proof" ? "argument" : "statement environment surroundings",
      outermost: true,
      text: (label) =>
        name === "proof" ? ":::proof\n‹The argument.›\n:::" : `:::${name}[Title]{#${label}}\n‹The statement.›\n:::`,
    }),
  );
  const made = (some: readonly Surrounding[]) => some.map((one) => surroundingOffer(one, asked, knowledge));
  return [...made(PROSE), footnoteOffer(asked, knowledge), ...made(environments)];
}

const [TITLE, SYNONYM, MEANING] = [5, 3, 1];

function surroundingOffer(one: Surrounding, asked: Asked, knowledge: CaseKnowledge): Offer {
  const { text, select } = chosen(one.text(takeName(one.name, namesTaken(knowledge))));
  return {
    id: `surroundings ${one.name}`,
    compartment: "surroundings",
    title: one.title,
    line: one.words,
    words: one.words,
    here: "",
    value: null,
    setting: { set: "block", text, select, outermost: one.outermost },
    score: answers(asked, [
      { words: one.title, weight: TITLE },
      { words: one.synonyms, weight: SYNONYM },
      { words: one.words, weight: MEANING },
    ]),
  };
}

function footnoteOffer(asked: Asked, knowledge: CaseKnowledge): Offer {
  return {
    id: "surroundings footnote",
    compartment: "surroundings",
    title: "Footnote",
    line: "words below",
    words: "a mark here, its words below the paragraph",
    here: "",
    value: null,
    setting: { set: "footnote", label: takeName("note", namesTaken(knowledge)) },
    score: answers(asked, [
      { words: "footnote", weight: TITLE },
      { words: "note remark", weight: SYNONYM },
    ]),
  };
}

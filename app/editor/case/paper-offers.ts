import type { CellWords } from "../model/knowledge.ts";
import { type Asked, answers } from "./asked.ts";
import { PREFERRED } from "./measured.ts";
import type { CaseKnowledge, Offer } from "./types.ts";

const [NAME, NEAR, FAR, SORT] = [5, 2, 1, 0.5];

/** Arguments by the letters of the definitions; what one will want to change. */
const ARGUMENTS: Readonly<Record<string, string>> = { n: "3", p: "0.5", s: "0.5" };

/** A call of each callable, at a first argument: "K(3)". */
export function callsOf(cell: CellWords): { readonly formula: string; readonly meaning: string }[] {
  return cell.callables.map(({ form, meaning }) => {
    const [, head = "", args = ""] = /^([\w.]+)\(([^)]*)\)$/.exec(form) ?? [];
    const first = args.split(",").map((name) => ARGUMENTS[name.trim()] ?? "1");
    return { formula: `${head}(${first.join(", ")})`, meaning };
  });
}

/** What the case wants to know the present value of. */
export function formulasOf({ names }: Pick<CaseKnowledge, "names">): string[] {
  return [
    ...names.parameters.map(({ name }) => name),
    ...names.cells.flatMap((cell) => [
      ...cell.values.map(({ name }) => `${cell.name}.${name}`),
      ...callsOf(cell).map(({ formula }) => formula),
    ]),
  ];
}

/** Numbers of the paper's results with their present values; first what is itself a formula. */
export function numberOffers(asked: Asked, knowledge: CaseKnowledge): Offer[] {
  const typed = knowledge.values.get(asked.all);
  const known = new Set(formulasOf(knowledge));
  const own = typed !== undefined && typed.reason === "" && !known.has(asked.all) ? [typedOffer(asked, knowledge)] : [];
  return [
    ...own,
    ...knowledge.names.cells.flatMap((cell) => [
      ...cell.values.map(({ name, meaning }) => numberOffer(`${cell.name}.${name}`, meaning, cell, asked, knowledge)),
      ...callsOf(cell).map(({ formula, meaning }) => numberOffer(formula, meaning, cell, asked, knowledge)),
    ]),
  ];
}

function typedOffer({ all }: Asked, knowledge: CaseKnowledge): Offer {
  return {
    id: `number ${all}`,
    compartment: "numbers",
    title: all,
    line: "what you wrote, as a formula",
    words: "what you wrote, as a formula",
    here: "",
    value: knowledge.values.get(all) ?? null,
    setting: { set: "number", formula: all, select: null },
    score: 2 * NAME,
  };
}

function numberOffer(
  formula: string,
  meaning: string,
  cell: CellWords,
  asked: Asked,
  { values }: CaseKnowledge,
): Offer {
  const isPreferred = PREFERRED.includes(formula.slice(cell.name.length + 1));
  const open = formula.indexOf("(");
  const head = open < 0 ? formula : formula.slice(0, open);
  return {
    id: `number ${formula}`,
    compartment: "numbers",
    title: formula,
    line: cell.title,
    words: `${meaning}; ${cell.title}`,
    here: "",
    value: values.get(formula) ?? null,
    setting: {
      set: "number",
      formula,
      select: open < 0 ? null : { from: open + 1, to: formula.length - 1 },
    },
    score:
      (asked.words.length === 0 && isPreferred ? FAR : 0) +
      answers(asked, [
        { words: head, weight: NAME },
        { words: head.replaceAll(".", " "), weight: NAME - 1 },
        { words: cell.title, weight: NEAR },
        { words: meaning, weight: FAR },
        { words: "number value quote", weight: SORT },
      ]),
  };
}

export function parameterOffers(asked: Asked, { names, values }: CaseKnowledge): Offer[] {
  return names.parameters.map(({ name, meaning }) => ({
    id: `parameter ${name}`,
    compartment: "parameters",
    title: name,
    line: meaning,
    words: meaning,
    here: "",
    value: values.get(name) ?? null,
    setting: { set: "number", formula: name, select: null },
    score: answers(asked, [
      { words: name, weight: NAME },
      { words: meaning, weight: NEAR },
      { words: "parameter number value", weight: SORT },
    ]),
  }));
}

export function referenceOffers(asked: Asked, { names }: CaseKnowledge): Offer[] {
  return names.labels.map(({ label, text, about }) => ({
    id: `reference ${label}`,
    compartment: "references",
    title: text,
    line: about,
    words: about,
    here: label,
    value: null,
    setting: { set: "inline", text: `:ref[${label}]` },
    score: answers(asked, [
      { words: label, weight: NAME - 1 },
      { words: text, weight: NAME - 1 },
      { words: about, weight: FAR },
      { words: "reference refer see", weight: SORT },
    ]),
  }));
}

export function citationOffers(asked: Asked, { names }: CaseKnowledge): Offer[] {
  return names.citations.map(({ name, meaning }) => ({
    id: `citation ${name}`,
    compartment: "citations",
    title: name,
    line: meaning,
    words: meaning,
    here: "",
    value: null,
    setting: { set: "inline", text: `:cite[${name}]` },
    score: answers(asked, [
      { words: name, weight: NAME },
      { words: meaning, weight: NEAR },
      { words: "citation cite bibliography", weight: SORT },
    ]),
  }));
}

import { captionOf, KINDS, type Plan, type PlannedCell, PRESENTATION_KEYS } from "../../cells/index.ts";
import { FUNCTIONS, printExact, toDouble } from "../../formulas/index.ts";
import {
  bibliographyItem,
  ENVIRONMENTS,
  NUMBER_ATTRIBUTES,
  type Paper,
  referenceText,
  type Target,
} from "../../paper/index.ts";
import type { CellWords, LabelWords, LanguageWords, PaperNames, Word } from "../model/knowledge.ts";
import { isPlainNumber, shownValue } from "../model/scale.ts";

/** What the language has, from the definitions that check a paper. */
export const LANGUAGE_WORDS: LanguageWords = {
  kinds: [...KINDS.values()].map(({ documentation: { name, label, summary, ownKeys, keys, parts, offered } }) => ({
    name,
    label,
    meaning: summary,
    ownKeys,
    keys,
    parts,
    offered,
  })),
  presentation: PRESENTATION_KEYS,
  functions: FUNCTIONS.map(({ name, form, meaning }) => ({ name, form, meaning })),
  numberAttributes: NUMBER_ATTRIBUTES,
  environments: Object.entries(ENVIRONMENTS).map(([name, noun]) => ({
    name,
    meaning: noun === "Proof" ? "an argument, closed by its sign; it has no number" : `numbered as ${noun} 2.1`,
  })),
};

/** Longest extract of what a label is about, in characters. */
const LONGEST_ABOUT = 160;

/** While a parameter is tried, and when results come in, the plan of the text stays and its names with it. */
const kept = new WeakMap<Plan, PaperNames>();

/** What a paper has named, with titles of its cells by id. */
export function namesOf(paper: Paper, plan: Plan, titles: ReadonlyMap<string, string>): PaperNames {
  const known = kept.get(plan) ?? readNames(paper, plan, titles);
  kept.set(plan, known);
  return known;
}

function readNames(paper: Paper, plan: Plan, titles: ReadonlyMap<string, string>): PaperNames {
  return {
    parameters: plan.parameters.map((parameter) => ({
      name: parameter.name,
      symbol: parameter.symbol,
      meaning: parameterMeaning(parameter),
    })),
    cells: plan.cells.flatMap((planned) => {
      const { name } = planned.cell;
      return name === null || planned.kind === "parameters" ? [] : [cellWords(name, planned, titles)];
    }),
    labels: [...paper.targets.values()].map((target) => labelWords(target, paper, plan)),
    citations: paper.bibliography.map((entry) => ({
      name: entry.key,
      meaning: bibliographyItem(entry)
        .map(({ text }) => text)
        .join(""),
    })),
  };
}

/** "parameter, sqrt(2*beta) = 1.41421 per day; drift; from 1.45 to 4 in steps of 0.05": value, unit, note and range. */
function parameterMeaning({ source, value, min, max, step, unit, note }: Plan["parameters"][number]): string {
  const number = value.type === "number" ? shownValue(toDouble(value.quantity), source, null) : "no value";
  const stands = isPlainNumber(source) ? source : `${source} = ${number}`;
  const range = [
    ...(min === null ? [] : [`from ${printExact(min)}`]),
    ...(max === null ? [] : [`${min === null ? "up " : ""}to ${printExact(max)}`]),
    ...(step === null ? [] : [`in steps of ${printExact(step)}`]),
  ].join(" ");
  const measured = unit === "" ? stands : `${stands} ${unit}`;
  return [`parameter, ${measured}`, note, range].filter((part) => part !== "").join("; ");
}

function cellWords(name: string, planned: PlannedCell, titles: ReadonlyMap<string, string>): CellWords {
  const kind = KINDS.get(planned.kind);
  const title = titles.get(planned.id) ?? planned.kind;
  const documented = kind?.documentation;
  const known = new Map<string, string>(documented?.values.map((value) => [value.name, value.meaning]) ?? []);
  // What a body itself names (columns, records, keys of a formula cell) is known when it was read without a fault.
  const members =
    kind === undefined || planned.task === null
      ? { values: documented?.values.map((value) => value.name) ?? [], callables: [] }
      : kind.members(planned.task.model);
  const callables = documented?.callables ?? [];
  const own = members.callables.filter(({ member }) => !callables.some((each) => each.member === member));
  const template = callables.find(({ member }) => member === "NAME");
  return {
    name,
    kind: planned.kind,
    title: title.includes(name) ? title : `${title}, ${planned.kind.replace("_", " ")}`,
    values: members.values.map(
      (value): Word => ({ name: value, meaning: known.get(value) ?? `named in the working of ${name}` }),
    ),
    callables: [
      ...callables.filter(({ member }) => member !== "NAME"),
      ...own.map(({ member, least }) => ({
        member,
        args: template?.args.slice(0, Math.max(1, least)) ?? ["x"],
        meaning: template?.meaning.replaceAll("NAME", member) ?? `named in the working of ${name}`,
      })),
    ].map(({ member, args, meaning }) => ({
      member,
      form: `${name}${member === "" ? "" : `.${member}`}(${args.join(", ")})`,
      meaning,
    })),
  };
}

function labelWords(target: Target, paper: Paper, plan: Plan): LabelWords {
  const cell = plan.cells.find(({ cell }) => cell.name === target.label);
  const about = cell === undefined ? sourceOf(target, paper.text) : (captionOf(cell)?.text ?? "");
  const line = about.replace(/\s+/g, " ").trim();
  return {
    label: target.label,
    text: referenceText(target),
    about: line.length > LONGEST_ABOUT ? `${line.slice(0, LONGEST_ABOUT).replace(/\$[^$]*$/, dropOpenDollar)}…` : line,
  };
}

/** A section's heading, a theorem's title or first words, a displayed formula in line. */
function sourceOf({ noun, span }: Target, text: string): string {
  const source = text.slice(span.from, Math.min(span.to, span.from + 600));
  if (noun === "Section") return source.replace(/^#+\s*/, "").replace(/\s*\{#[^}]*\}\s*$/, "");
  if (noun === "equation")
    return `$${source
      .replaceAll("$$", "")
      .replace(/\\label\{[^}]*\}/, "")
      .trim()}$`;
  const [opening = "", ...rest] = source.split("\n");
  const title = /\[(.*)\]/.exec(opening)?.[1];
  return title ?? rest.join(" ").replace(/:::+\s*$/, "");
}

/** A dollar that the cut has left open would set the rest as mathematics. */
function dropOpenDollar(tail: string, at: number, whole: string): string {
  return (whole.slice(0, at).split("$").length - 1) % 2 === 0 ? "" : tail;
}

import type { Paper, Yaml } from "../../paper/index.ts";
import { walk } from "../../paper/index.ts";
import type { Body } from "../body.ts";
import type { Declarations } from "../declared.ts";
import { declareNames } from "../declared.ts";
import type { Draft } from "../drafts.ts";
import { readDrafts } from "../drafts.ts";
import { type Meant, namesInFormula } from "./in-formula.ts";

/** What a name of a paper is the name of. */
export type Named = "parameter" | "cell" | "label";

/** A paper with its names, for looking where they are used. */
export interface NamedPaper {
  readonly paper: Paper;
  readonly drafts: readonly Draft[];
  readonly names: Declarations;
}

export function namesOfPaper(paper: Paper): NamedPaper {
  const drafts = readDrafts(paper);
  return { paper, drafts, names: declareNames(drafts) };
}

/** What a name is the name of; null: nothing in this paper has it. */
export function whatIsNamed({ paper, names }: NamedPaper, name: string): Named | null {
  if (names.parameters.has(name)) return "parameter";
  if (names.cells.has(name)) return "cell";
  return paper.targets.has(name) ? "label" : null;
}

/**
 * Every place of the text where a name stands that means this parameter, cell or label: where it is given, in formulas,
 * in numbers of sentences, mathematics and captions, in references, in keys that name it. In rising order.
 */
export function usesOf(named: NamedPaper, name: string): readonly number[] {
  const what = whatIsNamed(named, name);
  if (what === null) return [];
  const found = new Set<number>(referencesTo(named.paper, name));
  if (what === "label") found.add(labelAt(named.paper, name));
  else {
    const meant: Meant = { name, isParameter: what === "parameter", owners: ownersOf(named, name) };
    for (const draft of named.drafts) for (const at of usesInCell(named.paper, draft, meant)) found.add(at);
    for (const number of named.paper.numbers)
      for (const at of namesInFormula(number.formula, meant)) found.add(number.formulaFrom + at);
  }
  // A place that a reader could not tell exactly, as in a quoted scalar, does not hold the name.
  return [...found].filter((at) => at >= 0 && named.paper.text.startsWith(name, at)).sort((a, b) => a - b);
}

/** Cells that declare a parameter or vary it: their values of its name are the parameter's. */
function ownersOf({ drafts, names }: NamedPaper, name: string): ReadonlySet<string> {
  const declaring = names.declared.get(name)?.draft;
  return new Set(
    drafts.flatMap((draft) => {
      const varies = draft.body?.introduced.some((each) => each.varies && each.name === name) === true;
      return draft.cell.name !== null && (varies || draft === declaring) ? [draft.cell.name] : [];
    }),
  );
}

function usesInCell(paper: Paper, draft: Draft, meant: Meant): number[] {
  const { cell, kind } = draft;
  const found: number[] = [];
  if (!meant.isParameter && cell.name === meant.name) found.push(givenAt(paper.text, cell.span.from, cell.name));
  for (const body of [draft.body, draft.looks]) {
    if (body === null) continue;
    for (const { name, varies, from } of body.introduced) {
      const gives = kind?.knownAtPlanning === true || varies;
      if (meant.isParameter && gives && name === meant.name) found.push(scalarFrom(paper.text, from, name));
    }
    for (const { id, node } of body.references)
      if (!meant.isParameter && id === meant.name) found.push(scalarFrom(paper.text, node.from, id));
    found.push(...usesInFormulas(paper.text, body, meant));
  }
  if (cell.body !== null) {
    found.push(...usesInWords(paper.text, cell.body, meant));
    if (!meant.isParameter) found.push(...labelsOfPanels(cell.body, meant.name));
  }
  return found;
}

function usesInFormulas(text: string, body: Body, meant: Meant): number[] {
  return body.formulas.flatMap(({ base, from, to }) => {
    if (base === null) return inOpaque(text, from, to, meant);
    // From a formula's first sign to the end of its scalar: an interval's ends are formulas of their own.
    const source = text.slice(base, to).replace(/["']\s*$/, "");
    const [first, second] = source.split(/\s+to\s+/);
    if (first === undefined || second === undefined) return namesInFormula(source, meant).map((at) => base + at);
    const secondAt = base + source.length - second.length;
    return [
      ...namesInFormula(first, meant).map((at) => base + at),
      ...namesInFormula(second, meant).map((at) => secondAt + at),
    ];
  });
}

/** In a scalar whose signs YAML folded or unquoted: every word of that name that is no value of something else. */
function inOpaque(text: string, from: number, to: number, { name }: Meant): number[] {
  const words = new RegExp(`(?<![\\w.\\\\])${name}(?!\\w)`, "g");
  return [...text.slice(from, to).matchAll(words)].map(({ index }) => from + index);
}

/** Numbers and references in heads and labels, which are read when they are set. */
function usesInWords(text: string, node: Yaml, meant: Meant): number[] {
  if (node.yaml === "map") return node.entries.flatMap(({ value }) => usesInWords(text, value, meant));
  if (node.yaml === "list") return node.items.flatMap((item) => usesInWords(text, item, meant));
  const source = text.slice(node.from, node.to);
  return [...source.matchAll(/(?::value\[([^\]]*)\]|\\value(?:\[[^\]]*\])?\{([^}]*)\})/g)].flatMap((match) => {
    const formula = match[1] ?? match[2] ?? "";
    const base = node.from + match.index + match[0].lastIndexOf(formula);
    return namesInFormula(formula, meant).map((at) => base + at);
  });
}

/** `labels` names a figure's panels by their cells. */
function labelsOfPanels(body: Extract<Yaml, { yaml: "map" }>, name: string): number[] {
  const value = (key: string) => body.entries.find((entry) => entry.key === key)?.value;
  const [panels, labels] = [value("panels"), value("labels")];
  if (panels?.yaml !== "list" || labels?.yaml !== "map") return [];
  const isPanel = panels.items.some((item) => item.yaml === "scalar" && item.text === name);
  return isPanel ? labels.entries.flatMap(({ key, keyFrom }) => (key === name ? [keyFrom] : [])) : [];
}

/** Past a quotation mark. */
function scalarFrom(text: string, from: number, name: string): number {
  return text.startsWith(name, from) ? from : from + 1;
}

/** A cell's name in its opening fence. */
function givenAt(text: string, from: number, name: string): number {
  const opening = /^[^\n]*/.exec(text.slice(from))?.[0] ?? "";
  const found = /^\s*[`~]+\s*\S+\s+/.exec(opening)?.[0];
  return found === undefined || !opening.startsWith(name, found.length) ? -1 : from + found.length;
}

function referencesTo(paper: Paper, name: string): number[] {
  const found: number[] = [];
  walk([...paper.front.titleNodes, ...paper.front.abstractNodes, ...paper.root.children], (node) => {
    if (node.type !== "reference" || node.label !== name) return;
    const from = node.position?.start.offset ?? -1;
    const at = paper.text.indexOf(name, from);
    if (from >= 0 && at >= 0 && /^:ref\[\s*$/.test(paper.text.slice(from, at))) found.push(at);
  });
  return found;
}

/** Where a label is given: `{#label}` of a heading or an environment, `\label{…}` of a display. */
function labelAt(paper: Paper, name: string): number {
  const target = paper.targets.get(name);
  if (target === undefined) return -1;
  const source = paper.text.slice(target.span.from, target.span.to);
  const escaped = name.replace(/[.*+?^${}()|[\]\\]/g, "\\$&");
  const given =
    target.noun === "equation"
      ? new RegExp(`\\\\label\\s*\\{\\s*(?=${escaped}\\s*\\})`)
      : new RegExp(`\\{[^{}\\n]*#(?=${escaped}[\\s}])`);
  const found = given.exec(source);
  return found === null ? -1 : target.span.from + found.index + found[0].length;
}

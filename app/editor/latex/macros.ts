import { LABEL_FORM } from "./displays.ts";
import {
  argumentsOf,
  CITING,
  closingPlace,
  endOf,
  type LatexArgument,
  type LatexMacro,
  type LatexNode,
  plainWords,
  REFERRING,
  startOf,
} from "./nodes.ts";
import type { Gathered, Stretch } from "./writer.ts";

/** Nouns that a reference of a paper writes by itself. */
const NOUNS =
  /(?:\b(?:Theorem|Lemma|Proposition|Corollary|Definition|Conjecture|Assumption|Remark|Example|Section|Figure|Table|Equation|Thm|Prop|Sec|Fig|Eq)s?|\b(?:Lemmata|Corollaries|equations?|eqs?|section|figure|table|theorem|lemma)|§)\.?(?:~|\s)*$/;

/**
 * Writes what a macro becomes.
 * @returns how many of the nodes after it were used up with it; null where it is not sure what it would be
 */
export function macroText(
  macro: LatexMacro,
  next: LatexNode | undefined,
  out: Stretch,
  gathered: Gathered,
): number | null {
  const name = macro.content;
  if (name in SECTIONS) return section(macro, next, out, gathered);
  if (name in EMPHASES) return emphasis(macro, out, gathered);
  if (CITING.includes(name)) return citation(macro, out, gathered);
  if (REFERRING.includes(name)) return reference(macro, out, gathered);
  if (name === "footnote") return footnote(macro, out, gathered);
  if (name === "texttt") return code(macro, out, gathered);
  return null;
}

const SECTIONS: Readonly<Record<string, string>> = { section: "##", subsection: "###", subsubsection: "####" };
const EMPHASES: Readonly<Record<string, string>> = { emph: "*", textit: "*", textbf: "**" };

function section(macro: LatexMacro, next: LatexNode | undefined, out: Stretch, gathered: Gathered): number | null {
  const title = argumentsOf(macro).required.at(-1);
  if (title === undefined) return null;
  const label = next?.type === "macro" && next.content === "label" ? labelOf(next) : null;
  const words = writtenArgument(title, gathered).replace(/\s*\n\s*/g, " ");
  gathered.count("section");
  out.addBlock(`${SECTIONS[macro.content]} ${words}${label === null ? "" : ` {#${label}}`}`);
  return label === null ? 0 : 1;
}

function emphasis(macro: LatexMacro, out: Stretch, gathered: Gathered): number | null {
  const [words] = argumentsOf(macro).required;
  if (words === undefined) return null;
  const mark = EMPHASES[macro.content] ?? "*";
  const text = writtenArgument(words, gathered);
  if (text === "" || text.includes("\n\n")) return null;
  gathered.count("emphasis");
  out.add(`${mark}${text}${mark}`);
  return 0;
}

function citation(macro: LatexMacro, out: Stretch, gathered: Gathered): number | null {
  const { optional, required } = argumentsOf(macro);
  const keys = plainWords(required[0]?.content ?? []);
  if (keys === null || keys === "" || /[\]\s]{2}|\]/.test(keys) || optional.length > 1) return null;
  const [at] = optional;
  const place = at === undefined ? "" : plainWords(at.content)?.replaceAll("~", " ");
  if (place === undefined || /["{}\n]/.test(place)) return null;
  const attributes = [
    ...(place === "" ? [] : [`at="${place}"`]),
    ...(macro.content === "citet" || macro.content === "textcite" ? ["as=text"] : []),
  ];
  gathered.count("citation");
  const list = keys
    .split(",")
    .map((key) => key.trim())
    .join(", ");
  out.add(`:cite[${list}]${attributes.length === 0 ? "" : `{${attributes.join(" ")}}`}`);
  return 0;
}

function reference(macro: LatexMacro, out: Stretch, gathered: Gathered): number | null {
  const keys = plainWords(argumentsOf(macro).required[0]?.content ?? []);
  if (keys === null || !LABEL_FORM.test(keys)) return null;
  out.dropEnd(NOUNS);
  gathered.count("reference");
  out.add(`:ref[${keys}]`);
  return 0;
}

function footnote(macro: LatexMacro, out: Stretch, gathered: Gathered): number | null {
  const { optional, required } = argumentsOf(macro);
  const [words] = required;
  if (words === undefined || optional.length > 0) return null;
  const name = gathered.footnoteName();
  const text = writtenArgument(words, gathered);
  if (text.includes("\n\n")) return null;
  gathered.footnotes.push(`[^${name}]: ${text.replace(/\s*\n\s*/g, " ")}`);
  gathered.count("footnote");
  out.add(`[^${name}]`);
  return 0;
}

function code(macro: LatexMacro, out: Stretch, gathered: Gathered): number | null {
  const words = plainWords(argumentsOf(macro).required[0]?.content ?? []);
  if (words === null || words === "" || words.includes("`")) return null;
  gathered.count("emphasis");
  out.add(`\`${words}\``);
  return 0;
}

/** The label that a macro gives, where a paper may have it. */
export function labelOf(macro: LatexMacro): string | null {
  const label = plainWords(argumentsOf(macro).required[0]?.content ?? []);
  return label !== null && LABEL_FORM.test(label) ? label : null;
}

/** What stands in an argument, as text of a paper. */
export function writtenArgument(argument: LatexArgument, gathered: Gathered): string {
  const last = argument.content.findLast((node) => node.position !== undefined);
  if (last === undefined) return "";
  const from = last.type === "macro" ? startOf(last) : endOf(last);
  return gathered.write(argument.content, closingPlace(gathered.source, from, argument.closeMark));
}

import { RESERVED_NAMES } from "../../formulas/index.ts";
import type { Paper } from "../../paper/index.ts";
import { readPaper } from "../../paper/index.ts";
import { isName } from "../names.ts";
import { planPaper } from "../plan.ts";
import { edited, type TextEdit } from "../text-edits.ts";
import { type Named, namesOfPaper, usesOf, whatIsNamed } from "./uses.ts";

/** A name of a paper changed everywhere it is used. */
export interface Renaming {
  readonly what: Named;
  /** In rising order; to be made as one. */
  readonly edits: readonly TextEdit[];
}

export interface NoRenaming {
  readonly problem: string;
}

/**
 * The edits that give a parameter, a cell or a label another name, wherever it is used. The paper is read and planned
 * again with them: a new name that a dummy, a column or a sum already has, or a use that they would miss, is a problem,
 * and then nothing is to be changed.
 * @param bibliography the paper's BibTeX, to read the paper again
 */
export function renames(paper: Paper, bibliography: string, from: string, to: string): Renaming | NoRenaming {
  const named = namesOfPaper(paper);
  const what = whatIsNamed(named, from);
  if (what === null) return { problem: `Nothing in this paper is named ${from || "so"}.` };
  if (to === from) return { problem: "That is its name already." };
  const unfit = unfitName(what, to);
  if (unfit !== "") return { problem: unfit };
  const taken = whatIsNamed(named, to);
  if (taken !== null) return { problem: `${to} is the name of a ${taken} already; another name would do.` };
  const uses = usesOf(named, from);
  const edits = uses.map((at) => ({ from: at, to: at + from.length, insert: to }));
  return whatWouldBreak(paper, bibliography, { what, edits }, from, to) ?? { what, edits };
}

/** The parameter, cell or label whose name stands at a place of the text; null: none does. */
export function nameAt(paper: Paper, place: number): string | null {
  const line = /[A-Za-z][\w:.-]*/g;
  const before = paper.text.lastIndexOf("\n", place - 1) + 1;
  const end = paper.text.indexOf("\n", place);
  const named = namesOfPaper(paper);
  for (const match of paper.text.slice(before, end < 0 ? undefined : end).matchAll(line)) {
    const at = before + match.index;
    if (at > place || at + match[0].length < place) continue;
    // A label may hold signs that part names in a formula.
    const labels = [match[0], match[0].replace(/[:.-]+$/, "")];
    for (const name of new Set([...labels, ...(match[0].match(/\w+/g) ?? [])])) {
      const here = usesOf(named, name).some((use) => use <= place && place <= use + name.length);
      if (here) return name;
    }
  }
  return null;
}

/** Why a name cannot be that of a parameter, a cell or a label, whatever else the paper names; "" when it can. */
export function unfitName(what: Named, name: string): string {
  if (what === "label") {
    return /^[A-Za-z0-9][\w:.-]*$/.test(name)
      ? ""
      : "A label is letters and digits, with - _ : . between or after them.";
  }
  if (!isName(name)) return "A name is letters, digits and underscores, starting with a letter.";
  return RESERVED_NAMES.has(name) ? `${name} has a meaning of its own in formulas; another name would do.` : "";
}

/** What the paper as it would be has wrong that it has not now; null: nothing. */
function whatWouldBreak(
  paper: Paper,
  bibliography: string,
  { what, edits }: Renaming,
  from: string,
  to: string,
): NoRenaming | null {
  const after = readPaper(edited(paper.text, edits), bibliography);
  const named = namesOfPaper(after);
  if (whatIsNamed(named, to) !== what || usesOf(named, to).length !== edits.length) {
    return { problem: `${to} means something else in places where ${from} is used; another name would do.` };
  }
  const before = new Map<string, number>();
  for (const { message } of problemsOf(paper)) {
    const renamed = withName(message, from, to);
    before.set(renamed, (before.get(renamed) ?? 0) + 1);
  }
  for (const problem of problemsOf(after)) {
    const message = withName(problem.message, from, to);
    const left = before.get(message) ?? 0;
    if (left === 0) return { problem: `With this name, line ${problem.line}: ${problem.message}` };
    before.set(message, left - 1);
  }
  return null;
}

function problemsOf(paper: Paper): readonly { readonly line: number; readonly message: string }[] {
  return [...paper.problems, ...planPaper(paper).problems].filter(({ severity }) => severity === "error");
}

/** Messages that differ in the name alone, and in what they guess was meant, are the same. */
function withName(message: string, from: string, to: string): string {
  const escaped = from.replace(/[.*+?^${}()|[\]\\]/g, "\\$&");
  return message.replace(/ Did you mean .*$/, "").replace(new RegExp(`(?<!\\w)${escaped}(?!\\w)`, "g"), to);
}

import type { Paper } from "../../paper/index.ts";
import { planPaper } from "../plan.ts";
import { unfitName } from "../renaming/rename.ts";
import { namesOfPaper, whatIsNamed } from "../renaming/uses.ts";
import type { TextEdit } from "../text-edits.ts";
import type { ParameterEdit } from "./change.ts";
import { PARAMETER_FIELDS, type ParameterFields, parametersCells } from "./entry.ts";
import { errorGained, faultOf, type ParameterProblem, paperAfter } from "./judge.ts";
import { addedEntry, aroundOf, lineEnd, startsLine } from "./map-edits.ts";
import { type Around, scalarText } from "./scalar.ts";

/**
 * The edits that give a paper one more parameter: at the end of its first `parameters` cell, or in a new one after the
 * front matter where it has none. A name that is taken, reserved, or that a cell already has for a dummy is a problem.
 * @param bibliography the paper's BibTeX, to read the paper again
 */
export function addsParameter(
  paper: Paper,
  bibliography: string,
  name: string,
  fields: Partial<ParameterFields>,
): ParameterEdit | ParameterProblem {
  const unfit = nameFault(paper, name);
  if (unfit !== "") return { problem: unfit, field: "name" };
  if ((fields.value ?? "").trim() === "")
    return { problem: "A parameter needs a value: a number or a formula.", field: "value" };
  const unread = unreadCell(paper);
  if (unread !== null) return unread;
  const edits = [additionTo(paper, name, fields)];
  const after = paperAfter(paper, bibliography, edits);
  const fault = faultOf(after, name);
  if (fault !== null) return fault;
  const gained = errorGained({ paper, plan: planPaper(paper) }, after);
  if (gained !== null) return { problem: `With this name, line ${gained.line}: ${gained.message}`, field: "name" };
  return { edits, after: after.plan.parameters.find((each) => each.name === name) ?? null };
}

/** Why a new parameter cannot have a name; "" when it can. */
export function nameFault(paper: Paper, name: string): string {
  const unfit = unfitName("parameter", name);
  if (unfit !== "") return unfit;
  const named = namesOfPaper(paper);
  const taken = whatIsNamed(named, name);
  if (taken !== null) return `${name} is the name of a ${taken} already; another name would do.`;
  const dummy = named.drafts.find(({ body }) => body?.introduced.some((each) => each.name === name) === true);
  if (dummy === undefined) return "";
  const { cell, kind } = dummy;
  return `The ${kind?.documentation.label.toLowerCase() ?? "cell"} in line ${cell.span.line} has ${name} for a name of its own; another name would do.`;
}

/** With all cells of parameters unreadable there is no place for one more, and a further cell would hide the fault. */
function unreadCell(paper: Paper): ParameterProblem | null {
  if (parametersCells(paper).length > 0) return null;
  const cell = paper.cells.find(({ kind }) => kind === "parameters");
  if (cell === undefined) return null;
  return {
    problem: `The parameters in line ${cell.span.line} cannot be read; they are to be mended first.`,
    field: null,
  };
}

function additionTo(paper: Paper, name: string, fields: Partial<ParameterFields>): TextEdit {
  const { text } = paper;
  const first = parametersCells(paper)[0];
  if (first === undefined) return newCell(paper, `${name}: ${parameterText(fields, "block")}`);
  const { cell, body } = first;
  const around = body.entries.length === 0 ? "block" : aroundOf(text, body);
  const entry = `${name}: ${parameterText(fields, around)}`;
  if (body.entries.length > 0) return addedEntry(text, body, entry);
  // An empty body begins after its opening line; without a closing one it ends with it.
  const at = Math.min(text.length, lineEnd(text, cell.span.from) + 1);
  return { from: at, to: at, insert: `${indentOfCell(text, cell.span.from)}${entry}\n` };
}

function indentOfCell(text: string, from: number): string {
  const before = text.slice(text.lastIndexOf("\n", from - 1) + 1, from);
  return startsLine(text, { keyFrom: from }) ? before : "";
}

/** A value alone as it is; with more said of it, in braces. */
function parameterText(fields: Partial<ParameterFields>, around: Around): string {
  const said = PARAMETER_FIELDS.filter((field) => (fields[field] ?? "").trim() !== "");
  if (said.length === 1) return scalarText(fields.value ?? "", around);
  return `{${said.map((field) => `${field}: ${scalarText(fields[field] ?? "", "flow")}`).join(", ")}}`;
}

function newCell({ text, front }: Paper, entry: string): TextEdit {
  const cell = `\`\`\`parameters\n${entry}\n\`\`\`\n`;
  if (front.span === null) return { from: 0, to: 0, insert: `${cell}${/^\s*$/.test(text) ? "" : "\n"}` };
  const end = lineEnd(text, Math.max(front.span.from, front.span.to - 1));
  const rest = text.slice(end + 1);
  const at = Math.min(text.length, end + 1);
  const lead = end < text.length ? "\n" : "\n\n";
  return { from: at, to: at, insert: `${lead}${cell}${rest === "" || /^[ \t]*\n/.test(rest) ? "" : "\n"}` };
}

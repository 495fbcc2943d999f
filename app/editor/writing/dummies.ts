import type { Knowledge, Word } from "../model/knowledge.ts";
import type { CellAround } from "./place.ts";

/** Keys of a working under which names are introduced: whatever is no parameter there is a variable of the cell's own. */
const INTRODUCING = ["over", "rows", "vary", "unknowns"];

/** A call that stands around a place, with what stands in it. */
interface Call {
  readonly name: string;
  /** Its arguments, as far as they are written. */
  readonly args: readonly string[];
  /** In which of them the place is. */
  readonly at: number;
}

/**
 * Names that a formula may use at a place besides those of the paper: variables of a sum, integral or the like around it,
 * those of the cell's own, and keys of a formula cell above it. null where a variable is being named just there.
 */
export function dummiesAt(
  text: string,
  offset: number,
  cell: CellAround | null,
  { words, names }: Knowledge,
): readonly Word[] | null {
  const found: Word[] = [];
  const known = new Set([...names.parameters, ...names.cells].map(({ name }) => name));
  for (const { name, args, at } of callsAround(text, offset)) {
    const form = words.functions.find((each) => each.name === name)?.form ?? "";
    const letter = /^\w+\((?:F|condition), (\w+),/.exec(form)?.[1];
    if (letter === undefined) continue;
    if (at === 1) return null;
    const given = /^\s*([A-Za-z]\w*)\s*$/.exec(args[1] ?? "")?.[1] ?? letter;
    if (at === 0 && !known.has(given)) found.push({ name: given, meaning: `the variable of ${name}` });
  }
  if (cell !== null) found.push(...ofCell(text, offset, cell, words).filter(({ name }) => !known.has(name)));
  return found.filter(({ name }, place) => found.findIndex((each) => each.name === name) === place);
}

/** Calls whose brackets are open at a place, the innermost first. Formulas are written in one line or paragraph. */
function callsAround(text: string, offset: number): Call[] {
  const from = Math.max(text.lastIndexOf("\n\n", offset - 1), text.lastIndexOf("\n```", offset - 1), 0);
  const calls: Call[] = [];
  let depth = 0;
  for (let at = offset - 1; at >= from; at -= 1) {
    const sign = text[at];
    if (sign === ")") depth += 1;
    else if (sign === "(" && depth > 0) depth -= 1;
    else if (sign === "(") {
      const name = /[A-Za-z]\w*$/.exec(text.slice(Math.max(from, at - LONGEST_NAME), at))?.[0];
      if (name !== undefined) calls.push({ name, ...argumentsAt(text, at + 1, offset) });
    } else if (sign === "[" || sign === "{") break;
  }
  return calls;
}

const LONGEST_NAME = 40;
const LONGEST_CALL = 400;

function argumentsAt(text: string, from: number, offset: number): Pick<Call, "args" | "at"> {
  const args = [""];
  let at = 0;
  let depth = 0;
  for (let place = from; place < Math.min(text.length, from + LONGEST_CALL); place += 1) {
    if (place === offset) at = args.length - 1;
    const sign = text[place] ?? "";
    if (sign === "\n" || (depth === 0 && /[)\]}]/.test(sign))) break;
    if (sign === "(") depth += 1;
    else if (sign === ")") depth -= 1;
    if (sign === "," && depth === 0) args.push("");
    else args[args.length - 1] += sign;
    if (place + 1 === offset) at = args.length - 1;
  }
  return { args, at };
}

function ofCell(text: string, offset: number, cell: CellAround, words: Knowledge["words"]): Word[] {
  const rest = text.slice(cell.bodyFrom);
  const end = rest.search(/^ {0,3}(?:`{3,}|~{3,})[ \t]*$/m);
  const body = end < 0 ? rest : rest.slice(0, end);
  const found: Word[] = [];
  for (const key of INTRODUCING) {
    const value = new RegExp(`^${key}:[ \\t]*(.*(?:\\n[ \\t]+.*)*)`, "m").exec(body)?.[1] ?? "";
    for (const [, name = ""] of value.matchAll(/(?:^|[{,\n])[ \t]*([A-Za-z]\w*):/g))
      found.push({ name, meaning: `named by ${key}` });
  }
  const kind = words.kinds.find(({ name }) => name === cell.kind);
  if (kind?.ownKeys === true && kind.keys.length === 0) {
    const above = body.slice(0, Math.max(0, text.lastIndexOf("\n", offset - 1) + 1 - cell.bodyFrom));
    for (const [, name = ""] of above.matchAll(/^([A-Za-z]\w*):/gm)) found.push({ name, meaning: "named above" });
  }
  return found;
}

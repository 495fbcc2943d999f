import type { Knowledge } from "../model/knowledge.ts";
import { cellAround, inMath } from "./place.ts";
import { remarkOn } from "./suggest.ts";

/** What is said of what stands under the caret. */
export interface Meaning {
  readonly from: number;
  readonly to: number;
  /** "start", "Figure 2", "kesten1978" */
  readonly term: string;
  /** With mathematics in dollars. */
  readonly words: string;
  /** The parameter, cell or label that it names and that may be given another name; null: it names none. */
  readonly names: string | null;
}

/**
 * What the word at a place means: a kind, a key of a working, a name or function in a formula, the target of a
 * reference, an entry of the bibliography. null for plain prose and for what is not known.
 */
export function meaningAt(text: string, offset: number, knowledge: Knowledge): Meaning | null {
  const lineFrom = text.lastIndexOf("\n", offset - 1) + 1;
  const end = text.indexOf("\n", offset);
  const line = text.slice(lineFrom, end === -1 ? text.length : end);
  return (
    pointerAt(line, lineFrom, offset, knowledge) ??
    numberAt(line, lineFrom, offset, knowledge) ??
    symbolAt(text, line, lineFrom, offset, knowledge) ??
    workingAt(text, line, lineFrom, offset, knowledge)
  );
}

function pointerAt(line: string, at: number, offset: number, { names }: Knowledge): Meaning | null {
  const found = around(line, at, offset, /:(ref|cite)\[([^\]\n]*)\]/g);
  if (found === null) return null;
  const [whole, directive, inside = ""] = found.match;
  const begin = found.from + whole.indexOf("[") + 1;
  const keys = [...inside.matchAll(/[^,\s]+/g)];
  const key =
    keys.find(({ index, 0: word }) => offset >= begin + index && offset <= begin + index + word.length) ?? keys[0];
  if (key === undefined) return null;
  const span = { from: begin + key.index, to: begin + key.index + key[0].length };
  if (directive === "ref") {
    const label = names.labels.find((each) => each.label === key[0]);
    return label === undefined ? null : { ...span, term: capital(label.text), words: label.about, names: label.label };
  }
  const entry = names.citations.find(({ name }) => name === key[0]);
  return entry === undefined ? null : { ...span, term: entry.name, words: entry.meaning, names: null };
}

function numberAt(line: string, at: number, offset: number, knowledge: Knowledge): Meaning | null {
  const found = around(line, at, offset, /(?::value\[|\\value(?:\[[^\]\n]*\])?\{)([^\]}\n]*)/g);
  if (found === null) return null;
  const formula = found.match[1] ?? "";
  return nameAt(formula, found.from + found.match[0].length - formula.length, offset, knowledge);
}

/** A parameter by its symbol in mathematics: a plain letter may be a variable there, and is not taken for one. */
function symbolAt(text: string, line: string, at: number, offset: number, { names }: Knowledge): Meaning | null {
  const found = around(line, at, offset, /(?:\\[A-Za-z]+|[A-Za-z])(?:_(?:\{[^{}\n]*\}|[A-Za-z\d]))?/g);
  if (found === null || !inMath(text.slice(Math.max(0, text.lastIndexOf("\n\n", offset - 1)), found.from))) return null;
  const [tex] = found.match;
  const parameter = names.parameters.find(({ symbol }) => /[\\_]/.test(symbol) && braced(symbol) === braced(tex));
  if (parameter === undefined) return null;
  const { name, meaning } = parameter;
  return { from: found.from, to: found.from + tex.length, term: name, words: meaning, names: name };
}

/** `x_0` is `x_{0}`. */
function braced(tex: string): string {
  return tex.replace(/_([A-Za-z\d])/g, "_{$1}").trim();
}

function workingAt(text: string, line: string, at: number, offset: number, knowledge: Knowledge): Meaning | null {
  const { words } = knowledge;
  const fence = /^( {0,3}`{3,}[ \t]*)([a-z_]+)/.exec(line);
  if (fence !== null) {
    const kind = words.kinds.find(({ name }) => name === fence[2]);
    const from = at + (fence[1] ?? "").length;
    const to = at + fence[0].length;
    return kind === undefined || offset < from || offset > to
      ? null
      : { from, to, term: kind.label, words: kind.meaning, names: null };
  }
  const cell = cellAround(text, offset);
  const kind = words.kinds.find(({ name }) => name === cell?.kind);
  if (cell === null || kind === undefined) return null;
  const entry = /^(\s*)([A-Za-z_]\w*):/.exec(line);
  const from = at + (entry?.[1] ?? "").length;
  const to = from + (entry?.[2] ?? "").length;
  if (entry === null || offset > to) return nameAt(line, at, offset, knowledge, kind.ownKeys ? kind.keys : []);
  const keys = [...(kind.ownKeys ? [] : kind.keys), ...words.presentation];
  const key = offset < from || entry[1] !== "" ? undefined : keys.find(({ name }) => name === entry[2]);
  return key === undefined
    ? nameAt(line, at, offset, knowledge)
    : { from, to, term: key.name, words: `${key.meaning}${remarkOn(key.required, key.fallback)}`, names: null };
}

/** A name of a formula, or one of the keys within braces. */
function nameAt(
  source: string,
  at: number,
  offset: number,
  { words, names }: Knowledge,
  keys: Knowledge["words"]["kinds"][number]["keys"] = [],
): Meaning | null {
  const found = around(source, at, offset, /[A-Za-z]\w*(?:\.\w+)?/g);
  if (found === null) return null;
  const [term] = found.match;
  const span = { from: found.from, to: found.from + term.length, term };
  const after = source.slice(span.to - at);
  const key = keys.find(({ name }) => name === term);
  if (key !== undefined && after.startsWith(":"))
    return { ...span, words: `${key.meaning}${remarkOn(key.required, key.fallback)}`, names: null };
  const [name = "", member] = term.split(".");
  const cell = names.cells.find((each) => each.name === name);
  const called = cell?.callables.find((each) => each.member === (member ?? ""));
  if (cell !== undefined && called !== undefined && after.startsWith("(")) {
    return { ...span, term: called.form, words: called.meaning, names: name };
  }
  if (cell !== undefined && member !== undefined) {
    const value = cell.values.find((each) => each.name === member);
    return value === undefined ? null : { ...span, words: value.meaning, names: name };
  }
  if (cell !== undefined) return { ...span, words: cell.title, names: name };
  const parameter = names.parameters.find((each) => each.name === name);
  if (parameter !== undefined) return { ...span, words: parameter.meaning, names: name };
  const used = words.functions.find((each) => each.name === name && after.startsWith("("));
  return used === undefined ? null : { ...span, term: used.form, words: used.meaning, names: null };
}

/** The match that a place lies in or touches. */
function around(
  source: string,
  at: number,
  offset: number,
  pattern: RegExp,
): { from: number; match: RegExpMatchArray } | null {
  for (const match of source.matchAll(pattern)) {
    const from = at + (match.index ?? 0);
    if (offset >= from && offset <= from + match[0].length) return { from, match };
  }
  return null;
}

function capital(words: string): string {
  return words.charAt(0).toUpperCase() + words.slice(1);
}

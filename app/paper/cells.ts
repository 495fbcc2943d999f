import type { Code } from "mdast";
import { nearestSpelling } from "../spelling/index.ts";
import type { Lines } from "./lines.ts";
import { sourceMap } from "./lines.ts";
import { PRINTED_PARTS } from "./printed.ts";
import type { Cell, Problem } from "./types.ts";
import { readYaml } from "./yaml-tree.ts";

/** Which names and how many unnamed cells of each kind there are so far: what ids and slots are made from. */
export interface CellCount {
  readonly names: Set<string>;
  readonly unnamed: Map<string, number>;
}

/** Nothing counted yet. */
export function newCellCount(): CellCount {
  return { names: new Set(), unnamed: new Map() };
}

/**
 * A fenced block is a cell when its info string begins with a kind of the language, or is two words of which the second
 * could be a name (its kind is then unknown, which is said where kinds are checked). Any other is a block of code.
 */
export function isCell(code: Code): boolean {
  const kind = code.lang ?? "";
  if (kind === "") return false;
  if (Object.hasOwn(PRINTED_PARTS, kind)) return true;
  return /^[A-Za-z_]\w*$/.test(kind) && /^[A-Za-z]\w*$/.test(code.meta?.trim() ?? "");
}

/** A warning for a block of code whose only word is nearly a kind of the language. */
export function misspeltKind(code: Code, text: string, lines: Lines): Problem | null {
  const kind = code.lang ?? "";
  if (kind.length < 5 || (code.meta ?? "") !== "") return null;
  const nearest = nearestSpelling(kind, Object.keys(PRINTED_PARTS));
  const start = code.position?.start.offset;
  if (nearest === null || nearest === kind || start === undefined) return null;
  const from = text.indexOf(kind, start);
  const to = from + kind.length;
  const message = `“${kind}” is not a kind of cell, so this is set as plain code. Did you mean “${nearest}”?`;
  const fix = { label: `Write ${nearest}`, from, to, insert: nearest };
  return { from, to, line: lines.lineAt(from), severity: "warning", message, fix };
}

/** Reads a cell: its kind and name from the info string, its body from YAML. */
export function readCell(
  code: Code,
  text: string,
  lines: Lines,
  count: CellCount,
): { cell: Cell; problems: readonly Problem[] } {
  const from = code.position?.start.offset ?? 0;
  const to = code.position?.end.offset ?? text.length;
  const span = lines.span(from, to);
  const source = text.slice(from, to);
  const problems: Problem[] = [];
  const kind = code.lang ?? "";
  const info = /^[^\r\n]*/.exec(source)?.[0] ?? "";
  const words = (code.meta ?? "").trim();
  const name = /^[A-Za-z]\w*$/.test(words) ? words : null;
  const free = name !== null && !count.names.has(name);
  const ordinal = (count.unnamed.get(kind) ?? 0) + (free ? 0 : 1);
  count.unnamed.set(kind, ordinal);
  if (free) count.names.add(name);
  const id = free ? name : `${kind}@${span.line}`;
  const slot = free ? name : `${kind}#${ordinal}`;
  const report = (start: number, end: number, message: string) =>
    problems.push({ from: start, to: end, line: lines.lineAt(start), severity: "error", message, cell: id });

  if (name === null && words !== "") {
    const start = from + Math.max(0, info.indexOf(words, info.indexOf(kind) + kind.length));
    report(start, start + words.length, nameMessage(words));
  }
  if (!isClosed(source, info)) {
    report(from, from + info.length, "This cell is not closed: it needs a line of ``` after its last entry.");
  }
  const { bodyFrom, bodyTo } = bodyRange(source, from, info, code.value);
  const body = readBody(code.value, text, bodyFrom, bodyTo, lines);
  for (const problem of body.problems) problems.push({ ...problem, cell: id });
  let map: Cell["body"] = null;
  if (body.value?.yaml === "map") map = body.value;
  else if (code.value.trim() === "") map = { yaml: "map", entries: [], from: bodyFrom, to: bodyFrom, line: span.line };
  else if (body.value !== null) {
    report(
      body.value.from,
      body.value.to,
      "A cell's body is a list of entries “key: value”, one a line, with a space after the colon.",
    );
  }
  return { cell: { id, slot, kind, name, span, bodyFrom, bodyTo, body: map }, problems };
}

function nameMessage(words: string): string {
  if (/\s/.test(words)) return `After the kind comes one name; here are several words: “${words}”.`;
  return `“${words}” cannot be a name: a name is letters, digits and underscores, and begins with a letter.`;
}

function isClosed(source: string, info: string): boolean {
  const fence = /^[ \t]*(`{3,}|~{3,})/.exec(info)?.[1] ?? "```";
  const last =
    source
      .slice(info.length)
      .split(/\r\n?|\n/)
      .at(-1) ?? "";
  const closing = /(`{3,}|~{3,})[ \t]*$/.exec(last)?.[1] ?? "";
  return source.length > info.length && closing.charAt(0) === fence.charAt(0) && closing.length >= fence.length;
}

function bodyRange(source: string, from: number, info: string, value: string): { bodyFrom: number; bodyTo: number } {
  const ending = /^(\r\n?|\n)?/.exec(source.slice(info.length))?.[0].length ?? 0;
  const start = info.length + ending;
  const rest = source.slice(start);
  const lastLine = isClosed(source, info) ? Math.max(rest.lastIndexOf("\n"), rest.lastIndexOf("\r")) + 1 : rest.length;
  const end = start + Math.max(lastLine, rest.startsWith(value) ? value.length : 0);
  return { bodyFrom: from + start, bodyTo: from + Math.min(end, source.length) };
}

function readBody(value: string, text: string, bodyFrom: number, bodyTo: number, lines: Lines) {
  const written = text.slice(bodyFrom, bodyTo);
  if (written.startsWith(value)) return readYaml(value, (index) => bodyFrom + index, lines);
  const starts = lineStarts(value, written);
  return readYaml(value, (index) => bodyFrom + (starts.at(index) ?? 0), lines);
}

/** For a body that is indented or quoted as a whole: where an index of the body stands in what is written. */
function lineStarts(value: string, written: string): { at(index: number): number } {
  const pairs: { value: number; written: number }[] = [];
  const ofValue = value.split("\n");
  const ofWritten = written.split("\n");
  let inValue = 0;
  let inWritten = 0;
  for (let i = 0; i < ofValue.length; i++) {
    const line = ofWritten[i] ?? "";
    const content = ofValue[i] ?? "";
    pairs.push({ value: inValue, written: inWritten + sourceMap(content, line)(0) });
    inValue += content.length + 1;
    inWritten += line.length + 1;
  }
  return {
    at(index) {
      const pair = pairs.findLast((candidate) => candidate.value <= index);
      return pair === undefined ? index : Math.min(written.length, pair.written + index - pair.value);
    },
  };
}

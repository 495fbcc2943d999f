/** What stands at a place of a paper's text, as far as help while writing needs to know it. */
export type WritingPlace =
  /** The kind after an opening fence. */
  | { readonly place: "kind"; readonly from: number }
  /** A key of a body; `under` is the key whose map it stands in. */
  | {
      readonly place: "key";
      readonly from: number;
      readonly cell: CellAround;
      readonly under: string | null;
      /** Keys that the same map has already. */
      readonly taken: readonly string[];
    }
  /** The value of a key, up to the caret. */
  | {
      readonly place: "value";
      readonly from: number;
      readonly cell: CellAround;
      readonly key: string;
      readonly under: string | null;
      readonly written: string;
    }
  /** A formula, up to the caret. */
  | { readonly place: "formula"; readonly from: number; readonly written: string }
  | { readonly place: "attributes"; readonly from: number; readonly of: "value" | "cite" }
  | { readonly place: "environment"; readonly from: number }
  | { readonly place: "label"; readonly from: number }
  | { readonly place: "citation"; readonly from: number }
  | { readonly place: "directive"; readonly from: number }
  /** After a backslash within mathematics; `from` is at the backslash. */
  | { readonly place: "tex"; readonly from: number }
  | { readonly place: "texEnvironment"; readonly from: number };

export interface CellAround {
  readonly kind: string;
  readonly name: string | null;
  readonly bodyFrom: number;
}

const FENCE = /^ {0,3}(`{3,}|~{3,})[ \t]*(.*)$/gm;

/** The fenced block whose body a place stands in; null where it stands in none. */
export function cellAround(text: string, offset: number): CellAround | null {
  let open: { mark: string; info: string; bodyFrom: number } | null = null;
  FENCE.lastIndex = 0;
  for (let found = FENCE.exec(text); found !== null; found = FENCE.exec(text)) {
    const end = found.index + found[0].length;
    if (end >= offset) break;
    const [, mark = "", info = ""] = found;
    if (open === null) open = { mark, info, bodyFrom: end + 1 };
    else if (mark.startsWith(open.mark) && info.trim() === "") open = null;
  }
  if (open === null) return null;
  const [kind = "", name = null] = open.info.trim().split(/\s+/);
  return { kind, name, bodyFrom: open.bodyFrom };
}

/** What may be written at a place; null where it is plain prose. */
export function placeAt(text: string, offset: number): WritingPlace | null {
  const lineFrom = text.lastIndexOf("\n", offset - 1) + 1;
  const before = text.slice(lineFrom, offset);
  const cell = cellAround(text, offset);
  // A sentence may run over several lines; a body's entries are read line by line.
  const blockFrom = cell === null ? Math.max(0, text.lastIndexOf("\n\n", offset - 1)) : lineFrom;
  const inline = inlinePlace(text.slice(blockFrom, offset), blockFrom);
  if (inline !== null) return inline;
  if (cell !== null) return bodyPlace(text, offset, lineFrom, cell);
  const fence = /^ {0,3}`{3,}[ \t]*([a-z_]*)$/.exec(before);
  if (fence !== null) return { place: "kind", from: offset - (fence[1] ?? "").length };
  const environment = /^:{3,}([a-z]*)$/.exec(before);
  if (environment !== null) return { place: "environment", from: offset - (environment[1] ?? "").length };
  const directive = /(?<![\w:]):([a-z]+)$/.exec(before);
  return directive === null ? null : { place: "directive", from: offset - (directive[1] ?? "").length };
}

/** Places within a line or a sentence: directives, their attributes, mathematics. */
function inlinePlace(before: string, at: number): WritingPlace | null {
  const end = at + before.length;
  const formula = /(?::value\[|\\value(?:\[[^\]\n]*\])?\{)([^\]}\n]*)$/.exec(before);
  if (formula !== null) {
    const written = formula[1] ?? "";
    return { place: "formula", from: end - written.length, written };
  }
  const attribute = /(?::(value|cite)\[[^\]\n]*\]\{|\\value\[)(?:[^}\]\n]*[\s,])?([\w=]*)$/.exec(before);
  if (attribute !== null) {
    const of = attribute[1] === "cite" ? "cite" : "value";
    return { place: "attributes", from: end - (attribute[2] ?? "").length, of };
  }
  const pointer = /:(ref|cite)\[(?:[^\]\n]*,\s*)?([^\],\s]*)$/.exec(before);
  if (pointer !== null) {
    const place = pointer[1] === "ref" ? "label" : "citation";
    return { place, from: end - (pointer[2] ?? "").length };
  }
  const tex = /(?<!\\)(?:\\\\)*(\\(?:(?:begin|end)\{([a-zA-Z*]*)|([a-zA-Z]*)))$/.exec(before);
  if (tex === null || !inMath(before)) return null;
  if (tex[2] !== undefined) return { place: "texEnvironment", from: end - tex[2].length };
  return { place: "tex", from: end - (tex[1] ?? "").length };
}

/** Whether a dollar, or two, is open at the end of a block's text. */
export function inMath(before: string): boolean {
  const dollars = before.match(/(?<!\\)\$\$?/g) ?? [];
  let open = "";
  for (const dollar of dollars) {
    if (open === "") open = dollar;
    else if (open === dollar) open = "";
    else if (open === "$") open = "$";
  }
  return open !== "";
}

function bodyPlace(text: string, offset: number, lineFrom: number, cell: CellAround): WritingPlace | null {
  const before = text.slice(lineFrom, offset);
  if (/(?:^|\s)#/.test(before)) return null;
  const indent = /^\s*/.exec(before)?.[0].length ?? 0;
  const under = indent === 0 ? null : keyAbove(text.slice(cell.bodyFrom, lineFrom), indent);
  const key = /^\s*([A-Za-z_]\w*)?$/.exec(before);
  if (key !== null) {
    const taken = keysBeside(bodyAround(text, cell.bodyFrom), indent, lineFrom - cell.bodyFrom);
    return { place: "key", from: offset - (key[1] ?? "").length, cell, under, taken };
  }
  const entry = /^\s*(?:-\s+)?([A-Za-z_]\w*):\s+(.*)$/.exec(before);
  if (entry === null) {
    const item = /^\s*-\s+(.*)$/.exec(before);
    const written = item?.[1] ?? "";
    return item === null || under === null
      ? null
      : { place: "value", from: offset - written.length, cell, key: under, under: null, written };
  }
  const [, name = "", written = ""] = entry;
  const flow = /(?:^|[^[({]*)\{(?:[^{}]*,\s*)?([A-Za-z_]*)$/.exec(written);
  if (flow !== null) {
    const rest = /^[^\n}]*/.exec(text.slice(offset))?.[0] ?? "";
    const taken = [...`${written} ${rest}`.matchAll(/([A-Za-z_]\w*):/g)].map((found) => found[1] ?? "");
    return { place: "key", from: offset - (flow[1] ?? "").length, cell, under: name, taken };
  }
  const inner = /[{,]\s*([A-Za-z_]\w*):\s+([^,{}]*)$/.exec(written);
  if (inner !== null && written.startsWith("{")) {
    const value = inner[2] ?? "";
    return { place: "value", from: offset - value.length, cell, key: inner[1] ?? "", under: name, written: value };
  }
  return { place: "value", from: offset - written.length, cell, key: name, under, written };
}

/** The last key above that is indented less. */
function keyAbove(lines: string, indent: number): string | null {
  for (const line of lines.split("\n").reverse()) {
    const found = /^(\s*)([A-Za-z_]\w*):/.exec(line);
    if (found !== null && (found[1] ?? "").length < indent) return found[2] ?? null;
  }
  return null;
}

function bodyAround(text: string, from: number): string {
  const end = text.slice(from).search(/^ {0,3}(`{3,}|~{3,})[ \t]*$/m);
  return end === -1 ? text.slice(from) : text.slice(from, from + end);
}

/** Keys of the map in which a line of a body stands, but for that of the line itself. */
function keysBeside(body: string, indent: number, lineFrom: number): string[] {
  const above = body.slice(0, lineFrom).split("\n").slice(0, -1).reverse();
  const below = body.slice(lineFrom).split("\n").slice(1);
  return [...keysTo(above, indent), ...keysTo(below, indent)];
}

/** Keys at an indentation, to the first line that is indented less. */
function keysTo(lines: readonly string[], indent: number): string[] {
  const keys: string[] = [];
  for (const line of lines) {
    const own = /^[ \t]*/.exec(line)?.[0].length ?? 0;
    if (line.trim() !== "" && own < indent) break;
    const key = /^[ \t]*([A-Za-z_]\w*):/.exec(line)?.[1];
    if (own === indent && key !== undefined) keys.push(key);
  }
  return keys;
}

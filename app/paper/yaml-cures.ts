import type { YAMLError } from "yaml";

/** A mistake in YAML at indices of its source, with what to put instead where that is certain. */
export interface YamlFault {
  readonly from: number;
  readonly to: number;
  readonly message: string;
  /** Where the same was said before. */
  readonly earlier?: number;
  readonly fix?: { readonly label: string; readonly from: number; readonly to: number; readonly insert: string };
}

/** What YAML takes a leading character for. */
const indicators: Readonly<Record<string, string>> = {
  "*": "an alias",
  "&": "an anchor",
  "!": "a tag",
  "%": "a directive",
  "@": "a reserved sign",
  "`": "a reserved sign",
  "|": "a block of text on the next lines",
  ">": "a block of folded text on the next lines",
  "-": "an item of a list",
  "{": "a map in braces",
  "[": "a list in brackets",
  '"': "a quoted text",
  "'": "a quoted text",
};

const howToKeep = "Put the whole in single quotes, or on lines of its own after “|”.";

/** Deepest nesting of lists and maps that is read. Recursion deeper than this could exhaust the stack. */
const deepest = 40;

/** A text as a YAML scalar in single quotes. */
export function inSingleQuotes(text: string): string {
  return `'${text.replaceAll("'", "''").replace(/\s*\r?\n\s*/g, " ")}'`;
}

/** A fault whose cure is to quote the stretch from..to of the source. */
export function quotable(source: string, from: number, to: number, message: string): YamlFault {
  const insert = inSingleQuotes(source.slice(from, to));
  return { from, to, message: `${message} ${howToKeep}`, fix: { label: `Write ${insert}`, from, to, insert } };
}

/** The parser's errors in our words, one for each line at fault, with the cure where the line is a trap of YAML. */
export function faultsOfErrors(source: string, errors: readonly YAMLError[]): YamlFault[] {
  const faults: YamlFault[] = [];
  let lastLine = -1;
  for (const error of errors) {
    const at = Math.min(error.pos[0], source.length);
    const start = source.lastIndexOf("\n", at - 1) + 1;
    if (start === lastLine) continue;
    lastLine = start;
    faults.push(trapInLine(source, start) ?? describe(source, error, at));
  }
  return faults;
}

/** An entry `key: value` in one line whose value YAML does not take as one text. */
function trapInLine(source: string, start: number): YamlFault | null {
  const end = source.indexOf("\n", start);
  const line = source.slice(start, end < 0 ? source.length : end).replace(/\r$/, "");
  const entry = /^(\s*(?:-\s+)?[\w\\.-]+\s*:\s+)(\S.*?)\s*$/.exec(line);
  if (entry === null) return null;
  const [, before = "", value = ""] = entry;
  const from = start + before.length;
  const to = from + value.length;
  const first = value.charAt(0);
  const doubleQuoted = /^"([^"]*)"$/.exec(value);
  if (doubleQuoted !== null) {
    const insert = inSingleQuotes(doubleQuoted[1] ?? "");
    const message = `Between double quotes YAML reads a backslash as an escape. Use single quotes: ${insert}`;
    return { from, to, message, fix: { label: `Write ${insert}`, from, to, insert } };
  }
  if (isWhole(value)) {
    const message = "Within [ ] or { }, a text that holds brackets, braces, a comma or “: ” goes in single quotes.";
    return { from, to, message };
  }
  if (Object.hasOwn(indicators, first)) {
    return quotable(source, from, to, `YAML takes a leading ${first} for ${indicators[first]}, and this is not one.`);
  }
  if (/:(\s|$)/.test(value)) {
    const entries = /,\s*[\w\\]+\s*:\s/.test(value) ? " Several entries go on a line each; for one text:" : "";
    return quotable(source, from, to, `YAML cuts this text at “: ”.${entries}`);
  }
  return null;
}

/** A list or map in brackets that ends where the line ends: the fault lies inside. */
function isWhole(value: string): boolean {
  return /^\[.*\]$|^\{.*\}$/.test(value);
}

function describe(source: string, error: YAMLError, at: number): YamlFault {
  const to = Math.min(Math.max(at + 1, error.pos[1]), source.length);
  return { from: at, to, message: words(error) };
}

function words(error: YAMLError): string {
  switch (error.code) {
    case "TAB_AS_INDENT":
      return "A tab is not allowed here: YAML is indented with spaces.";
    case "BAD_INDENT":
      return /end with a ([\]}])/.test(error.message)
        ? `A list or map opened above is not closed: it needs its “${/end with a ([\]}])/.exec(error.message)?.[1]}”, and its lines further in than its key.`
        : "This line is indented differently from its neighbours. Entries of one map begin in the same column.";
    case "MULTILINE_IMPLICIT_KEY":
    case "BLOCK_AS_IMPLICIT_KEY":
      return "This entry is indented differently from its neighbours, or a text above it is not finished. Entries of one map begin in the same column.";
    case "MISSING_CHAR":
      return /quote/.test(error.message)
        ? "A quote opened here is not closed."
        : "An entry “key: value” is expected here, with a colon and a space after the key, and commas between entries in brackets.";
    case "MULTIPLE_DOCS":
      return "A line --- ends the YAML; leave it out.";
    case "RESOURCE_EXHAUSTION":
      return "This is nested too deeply.";
    default:
      return "This is not an entry “key: value”. A text with special signs goes in single quotes.";
  }
}

/** Signs that a formula or text was cut at “ #”, which begins a comment: open brackets, a trailing operator, “#word”. */
export function cutByComment(source: string, from: number, to: number): YamlFault | null {
  const rest = /^[ \t]+(#[^\r\n]*)/.exec(source.slice(to, to + 500));
  if (rest === null) return null;
  const text = source.slice(from, to);
  const unfinished = openBrackets(text) > 0 || /[-+*/^=<>,]$/.test(text.trimEnd());
  const attached = /^#[^\s#]/.test(rest[1] ?? "");
  if (!unfinished && !attached) return null;
  const end = to + rest[0].trimEnd().length;
  return quotable(source, from, end, "YAML cuts this at “ #”, which begins a comment.");
}

/** A formula with commas inside its brackets, which YAML cut into pieces of a list or map: the stretch it stands in. */
export function cutByComma(source: string, from: number, limit: number): YamlFault {
  let depth = 0;
  let to = from;
  for (; to < limit; to++) {
    const character = source.charAt(to);
    if (character === "(") depth++;
    else if (character === ")") depth--;
    else if (depth <= 0 && (character === "," || character === "]" || character === "}")) break;
  }
  const end = from + source.slice(from, to).trimEnd().length;
  const insert = inSingleQuotes(source.slice(from, end));
  const message = `YAML cuts this formula at its comma. Write ${insert}, or give each item of the list or map its own line.`;
  return { from, to: end, message, fix: { label: `Write ${insert}`, from, to: end, insert } };
}

/** Whether lists and maps are nested beyond what is read; judged generously, before the parser sees the text. */
export function nestsTooDeeply(source: string): boolean {
  let brackets = 0;
  const indents: number[] = [];
  for (const line of source.split(/\r?\n/)) {
    const prefix = /^(?:[ \t]|[-?:](?=[ \t]))*/.exec(line)?.[0] ?? "";
    if (prefix.replace(/[ \t]/g, "").length > deepest) return true;
    if (prefix.length < line.length) {
      while ((indents.at(-1) ?? -1) >= prefix.length) indents.pop();
      indents.push(prefix.length);
    }
    for (const character of line) {
      if (character === "[" || character === "{") brackets++;
      if ((character === "]" || character === "}") && brackets > 0) brackets--;
      if (brackets + indents.length > deepest) return true;
    }
  }
  return false;
}

/** How many round brackets a text leaves open. */
export function openBrackets(text: string): number {
  let depth = 0;
  for (const character of text) {
    if (character === "(") depth++;
    if (character === ")") depth--;
  }
  return depth;
}

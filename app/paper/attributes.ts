/** Attributes in braces as written: `{digits=6 at="Theorem 1.2" #shift}`. */
export interface Attributes {
  readonly values: readonly Attribute[];
  /** After `#`; null when there is none. */
  readonly label: string | null;
  /** Index of the label in the source, for problems. */
  readonly labelAt: number;
  /** What could be read as neither. */
  readonly rest: string;
}

export interface Attribute {
  readonly name: string;
  readonly value: string;
  /** Index of the name in the source, and the end of the value. */
  readonly from: number;
  readonly to: number;
}

/** Reads `{…}`; the empty text has no attributes. Never fails: what makes no sense is in `rest`. */
export function readAttributes(source: string): Attributes {
  const values: Attribute[] = [];
  let label: string | null = null;
  let labelAt = 0;
  const inner = source.replace(/^\{|\}$/g, (brace) => " ".repeat(brace.length));
  const pattern = /#([^\s#}]+)|([A-Za-z][\w-]*)\s*=\s*(?:"([^"]*)"|'([^']*)'|([^\s"'}]+))/g;
  let rest = inner;
  for (const match of inner.matchAll(pattern)) {
    const [whole, id, name, double, single, bare] = match;
    const from = match.index;
    const to = from + whole.length;
    rest = rest.slice(0, from) + " ".repeat(whole.length) + rest.slice(to);
    if (id !== undefined) {
      label = id;
      labelAt = from + 1;
    } else if (name !== undefined) values.push({ name, value: double ?? single ?? bare ?? "", from, to });
  }
  return { values, label, labelAt, rest: rest.trim() };
}

/** A directive or an opening line taken apart: `[label]` and `{attributes}` with their indices in the source. */
export interface Bracketed {
  /** null when there are no brackets. */
  readonly label: string | null;
  readonly labelAt: number;
  readonly attributes: string;
  readonly attributesAt: number;
  /** What follows the last bracket or brace. */
  readonly rest: string;
}

/** Takes `[label]{attributes}` apart, from index `at` on; brackets within the label balance. */
export function takeBrackets(source: string, at: number): Bracketed {
  let end = at;
  let label: string | null = null;
  if (source.charAt(at) === "[") {
    let depth = 0;
    for (; end < source.length; end++) {
      if (source.charAt(end) === "[") depth++;
      if (source.charAt(end) === "]" && --depth === 0) break;
    }
    if (depth === 0) label = source.slice(at + 1, end++);
    else end = at;
  }
  const attributes = /^\{(?:"[^"]*"|[^}"])*\}/.exec(source.slice(end))?.[0] ?? "";
  return { label, labelAt: at + 1, attributes, attributesAt: end, rest: source.slice(end + attributes.length) };
}

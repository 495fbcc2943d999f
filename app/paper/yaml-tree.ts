import type { Node, Pair, Scalar, YAMLMap, YAMLSeq } from "yaml";
import { isAlias, isMap, isPair, isScalar, isSeq, parseDocument } from "yaml";
import { Lines } from "./lines.ts";
import { remembered } from "./memory.ts";
import type { Problem, Yaml, YamlEntry } from "./types.ts";
import type { YamlFault } from "./yaml-cures.ts";
import {
  cutByComma,
  cutByComment,
  faultsOfErrors,
  inSingleQuotes,
  nestsTooDeeply,
  openBrackets,
  quotable,
} from "./yaml-cures.ts";

export interface YamlReading {
  /** null when there is any problem: half a body would give rise to further, misleading ones. */
  readonly value: Yaml | null;
  /** What could be read all the same; null: nothing. */
  readonly partial: Yaml | null;
  readonly problems: readonly Problem[];
}

/** Length of YAML, in characters, whose reading is remembered. */
const kept = 200_000;

/**
 * Reads YAML by the failsafe schema: every scalar is its text. Anchors, aliases, tags and keys that are not plain words
 * are refused; the traps of YAML are reported with their cures.
 * @param at where an index of `source` stands in the paper's text
 */
export function readYaml(source: string, at: (index: number) => number, lines: Lines): YamlReading {
  const { tree, faults } = readOnItsOwn(source);
  const problems = faults.map((fault) => problemOf(fault, at, lines));
  const partial = tree === null ? null : moved(tree, at, lines);
  return { value: problems.length === 0 ? partial : null, partial, problems };
}

/** The same with offsets and lines of the source itself. */
const readOnItsOwn = remembered((source: string): { tree: Yaml | null; faults: readonly YamlFault[] } => {
  if (nestsTooDeeply(source)) {
    const message = "Lists and maps are nested too deeply here to be read.";
    return { tree: null, faults: [{ from: 0, to: source.length, message }] };
  }
  const document = parseDocument(source, {
    schema: "failsafe",
    prettyErrors: false,
    uniqueKeys: false,
    logLevel: "error",
  });
  const faults = faultsOfErrors(source, document.errors);
  const tree = new Converter(source, new Lines(source), faults).convert(document.contents, 0);
  return { tree, faults };
}, kept);

function moved(node: Yaml, at: (index: number) => number, lines: Lines): Yaml {
  const from = at(node.from);
  const place = { from, to: at(node.to), line: lines.lineAt(from) };
  if (node.yaml === "scalar") return { ...node, ...place };
  if (node.yaml === "list") return { ...node, ...place, items: node.items.map((item) => moved(item, at, lines)) };
  const entries = node.entries.map((entry): YamlEntry => {
    const keyFrom = at(entry.keyFrom);
    const value = moved(entry.value, at, lines);
    return { key: entry.key, keyFrom, keyTo: at(entry.keyTo), line: lines.lineAt(keyFrom), value };
  });
  return { ...node, ...place, entries };
}

function problemOf(fault: YamlFault, at: (index: number) => number, lines: Lines): Problem {
  const from = at(fault.from);
  const { fix } = fault;
  const earlier = fault.earlier === undefined ? "" : ` It stands first in line ${lines.lineAt(at(fault.earlier))}.`;
  const message = fault.message + earlier;
  const problem: Problem = { from, to: at(fault.to), line: lines.lineAt(from), severity: "error", message };
  return fix === undefined ? problem : { ...problem, fix: { ...fix, from: at(fix.from), to: at(fix.to) } };
}

/** YAML's `? key` at the beginning of a line or of an entry; a value that ends in a question mark is none. */
const EXPLICIT_KEY = /(?:^|[\r\n{[,]|-[ \t])[ \t]*\?[ \t]*$/;

class Converter {
  constructor(
    private readonly source: string,
    private readonly lines: Lines,
    private readonly faults: YamlFault[],
  ) {}

  convert(node: unknown, fallback: number): Yaml {
    if (isAlias(node)) {
      const [from, to] = rangeOf(node, fallback);
      this.report(quotable(this.source, from, to, "YAML takes a leading * for an alias, which a paper does not use."));
      return this.scalar("", false, from, to);
    }
    if (isScalar(node)) return this.convertScalar(node, fallback);
    if (isMap(node)) return this.convertMap(node, fallback);
    if (isSeq(node)) return this.convertList(node, fallback);
    return this.scalar("", false, fallback, fallback);
  }

  private convertScalar(node: Scalar, fallback: number): Yaml {
    const [from, to] = rangeOf(node, fallback);
    this.refuseProperties(node, from, to);
    const written = this.source.slice(from, to);
    if (node.type === "PLAIN") {
      const cut = cutByComment(this.source, from, to);
      if (cut !== null) this.report(cut);
    }
    if (node.type === "QUOTE_DOUBLE" && /\\[a-zA-Z]/.test(written)) {
      const insert = inSingleQuotes(written.slice(1, -1));
      const message = `Between double quotes YAML reads ${/\\[a-zA-Z]/.exec(written)?.[0]} as an escape. Use single quotes: ${insert}`;
      this.report({ from, to, message, fix: { label: `Write ${insert}`, from, to, insert } });
    }
    const text = typeof node.value === "string" ? node.value : written;
    return this.scalar(text, node.type !== "PLAIN", from, to);
  }

  private convertList(node: YAMLSeq, fallback: number): Yaml {
    const [from, to] = rangeOf(node, fallback);
    this.refuseProperties(node, from, to);
    if (node.flow && this.reportCuts(node.items, to)) return { yaml: "list", items: [], ...this.place(from, to) };
    const items = node.items.map((item) => {
      if (!isPair(item)) return this.convert(item, from);
      return { yaml: "map" as const, entries: [this.entry(item, from)], ...this.place(from, to) };
    });
    return { yaml: "list", items, ...this.place(from, to) };
  }

  private convertMap(node: YAMLMap, fallback: number): Yaml {
    const [from, to] = rangeOf(node, fallback);
    this.refuseProperties(node, from, to);
    const parts = node.items.flatMap((pair) => [pair.key, pair.value]);
    if (node.flow && this.reportCuts(parts, to)) return { yaml: "map", entries: [], ...this.place(from, to) };
    const seen = new Map<string, number>();
    const entries = node.items.map((pair) => {
      const entry = this.entry(pair, from);
      const earlier = seen.get(entry.key);
      if (earlier === undefined) seen.set(entry.key, entry.keyFrom);
      else {
        const message = `“${entry.key}” is given twice here. Keep one of the two.`;
        this.report({ from: entry.keyFrom, to: entry.keyTo, message, earlier });
      }
      return entry;
    });
    return { yaml: "map", entries, ...this.place(from, to) };
  }

  private entry(pair: Pair, fallback: number): YamlEntry {
    const [from, to] = rangeOf(pair.key, fallback);
    if (!isScalar(pair.key) || (from < to && EXPLICIT_KEY.test(this.source.slice(0, from)))) {
      this.report({ from, to, message: "A key is one plain word, with a colon and a space after it." });
    } else this.refuseProperties(pair.key, from, to);
    const key = isScalar(pair.key) ? String(pair.key.value ?? "") : this.source.slice(from, to);
    const value = this.convert(pair.value, to);
    if (value.yaml === "scalar" && value.text === "" && !value.quoted) this.noticeLostText(to);
    return { key, keyFrom: from, keyTo: to, line: this.lines.lineAt(from), value };
  }

  /** `symbol: #1`: the whole value is a comment to YAML. */
  private noticeLostText(keyEnd: number): void {
    const lost = /^\s*:[ \t]+(#[^\s#][^\r\n]*)/.exec(this.source.slice(keyEnd, keyEnd + 500));
    if (lost === null) return;
    const text = (lost[1] ?? "").trimEnd();
    const from = keyEnd + lost[0].length - (lost[1] ?? "").length;
    this.report(quotable(this.source, from, from + text.length, "YAML takes a leading # for a comment."));
  }

  /** Formulas that YAML cut at commas within their brackets, in a list or map in brackets. */
  private reportCuts(parts: readonly unknown[], end: number): boolean {
    let reported = -1;
    for (const part of parts) {
      if (!isScalar(part) || part.type !== "PLAIN" || !part.range) continue;
      const [from, to] = part.range;
      if (from < reported || openBrackets(this.source.slice(from, to)) <= 0) continue;
      const fault = cutByComma(this.source, from, end);
      if (fault.to <= to) continue;
      reported = fault.to;
      this.report(fault);
    }
    return reported >= 0;
  }

  private refuseProperties(node: Node, from: number, to: number): void {
    if ("anchor" in node && typeof node.anchor === "string") {
      this.report({
        from,
        to,
        message: "Anchors (&) are not used in a paper. Put a text that begins with & in quotes.",
      });
    } else if (typeof node.tag === "string") {
      this.report({ from, to, message: "Tags (!) are not used in a paper. Put a text that begins with ! in quotes." });
    }
  }

  private report(fault: YamlFault): void {
    const line = this.lines.lineAt(fault.from);
    if (!this.faults.some((known) => this.lines.lineAt(known.from) === line)) this.faults.push(fault);
  }

  private scalar(text: string, quoted: boolean, from: number, to: number): Yaml {
    return { yaml: "scalar", text, quoted, ...this.place(from, to) };
  }

  private place(from: number, to: number): { from: number; to: number; line: number } {
    return { from, to, line: this.lines.lineAt(from) };
  }
}

function rangeOf(node: unknown, fallback: number): [number, number] {
  if (isScalar(node) || isMap(node) || isSeq(node) || isAlias(node)) {
    const range = node.range;
    if (range) return [range[0], range[1]];
  }
  return [fallback, fallback];
}

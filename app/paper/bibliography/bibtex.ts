import { nearestSpelling } from "../../spelling/index.ts";
import { Lines } from "../lines.ts";
import { didYouMean } from "../spelling.ts";
import type { BibliographyEntry, Problem } from "../types.ts";
import { numberCited } from "./order.ts";

const months: Readonly<Record<string, string>> = {
  jan: "January",
  feb: "February",
  mar: "March",
  apr: "April",
  may: "May",
  jun: "June",
  jul: "July",
  aug: "August",
  sep: "September",
  oct: "October",
  nov: "November",
  dec: "December",
};

const entryTypes = [
  "article",
  "book",
  "booklet",
  "conference",
  "inbook",
  "incollection",
  "inproceedings",
  "manual",
  "mastersthesis",
  "misc",
  "online",
  "phdthesis",
  "proceedings",
  "techreport",
  "thesis",
  "unpublished",
];

/**
 * Reads BibTeX: entries, `@string` abbreviations (the twelve months are given), values in braces or quotation marks,
 * joined by `#`. Text between entries and `@comment` is left out, as BibTeX does. Never fails; an entry at fault is
 * reported at its place and reading goes on at the next line that begins with @.
 * Source: the BibTeX format as described by O. Patashnik, "BibTeXing" (1988).
 * @param cited keys of the entries that the paper cites: those are numbered
 */
export function readBibliography(
  text: string,
  cited: ReadonlySet<string>,
): { entries: readonly BibliographyEntry[]; problems: readonly Problem[] } {
  const reader = new BibtexReader(text);
  reader.read();
  return { entries: numberCited(reader.entries, cited), problems: reader.problems };
}

/** Thrown within the reader only: an entry cannot be read further. */
class EntryFault extends Error {
  readonly from: number;
  constructor(message: string, from: number) {
    super(message);
    this.name = "EntryFault";
    this.from = from;
  }
}

class BibtexReader {
  readonly entries: Omit<BibliographyEntry, "number">[] = [];
  readonly problems: Problem[] = [];
  private readonly strings = new Map(Object.entries(months));
  private readonly keyLines = new Map<string, number>();
  private readonly lines: Lines;
  private at = 0;

  constructor(private readonly text: string) {
    this.lines = new Lines(text);
  }

  read(): void {
    for (;;) {
      const start = this.text.indexOf("@", this.at);
      if (start < 0) return;
      this.at = start + 1;
      try {
        this.block(start);
      } catch (fault) {
        if (!(fault instanceof EntryFault)) throw fault;
        this.report(fault.from, fault.from + 1, fault.message);
        this.recover(start);
      }
    }
  }

  private block(start: number): void {
    const type = this.word(/[A-Za-z]+/y).toLowerCase();
    if (type === "") return;
    if (type === "comment" && this.peek() !== "{" && this.peek() !== "(") return;
    const close = this.peek() === "{" ? "}" : this.peek() === "(" ? ")" : "";
    if (close === "") {
      if (entryTypes.includes(type)) throw new EntryFault(`After @${type} comes a brace: @${type}{key, …}.`, start);
      return;
    }
    this.at++;
    if (type === "comment" || type === "preamble") this.skipBlock(start, close);
    else if (type === "string") this.abbreviation(start, close);
    else this.entry(start, type, close);
  }

  private abbreviation(start: number, close: string): void {
    const name = this.word(/[^\s"#%'(),={}]+/y);
    if (name === "" || this.peek() !== "=")
      throw new EntryFault("An abbreviation is written @string{name = {text}}.", start);
    this.at++;
    this.strings.set(name.toLowerCase(), this.value());
    if (this.peek() !== close) throw new EntryFault(`This @string is not closed: it needs its “${close}”.`, start);
    this.at++;
  }

  private entry(start: number, type: string, close: string): void {
    this.space();
    const keyAt = this.at;
    const key = this.word(/[^\s,{}"#%()=]+/y);
    if (key === "" || (this.peek() !== "," && this.peek() !== close)) {
      throw new EntryFault(`An entry begins with its key and a comma: @${type}{kesten1978, …}.`, keyAt);
    }
    const fields: Record<string, string> = {};
    while (this.peek() === ",") {
      this.at++;
      if (this.peek() === close) break;
      this.field(key, fields);
    }
    if (this.peek() === "@")
      throw new EntryFault(`The entry “${key}” is not closed before the next: a brace is missing.`, start);
    if (this.peek() !== close) {
      const why = this.peek() === "" ? `it needs its “${close}”` : "after a field comes a comma, or the closing brace";
      throw new EntryFault(`The entry “${key}” cannot be read here: ${why}.`, Math.min(this.at, this.text.length));
    }
    this.at++;
    this.keep(start, keyAt, type, key, fields);
  }

  private field(key: string, fields: Record<string, string>): void {
    this.space();
    const at = this.at;
    const name = this.word(/[^\s"#%'(),={}]+/y);
    if (name === "" || this.peek() !== "=") {
      throw new EntryFault(`In the entry “${key}” a field “name = {value}” is expected here.`, at);
    }
    this.at++;
    const value = this.value().replace(/\s+/g, " ").trim();
    const folded = name.toLowerCase();
    if (Object.hasOwn(fields, folded))
      this.report(at, at + name.length, `“${name}” is given twice in the entry “${key}”.`);
    else fields[folded] = value;
  }

  private keep(start: number, keyAt: number, type: string, key: string, fields: Record<string, string>): void {
    const end = keyAt + key.length;
    const earlier = this.keyLines.get(key);
    if (earlier !== undefined) {
      this.report(keyAt, end, `The key “${key}” was given in line ${earlier} already; that entry is taken.`);
      return;
    }
    this.keyLines.set(key, this.lines.lineAt(keyAt));
    if (!entryTypes.includes(type)) {
      const nearest = nearestSpelling(type, entryTypes);
      const message = `@${type} is not a type of entry known here; it is set as @misc.${didYouMean(type, entryTypes)}`;
      const fix =
        nearest === null
          ? undefined
          : { label: `Write @${nearest}`, from: start + 1, to: start + 1 + type.length, insert: nearest };
      this.report(start, start + 1 + type.length, message, "warning", fix);
    }
    const missing = [
      fields.title === undefined ? "title" : "",
      fields.author === undefined && fields.editor === undefined ? "author" : "",
      fields.year === undefined && fields.date === undefined ? "year" : "",
    ].filter((name) => name !== "");
    if (missing.length > 0) this.report(keyAt, end, `The entry “${key}” has no ${missing.join(", no ")}.`, "warning");
    this.entries.push({ key, type, fields, span: this.lines.span(start, this.at) });
  }

  private value(): string {
    let value = this.piece();
    while (this.peek() === "#") {
      this.at++;
      value += this.piece();
    }
    return value;
  }

  private piece(): string {
    const first = this.peek();
    if (first === "{") return this.braced();
    if (first === '"') return this.quoted();
    const at = this.at;
    const word = this.word(/[^\s"#%'(),={}]+/y);
    if (/^\d+$/.test(word)) return word;
    if (word === "") throw new EntryFault("A value is expected here: {text}, a number, or an abbreviation.", at);
    const text = this.strings.get(word.toLowerCase());
    if (text === undefined) {
      const message = `“${word}” is no abbreviation given by @string; a text stands in braces.${didYouMean(word, this.strings.keys())}`;
      this.report(at, at + word.length, message);
    }
    return text ?? word;
  }

  private braced(): string {
    const start = this.at;
    let depth = 0;
    for (; this.at < this.text.length; this.at++) {
      const character = this.text.charAt(this.at);
      if (character === "\\") this.at++;
      else if (character === "{") depth++;
      else if (character === "}" && --depth === 0) return this.text.slice(start + 1, this.at++);
    }
    throw new EntryFault("Nothing closes this brace.", start);
  }

  private quoted(): string {
    const start = this.at;
    let depth = 0;
    for (this.at++; this.at < this.text.length; this.at++) {
      const character = this.text.charAt(this.at);
      if (character === "{") depth++;
      else if (character === "}") depth--;
      else if (character === '"' && depth === 0) return this.text.slice(start + 1, this.at++);
    }
    throw new EntryFault("Nothing closes this quotation mark.", start);
  }

  private skipBlock(start: number, close: string): void {
    const open = close === "}" ? "{" : "(";
    for (let depth = 1; this.at < this.text.length; this.at++) {
      const character = this.text.charAt(this.at);
      if (character === open) depth++;
      if (character === close && --depth === 0) {
        this.at++;
        return;
      }
    }
    throw new EntryFault(`This is not closed: it needs its “${close}”.`, start);
  }

  /** Goes on at the next line that begins with @. */
  private recover(start: number): void {
    const next = /(?:\r\n?|\n)[ \t]*@/g;
    next.lastIndex = start + 1;
    const found = next.exec(this.text);
    this.at = found === null ? this.text.length : next.lastIndex - 1;
  }

  private word(pattern: RegExp): string {
    this.space();
    pattern.lastIndex = this.at;
    const word = pattern.exec(this.text)?.[0] ?? "";
    this.at += word.length;
    return word;
  }

  /** Next character that is no space; "" at the end. */
  private peek(): string {
    this.space();
    return this.text.charAt(this.at);
  }

  private space(): void {
    while (/\s/.test(this.text.charAt(this.at))) this.at++;
  }

  private report(
    from: number,
    to: number,
    message: string,
    severity: Problem["severity"] = "error",
    fix?: Problem["fix"],
  ): void {
    const place = { from, to: Math.min(to, this.text.length), line: this.lines.lineAt(from) };
    const problem: Problem = { ...place, severity, message, where: "bibliography" };
    this.problems.push(fix === undefined ? problem : { ...problem, fix });
  }
}

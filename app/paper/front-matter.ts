import type { RootContent } from "mdast";
import { dressBlocks, placeInScalar, readScalar } from "./dress.ts";
import type { Reading } from "./reading.ts";
import { relocate } from "./relocate.ts";
import { didYouMean } from "./spelling.ts";
import { parseBlocks } from "./syntax/index.ts";
import type { Author, FrontMatter, Span, Yaml, YamlEntry } from "./types.ts";
import { readYaml } from "./yaml-tree.ts";

/** What a paper is called that has no title: on the shelf, on its pages and in print. */
export const UNTITLED = "Untitled paper";

type Scalar = Extract<Yaml, { yaml: "scalar" }>;

const keys = ["title", "authors", "abstract", "keywords", "msc", "macros"];
const authorKeys = ["name", "affiliation", "email", "orcid"] as const;

/** Reads the YAML between the `---` lines at the head of a text; null: there is none. */
export function readFrontMatter(reading: Reading, span: Span | null): FrontMatter {
  const front = new FrontMatterReader(reading);
  if (span !== null) front.read(span);
  return front.finish(span);
}

class FrontMatterReader {
  private title: Scalar | undefined;
  private abstract: Scalar | undefined;
  private authors: Author[] = [];
  private keywords: string[] = [];
  private msc: string[] = [];
  private readonly macros: Record<string, string> = {};

  constructor(private readonly reading: Reading) {}

  read(span: Span): void {
    const { text, lines } = this.reading;
    const source = text.slice(span.from, span.to);
    const start = /^---[ \t]*(\r\n?|\n)?/.exec(source)?.[0].length ?? 0;
    const end = Math.max(start, Math.max(source.lastIndexOf("\n"), source.lastIndexOf("\r")) + 1);
    const { partial: value, problems } = readYaml(
      source.slice(start, end),
      (index) => span.from + start + index,
      lines,
    );
    this.reading.problems.push(...problems);
    if (value === null || (value.yaml === "scalar" && value.text.trim() === "")) return;
    if (value.yaml !== "map") this.refuse(value, "Front matter is a list of entries “key: value”, one a line.");
    else for (const entry of value.entries) this.entry(entry);
  }

  finish(span: Span | null): FrontMatter {
    const { title, abstract, authors, keywords, msc, macros } = this;
    return {
      title: title?.text.trim() ?? "",
      authors,
      abstract: abstract?.text.trim() ?? "",
      keywords,
      msc,
      macros,
      span,
      titleNodes: readScalar(this.reading, title),
      abstractNodes: abstract === undefined ? [] : this.blocks(abstract),
    };
  }

  private entry({ key, keyFrom, keyTo, value }: YamlEntry): void {
    switch (key) {
      case "title":
        this.title = this.scalar(value, "The title is one text.");
        break;
      case "abstract":
        this.abstract = this.scalar(
          value,
          "The abstract is one text; several lines stand after “abstract: |”, further in.",
        );
        break;
      case "authors":
        this.authors = this.items(value, "Authors are a list of entries “- name: …”.").flatMap(
          (item) => this.author(item) ?? [],
        );
        break;
      case "keywords":
        this.keywords = this.texts(value, "Keywords are a list: [fronts, branching].");
        break;
      case "msc":
        this.msc = this.texts(value, "MSC codes are a list: [60J80, 35K57].");
        break;
      case "macros":
        this.readMacros(value);
        break;
      default: {
        const message = `Front matter has no “${key}”. It has ${keys.join(", ")}.${didYouMean(key, keys)}`;
        this.reading.report(keyFrom, keyTo, message);
      }
    }
  }

  private author(item: Yaml): Author | null {
    if (item.yaml === "scalar" && item.text.trim() !== "") return { name: item.text.trim() };
    if (item.yaml !== "map") {
      this.refuse(item, `An author has ${authorKeys.join(", ")}: “- name: …”.`);
      return null;
    }
    const author: { -readonly [Key in keyof Author]: Author[Key] } = { name: "" };
    for (const { key, keyFrom, keyTo, value } of item.entries) {
      const known = authorKeys.find((candidate) => candidate === key);
      if (known === undefined) {
        const message = `An author has no “${key}”, but ${authorKeys.join(", ")}.${didYouMean(key, authorKeys)}`;
        this.reading.report(keyFrom, keyTo, message);
      } else {
        const text = this.scalar(value, `“${key}” is one text.`)?.text.trim();
        if (text) author[known] = text;
      }
    }
    if (author.name === "") this.refuse(item, "An author needs a name.");
    const orcid = item.entries.find((entry) => entry.key === "orcid")?.value;
    if (author.orcid !== undefined && orcid !== undefined && !isOrcid(author.orcid)) {
      this.refuse(
        orcid,
        "This is not an ORCID: sixteen digits in groups of four, the last a check digit (0000-0002-1825-0097).",
      );
    }
    return author.name === "" ? null : author;
  }

  private readMacros(value: Yaml): void {
    if (value.yaml !== "map") {
      this.refuse(value, "Macros are entries “\\E: \\mathbb{E}”, one a line, further in.");
      return;
    }
    for (const { key, keyFrom, keyTo, value: body } of value.entries) {
      if (!/^\\([A-Za-z]+|[^A-Za-z\s])$/.test(key)) {
        this.reading.report(keyFrom, keyTo, `“${key}” cannot be a macro: a macro is a backslash and letters, as \\E.`);
      } else {
        const scalar = this.scalar(body, "A macro stands for one text of TeX.");
        if (scalar !== undefined) this.macros[key] = scalar.text;
      }
    }
  }

  private texts(value: Yaml, message: string): string[] {
    return this.items(value, message).flatMap((item) => this.scalar(item, message)?.text.trim() || []);
  }

  private items(value: Yaml, message: string): readonly Yaml[] {
    if (value.yaml === "list") return value.items;
    if (value.yaml !== "scalar" || value.text !== "") this.refuse(value, message);
    return [];
  }

  private scalar(value: Yaml, message: string): Scalar | undefined {
    if (value.yaml === "scalar") return value;
    this.refuse(value, message);
    return undefined;
  }

  private refuse(value: Yaml, message: string): void {
    this.reading.report(value.from, value.to, message);
  }

  private blocks(scalar: Scalar): readonly RootContent[] {
    const root = parseBlocks(scalar.text);
    relocate(root, placeInScalar(this.reading.text, scalar), this.reading.lines);
    return dressBlocks(this.reading, root.children);
  }
}

/** Source: ISO/IEC 7064 MOD 11-2, as ORCID uses it (support.orcid.org, "Structure of the ORCID identifier"). */
function isOrcid(orcid: string): boolean {
  const match = /^(?:https:\/\/orcid\.org\/)?(\d{4})-(\d{4})-(\d{4})-(\d{3}[\dX])$/.exec(orcid);
  if (match === null) return false;
  const digits = match.slice(1).join("");
  let total = 0;
  for (const digit of digits.slice(0, -1)) total = (total + Number(digit)) * 2;
  const check = (12 - (total % 11)) % 11;
  return digits.at(-1) === (check === 10 ? "X" : String(check));
}

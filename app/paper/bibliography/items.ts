import type { BibliographyEntry } from "../types.ts";
import { texPieces, texToUnicode } from "./accents.ts";
import { personNames, withInitials } from "./names.ts";

/** A run of a printed entry: plain or emphasised words, math (its TeX), or words that lead to an address. */
export interface ItemRun {
  readonly text: string;
  readonly emphasis: boolean;
  readonly math?: boolean;
  readonly link?: string;
}

/** A citation as printed: "[3]", "[1, 3]", "[3, Theorem 1.2]", or "Kesten (1978)". What is missing prints as "?". */
export function citationText(
  entries: readonly BibliographyEntry[],
  options: { readonly as?: "number" | "text"; readonly at?: string | null } = {},
): string {
  const at = options.at ? `, ${options.at}` : "";
  if (entries.length === 0) return `[?${at}]`;
  if (options.as === "text") {
    const words = entries.map((entry, index) => {
      const last = index === entries.length - 1;
      return `${shortNames(entry)} (${yearOf(entry) || "n.d."}${last ? at : ""})`;
    });
    return joined(words);
  }
  const numbers = entries.map((entry) => entry.number).sort((a, b) => (a ?? Infinity) - (b ?? Infinity));
  return `[${numbers.map((number) => number ?? "?").join(", ")}${at}]`;
}

/** An entry of the printed list: authors, title, where and when it appeared, and its DOI or address. */
export function bibliographyItem(entry: BibliographyEntry): ItemRun[] {
  const { fields } = entry;
  const runs: ItemRun[] = [];
  const authors = personNames(fields.author ?? "")
    .map(withInitials)
    .filter((name) => name !== "");
  const editors = personNames(fields.editor ?? "")
    .map(withInitials)
    .filter((name) => name !== "");
  if (fields.author !== undefined) runs.push(words(`${joined(authors)}. `));
  else if (fields.editor !== undefined)
    runs.push(words(`${joined(editors)} (${editors.length > 1 ? "eds" : "ed."}). `));
  const standsAlone = fields.journal === undefined && fields.booktitle === undefined;
  if (fields.title !== undefined) {
    runs.push(
      ...texRuns(fields.title.replace(/[.\s]+$/, ""), standsAlone),
      words(/[?!]$/.test(fields.title) ? " " : ". "),
    );
  }
  runs.push(...whereabouts(entry, editors));
  return runs.filter((run) => run.text !== "");
}

function whereabouts({ type, fields }: BibliographyEntry, editors: readonly string[]): ItemRun[] {
  const runs: ItemRun[] = [];
  const year = yearOf({ fields });
  const pages = fields.pages === undefined ? "" : texToUnicode(fields.pages).replace(/\s*[-–]+\s*/g, "–");
  if (fields.journal !== undefined) {
    runs.push(...texRuns(fields.journal, true));
    const issue = fields.number === undefined ? "" : `(${texToUnicode(fields.number)})`;
    runs.push(words(fields.volume === undefined ? "" : ` ${texToUnicode(fields.volume)}${issue}`));
    runs.push(words(pages === "" ? "" : `, ${pages}`));
  } else if (fields.booktitle !== undefined) {
    runs.push(words("In: "), ...texRuns(fields.booktitle, true));
    if (fields.author !== undefined && editors.length > 0)
      runs.push(words(` (${editors.length > 1 ? "eds" : "ed."} ${joined(editors)})`));
    runs.push(words(fields.volume === undefined ? "" : `, vol. ${texToUnicode(fields.volume)}`));
    runs.push(words(pages === "" ? "" : `, ${pages}`));
  }
  const place = [
    fields.edition === undefined ? "" : `${texToUnicode(fields.edition)} ed.`,
    thesisName(type, fields),
    texToUnicode(fields.publisher ?? fields.school ?? fields.institution ?? fields.howpublished ?? ""),
    texToUnicode(fields.address ?? ""),
  ].filter((part) => part !== "");
  const last = [...place, runs.length === 0 ? year : ""].filter((part) => part !== "").join(", ");
  if (last !== "") runs.push(words(`${runs.length === 0 ? "" : ", "}${last}`));
  if (runs.length > 0 && !last.endsWith(year)) runs.push(words(` (${year})`));
  if (runs.length > 0) runs.push(words("."));
  if (fields.note !== undefined) runs.push(words(" "), ...texRuns(fields.note, false), words("."));
  return [...runs, ...address(fields)];
}

function thesisName(type: string, fields: Readonly<Record<string, string>>): string {
  if (type === "phdthesis") return texToUnicode(fields.type ?? "PhD thesis");
  if (type === "mastersthesis") return texToUnicode(fields.type ?? "Master’s thesis");
  if (type === "techreport")
    return `${texToUnicode(fields.type ?? "Technical report")} ${texToUnicode(fields.number ?? "")}`.trim();
  return "";
}

function address(fields: Readonly<Record<string, string>>): ItemRun[] {
  const doi = fields.doi?.replace(/^(https?:\/\/(dx\.)?doi\.org\/|doi:\s*)/i, "").replaceAll("\\_", "_");
  if (doi) return [words(" "), { text: `doi:${doi}`, emphasis: false, link: `https://doi.org/${doi}` }];
  const eprint = fields.eprint?.replace(/^arxiv:/i, "");
  if (eprint && /^(arxiv)?$/i.test(fields.archiveprefix ?? fields.eprinttype ?? "")) {
    return [words(" "), { text: `arXiv:${eprint}`, emphasis: false, link: `https://arxiv.org/abs/${eprint}` }];
  }
  const url = fields.url?.replace(/^\\url\{(.*)\}$/, "$1").replaceAll("\\_", "_");
  if (url && /^https?:\/\/\S+$/i.test(url)) return [words(" "), { text: url, emphasis: false, link: url }];
  return [];
}

function texRuns(tex: string, emphasis: boolean): ItemRun[] {
  return texPieces(tex).map(({ text, math }) => (math ? { text, emphasis, math } : { text, emphasis }));
}

function words(text: string): ItemRun {
  return { text, emphasis: false };
}

function shortNames({ fields, key }: BibliographyEntry): string {
  const names = personNames(fields.author ?? fields.editor ?? "")
    .map((name) => name.last)
    .filter((name) => name !== "");
  if (names.length === 0) return texToUnicode(fields.title ?? key);
  return names.length > 2 ? `${names[0]} et al.` : joined(names);
}

function yearOf({ fields }: Pick<BibliographyEntry, "fields">): string {
  return /\d{4}/.exec(fields.year ?? fields.date ?? "")?.[0] ?? texToUnicode(fields.year ?? "");
}

function joined(names: readonly string[]): string {
  if (names.length <= 1) return names[0] ?? "";
  return `${names.slice(0, -1).join(", ")} and ${names.at(-1)}`;
}

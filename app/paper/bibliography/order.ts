import type { BibliographyEntry } from "../types.ts";
import { texToUnicode } from "./accents.ts";
import { personNames } from "./names.ts";

/** Numbers the cited entries by the first author's last name, then the other authors', the year, title and key. */
export function numberCited(
  entries: readonly Omit<BibliographyEntry, "number">[],
  cited: ReadonlySet<string>,
): BibliographyEntry[] {
  const ordered = entries
    .filter((entry) => cited.has(entry.key))
    .map((entry) => ({ key: entry.key, order: sortKey(entry) }))
    .sort((a, b) => compare(a.order, b.order));
  const numbers = new Map(ordered.map(({ key }, index) => [key, index + 1]));
  return entries.map((entry) => ({ ...entry, number: numbers.get(entry.key) ?? null }));
}

function sortKey({ fields, key }: Omit<BibliographyEntry, "number">): string[] {
  const names = personNames(fields.author ?? fields.editor ?? fields.title ?? key);
  const authors = names.map((name) => `${name.last} ${name.first}`).join("  ");
  return [authors, fields.year ?? fields.date ?? "", texToUnicode(fields.title ?? ""), key].map(fold);
}

/** Letters without accents and case, so that the order is the same on every machine. */
function fold(text: string): string {
  return text
    .normalize("NFD")
    .replace(/\p{Mark}/gu, "")
    .toLowerCase();
}

function compare(a: readonly string[], b: readonly string[]): number {
  for (const [index, left] of a.entries()) {
    const right = b[index] ?? "";
    if (left !== right) return left < right ? -1 : 1;
  }
  return 0;
}

import { texToUnicode } from "./accents.ts";

export interface PersonName {
  /** With its particles: "van der Hofstad". */
  readonly last: string;
  readonly first: string;
  readonly suffix: string;
}

/**
 * The persons of an `author` or `editor` field: "Last, First", "Last, Jr, First" or "First von Last", joined by "and".
 * A name wholly in braces is one last name (an institution).
 * Source: the rules of names in O. Patashnik, "BibTeXing" (1988).
 */
export function personNames(field: string): PersonName[] {
  return splitOutsideBraces(field, /\s+and\s+/iy).map(readName);
}

/** "H. Kesten": initials before the last name. */
export function withInitials(name: PersonName): string {
  const initials = name.first
    .split(/[\s\u00A0]+/)
    .filter((word) => word !== "")
    .map((word) => word.split("-").map(initial).join("-"));
  return [...initials, name.last].join("\u00A0") + (name.suffix === "" ? "" : `, ${name.suffix}`);
}

function initial(word: string): string {
  const letter = [...word][0] ?? "";
  return word.endsWith(".") ? word : `${letter}.`;
}

function readName(source: string): PersonName {
  const parts = splitOutsideBraces(source.trim(), /\s*,\s*/y);
  if (parts.length >= 3) {
    return { last: plain(parts[0]), suffix: plain(parts[1]), first: plain(parts.slice(2).join(", ")) };
  }
  if (parts.length === 2) return { last: plain(parts[0]), suffix: "", first: plain(parts[1]) };
  const words = splitOutsideBraces(source.trim(), /\s+/y);
  const particle = words.findIndex((word, index) => index < words.length - 1 && index > 0 && /^[a-z]/.test(word));
  const from = particle < 0 ? words.length - 1 : particle;
  return { first: plain(words.slice(0, from).join(" ")), last: plain(words.slice(from).join(" ")), suffix: "" };
}

function plain(tex: string | undefined): string {
  return texToUnicode(tex ?? "").trim();
}

/** @param separator sticky */
function splitOutsideBraces(text: string, separator: RegExp): string[] {
  const parts: string[] = [];
  let depth = 0;
  let start = 0;
  for (let at = 0; at < text.length; at++) {
    const character = text.charAt(at);
    if (character === "\\") at++;
    else if (character === "{") depth++;
    else if (character === "}") depth--;
    else if (depth === 0) {
      separator.lastIndex = at;
      const found = separator.exec(text);
      if (found === null || found[0] === "") continue;
      parts.push(text.slice(start, at));
      at += found[0].length - 1;
      start = at + 1;
    }
  }
  parts.push(text.slice(start));
  return parts;
}

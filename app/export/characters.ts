import { MATH_CHARACTERS } from "./math-characters.ts";

/**
 * What print's fonts hold beyond ASCII, by character. The text faces are Latin Modern (T1, TS1), Greek is set in LGR and
 * Cyrillic in the Washington fonts, all of which come with the TeX of the Debian packages that Halfline asks for.
 */

/** Characters that LaTeX's own input tables for T1 and TS1 know; as pairs of first and last code point. */
const LATIN_RANGES: readonly (readonly [number, number])[] = [
  [0xa1, 0xac],
  [0xae, 0xff],
  [0x100, 0x137],
  [0x139, 0x13e],
  [0x141, 0x148],
  [0x14a, 0x165],
  [0x168, 0x17e],
  [0x192, 0x192],
  [0x1c4, 0x1d4],
  [0x1e2, 0x1e3],
  [0x1e6, 0x1eb],
  [0x1f0, 0x1f0],
  [0x1f4, 0x1f5],
  [0x218, 0x21b],
  [0x232, 0x233],
  [0x237, 0x237],
  [0x1e02, 0x1e03],
  [0x1e0d, 0x1e0d],
  [0x1e1e, 0x1e21],
  [0x1e25, 0x1e25],
  [0x1e30, 0x1e31],
  [0x1e37, 0x1e37],
  [0x1e43, 0x1e43],
  [0x1e45, 0x1e45],
  [0x1e47, 0x1e47],
  [0x1e5b, 0x1e5b],
  [0x1e63, 0x1e63],
  [0x1e6d, 0x1e6d],
  [0x1e8e, 0x1e91],
  [0x1e9e, 0x1e9e],
  [0x1ef2, 0x1ef3],
  [0x2010, 0x2010],
  [0x2013, 0x2016],
  [0x2018, 0x201a],
  [0x201c, 0x201e],
  [0x2020, 0x2022],
  [0x2030, 0x2031],
  [0x2039, 0x203b],
  [0x203d, 0x203d],
  [0x20ac, 0x20ac],
  [0x2116, 0x2116],
  [0x2122, 0x2122],
];

/** Whether the Latin text faces hold a character as it stands. */
export function isLatin(code: number): boolean {
  return LATIN_RANGES.some(([first, last]) => code >= first && code <= last);
}

/** Whether `textalpha` sets a character: Greek letters with and without accents. */
export function isGreek(code: number): boolean {
  return (
    (code >= 0x386 && code <= 0x3ce && code !== 0x38b && code !== 0x38d && code !== 0x3a2) ||
    (code >= 0x1f00 && code <= 0x1fff)
  );
}

/** Spaces, hyphens and marks of direction: what becomes of them in text. */
export const SPACING: ReadonlyMap<string, string> = new Map([
  ["\u00a0", "~"],
  ["\u00ad", "\\-"],
  ["\u2002", "\\enspace{}"],
  ["\u2003", "\\quad{}"],
  ["\u2004", "\\ "],
  ["\u2005", "\\ "],
  ["\u2006", "\\,"],
  ["\u2007", "\\ "],
  ["\u2008", "\\,"],
  ["\u2009", "\\,"],
  ["\u200a", "\\,"],
  ["\u200b", ""],
  ["\u200c", ""],
  ["\u200d", ""],
  ["\u2060", ""],
  ["\ufeff", ""],
  ["\u200e", ""],
  ["\u200f", ""],
  ["\u2011", "\\mbox{-}"],
  ["\u2012", "\u2013"],
  ["\u202f", "\\,"],
  ["\u205f", "\\:"],
  ["\ufe0e", ""],
  ["\ufe0f", ""],
]);

/** Position in the Washington Cyrillic fonts. Source: the fonts' own encoding vector (AMSFonts 3). */
export const CYRILLIC: ReadonlyMap<string, number> = new Map([
  ..."АБВГДЕЗИКЛМНОПРСТУФХЦЧШЩЫ"
    .split("")
    .map((c, i): [string, number] => [c, "ABVGDEZIKLMNOPRSTUFHCQXWY".charCodeAt(i)]),
  ..."абвгдезиклмнопрстуфхцчшщы"
    .split("")
    .map((c, i): [string, number] => [c, "abvgdeziklmnoprstufhcqxwy".charCodeAt(i)]),
  ["Ё", 19],
  ["Ж", 17],
  ["Й", 18],
  ["Ь", 94],
  ["Ъ", 95],
  ["Э", 3],
  ["Ю", 16],
  ["Я", 23],
  ["Є", 5],
  ["І", 4],
  ["Ј", 74],
  ["Љ", 1],
  ["Њ", 0],
  ["Џ", 2],
  ["Ђ", 6],
  ["Ћ", 7],
  ["ё", 27],
  ["ж", 25],
  ["й", 26],
  ["ь", 126],
  ["ъ", 127],
  ["э", 11],
  ["ю", 24],
  ["я", 31],
  ["є", 13],
  ["і", 12],
  ["ј", 106],
  ["љ", 9],
  ["њ", 8],
  ["џ", 10],
  ["ђ", 14],
  ["ћ", 15],
]);

/** Combining marks as accents over what goes before. */
export const COMBINING: ReadonlyMap<string, string> = new Map([
  ["\u0300", "\\`"],
  ["\u0301", "\\'"],
  ["\u0302", "\\^"],
  ["\u0303", "\\~"],
  ["\u0304", "\\="],
  ["\u0306", "\\u"],
  ["\u0307", "\\."],
  ["\u0308", '\\"'],
  ["\u030a", "\\r"],
  ["\u030b", "\\H"],
  ["\u030c", "\\v"],
  ["\u0323", "\\d"],
  ["\u0327", "\\c"],
  ["\u0328", "\\k"],
  ["\u0331", "\\b"],
]);

const RAISED = "⁰¹²³⁴⁵⁶⁷⁸⁹⁺⁻⁼⁽⁾ⁿⁱ";
const RAISED_PLAIN = "0123456789+-=()ni";
const LOWERED = "₀₁₂₃₄₅₆₇₈₉₊₋₌₍₎ₐₑₒₓₙₖₘₚₛₜᵢⱼ";
const LOWERED_PLAIN = "0123456789+-=()aeoxnkmpstij";

/** What a raised or lowered character is on the line, and which of the two it is. */
export function shifted(char: string): { plain: string; raised: boolean } | null {
  const up = RAISED.indexOf(char);
  if (up >= 0) return { plain: RAISED_PLAIN[up] ?? "", raised: true };
  const down = LOWERED.indexOf(char);
  return down >= 0 ? { plain: LOWERED_PLAIN[down] ?? "", raised: false } : null;
}

const ALPHABET_FROM = 0x1d400;
const ALPHABET_TO = 0x1d7ff;

/** Mathematical alphanumerics (𝔼, 𝑥, 𝐯) as the letter in its TeX alphabet. */
export function alphabetTex(char: string): string | null {
  const code = char.codePointAt(0) ?? 0;
  if (code < ALPHABET_FROM || code > ALPHABET_TO) return null;
  const letter = char.normalize("NFKD");
  const plain = MATH_CHARACTERS.get(letter) ?? letter;
  const from = (low: number, high: number) => code >= low && code <= high;
  if (from(0x1d538, 0x1d56b)) return /[A-Z]/.test(letter) ? `\\mathbb{${letter}}` : null;
  if (from(0x1d49c, 0x1d503)) return /[A-Z]/.test(letter) ? `\\mathcal{${letter}}` : null;
  if (from(0x1d504, 0x1d537) || from(0x1d56c, 0x1d59f)) return `\\mathfrak{${letter}}`;
  if (from(0x1d400, 0x1d433) || from(0x1d7ce, 0x1d7d7)) return `\\mathbf{${letter}}`;
  if (from(0x1d5a0, 0x1d66f)) return `\\mathsf{${letter}}`;
  return from(0x1d7d8, 0x1d7ff) ? letter : plain;
}

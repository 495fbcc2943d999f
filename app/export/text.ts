import { alphabetTex, COMBINING, CYRILLIC, isGreek, isLatin, SPACING, shifted } from "./characters.ts";
import { MATH_CHARACTERS } from "./math-characters.ts";

/** Text as TeX, and the characters that no font of print holds. */
export interface TextTex {
  readonly tex: string;
  readonly missing: readonly string[];
}

const SPECIAL: ReadonlyMap<string, string> = new Map([
  ["\\", "\\textbackslash{}"],
  ["{", "\\{"],
  ["}", "\\}"],
  ["$", "\\$"],
  ["&", "\\&"],
  ["#", "\\#"],
  ["%", "\\%"],
  ["_", "\\_"],
  ["^", "\\textasciicircum{}"],
  ["~", "\\textasciitilde{}"],
  ['"', "\\textquotedbl{}"],
  ["`", "\\textasciigrave{}"],
  ["'", "'"],
  // Brackets and stars could be taken for the option or the starred form of a command before them.
  ["[", "{[}"],
  ["]", "{]}"],
  ["*", "{*}"],
  ["|", "\\textbar{}"],
  ["<", "\\textless{}"],
  [">", "\\textgreater{}"],
]);

/** Pairs that the fonts would join into another character: "--" into a dash, "?`" into an inverted mark. */
const JOINED = /([-',])(?=\1)|([!?])(?=`)/g;

/**
 * Plain text as LaTeX: every special character survives, accents, Greek and Cyrillic are set, mathematical characters
 * are set in math mode.
 */
export function textTex(text: string): TextTex {
  const missing: string[] = [];
  const separated = text.normalize("NFC").replace(JOINED, "$&\u0000");
  let tex = "";
  let last = "";
  for (const char of separated) {
    const accent = COMBINING.get(char);
    if (accent !== undefined) {
      tex = `${tex.slice(0, tex.length - last.length)}${accent}{${last}}`;
      last = `${accent}{${last}}`;
      continue;
    }
    last = char === "\u0000" ? "{}" : characterTex(char);
    if (last === "" && !SPACING.has(char)) missing.push(char);
    tex += last;
  }
  return { tex: joinCyrillic(tex), missing };
}

/** Text in the fixed-pitch face: straight quotes stay straight. */
export function codeTex(text: string): TextTex {
  const set = textTex(text.replaceAll("'", "\u0001"));
  const tex = set.tex.replaceAll("\u0001", "\\textquotesingle{}");
  return { tex: `\\texttt{${tex}}`, missing: set.missing.filter((char) => char !== "\u0001") };
}

/** One character; "" when there is none like it. */
function characterTex(char: string): string {
  const code = char.codePointAt(0) ?? 0;
  const special = SPECIAL.get(char) ?? SPACING.get(char);
  if (special !== undefined) return special;
  if (char === "\u0001") return char;
  if (code < 0x20 && char !== "\n" && char !== "\t") return "";
  if (code < 0x7f) return char;
  if (isLatin(code) || isGreek(code)) return char;
  const cyrillic = CYRILLIC.get(char);
  if (cyrillic !== undefined) return `\\cyr{\\char${cyrillic}{}}`;
  const math = MATH_CHARACTERS.get(char) ?? alphabetTex(char);
  if (math !== null && math !== undefined) return `\\ensuremath{${math}}`;
  const shift = shifted(char);
  if (shift) return `\\text${shift.raised ? "super" : "sub"}script{${shift.plain}}`;
  return decomposedTex(char);
}

/** A letter with marks that the fonts lack as one piece, built from its parts. */
function decomposedTex(char: string): string {
  const parts = [...char.normalize("NFD")];
  const [base = "", ...marks] = parts;
  if (marks.length === 0 || (base.codePointAt(0) ?? 0) > 0x7e) return "";
  let tex = base;
  for (const mark of marks) {
    const accent = COMBINING.get(mark);
    if (accent === undefined) return "";
    tex = `${accent}{${tex}}`;
  }
  return tex;
}

/** Letters of one word share one change of font. */
function joinCyrillic(tex: string): string {
  return tex.replace(
    /(?:\\cyr\{(?:\\char\d+\{\})\})+/g,
    (word) => `\\cyr{${word.replace(/\\cyr\{((?:\\char\d+\{\}))\}/g, "$1")}}`,
  );
}

/** An address as `\href` takes it; what TeX would act on is percent-encoded. */
export function addressTex(url: string): string {
  return url
    .replace(/[\\{}^`"<>| ]/g, (char) => encodeURIComponent(char))
    .replace(/[^\x21-\x7e]/gu, (char) => encodeURIComponent(char))
    .replace(/[%#&_$~]/g, (char) => (char === "~" ? "\\string~" : `\\${char}`));
}

/** Combining characters of TeX's accents, by the sign after the backslash. */
const combining: Readonly<Record<string, string>> = {
  "`": "\u0300",
  "'": "\u0301",
  "^": "\u0302",
  "~": "\u0303",
  "=": "\u0304",
  u: "\u0306",
  ".": "\u0307",
  '"': "\u0308",
  r: "\u030A",
  H: "\u030B",
  v: "\u030C",
  d: "\u0323",
  c: "\u0327",
  k: "\u0328",
  b: "\u0331",
};

/** Letters and signs that TeX writes as words. */
const letters: Readonly<Record<string, string>> = {
  ss: "ß",
  o: "ø",
  O: "Ø",
  l: "ł",
  L: "Ł",
  ae: "æ",
  AE: "Æ",
  oe: "œ",
  OE: "Œ",
  aa: "å",
  AA: "Å",
  i: "ı",
  j: "ȷ",
  dh: "ð",
  DH: "Ð",
  dj: "đ",
  DJ: "Đ",
  th: "þ",
  TH: "Þ",
  ng: "ŋ",
  NG: "Ŋ",
  textendash: "–",
  textemdash: "—",
  ldots: "…",
  dots: "…",
  S: "§",
  copyright: "©",
};

/** A piece of a TeX text: words in Unicode, or math whose TeX is kept. */
export interface TexPiece {
  readonly text: string;
  readonly math: boolean;
}

/** A TeX text as Unicode: accents and special letters made out, braces and commands of style left out, math kept. */
export function texPieces(tex: string): TexPiece[] {
  const pieces: TexPiece[] = [];
  const pattern = /\\\$|\$((?:\\.|[^$\\])+)\$/g;
  let at = 0;
  const words = (end: number) => {
    const text = texWords(tex.slice(at, end));
    if (text !== "") pieces.push({ text, math: false });
  };
  for (const match of tex.matchAll(pattern)) {
    if (match[1] === undefined) continue;
    words(match.index);
    pieces.push({ text: match[1], math: true });
    at = match.index + match[0].length;
  }
  words(tex.length);
  return pieces;
}

/** A TeX text as plain Unicode; math keeps its TeX, without dollars. */
export function texToUnicode(tex: string): string {
  return texPieces(tex)
    .map((piece) => piece.text)
    .join("");
}

function texWords(tex: string): string {
  return tex
    .replace(
      /\\(?:([`'^~=."])|([uvHckrdb])(?![A-Za-z]))\s*(?:\{\s*(\\?[A-Za-z])?\s*\}|(\\[ij](?![A-Za-z])|[A-Za-z]))/g,
      accented,
    )
    .replace(
      /\\([A-Za-z]+)(?:\s+|\{\}|(?![A-Za-z]))/g,
      (whole, word: string) => letters[word] ?? (styles.has(word) ? "" : whole),
    )
    .replace(/\\([&%$#_{}])/g, (_, sign: string) => (sign === "{" ? "\uE000" : sign === "}" ? "\uE001" : sign))
    .replace(/\\ /g, " ")
    .replace(/---/g, "—")
    .replace(/--/g, "–")
    .replace(/``/g, "“")
    .replace(/''/g, "”")
    .replace(/~/g, "\u00A0")
    .replace(/[{}]/g, "")
    .replaceAll("\uE000", "{")
    .replaceAll("\uE001", "}")
    .normalize("NFC");
}

const styles = new Set([
  "emph",
  "textit",
  "textbf",
  "textsc",
  "textrm",
  "textsf",
  "texttt",
  "it",
  "em",
  "bf",
  "sc",
  "rm",
  "mathrm",
  "url",
]);

function accented(
  _: string,
  sign: string | undefined,
  word: string | undefined,
  braced: string | undefined,
  bare: string | undefined,
): string {
  const letter = (braced ?? bare ?? "").replace(/^\\([ij])$/, "$1");
  return `${letter}${combining[sign ?? word ?? ""] ?? ""}`;
}

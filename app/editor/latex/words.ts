/**
 * Words of LaTeX as words of a paper: quotes, dashes and the space that does not break are the characters themselves,
 * and what would mean something in a paper is written so that it does not.
 * @param atLineStart nothing stands before it on its line
 */
export function proseOf(words: string, atLineStart: boolean): string {
  const escaped = words
    .replace(/[\\*_`[\]<$#|]/g, (sign) => (sign === "`" ? sign : `\\${sign}`))
    .replace(/``|(?<!`)''|''/g, (quotes) => (quotes === "``" ? "“" : "”"))
    .replace(/`/g, "‘")
    .replace(/'/g, "’")
    .replace(/---/g, "—")
    .replace(/--/g, "–")
    .replaceAll("~", "\u00a0");
  const lines = escaped.split("\n").map((line, number) => (number > 0 || atLineStart ? withoutItemMark(line) : line));
  return lines.join("\n");
}

/** At a line's start a hyphen, a plus or a number with a stop would begin a list. */
function withoutItemMark(line: string): string {
  return line.replace(/^([-+])(?=\s)/, "\\$1").replace(/^(\d+)([.)])(?=\s)/, "$1\\$2");
}

/** Signs that LaTeX writes as macros without an argument. */
export const SIGNS: Readonly<Record<string, string>> = {
  "%": "%",
  "&": "&",
  $: "\\$",
  "#": "\\#",
  _: "\\_",
  "{": "{",
  "}": "}",
  " ": " ",
  "/": "",
  "-": "",
  ",": "\u202f",
  ldots: "…",
  dots: "…",
  textendash: "–",
  textemdash: "—",
  S: "§",
  ss: "ß",
  o: "ø",
  O: "Ø",
  ae: "æ",
  AE: "Æ",
  aa: "å",
  AA: "Å",
  l: "ł",
  L: "Ł",
  i: "ı",
  LaTeX: "LaTeX",
  TeX: "TeX",
};

/** Accents, as the combining characters that follow their letter. */
export const ACCENTS: Readonly<Record<string, string>> = {
  "`": "\u0300",
  "'": "\u0301",
  "^": "\u0302",
  "~": "\u0303",
  "=": "\u0304",
  u: "\u0306",
  ".": "\u0307",
  '"': "\u0308",
  r: "\u030a",
  H: "\u030b",
  v: "\u030c",
  c: "\u0327",
  k: "\u0328",
};

/** A letter under its accent, as one character where there is one. The dotless i has its dot's place taken by it. */
export function accented(letter: string, accent: string): string {
  const base = letter === "ı" ? "i" : letter;
  return (base.slice(0, 1) + accent).normalize("NFC") + base.slice(1);
}

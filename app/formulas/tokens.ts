import type { FormulaProblem } from "./types.ts";

/** A word, number or sign of a formula with its place in the source. */
export interface Token {
  readonly type: "number" | "name" | "operator" | "open" | "close" | "comma" | "dot";
  readonly text: string;
  readonly from: number;
  readonly to: number;
}

export type Tokens =
  | { readonly ok: true; readonly tokens: readonly Token[] }
  | { readonly ok: false; readonly problem: FormulaProblem };

const NUMBER = /(?:\d+(?:\.\d+)?|\.\d+)(?:[eE][+-]?\d+)?/y;
const NAME = /[A-Za-z][A-Za-z0-9_]*/y;
const OPERATOR = /<=|>=|==|!=|[-+*/^<>]/y;
const SPACE = /[ \t\r\n]+/y;

/** Signs that people write for something that is spelled otherwise here; longer ones first. */
const CURES: readonly (readonly [string, string])[] = [
  ["**", "A power is written with ^, as in x^2."],
  ["&&", "`and` is written as a word."],
  ["||", "`or` is written as a word."],
  ["=", "Two numbers are compared with ==; formulas assign nothing."],
  ["!", "`not` is written as a word, and a factorial n! as gamma(n + 1)."],
  ["&", "`and` is written as a word, and there are no bit operators."],
  ["|", "`or` is written as a word, an absolute value as abs(x), and there are no bit operators."],
  ["~", "`not` is written as a word."],
  ["%", "There is no percent sign in formulas; write 0.05 for 5 %."],
  ["'", "A derivative is written derivative(F, x, at)."],
  ['"', "There are no strings in formulas."],
  ["[", "There are no lists or matrices in formulas; round brackets group and call."],
  ["]", "There are no lists or matrices in formulas; round brackets group and call."],
  ["{", "Round brackets group and call; there are no others."],
  ["}", "Round brackets group and call; there are no others."],
  [":", "There are no ranges in formulas."],
  ["?", "A choice is written if(condition, a, b)."],
  [";", "A formula is one expression; a comma separates arguments."],
  ["\\", "Formulas are not TeX: write sqrt(x), pi, mu without a backslash."],
  ["$", "Formulas are not TeX: leave the dollar out."],
  ["#", "A formula holds no comment."],
  ["\u2212", "A minus is written with the hyphen sign -."],
  ["\u2013", "A minus is written with the hyphen sign -."],
  ["\u00d7", "A product is written with *."],
  ["\u00b7", "A product is written with *."],
  ["\u22c5", "A product is written with *."],
  ["\u00f7", "A quotient is written with /."],
  ["\u2264", "Write <= for at most."],
  ["\u2265", "Write >= for at least."],
  ["\u2260", "Write != for unequal."],
  ["\u03c0", "Write pi."],
  ["\u221a", "Write sqrt(x)."],
  ["\u221e", "Infinity is not a number here; write a large number instead."],
  ["\u00b2", "A power is written with ^, as in x^2."],
  ["\u00b3", "A power is written with ^, as in x^3."],
];

function matchAt(pattern: RegExp, source: string, at: number): string | null {
  pattern.lastIndex = at;
  return pattern.exec(source)?.[0] ?? null;
}

function strangeSign(source: string, at: number): FormulaProblem {
  const known = CURES.find(([sign]) => source.startsWith(sign, at));
  const sign = known?.[0] ?? String.fromCodePoint(source.codePointAt(at) ?? 0);
  const cure =
    known?.[1] ??
    (/\p{L}/u.test(sign)
      ? "Names are made of the letters a to z, digits and underscores."
      : "Formulas are made of numbers, names, + - * / ^, comparisons, round brackets and commas.");
  return { message: `The sign ${sign} has no place in a formula. ${cure}`, from: at, to: at + sign.length };
}

function badNumber(source: string, from: number, to: number): FormulaProblem | null {
  const text = source.slice(from, to);
  const following = source.slice(to, to + 1);
  if (text === "0" && /[xXbBoO]/.test(following) && /[0-9a-fA-F]/.test(source.slice(to + 1, to + 2))) {
    return { message: "Numbers are written in base 10, as 16 or 2e-3.", from, to: to + 1 };
  }
  if (following === "." && !/[A-Za-z_]/.test(source.slice(to + 1, to + 2))) {
    const cure = text.includes(".") ? "A number has one decimal point." : `Write ${text} or ${text}.0.`;
    return { message: `The point after ${text} has no digits. ${cure}`, from, to: to + 1 };
  }
  const value = Number(text);
  if (!Number.isFinite(value) || (value === 0 && /[1-9]/.test(text.replace(/[eE].*$/, "")))) {
    const range = "A number in a formula lies between 1e-300 and 1e300 in size; build others as 10^-400.";
    return { message: `${text} is out of range. ${range}`, from, to };
  }
  return null;
}

/** Cuts a formula into words and signs, and refuses every sign that the language does not have. */
export function readTokens(source: string): Tokens {
  const tokens: Token[] = [];
  let at = 0;
  const push = (type: Token["type"], text: string): void => {
    tokens.push({ type, text, from: at, to: at + text.length });
    at += text.length;
  };
  while (at < source.length) {
    const space = matchAt(SPACE, source, at);
    if (space !== null) {
      at += space.length;
      continue;
    }
    const number = matchAt(NUMBER, source, at);
    if (number !== null) {
      const problem = badNumber(source, at, at + number.length);
      if (problem) return { ok: false, problem };
      push("number", number);
      continue;
    }
    const name = matchAt(NAME, source, at);
    if (name !== null) {
      push("name", name);
      continue;
    }
    const double = source.slice(at, at + 2);
    const operator = double === "**" ? null : matchAt(OPERATOR, source, at);
    const sign = source[at] ?? "";
    if (operator !== null) push("operator", operator);
    else if (sign === "(") push("open", sign);
    else if (sign === ")") push("close", sign);
    else if (sign === ",") push("comma", sign);
    else if (sign === ".") push("dot", sign);
    else return { ok: false, problem: strangeSign(source, at) };
  }
  return { ok: true, tokens };
}

/** Whether the first of these tokens is a bracket that the last one closes. */
export function isBracketed(tokens: readonly Token[]): boolean {
  let depth = 0;
  for (const [i, { type }] of tokens.entries()) {
    depth += type === "open" ? 1 : type === "close" ? -1 : 0;
    if (depth === 0 && i < tokens.length - 1) return false;
  }
  return tokens[0]?.type === "open";
}

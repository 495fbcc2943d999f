import { alphabetTex, shifted } from "./characters.ts";
import { MATH_CHARACTERS } from "./math-characters.ts";
import { ALIGNMENTS, COMMANDS, ENVIRONMENTS, TEXT_COMMANDS } from "./math-words.ts";
import { textTex } from "./text.ts";

/** TeX for print, and what stood in it that may not, each in words. */
export interface MathTex {
  readonly tex: string;
  readonly problems: readonly string[];
}

/** Macros of the front matter as the print knows them: name with backslash → its name in the LaTeX source. */
export type KnownMacros = ReadonlyMap<string, string>;

/**
 * A formula's TeX, checked against the list of commands that may be used: TeX is a programming language, and only what
 * typesets mathematics is let through. Comments and blank lines are taken out, mathematical characters become commands.
 * @param tex TeX without dollars, numbers put in and labels taken out
 * @param arguments_ how many `#1` … may stand in it: only a macro's body has any
 */
export function mathTex(tex: string, macros: KnownMacros, arguments_ = 0): MathTex {
  return new MathReader(tex, macros, arguments_).read();
}

const DIMENSION = /^\s*\{\s*(-?\d{0,2}(?:\.\d{1,3})?)\s*(em|ex|pt|mu|mm)\s*\}/;

class MathReader {
  private readonly source: string;
  private readonly macros: KnownMacros;
  private readonly argumentCount: number;
  private readonly problems: string[] = [];
  private readonly open: string[] = [];
  private at = 0;

  constructor(source: string, macros: KnownMacros, argumentCount: number) {
    this.source = source;
    this.macros = macros;
    this.argumentCount = argumentCount;
  }

  read(): MathTex {
    let tex = "";
    while (this.at < this.source.length) tex += this.readToken();
    for (const opened of this.open)
      this.problem(opened === "{" ? "A brace `{` is not closed." : `\`\\begin{${opened}}\` has no \`\\end\`.`);
    // Whatever it was made of: two `^` in a row would be TeX's way to write any character at all.
    if (tex.includes("^^")) this.problem("Two `^` cannot stand side by side.");
    return { tex: tex.replace(/\n(?:[ \t]*\n)+/g, "\n").trim(), problems: this.problems };
  }

  private problem(message: string): string {
    if (!this.problems.includes(message)) this.problems.push(message);
    return "";
  }

  private readToken(): string {
    const char = String.fromCodePoint(this.source.codePointAt(this.at) ?? 0);
    this.at += char.length;
    switch (char) {
      case "\\":
        return this.readCommand();
      case "{":
        this.open.push("{");
        return "{";
      case "}":
        return this.open.pop() === "{" ? "}" : this.problem("A brace `}` closes nothing.");
      case "%":
        return this.skipComment();
      case "$":
        return this.problem("A dollar cannot stand inside a formula.");
      case "#":
        return this.readArgument();
      case "^":
        // Two in a row are TeX's way to write any character at all.
        return this.source[this.at] === "^" ? this.problem("Two `^` cannot stand side by side.") : "^";
      default:
        return this.readCharacter(char);
    }
  }

  private skipComment(): string {
    const end = this.source.indexOf("\n", this.at);
    this.at = end < 0 ? this.source.length : end;
    return "";
  }

  private readArgument(): string {
    const digit = /^[1-9]/.exec(this.source.slice(this.at))?.[0];
    if (digit === undefined || Number(digit) > this.argumentCount)
      return this.problem("`#` can stand only in a macro, as `#1`.");
    this.at += 1;
    return `#${digit}`;
  }

  private readCharacter(char: string): string {
    const code = char.codePointAt(0) ?? 0;
    if ((code >= 0x20 && code < 0x7f) || char === "\n" || char === "\t") return char;
    if (char === "\u00a0") return "~";
    const shift = shifted(char);
    if (shift) return shift.raised ? `^{${shift.plain}}` : `_{${shift.plain}}`;
    const tex = MATH_CHARACTERS.get(char) ?? alphabetTex(char);
    if (tex !== undefined && tex !== null) return `{${tex}}`;
    return this.problem(`“${char}” cannot be set in a formula.`);
  }

  private readCommand(): string {
    const name = /^(?:[A-Za-z]+\*?|[\s\S])/u.exec(this.source.slice(this.at))?.[0] ?? "";
    this.at += name.length;
    const plain = name.replace(/\*$/, "");
    const macro = this.macros.get(`\\${plain}`);
    if (macro !== undefined) {
      this.at -= name.length - plain.length;
      return `${macro}${this.spaceAfter(macro)}`;
    }
    if (name === "begin" || name === "end") return this.readEnvironment(name);
    if (TEXT_COMMANDS.has(name)) return this.readText(name);
    if (name === "hspace" || name === "hspace*") return this.readSpace();
    if (COMMANDS.has(name)) return `\\${name}${this.spaceAfter(name)}`;
    if (name.endsWith("*") && COMMANDS.has(name.slice(0, -1))) {
      this.at -= 1;
      return `\\${name.slice(0, -1)}`;
    }
    if (name === "") return this.problem("A backslash stands alone at the end.");
    return this.problem(`\`\\${name.trim() === "" ? " " : name}\` cannot be used in a formula.`);
  }

  /** A command of letters must not run into the letter that follows it once a space or comment is gone. */
  private spaceAfter(name: string): string {
    return /[A-Za-z]$/.test(name) && /^[A-Za-z]/.test(this.source.slice(this.at)) ? " " : "";
  }

  private readEnvironment(side: "begin" | "end"): string {
    const match = /^\s*\{\s*([A-Za-z]+\*?)\s*\}/.exec(this.source.slice(this.at));
    const name = match?.[1];
    if (!match || name === undefined)
      return this.problem(`\`\\${side}\` needs the name of what it ${side}s, as \`\\${side}{cases}\`.`);
    this.at += match[0].length;
    // A display is one formula already: what would be a display of its own is set as its part.
    const set = ALIGNMENTS.get(name) ?? (ENVIRONMENTS.has(name) ? name : undefined);
    if (set === undefined) return this.problem(`\`\\${side}{${name}}\` cannot be used in a formula.`);
    if (side === "begin") this.open.push(name);
    else if (this.open.pop() !== name) return this.problem(`\`\\end{${name}}\` ends nothing that is open.`);
    return set === "" ? "" : `\\${side}{${set}}`;
  }

  /** Words in a formula: set as prose is. Formulas within them are read as formulas. */
  private readText(name: string): string {
    while (/\s/.test(this.source[this.at] ?? "")) this.at += 1;
    if (this.source[this.at] !== "{") return this.problem(`\`\\${name}\` needs its words in braces.`);
    const close = closingBrace(this.source, this.at);
    if (close < 0) return this.problem("A brace `{` is not closed.");
    const inner = this.source.slice(this.at + 1, close);
    this.at = close + 1;
    const parts = inner.split(/(?<!\\)\$/);
    if (parts.length % 2 === 0) return this.problem(`A dollar in \`\\${name}\` has no second one.`);
    return `\\${name}{${parts.map((part, i) => (i % 2 === 0 ? this.readWords(part) : this.readInner(part))).join("")}}`;
  }

  private readWords(words: string): string {
    const plain = words
      .replace(/\\([\s{}$&#%_,;:!])/g, (_, char: string) => (/[\s,;:!]/.test(char) ? " " : char))
      .replace(/[{}]/g, "");
    const command = /\\[A-Za-z]*/.exec(plain)?.[0];
    if (command !== undefined) return this.problem(`\`${command}\` cannot be used in words within a formula.`);
    const set = textTex(plain);
    for (const char of set.missing) this.problem(`“${char}” cannot be set in print.`);
    return set.tex;
  }

  private readInner(tex: string): string {
    const inner = mathTex(tex, this.macros, this.argumentCount);
    for (const problem of inner.problems) this.problem(problem);
    return `$${inner.tex}$`;
  }

  private readSpace(): string {
    const match = DIMENSION.exec(this.source.slice(this.at));
    if (!match) return this.problem("`\\hspace` takes a short length, as `\\hspace{1em}`.");
    this.at += match[0].length;
    return `\\hspace{${match[1]}${match[2]}}`;
  }
}

function closingBrace(source: string, open: number): number {
  let depth = 0;
  for (let i = open; i < source.length; i += 1) {
    if (source[i] === "\\") i += 1;
    else if (source[i] === "{") depth += 1;
    else if (source[i] === "}") {
      depth -= 1;
      if (depth === 0) return i;
    }
  }
  return -1;
}

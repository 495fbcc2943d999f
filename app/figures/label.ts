import { ACCENTS, BLACKBOARD, FUNCTIONS, GREEK, IGNORED, RELATIONS, SPACES, SYMBOLS, UPRIGHT } from "./label-words.ts";

/**
 * Labels in a plate are TeX, and SVG text cannot hold KaTeX. This reads the small part of TeX that labels use and turns
 * it into runs of text: letters are italic variables, digits and operators upright, `_` and `^` shift the run.
 *
 * What is read: letters, digits, operators, braces, `_`, `^`, primes, Greek letters, `\frac` and its kin (as a/b),
 * `\sqrt`, `\text \mathrm \operatorname \mathbb \mathcal \mathbf \mathit`, accents over one letter, named functions, the relations and
 * arrows below, and spaces. Anything else makes the whole label fall back to plain text. A label of whole words without any TeX in it
 * ("tail law", "exact") is set as words.
 */

export type RunShift = "base" | "sub" | "sup";

export interface LabelRun {
  readonly text: string;
  /** `variable`: math italic. `upright`: the interface face. `blackboard`: double-struck capitals, as Unicode. */
  readonly style: "variable" | "upright" | "blackboard";
  readonly shift: RunShift;
}

/** True when a label is whole words, not a formula: "tail law", "simulated, 95 %". */
export function isWords(label: string): boolean {
  return !/[\\_^{}$=<>]/.test(label) && /\p{L}{3,}/u.test(label) && !/[()+*/]/.test(label);
}

/**
 * Reads a label's TeX into runs; see the head of this file for what is understood.
 * @param label TeX without dollars, or plain words
 * @returns runs in reading order; never throws: what is not understood comes back as one upright run
 */
export function labelRuns(label: string): readonly LabelRun[] {
  if (label.trim() === "") return [];
  if (isWords(label)) return [{ text: label, style: "upright", shift: "base" }];
  const reader = new LabelReader(label);
  const runs = reader.readAll();
  return runs
    ? joinRuns(runs)
    : [{ text: label.replace(/\\([A-Za-z]+)/g, "$1").replace(/[{}$\\]/g, ""), style: "upright", shift: "base" }];
}

/** The label as one plain string, for alternatives, CSV heads and measuring. */
export function labelText(label: string): string {
  return labelRuns(label)
    .map((run) =>
      run.shift === "sub"
        ? `_${run.text}`
        : run.shift === "sup" && !/^[′*]+$/.test(run.text)
          ? `^${run.text}`
          : run.text,
    )
    .join("");
}

function joinRuns(runs: readonly LabelRun[]): LabelRun[] {
  const joined: LabelRun[] = [];
  for (const run of runs) {
    const last = joined.at(-1);
    if (run.text === "") continue;
    if (last && last.style === run.style && last.shift === run.shift)
      joined[joined.length - 1] = { ...last, text: last.text + run.text };
    else joined.push(run);
  }
  return joined.map((run) => ({ ...run, text: withFractions(run) }));
}

const VULGAR = new Map([
  ["1/2", "½"],
  ["1/4", "¼"],
  ["3/4", "¾"],
  ["1/3", "⅓"],
  ["2/3", "⅔"],
]);

/** A number that is a common fraction is set as one; `n/2` and `11/2` are not. */
function withFractions(run: LabelRun): string {
  return run.shift === "base"
    ? run.text.replace(/(?<![\p{L}\d).])\d\/\d(?![\d.])/gu, (text) => VULGAR.get(text) ?? text)
    : run.text;
}

/** One pass over the source; a method returns null where the source leaves the subset. */
class LabelReader {
  private at = 0;
  private readonly source: string;

  constructor(source: string) {
    this.source = source;
  }

  readAll(): LabelRun[] | null {
    const runs = this.readUntil(null, "base");
    return runs && this.at >= this.source.length ? runs : null;
  }

  private readUntil(close: "}" | null, shift: RunShift): LabelRun[] | null {
    const runs: LabelRun[] = [];
    while (this.at < this.source.length) {
      if (this.source[this.at] === "}") return close === "}" ? runs : null;
      const next = this.readAtom(shift);
      if (next === null) return null;
      runs.push(...next);
    }
    return close === null ? runs : null;
  }

  private readGroup(shift: RunShift): LabelRun[] | null {
    while (this.source[this.at] === " ") this.at += 1;
    if (this.source[this.at] !== "{") return this.at < this.source.length ? this.readAtom(shift) : null;
    this.at += 1;
    const runs = this.readUntil("}", shift);
    this.at += 1;
    return runs;
  }

  private readVerbatim(): string | null {
    if (this.source[this.at] !== "{") return null;
    const close = this.source.indexOf("}", this.at);
    if (close < 0) return null;
    const text = this.source.slice(this.at + 1, close);
    this.at = close + 1;
    return /[\\{$]/.test(text) ? null : text;
  }

  private readAtom(shift: RunShift): LabelRun[] | null {
    const char = String.fromCodePoint(this.source.codePointAt(this.at) ?? 0);
    this.at += char.length;
    const upright = (text: string): LabelRun[] => [{ text, style: "upright", shift }];
    if (char === "\\") return this.readCommand(shift);
    if (char === "{") {
      this.at -= 1;
      return this.readGroup(shift);
    }
    if (char === "_" || char === "^") return this.readGroup(char === "_" ? "sub" : "sup");
    if (char === "'") return [{ text: "′", style: "upright", shift: "base" }];
    if (char === " " || char === "~") return char === "~" ? upright("\u00a0") : [];
    if (char === "$" || char === "%" || char === "#" || char === "&") return char === "$" ? null : upright(char);
    if (char === "-") return upright(shift === "base" && this.followsOperand() ? "\u2009−\u2009" : "−");
    if (char === "+") return upright(shift === "base" ? "\u2009+\u2009" : "+");
    if (char === "=" || char === "<" || char === ">") return upright(shift === "base" ? ` ${char} ` : char);
    if (char === "*") return upright("∗");
    return /\p{L}/u.test(char) ? [{ text: char, style: "variable", shift }] : upright(char);
  }

  private followsOperand(): boolean {
    return /[\p{L}\p{N})}\]]\s*$/u.test(this.source.slice(0, this.at - 1));
  }

  private readCommand(shift: RunShift): LabelRun[] | null {
    const name = /^(?:[A-Za-z]+|.)/u.exec(this.source.slice(this.at))?.[0];
    if (name === undefined) return null;
    this.at += name.length;
    const upright = (text: string): LabelRun[] => [{ text, style: "upright", shift }];
    const greek = GREEK.get(name);
    if (greek !== undefined) return [{ text: greek, style: "variable", shift }];
    const symbol = SYMBOLS.get(name) ?? SPACES.get(name);
    if (symbol !== undefined) return upright(symbol);
    const relation = RELATIONS.get(name);
    if (relation !== undefined) return upright(shift === "base" ? ` ${relation} ` : relation);
    if (FUNCTIONS.has(name)) return upright(`${name}\u2009`);
    if (IGNORED.has(name)) return [];
    if (UPRIGHT.has(name)) return this.mapVerbatim(upright);
    if (name === "mathit" || name === "textit" || name === "mathcal")
      return this.mapVerbatim((text) => [{ text, style: "variable", shift }]);
    if (name === "mathbb")
      return this.mapVerbatim((text) => [
        { text: [...text].map((c) => BLACKBOARD.get(c) ?? c).join(""), style: "blackboard", shift },
      ]);
    const accent = ACCENTS.get(name);
    if (accent !== undefined) return this.readAccent(accent, shift);
    if (name === "frac" || name === "tfrac" || name === "dfrac") return this.readFraction(shift);
    if (name === "sqrt") return this.readRoot(shift);
    return null;
  }

  private mapVerbatim(make: (text: string) => LabelRun[]): LabelRun[] | null {
    const text = this.readVerbatim();
    return text === null ? null : make(text);
  }

  private readAccent(mark: string, shift: RunShift): LabelRun[] | null {
    const inner = this.readGroup(shift);
    const [only] = inner ?? [];
    return inner?.length === 1 && only && [...only.text].length === 1 ? [{ ...only, text: only.text + mark }] : null;
  }

  private readFraction(shift: RunShift): LabelRun[] | null {
    const above = this.readGroup(shift);
    const below = this.readGroup(shift);
    if (!above || !below) return null;
    return [...bracketed(above, shift), { text: "/", style: "upright", shift }, ...bracketed(below, shift)];
  }

  private readRoot(shift: RunShift): LabelRun[] | null {
    const inner = this.readGroup(shift);
    return inner && [{ text: "√", style: "upright", shift }, ...bracketed(inner, shift)];
  }
}

/** Brackets round a part of more than one symbol, so that a/b and √x keep their meaning on one line. */
function bracketed(runs: readonly LabelRun[], shift: RunShift): LabelRun[] {
  const simple = runs.length === 1 && /^(?:[\p{L}]|[\d.]+)$/u.test(runs[0]?.text ?? "");
  if (simple) return [...runs];
  return [{ text: "(", style: "upright", shift }, ...runs, { text: ")", style: "upright", shift }];
}

import { type KnownMacros, mathTex } from "./math.ts";
import { COMMANDS, TEXT_COMMANDS } from "./math-words.ts";

/** The macros of a paper as LaTeX defines them. */
export interface PaperMacros {
  /** One `\newcommand` a line. */
  readonly definitions: readonly string[];
  readonly known: KnownMacros;
  readonly problems: readonly string[];
}

/** Commands of LaTeX's text that a paper may well take as names in mathematics: given another name, so that prose is not harmed. */
const TAKEN_BY_TEXT = new Set([
  ..."bcdikjlortuvHLOPS",
  "aa",
  "AA",
  "ae",
  "AE",
  "oe",
  "OE",
  "ss",
  "dh",
  "DH",
  "dj",
  "DJ",
  "ng",
  "NG",
  "th",
  "TH",
  "dag",
  "ddag",
]);

/**
 * Reads the front matter's macros for print. A name that the formulas' own commands have is redefined; any other is new,
 * and LaTeX itself refuses it where it is taken.
 */
export function paperMacros(macros: Readonly<Record<string, string>>): PaperMacros {
  const problems: string[] = [];
  const known = new Map<string, string>();
  for (const name of Object.keys(macros)) {
    if (!/^\\[A-Za-z]+$/.test(name))
      problems.push(`\`${name}\` cannot name a macro: a backslash and letters, as \`\\E\`.`);
    else known.set(name, TAKEN_BY_TEXT.has(name.slice(1)) ? `\\paper${name.slice(1)}` : name);
  }
  const circle = macroCircle(macros);
  if (circle)
    problems.push(
      `The macros ${circle.map((name) => `\`${name}\``).join(" and ")} unfold into each other without end.`,
    );
  const definitions: string[] = [];
  for (const [name, printed] of known) {
    const body = macros[name] ?? "";
    const count = Math.max(0, ...[...body.matchAll(/#([1-9])/g)].map((match) => Number(match[1])));
    const checked = mathTex(body, known, count);
    problems.push(...checked.problems.map((problem) => `In the macro \`${name}\`: ${problem}`));
    const own = printed.slice(1);
    const command = COMMANDS.has(own) || TEXT_COMMANDS.has(own) ? "renewcommand" : "newcommand";
    definitions.push(`\\${command}{${printed}}${count > 0 ? `[${count}]` : ""}{${checked.tex}}`);
  }
  return circle ? { definitions: [], known, problems } : { definitions, known, problems };
}

/** Macros that unfold into themselves, directly or by way of others; null when none does. */
function macroCircle(macros: Readonly<Record<string, string>>): readonly string[] | null {
  const uses = new Map(
    Object.entries(macros).map(([name, body]) => [
      name,
      [...body.matchAll(/\\[A-Za-z]+/g)].map((match) => match[0]).filter((used) => Object.hasOwn(macros, used)),
    ]),
  );
  const done = new Set<string>();
  const walk = (name: string, path: readonly string[]): readonly string[] | null => {
    if (path.includes(name)) return path.slice(path.indexOf(name));
    if (done.has(name)) return null;
    for (const used of uses.get(name) ?? []) {
      const found = walk(used, [...path, name]);
      if (found) return found;
    }
    done.add(name);
    return null;
  };
  for (const name of uses.keys()) {
    const found = walk(name, []);
    if (found) return found;
  }
  return null;
}

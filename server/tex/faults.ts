/** A mistake that TeX found, at a line of the paper where it can be told. */
export interface TexFault {
  readonly line: number | null;
  readonly message: string;
}

interface Rule {
  readonly pattern: RegExp;
  say(match: RegExpExecArray, source: string): string;
}

/** TeX's messages in the words of somebody who writes a paper. */
const RULES: readonly Rule[] = [
  {
    pattern: /^Undefined control sequence/,
    say: (_, source) => `TeX does not know \`${/\\[A-Za-z@]+\s*$/.exec(source)?.[0].trim() ?? "a command here"}\`.`,
  },
  {
    pattern: /^(?:Missing \$ inserted|Extra \}, or forgotten \$|Missing [{}] inserted|Too many \}'s)/,
    say: () => "A brace or a dollar of a formula has no partner.",
  },
  {
    pattern: /^Double (super|sub)script/,
    say: ([, kind]) =>
      `Two ${kind === "super" ? "exponents" : "indices"} follow one another: put braces round what belongs together.`,
  },
  {
    pattern: /^LaTeX Error: Command (\\\S+) already defined/,
    say: ([, name]) => `The macro \`${name}\` is a command of LaTeX already: choose another name.`,
  },
  { pattern: /^Misplaced alignment tab character &/, say: () => "`&` stands outside an alignment." },
  { pattern: /^Extra alignment tab/, say: () => "A row has more `&` than its alignment has columns." },
  {
    pattern: /^LaTeX Error: \\begin\{(\w+\*?)\}.* ended by \\end\{(\w+\*?)\}/,
    say: ([, opened, closed]) => `\`\\begin{${opened}}\` is ended by \`\\end{${closed}}\`.`,
  },
  {
    pattern: /^(?:Missing|Extra) (?:delimiter|\\right|\\left)/,
    say: () => "`\\left` and `\\right` must come in pairs, each with its bracket.",
  },
  {
    pattern: /^Use of (\\\S+?) ?doesn't match its definition/,
    say: ([, name]) => `\`${name}\` is not used as it was defined: count its arguments.`,
  },
  {
    pattern: /^(?:Argument of|Paragraph ended before) (\\\S+)/,
    say: ([, name]) => `An argument of \`${name?.replace(/@.*$/, "")}\` is missing or not closed.`,
  },
  {
    pattern: /^TeX capacity exceeded/,
    say: () => "This needs more memory than TeX has: a macro may unfold without end.",
  },
];

/**
 * The mistakes in a log of TeX run with `-file-line-error`.
 * @param lineMap line of the paper for a line of main.tex, or null
 */
export function texFaults(log: string, lineMap: (texLine: number) => number | null): readonly TexFault[] {
  const lines = log.split("\n");
  const faults: TexFault[] = [];
  lines.forEach((text, i) => {
    const match = /^(?:\.\/)?main\.tex:(\d+): (.+)$/.exec(text);
    if (!match || /==> Fatal error|Emergency stop/.test(text)) return;
    // What TeX had read when it stopped stands on the line "l.123 …" below.
    const source =
      lines
        .slice(i + 1, i + 8)
        .find((line) => /^l\.\d+ /.test(line))
        ?.replace(/^l\.\d+ /, "") ?? "";
    faults.push({ line: lineMap(Number(match[1])), message: words(match[2] ?? "", source) });
  });
  if (faults.length > 0) return faults;
  const other = lines.find((line) => /^! |^[^:\s]+:\d+: /.test(line));
  return [
    { line: null, message: other ? `TeX stopped: ${other.replace(/^! /, "")}` : "TeX stopped without saying why." },
  ];
}

function words(message: string, source: string): string {
  for (const rule of RULES) {
    const match = rule.pattern.exec(message);
    if (match) return rule.say(match, source);
  }
  return `TeX says: ${message.trim()}`;
}

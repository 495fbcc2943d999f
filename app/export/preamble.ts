import { CYRILLIC } from "./characters.ts";

/** What the body of a paper needs of its preamble. */
export interface PreambleNeeds {
  /** A page as large as what stands on it, instead of a paper's pages. */
  readonly cropped?: boolean;
  readonly greek: boolean;
  readonly cyrillic: boolean;
  readonly lineNumbers: boolean;
  /** Definitions of the paper's macros, one a line. */
  readonly macros: readonly string[];
}

/** Environments whose words are set upright; all are counted together within the sections. */
const ENVIRONMENTS: readonly (readonly [style: string, names: readonly string[]])[] = [
  ["plain", ["theorem", "lemma", "proposition", "corollary", "conjecture"]],
  ["definition", ["definition", "assumption", "example"]],
  ["remark", ["remark"]],
];

/** Everything before `\begin{document}`, a line an entry. */
export function preamble(needs: PreambleNeeds): readonly string[] {
  return [
    "% Written with Halfline. Set it with:  latexmk -pdf main.tex",
    needs.cropped
      ? "\\documentclass[class=amsart,11pt,border=2mm]{standalone}"
      : "\\documentclass[a4paper,11pt]{amsart}",
    "\\usepackage[T1]{fontenc}",
    "\\usepackage[utf8]{inputenc}",
    "\\usepackage{textcomp,lmodern}",
    ...(needs.greek ? ["\\usepackage{textalpha}"] : []),
    "\\usepackage{amssymb,mathtools,mathrsfs,bm,cancel}",
    "\\usepackage{booktabs,longtable,array,graphicx}",
    "\\usepackage{siunitx}",
    "\\sisetup{group-digits=integer, group-minimum-digits=5, exponent-product=\\times, retain-zero-uncertainty=true}",
    "\\usepackage{pgfplots}",
    "\\pgfplotsset{compat=1.18}",
    ...(needs.lineNumbers ? ["\\usepackage[mathlines]{lineno}", "\\modulolinenumbers[5]"] : []),
    "\\usepackage[hidelinks,hyperfootnotes=false,unicode]{hyperref}",
    // Words copied and searched in the PDF are the words of the paper.
    "\\input{glyphtounicode}",
    "\\pdfgentounicode=1",
    ...(needs.cyrillic ? cyrillic() : []),
    "\\providecommand{\\lt}{<}",
    "\\providecommand{\\gt}{>}",
    ...theorems(),
    "% What a number that is out of date was set with; the dagger stands at the number.",
    "\\newcommand{\\outofdate}[2]{\\begingroup\\renewcommand{\\thefootnote}{#1}\\footnotetext{#2}\\endgroup}",
    ...needs.macros,
  ];
}

function theorems(): readonly string[] {
  return ENVIRONMENTS.flatMap(([style, names]) => [
    `\\theoremstyle{${style}}`,
    ...names.map((name) => {
      const noun = `${name.charAt(0).toUpperCase()}${name.slice(1)}`;
      return name === "theorem" ? `\\newtheorem{theorem}{${noun}}[section]` : `\\newtheorem{${name}}[theorem]{${noun}}`;
    }),
  ]);
}

/** The Washington fonts by their own encoding, with each glyph's meaning for search. */
function cyrillic(): readonly string[] {
  const shapes: readonly (readonly [string, string])[] = [
    ["{m}{n}", "wncyr10"],
    ["{m}{it}", "wncyi10"],
    ["{m}{sl}", "wncyi10"],
    ["{bx}{n}", "wncyb10"],
    ["{m}{sc}", "wncysc10"],
  ];
  const families = ["wncyr10", "wncyi10", "wncyb10", "wncysc10"];
  const meanings = [...CYRILLIC].flatMap(([char, position]) => {
    const name = glyphName(position);
    const code = (char.codePointAt(0) ?? 0).toString(16).toUpperCase().padStart(4, "0");
    return name === null ? [] : families.map((family) => `\\pdfglyphtounicode{tfm:${family}/${name}}{${code}}`);
  });
  return [
    "\\DeclareFontEncoding{OT2}{}{}",
    "\\DeclareFontSubstitution{OT2}{wncyr}{m}{n}",
    "\\DeclareFontFamily{OT2}{wncyr}{}",
    ...shapes.map(([shape, font]) => `\\DeclareFontShape{OT2}{wncyr}${shape}{<-> ${font}}{}`),
    "\\DeclareRobustCommand{\\cyr}[1]{{\\fontencoding{OT2}\\fontfamily{wncyr}\\selectfont #1}}",
    ...meanings,
  ];
}

/** Names of the glyphs that are not letters of ASCII. Source: the fonts' encoding vector (AMSFonts 3). */
const GLYPHS: ReadonlyMap<number, string> = new Map(
  Object.entries({
    0: "Nj",
    1: "Lj",
    2: "Dzh",
    3: "Ze",
    4: "Iroman",
    5: "Ye",
    6: "Dj",
    7: "Tsoft",
    8: "nj",
    9: "lj",
    10: "dzh",
    11: "ze",
    12: "iroman",
    13: "ye",
    14: "dj",
    15: "tsoft",
    16: "Yu",
    17: "Zhe",
    18: "Ishort",
    19: "Yo",
    23: "Ya",
    24: "yu",
    25: "zhe",
    26: "ishort",
    27: "yo",
    31: "ya",
    94: "Soft",
    95: "Hard",
    126: "soft",
    127: "hard",
  }).map(([position, name]) => [Number(position), name]),
);

function glyphName(position: number): string | null {
  return GLYPHS.get(position) ?? (position >= 65 && position <= 122 ? String.fromCharCode(position) : null);
}

import type { Word } from "../model/knowledge.ts";
import type { Suggestion } from "./suggest.ts";

/** Groups of commands that a page can set, with what is written after each and how far back the caret stands. */
const LETTERS =
  "alpha beta gamma delta epsilon varepsilon zeta eta theta vartheta iota kappa lambda mu nu xi pi rho sigma tau " +
  "upsilon phi varphi chi psi omega Gamma Delta Theta Lambda Xi Pi Sigma Upsilon Phi Psi Omega";

const SIGNS: Readonly<Record<string, string>> = {
  cdot: "·",
  times: "×",
  pm: "±",
  mp: "∓",
  le: "≤",
  ge: "≥",
  ne: "≠",
  ll: "≪",
  gg: "≫",
  sim: "∼, asymptotic to",
  approx: "≈",
  equiv: "≡",
  propto: "∝",
  in: "∈",
  notin: "∉",
  subset: "⊂",
  subseteq: "⊆",
  cup: "∪",
  cap: "∩",
  setminus: "∖",
  emptyset: "∅",
  infty: "∞",
  partial: "∂",
  nabla: "∇",
  forall: "∀",
  exists: "∃",
  to: "→",
  mapsto: "↦",
  uparrow: "↑",
  downarrow: "↓",
  implies: "⟹",
  iff: "⟺",
  sum: "∑",
  prod: "∏",
  int: "∫",
  oint: "∮",
  ldots: "… on the line",
  cdots: "⋯ at mid-height",
  ell: "ℓ",
  Re: "ℜ",
  Im: "ℑ",
  mid: "∣, as in a conditional probability",
  lfloor: "⌊",
  rfloor: "⌋",
  lceil: "⌈",
  rceil: "⌉",
  langle: "⟨",
  rangle: "⟩",
  quad: "a wide space",
  qquad: "a space twice as wide",
};

const OPERATORS = "exp log ln sin cos tan sinh cosh tanh lim limsup liminf sup inf max min det dim arg Pr";

/** What takes arguments in braces. */
const WITH_ARGUMENTS: Readonly<Record<string, readonly [arguments_: string, meaning: string]>> = {
  frac: ["{}{}", "a fraction"],
  tfrac: ["{}{}", "a small fraction"],
  dfrac: ["{}{}", "a large fraction"],
  binom: ["{}{}", "a binomial coefficient"],
  sqrt: ["{}", "a square root"],
  mathbb: ["{}", "blackboard letters: ℝ, ℕ"],
  mathbf: ["{}", "bold upright letters"],
  mathcal: ["{}", "calligraphic letters"],
  mathrm: ["{}", "upright letters"],
  mathfrak: ["{}", "Fraktur letters"],
  boldsymbol: ["{}", "a bold symbol"],
  operatorname: ["{}", "an operator's name, upright and spaced"],
  text: ["{}", "words within a formula"],
  hat: ["{}", "a hat over a letter"],
  tilde: ["{}", "a tilde over a letter"],
  bar: ["{}", "a bar over a letter"],
  dot: ["{}", "a dot over a letter"],
  ddot: ["{}", "two dots over a letter"],
  vec: ["{}", "an arrow over a letter"],
  overline: ["{}", "a line over an expression"],
  underline: ["{}", "a line under an expression"],
  widehat: ["{}", "a hat over an expression"],
  widetilde: ["{}", "a tilde over an expression"],
  underbrace: ["{}", "a brace under an expression"],
  overset: ["{}{}", "one thing over another"],
  underset: ["{}{}", "one thing under another"],
  value: ["{}", "a number bound to a result"],
  label: ["{}", "numbers a displayed formula, and names it for :ref"],
};

/** What is written whole, the caret in the midst of it. */
const PAIRS: readonly Suggestion[] = [
  { label: "\\left", meaning: "brackets that grow with what they hold", insert: "\\left( \\right)", back: 8 },
  { label: "\\begin", meaning: "rows within a display: aligned, cases, pmatrix", insert: "\\begin{}", back: 1 },
];

/** Commands that may follow a backslash in mathematics. */
export const TEX_WORDS: readonly Suggestion[] = [
  ...LETTERS.split(" ").map((name) => bare(name, "a Greek letter")),
  ...Object.entries(SIGNS).map(([name, meaning]) => bare(name, meaning)),
  ...OPERATORS.split(" ").map((name) => bare(name, "an operator, set upright")),
  ...Object.entries(WITH_ARGUMENTS).map(([name, [given, meaning]]) => ({
    label: `\\${name}`,
    meaning,
    insert: `\\${name}${given}`,
    back: given.length - 1,
  })),
  ...PAIRS,
];

function bare(name: string, meaning: string): Suggestion {
  return { label: `\\${name}`, meaning, insert: `\\${name}`, back: 0 };
}

/** What `\begin{…}` may hold within a display. */
export const TEX_ENVIRONMENTS: readonly Word[] = [
  { name: "aligned", meaning: "rows aligned at &" },
  { name: "gathered", meaning: "rows, each centred" },
  { name: "cases", meaning: "cases behind a brace" },
  { name: "matrix", meaning: "a matrix without brackets" },
  { name: "pmatrix", meaning: "a matrix in round brackets" },
  { name: "bmatrix", meaning: "a matrix in square brackets" },
  { name: "vmatrix", meaning: "a determinant" },
  { name: "array", meaning: "columns as given: {lcr}" },
];

/** A long paper made from a seed: the same seed and size give the same text. */

/** mulberry32, from memory; its quality is no matter here. */
function generator(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 32;
  };
}

const WORDS =
  "particle barrier front drift branching law tail constant speed profile shore larva current generation decay survival line process limit profile amplitude trajectory slope starting point number".split(
    " ",
  );
const FORMULAS = [
  "\\mu>\\sqrt{2\\beta}",
  "\\E_x[s^K]",
  "\\omega''+2\\mu\\omega'",
  "C n^{-3/2}s_0^{-n}",
  "x\\mapsto e^{-\\lambda x}",
];
const QUANTITIES = ["K1.mean", "T1.s0", "K1(3)", "larvae.decay", "K2.above(5)", "T2.constant", "mu"];

const HEAD = `---
title: A long paper
authors:
  - {name: Nobody, affiliation: Nowhere}
macros:
  \\E: \\mathbb{E}
---

\`\`\`parameters
beta: 1
mu: {value: 2, min: 1.45, max: 4, step: 0.05}
\`\`\`

\`\`\`process larvae
drift: mu
rate: beta
\`\`\`
`;

/** Cells come in this order, again and again; the number after each name is its turn. */
const CELLS: readonly ((turn: number) => string)[] = [
  (turn) =>
    `counts K${turn}\nof: larvae\nstart: ${(0.5 + turn / 8).toFixed(3)}\nup_to: 60\ncaption: How many arrive, $x$ is ${turn}.`,
  (turn) => `tail T${turn}\nof: larvae\nstart: ${(0.5 + turn / 8).toFixed(3)}`,
  (turn) => `profile w${turn}\nof: larvae\ns: [0, 1/2, s0]`,
  (turn) => `formula f${turn}\nshare: K${turn}(1)/K${turn}.mean\nrest: 1 - share`,
  (turn) => `table t${turn}\nrows: {n: [1, 2, 5, 10]}\ncolumns: {p: K${turn}(n), law: T${turn}(n)}`,
];

/** Markdown of at least `bytes` characters: sections, theorems, prose, math, references, bound numbers and `cells` cells. */
export function generatePaper(bytes: number, cells: number, seed: number): string {
  const random = generator(seed);
  const pick = <T>(items: readonly T[]): T => items[Math.floor(random() * items.length)] as T;
  let text = HEAD;
  let section = 0;
  let cell = 0;
  while (text.length < bytes || cell < cells) {
    if (section % 6 === 0) text += `\n## On the ${pick(WORDS)} of the ${pick(WORDS)} {#s${section}}\n`;
    text += `\n${paragraph(random, pick, section)}\n`;
    if (random() < 0.15) text += `\n:::lemma{#l${section}}\n${sentence(random, pick)}\n:::\n`;
    if (random() < 0.2) text += `\n$$\n${pick(FORMULAS)}=0\\label{e${section}}\n$$\n`;
    while (cell < cells && text.length > ((cell + 1) / (cells + 1)) * bytes) {
      const make = CELLS[cell % CELLS.length] as (turn: number) => string;
      text += `\n\`\`\`${make(1 + Math.floor(cell / CELLS.length))}\n\`\`\`\n`;
      cell += 1;
    }
    section += 1;
  }
  return text;
}

type Pick = <T>(items: readonly T[]) => T;

function paragraph(random: () => number, pick: Pick, section: number): string {
  const sentences = Array.from({ length: 3 + Math.floor(random() * 5) }, () => sentence(random, pick));
  if (random() < 0.25) sentences.push(`Its value is :value[${pick(QUANTITIES)}]{digits=5}.`);
  if (random() < 0.2) sentences.push(`See :ref[s${section - (section % 6)}].`);
  return sentences.join(" ");
}

function sentence(random: () => number, pick: Pick): string {
  const words = Array.from({ length: 6 + Math.floor(random() * 12) }, () =>
    random() < 0.06 ? `$${pick(FORMULAS)}$` : pick(WORDS),
  );
  if (random() < 0.2) words.splice(2, 0, `*${pick(WORDS)}*`);
  return `The ${words.join(" ")}.`;
}

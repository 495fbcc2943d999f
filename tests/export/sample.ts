import { type CellResult, computePlan, type Plan, planPaper, type ShownPaper } from "../../app/cells/index.ts";
import { type Paper, readPaper } from "../../app/paper/index.ts";

/** A paper with something of everything that the language has. Its people and references are invented. */
export const EVERYTHING = `---
title: How many reach the shore? A *working* paper with $\\mu>\\sqrt{2\\beta}$
authors:
  - name: Inês Valadão
    affiliation: Institute of the Outer Bank & Sons, Søndre Holm
    email: ines_v@shore.example
    orcid: 0000-0002-1825-0097
  - name: Андрей Щербина
abstract: We count 100 % of the larvae, $\\E[K]$ of them, at \`50\` m.
keywords: [branching diffusion, absorption]
msc: [60J80, 35K57]
macros:
  \\E: \\mathbb{E}
  \\P: \\mathbb{P}
  \\half: \\frac{#1}{2}
---

\`\`\`parameters
beta: 1
mu: {value: 2, min: 1.45, max: 4, step: 0.05, symbol: \\mu, note: drift}
\`\`\`

## Model {#model}

Particles drift with $\\mu = \\value{mu}$ and split at rate :value[beta]. See :ref[kpp], :ref[shift], :ref[K], :ref[t] and
:ref[model]; also :cite[maduro]{at="Theorem 1.2"} and :cite[castellane, maduro]. Said by :cite[castellane]{as=text}.
<!-- a remark to ourselves: not printed -->

$$ \\half{1} w'' + \\mu w' + \\beta (w^2 - w) = 0, \\qquad \\P(K \\ge 0) = 1 \\label{kpp} $$

and without a number

$$
\\begin{aligned}
a &= b \\\\[1ex]
  &= \\value[digits=3]{K.mean}
\\end{aligned}
$$

:::theorem[Shift & turn]{#shift}
There is a function $\\varphi$ with $\\varphi(0)=1$, such that for every $s \\le s_0$
$$ \\omega_s(x) = \\varphi(e^{-\\lambda x}) $$
where $s_0 = \\value[digits=4]{T.s0}$.
:::

:::proof
Stop each lineage at its first visit. Then
$$ G_{x+y} = G_x \\circ G_y. $$
:::

### Numbers {#numbers}

The mean is :value[K.mean]{digits=5}, and :value[K(3)]{as=scientific digits=3}; a note[^1] again[^1], *emphasis*, **strong**,
~~struck~~, \`code_with \\ % { } ~ ^ " '\`, [a link](https://shore.example/a_b?c=1&d=%20#e).

[^1]: A footnote with $x^2$ and 50 % & more.

\`\`\`process larvae
drift: mu
rate: beta
\`\`\`

\`\`\`counts K
of: larvae
start: 1
up_to: 30
show: [figure, table]
caption: How many reach the shore, with mean :value[K.mean]{digits=4} and $\\E[K]$ & more.
\`\`\`

\`\`\`tail T
of: larvae
start: 1
up_to: 30
\`\`\`

\`\`\`table t
rows: {n: [1, 2, 3, 4]}
columns: {exact: K(n), law: T(n), ratio: K(n)/T(n)}
caption: The law against the exact one.
\`\`\`

- one
- two
  1. deep
  2. deeper

> Quoted words.

| left | right |
|:-----|------:|
| a*b* | 1 |
| [x] | $y$ |

## Characters

Special: \\\\ \\{ \\} $5 & # % _ ^ ~ \\" ' \\\` < > | \\[x\\] \\* -- --- '' ,, ?\\\` end.
Latin: ÀÉîõüçñ ßæœøåłŁđğİşșțůűžĺ ẽ ṣ ế. Greek: αβγ Ωμέγα ἄνθρωπος. Cyrillic: Колмогоров, Ёж, Щука. Quotes: “a” ‘b’ „c“ «d» ‹e›.
Dashes: – — …; spaces: a\u00a0b\u2009c\u202fd; math: ≤ ≥ ≠ ≈ → ∞ ∑ √ ± × ∈ ℝ 𝔼 x² y₀; currency: € £ ¥; † ‡ § ¶ © ® ™ °.
`;

export const BIBLIOGRAPHY = `@article{castellane, author={Castellane, Rita and Thorvik, I.}, title={Singularities and transfer, a working account of {$x^2$}}, journal={Ann. Comb. Prob.}, volume={12}, year={2009}, pages={41--77}}
@article{maduro, author={L. Madur{\\'o}}, title={Killed branching motions & more}, journal={Stoch. Lett.}, volume=3, year=2016, pages={1--29}, doi={10.1000/xyz_1}}
`;

export const NOTHING_SHOWN: ShownPaper = { cells: new Map(), work: new Map(), changes: new Map() };

export interface Computed {
  readonly paper: Paper;
  readonly plan: Plan;
  readonly results: ReadonlyMap<string, CellResult>;
}

/** Reads, plans and computes a paper with the program's own parts. */
export function computed(text: string, bibliography = ""): Computed {
  const paper = readPaper(text, bibliography);
  const plan = planPaper(paper);
  const results = new Map<string, CellResult>();
  for (const [id, outcome] of computePlan(plan)) if (outcome.status === "computed") results.set(id, outcome.result);
  return { paper, plan, results };
}

/** What a paper shows after everything in it was computed. */
export function shownAs({ plan, results }: Computed): ShownPaper {
  const cells = plan.cells.flatMap((cell) => {
    const result = results.get(cell.id);
    if (!result) return [];
    const { key, seconds, solver } = result;
    const { parameterValues, workingKey } = cell;
    const shown = {
      key,
      seconds,
      solver,
      parameterValues,
      workingKey: workingKey ?? "",
      at: "2026-12-01T14:31:00Z",
      by: "Inês",
    };
    return [[cell.slot, shown] as const];
  });
  return { cells: new Map(cells), work: new Map(), changes: new Map() };
}

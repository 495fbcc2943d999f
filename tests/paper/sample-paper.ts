/** A paper of a given length in the language, for tests of speed and of arbitrary changes: sections, displays, cells, numbers. */
export function samplePaper(characters: number): { text: string; bibliography: string } {
  let text = frontMatter;
  for (let section = 1; text.length < characters; section++) text += sectionText(section);
  return { text, bibliography };
}

export const bibliography = `@string{spa = {Stochastic Processes and their Applications}}

@article{kesten1978,
  author = {Kesten, Harry},
  title = {Branching {B}rownian motion with absorption},
  journal = spa,
  volume = 7, number = 1, pages = {9--47}, year = 1978,
  doi = {10.1016/0304-4149(78)90035-2}
}

@book{bramson1983,
  author = {Bramson, Maury},
  title = {Convergence of solutions of the {K}olmogorov equation to travelling waves},
  publisher = {American Mathematical Society},
  year = {1983}
}
`;

const frontMatter = `---
title: Absorbed particles for $\\mu > \\mu_c$
authors:
  - name: A. Author
    affiliation: University of Somewhere
keywords: [branching diffusion, absorption]
msc: [60J80, 60E05]
abstract: |
  We compute :value[K0.mean]{digits=3} and compare with :cite[kesten1978].
macros:
  \\E: \\mathbb{E}
---

`;

function sectionText(section: number): string {
  const k = `K${section - 1}`;
  return `## Section ${section} {#s${section}}

The number *ever* absorbed, written $K$, has mean :value[${k}.mean]{digits=4} and the **law** $P(K=n)\\sim C n^{-3/2}$ as
$n\\to\\infty$; see [the text](https://example.org) and compare at 12:30 with \`code\`, equation :ref[e${section}], and
:cite[kesten1978, bramson1983]{at="Theorem 1.2"}. It costs $5 and $6 to print, of which ${section} were kept.

$$
u_t = D u_{xx} + \\mu u_x + f(u), \\qquad u(0) = \\value[digits=3]{${k}(3)} \\label{e${section}}
$$
where $f(u) = \\beta (G(u) - u)$ and nothing else, as in Figure :ref[${k}]. The *bracket* of a law of this kind is a
matter of taste, and what follows does not depend on it; nor does the proof, which is short. ${filler}

:::theorem[Shift number ${section}]{#t${section}}
Let $\\mu > 0$. Then $w(x + a, s) = w(x, s')$ for all $x$.

:::proof[of Theorem :ref[t${section}]]
It follows from uniqueness[^n${section}].
:::
:::

- an item with $x_${section}$
- another, with **words** set apart

\`\`\`counts ${k}
of: larvae
start: 1
up_to: 200
caption: How many reach the shore, :value[${k}.mean] on average.
\`\`\`

[^n${section}]: A remark on Section :ref[s${section}].

`;
}

const filler =
  "The density falls off as a power and then as an exponential, so that the picture is drawn on a logarithmic scale in both directions, and what is seen there is a straight line that bends once. ".repeat(
    9,
  );

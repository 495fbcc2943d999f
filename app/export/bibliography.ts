import { type BibliographyEntry, bibliographyItem } from "../paper/index.ts";
import type { Printing } from "./printing.ts";
import { addressTex } from "./text.ts";

/** The printed list of what is cited, ready made, so that no other program has to be started; "" when nothing is. */
export function bibliographyTex(entries: readonly BibliographyEntry[], printing: Printing): string {
  const cited = entries.filter((entry) => entry.number !== null).sort((a, b) => (a.number ?? 0) - (b.number ?? 0));
  if (cited.length === 0) return "";
  const items = cited.map((entry) => `\\bibitem{${printing.names.citation(entry.key)}} ${itemTex(entry, printing)}`);
  return `\\begin{thebibliography}{${cited.length}}\n${items.join("\n")}\n\\end{thebibliography}\n`;
}

function itemTex(entry: BibliographyEntry, printing: Printing): string {
  // Mistakes of the bibliography stand at its own lines, which are not the paper's: line 0.
  return bibliographyItem(entry)
    .map((run) => {
      if (run.math) return `$${printing.math(run.text, 0)}$`;
      const text = printing.text(run.text, 0);
      if (run.link !== undefined) return `\\href{${addressTex(run.link)}}{${text}}`;
      return run.emphasis ? `\\emph{${text}}` : text;
    })
    .join("");
}

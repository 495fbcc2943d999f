import { renderMath } from "../../ui/math.ts";

/** Words with their mathematics in dollars set; numbers in it stand as their formulas. */
export function wordsWithMath(words: string, macros: Readonly<Record<string, string>>): DocumentFragment {
  const made = document.createDocumentFragment();
  for (const [place, piece] of words.split(/(?<!\\)\$([^$]+)\$/).entries()) {
    if (place % 2 === 0) made.append(piece);
    else {
      const set = document.createElement("span");
      set.innerHTML = renderMath(withFormulas(piece), false, macros);
      made.append(set);
    }
  }
  return made;
}

function withFormulas(tex: string): string {
  return tex
    .replace(/\\label\{[^}]*\}/g, "")
    .replace(
      /\\value(?:\[[^\]]*\])?\{([^}]*)\}/g,
      (_, formula: string) => `\\mathtt{${formula.replaceAll("_", "\\_")}}`,
    );
}

import { type FrontMatter, type PaperNode, plainText } from "../../paper/index.ts";
import { renderMath } from "../../ui/math.ts";

/** Words, or a formula as HTML that `renderMath` made; `at` is where it begins in the text. */
export type Phrase = { readonly at: number } & ({ readonly text: string } | { readonly html: string });

/**
 * Phrases of the front matter without the paper's results: formulas are set, all else is plain words.
 * Numbers bound to results are left to the galley.
 */
export function phrasesOf(nodes: readonly PaperNode[], macros: FrontMatter["macros"]): Phrase[] {
  return nodes.map((node) => {
    const at = startOf(node);
    return node.type === "inlineMath" && !node.value.includes("\\value")
      ? { at, html: renderMath(node.value, false, macros) }
      : { at, text: plainText(node) };
  });
}

/** The paragraphs of an abstract; a block that is no paragraph becomes one of plain words. */
export function paragraphsOf(front: FrontMatter): Phrase[][] {
  return front.abstractNodes.map((block) =>
    block.type === "paragraph"
      ? phrasesOf(block.children, front.macros)
      : [{ at: startOf(block), text: plainText(block) }],
  );
}

function startOf(node: PaperNode): number {
  return node.position?.start.offset ?? 0;
}

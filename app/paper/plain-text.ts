import { citationText } from "./bibliography/index.ts";
import { mathTex } from "./math.ts";
import type { BoundNumber, Target } from "./types.ts";
import type { PaperNode } from "./walk.ts";

/** "Theorem 2.1", "equation (3)", "Figure 2": what a reference prints. */
export function referenceText(target: Target): string {
  return target.noun === "equation" ? `equation (${target.number})` : `${target.noun} ${target.number}`;
}

/**
 * The words of nodes without any markup, for outlines, alternative texts and search. Math is its TeX.
 * @param print what a bound number says; its formula by default
 */
export function plainText(
  nodes: PaperNode | readonly PaperNode[],
  print: (number: BoundNumber) => string = (number) => number.formula,
): string {
  const list = "type" in nodes ? [nodes] : nodes;
  return list.map((node) => wordsOf(node, print)).join("");
}

function wordsOf(node: PaperNode, print: (number: BoundNumber) => string): string {
  switch (node.type) {
    case "text":
    case "inlineCode":
    case "code":
    case "html":
      return node.value;
    case "math":
    case "inlineMath":
      return mathTex(node, print);
    case "break":
      return " ";
    case "image":
      return node.alt ?? "";
    case "boundNumber":
      return print(node.number);
    case "reference":
      return node.target === null ? `[${node.label}]` : referenceText(node.target);
    case "citation":
      return citationText(node.entries, { as: node.as, at: node.at });
    case "cell":
      return plainText(node.caption, print);
    default:
      return "children" in node ? plainText(node.children, print) : "";
  }
}

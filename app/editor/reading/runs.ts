import type { PhrasingContent } from "mdast";
import { type BibliographyEntry, bibliographyItem, citationText, mathTex, type Target } from "../../paper/index.ts";
import { withoutClasses } from "../model/bound-classes.ts";
import type { NumberFace, Run } from "../model/types.ts";
import type { NumberFaces } from "./number-faces.ts";

/** An inline or a displayed formula of the tree. */
type MathNode = Parameters<typeof mathTex>[0];

/** Running text of the paper as runs: what captions, titles and table entries are set from. */
export function runsOf(nodes: readonly PhrasingContent[], numbers: NumberFaces): Run[] {
  return nodes.flatMap((node) => runOf(node, numbers));
}

function runOf(node: PhrasingContent, numbers: NumberFaces): Run[] {
  switch (node.type) {
    case "text":
      return [{ run: "text", text: node.value.replace(/\s*\n\s*/g, " ") }];
    case "html":
      return [{ run: "text", text: node.value }];
    case "break":
      return [{ run: "text", text: " " }];
    case "inlineCode":
      return [{ run: "code", text: node.value }];
    case "inlineMath":
      return [{ run: "math", tex: boundTex(node, numbers), ...boundIn(node, numbers) }];
    case "emphasis":
    case "strong":
      return [{ run: node.type, runs: runsOf(node.children, numbers) }];
    case "delete":
      return [{ run: "deleted", runs: runsOf(node.children, numbers) }];
    case "link":
      return [{ run: "link", url: node.url, runs: runsOf(node.children, numbers) }];
    case "linkReference":
      return runsOf(node.children, numbers);
    case "image":
    case "imageReference":
      return [{ run: "text", text: node.alt ?? "" }];
    case "footnoteReference":
      return [{ run: "text", text: ` [${node.label ?? node.identifier}]` }];
    case "reference":
      return [{ run: "text", text: referenceText(node.target, node.label) }];
    case "citation":
      return [{ run: "text", text: citationText(node.entries, { at: node.at, as: node.as }) }];
    case "boundNumber":
      return [{ run: "number", number: numbers.face(node.number) }];
    default:
      return [];
  }
}

/** The TeX of a formula with its numbers put in. */
export function boundTex(node: MathNode, numbers: NumberFaces): string {
  const isBound = (node.data?.numbers ?? []).length > 0;
  return mathTex(isBound ? { ...node, value: withoutClasses(node.value) } : node, numbers.tex);
}

/** The numbers that are bound in a formula; nothing where there are none. */
export function boundIn(node: MathNode, numbers: NumberFaces): { numbers?: readonly NumberFace[] } {
  const bound = node.data?.numbers ?? [];
  return bound.length === 0 ? {} : { numbers: bound.map(({ number }) => numbers.face(number)) };
}

/** "Theorem 2.1", "equation (3)", "Figure 2"; the label itself where it leads nowhere. */
export function referenceText(target: Target | null, label: string): string {
  if (target === null) return label;
  return target.noun === "equation" ? `equation (${target.number})` : `${target.noun} ${target.number}`;
}

/** One entry of the printed bibliography as runs. */
export function itemRuns(entry: BibliographyEntry): Run[] {
  return bibliographyItem(entry).map(({ text, emphasis }) =>
    emphasis ? { run: "emphasis", runs: [{ run: "text", text }] } : { run: "text", text },
  );
}

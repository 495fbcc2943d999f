import type { PhrasingContent, RootContent } from "mdast";

/** A node of a paper's tree. */
export type PaperNode = RootContent | PhrasingContent;

/** Calls `visit` for every node in the order of the text, titles of surroundings and captions of cells included. */
export function walk(nodes: readonly PaperNode[], visit: (node: PaperNode) => void): void {
  for (const node of nodes) {
    visit(node);
    if (node.type === "environment") walk(node.title, visit);
    if (node.type === "cell") walk(node.caption, visit);
    if ("children" in node) walk(node.children, visit);
  }
}

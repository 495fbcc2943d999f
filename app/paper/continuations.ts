import type { RootContent } from "mdast";

/** Marks paragraphs that go on after a display without a blank line between: they are no new paragraphs in print. */
export function markContinuations(nodes: readonly RootContent[]): void {
  for (const [index, node] of nodes.entries()) {
    const before = nodes[index - 1];
    if (node.type === "paragraph" && before?.type === "math" && before.position && node.position) {
      const continues = node.position.start.line <= before.position.end.line + 1;
      if (continues) node.data = { ...node.data, continues };
    }
    if (node.type === "environment" || node.type === "blockquote" || node.type === "listItem")
      markContinuations(node.children);
    if (node.type === "list") for (const item of node.children) markContinuations(item.children);
  }
}

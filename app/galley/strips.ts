import type { RootContent } from "mdast";

/** A galley: a strip of the paper long enough to fill a window beside its neighbour. */
export interface Strip {
  readonly nodes: readonly RootContent[];
  readonly firstLine: number;
  readonly lastLine: number;
}

/** About what one galley holds, in pixels at its width of 500. */
const STRIP_HEIGHT = 860;
const CHARACTERS_A_LINE = 66;
const LINE_HEIGHT = 23.5;

/**
 * Parts a paper into galleys of about one height, between blocks, never after a heading.
 * @param heightOf height of what a cell prints; 0 where it prints nothing
 */
export function partIntoStrips(
  nodes: readonly RootContent[],
  heightOf: (node: RootContent) => number,
): readonly Strip[] {
  const printed = nodes.filter(
    (node) => node.type !== "footnoteDefinition" && node.type !== "definition" && node.type !== "yaml",
  );
  const strips: RootContent[][] = [];
  let strip: RootContent[] = [];
  let height = 0;
  printed.forEach((node, i) => {
    const own = estimatedHeight(node, heightOf);
    const afterHeading = strip.at(-1)?.type === "heading";
    const following = node.type === "heading" ? own + estimatedHeight(printed[i + 1], heightOf) : own;
    if (strip.length > 0 && !afterHeading && height + following > STRIP_HEIGHT) {
      strips.push(strip);
      strip = [];
      height = 0;
    }
    strip.push(node);
    height += own;
  });
  strips.push(strip);
  return strips.map((part, i) => ({
    nodes: part,
    // The first galley bears the title, which is the front matter's.
    firstLine: i === 0 ? 1 : (part[0]?.position?.start.line ?? 1),
    lastLine: part.at(-1)?.position?.end.line ?? 1,
  }));
}

function estimatedHeight(node: RootContent | undefined, heightOf: (node: RootContent) => number): number {
  if (!node) return 0;
  const length = (node.position?.end.offset ?? 0) - (node.position?.start.offset ?? 0);
  const lines = (node.position?.end.line ?? 0) - (node.position?.start.line ?? 0) + 1;
  switch (node.type) {
    case "cell":
      return heightOf(node);
    case "heading":
      return 46;
    case "math":
      return 34 + 24 * Math.max(1, node.value.split("\\\\").length);
    case "code":
      return 20 + 18 * lines;
    case "table":
      return 30 + 24 * lines;
    case "environment":
    case "list":
    case "listItem":
    case "blockquote":
      return 16 + node.children.reduce((sum, child) => sum + estimatedHeight(child, heightOf), 0);
    default:
      return Math.ceil(length / CHARACTERS_A_LINE) * LINE_HEIGHT;
  }
}

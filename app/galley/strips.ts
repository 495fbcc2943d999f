import type { RootContent } from "mdast";
import { type PaperNode, plainText } from "../paper/index.ts";

/** A galley: a strip of the paper long enough to fill a window beside its neighbour. */
export interface Strip {
  readonly nodes: readonly RootContent[];
  readonly firstLine: number;
  readonly lastLine: number;
}

/** About what one galley holds, in pixels at its width of 500. */
const STRIP_HEIGHT = 960;
const CHARACTERS_A_LINE = 68;
const LINE_HEIGHT = 23.5;
const CAPTION_LINE_HEIGHT = 20;

/**
 * Parts a paper into galleys of about one height, between blocks, never after a heading.
 * @param heightOf height of what a cell prints; 0 where it prints nothing
 * @param headHeight height of the title and what stands with it, at the head of the first galley
 */
export function partIntoStrips(
  nodes: readonly RootContent[],
  heightOf: (node: RootContent) => number,
  headHeight: number,
): readonly Strip[] {
  const printed = nodes.filter(
    (node) => node.type !== "footnoteDefinition" && node.type !== "definition" && node.type !== "yaml",
  );
  const strips: RootContent[][] = [];
  let strip: RootContent[] = [];
  let height = headHeight;
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

/** Height of running text. @param lineHeight pixels */
export function textHeight(nodes: readonly PaperNode[], lineHeight = LINE_HEIGHT): number {
  // TeX is longer than what it sets: a command is about one sign, and marks of structure are none.
  const words = plainText(nodes, () => "5.43688")
    .replace(/\\[A-Za-z]+\s*/g, "x")
    .replace(/[{}_^\\]/g, "");
  return Math.ceil(words.length / CHARACTERS_A_LINE) * lineHeight;
}

/** Height of a caption with its provenance line. */
export function captionHeight(nodes: readonly PaperNode[]): number {
  return 60 + textHeight(nodes, CAPTION_LINE_HEIGHT);
}

function estimatedHeight(node: RootContent | undefined, heightOf: (node: RootContent) => number): number {
  if (!node) return 0;
  const lines = (node.position?.end.line ?? 0) - (node.position?.start.line ?? 0) + 1;
  switch (node.type) {
    case "cell":
      return heightOf(node);
    case "heading":
      return 48;
    case "math":
      return (
        22 + 26 * Math.max(1, node.value.split("\\\\").length) + (/\\(?:d?frac|sum|int|prod)/.test(node.value) ? 16 : 0)
      );
    case "code":
      return 20 + 19 * lines;
    case "table":
      return 30 + 24 * lines;
    case "environment":
    case "list":
    case "listItem":
    case "blockquote":
      return 14 + node.children.reduce((sum, child) => sum + estimatedHeight(child, heightOf), 0);
    default:
      return textHeight([node]);
  }
}

import type {
  BlockContent,
  Blockquote,
  DefinitionContent,
  FootnoteDefinition,
  ListItem,
  Nodes,
  Paragraph,
  PhrasingContent,
  RootContent,
} from "mdast";
import { isCell, misspeltKind, readCell } from "./cells.ts";
import type { Grouped, RawNode } from "./environments.ts";
import { groupEnvironments } from "./environments.ts";
import { sourceMap } from "./lines.ts";
import { settleImage, settleLink } from "./links.ts";
import { noticeLooseMarks } from "./loose-marks.ts";
import { readDirective, readMath } from "./marks.ts";
import type { CellNode, DisplayMath, EnvironmentNode } from "./nodes.ts";
import type { Reading } from "./reading.ts";
import { relocate } from "./relocate.ts";
import type { RawDirective, RawPiece } from "./syntax/index.ts";
import { parseInline } from "./syntax/index.ts";
import type { Yaml } from "./types.ts";

/** Deeper nesting than this is set as plain text: deep recursion could exhaust the stack. */
const deepest = 60;

type RawPhrasing = PhrasingContent | DisplayMath | (RawDirective & { position?: RootContent["position"] });

/** Turns parsed blocks into the paper's: cells, surroundings, bound numbers, references, citations. Recursive. */
export function dressBlocks(reading: Reading, nodes: readonly RawNode[], depth = 0): RootContent[] {
  return groupEnvironments(reading, nodes).flatMap((grouped) => dressGrouped(reading, grouped, depth));
}

function dressGrouped(reading: Reading, grouped: Grouped, depth: number): RootContent[] {
  if (grouped.kind === "node") return dressBlock(reading, grouped.node, depth);
  if (grouped.kind === "fence") {
    const from = grouped.fence.position?.start.offset ?? 0;
    const children = readPhrasing(reading, grouped.fence.value, (index) => from + index);
    return [{ type: "paragraph", children, position: grouped.fence.position }];
  }
  const { opening, content } = grouped;
  const start = { line: reading.lines.lineAt(opening.from), column: 1, offset: opening.from };
  const end = { line: reading.lines.lineAt(opening.end), column: 1, offset: opening.end };
  const title = readPhrasing(reading, opening.title, (index) => opening.titleFrom + index);
  const children = content.flatMap((inner) => dressGrouped(reading, inner, depth + 1));
  const node: EnvironmentNode = {
    type: "environment",
    environment: opening.name,
    title,
    label: opening.label,
    number: null,
    children,
    position: { start, end },
  };
  return [node];
}

function dressBlock(reading: Reading, node: RootContent | RawPiece, depth: number): RootContent[] {
  if (depth > deepest || node.type === "rawPiece") return [asText(reading, node)];
  switch (node.type) {
    case "yaml":
    case "definition":
      return [];
    case "code": {
      if (isCell(node)) return [cellNode(reading, node)];
      const warning = misspeltKind(node, reading.text, reading.lines);
      if (warning !== null) reading.problems.push(warning);
      return [node];
    }
    case "math":
      readMath(reading, node);
      return [node];
    case "heading":
      node.children = dressPhrasing(reading, node.children, depth + 1);
      takeHeadingLabel(reading, node);
      return [node];
    case "paragraph":
      return splitAtDisplays(node, dressWords(reading, node.children, depth + 1));
    case "blockquote":
    case "footnoteDefinition":
      dressInside(reading, node, depth);
      return [node];
    case "list":
      for (const item of node.children) dressInside(reading, item, depth);
      return [node];
    case "table":
      for (const cell of node.children.flatMap((row) => row.children)) {
        cell.children = dressPhrasing(reading, cell.children, depth + 1);
      }
      return [node];
    default:
      return [node];
  }
}

function dressInside(reading: Reading, node: Blockquote | FootnoteDefinition | ListItem, depth: number): void {
  const blocks = dressBlocks(reading, node.children, depth + 1);
  node.children = blocks.filter((block) => isBlock(block));
}

/** mdast's type of what quotes and items hold; blocks dressed from blocks are always blocks. */
function isBlock(node: RootContent): node is BlockContent | DefinitionContent {
  return !["listItem", "tableRow", "tableCell", "yaml"].includes(node.type);
}

/** Words with displays among them taken as math in the line: where no display can stand (headings, captions). */
function dressPhrasing(reading: Reading, nodes: readonly RawPhrasing[], depth = 0): PhrasingContent[] {
  return dressWords(reading, nodes, depth).map((node) => {
    if (node.type !== "math") return node;
    reading.report(
      reading.from(node),
      reading.to(node),
      "A display cannot stand here. Put the formula between single dollars.",
    );
    return { type: "inlineMath", value: node.value, position: node.position, data: { numbers: node.data?.numbers } };
  });
}

function dressWords(reading: Reading, nodes: readonly RawPhrasing[], depth: number): (PhrasingContent | DisplayMath)[] {
  return nodes.flatMap((node): (PhrasingContent | DisplayMath)[] => {
    if (depth > deepest) return [{ type: "text", value: sourceOf(reading, node), position: node.position }];
    switch (node.type) {
      case "rawDirective":
        return [{ ...readDirective(reading, Object.assign(node, { type: "directive" }), node.value) }];
      case "math":
      case "inlineMath":
        readMath(reading, node);
        return [node];
      case "text":
        noticeLooseMarks(reading, node);
        return [node];
      case "link":
      case "linkReference":
        return settleLink(reading, node, dressPhrasing(reading, node.children, depth + 1));
      case "image":
      case "imageReference":
        return [settleImage(reading, node)];
      case "footnoteReference":
        if (reading.footnotes.has(node.identifier)) return [node];
        return [{ type: "text", value: sourceOf(reading, node), position: node.position }];
      case "emphasis":
      case "strong":
      case "delete":
        node.children = dressPhrasing(reading, node.children, depth + 1);
        return [node];
      default:
        return [node];
    }
  });
}

/** A paragraph with displays among its words becomes paragraphs and displays; what goes on after one is no new paragraph. */
function splitAtDisplays(paragraph: Paragraph, nodes: readonly (PhrasingContent | DisplayMath)[]): RootContent[] {
  if (!nodes.some((node) => node.type === "math")) {
    paragraph.children = nodes.filter((node) => node.type !== "math");
    return paragraph.children.length === 0 ? [] : [paragraph];
  }
  const blocks: RootContent[] = [];
  let words: PhrasingContent[] = [];
  const flush = () => {
    const first = words[0];
    const last = words.at(-1);
    if (words.some((node) => node.type !== "text" || node.value.trim() !== "") && first?.position && last?.position) {
      const position = { start: first.position.start, end: last.position.end };
      blocks.push({ type: "paragraph", children: words, position });
    }
    words = [];
  };
  for (const node of nodes) {
    if (node.type === "math") {
      flush();
      blocks.push(node);
    } else words.push(node);
  }
  flush();
  return blocks;
}

function takeHeadingLabel(reading: Reading, node: Extract<RootContent, { type: "heading" }>): void {
  const last = node.children.at(-1);
  node.data = { ...node.data, label: null, number: null };
  if (last?.type !== "text") return;
  const match = /\s*\{#([^\s{}]+)\}\s*$/.exec(last.value);
  if (match === null) return;
  const label = match[1] ?? "";
  const at =
    reading.from(last) + Math.max(0, reading.text.slice(reading.from(last), reading.to(last)).lastIndexOf(label));
  node.data.label = reading.checkedLabel(label, at);
  last.value = last.value.slice(0, match.index);
  if (last.value === "") node.children.pop();
}

function cellNode(reading: Reading, code: Extract<RootContent, { type: "code" }>): CellNode {
  const { cell, problems } = readCell(code, reading.text, reading.lines, reading.cellCount);
  reading.cells.push(cell);
  reading.problems.push(...problems);
  const caption = cell.body?.entries.find((entry) => entry.key === "caption")?.value;
  return { type: "cell", cell, parts: [], caption: readScalar(reading, caption), position: code.position };
}

/** A short text read as words, on its own; problems and numbers are gathered in the reading. */
export function readPhrasing(reading: Reading, text: string, place: (index: number) => number): PhrasingContent[] {
  if (text === "") return [];
  const root = parseInline(text);
  relocate(root, place, reading.lines);
  const nodes: PhrasingContent[] = [];
  for (const block of root.children) {
    if (block.type !== "paragraph") continue;
    if (nodes.length > 0) nodes.push({ type: "text", value: " " });
    nodes.push(...dressPhrasing(reading, block.children));
  }
  return nodes;
}

/** A scalar of YAML read as words, at its place in the text. */
export function readScalar(reading: Reading, scalar: Yaml | undefined): PhrasingContent[] {
  if (scalar?.yaml !== "scalar") return [];
  return readPhrasing(reading, scalar.text, placeInScalar(reading.text, scalar));
}

/** Where the characters of a scalar's text stand in the paper's text. */
export function placeInScalar(text: string, scalar: Extract<Yaml, { yaml: "scalar" }>): (index: number) => number {
  const map = sourceMap(scalar.text, text.slice(scalar.from, scalar.to));
  return (index) => scalar.from + map(index);
}

function asText(reading: Reading, node: Nodes | RawPiece): Paragraph {
  const message = "This is nested too deeply to be set; it is shown as it is written.";
  const { position } = node;
  reading.report(position?.start.offset ?? 0, position?.end.offset ?? 0, message);
  return { type: "paragraph", children: [{ type: "text", value: sourceOf(reading, node), position }], position };
}

function sourceOf(reading: Reading, node: { position?: RootContent["position"] }): string {
  return reading.text.slice(node.position?.start.offset ?? 0, node.position?.end.offset ?? 0);
}

import type { Nodes, Root, RootContent } from "mdast";
import type { CompileContext, Extension, Token } from "mdast-util-from-markdown";
import { frontmatterFromMarkdown } from "mdast-util-frontmatter";
import { gfmFootnoteFromMarkdown } from "mdast-util-gfm-footnote";
import { gfmTableFromMarkdown } from "mdast-util-gfm-table";
import { frontmatter } from "micromark-extension-frontmatter";
import { gfmFootnote } from "micromark-extension-gfm-footnote";
import { gfmTable } from "micromark-extension-gfm-table";
import type { Extension as SyntaxExtension } from "micromark-util-types";
import remarkParse from "remark-parse";
import { unified } from "unified";
import { comments } from "./comments.ts";
import { directive, environmentFence } from "./directives.ts";
import { displayIn, mathAmongWords } from "./dollars.ts";

/** `:value[…]{…}` and its like, not yet looked into. */
export interface RawDirective {
  type: "rawDirective";
  value: string;
}

/** A line of three or more colons, not yet paired. */
export interface RawFence {
  type: "rawFence";
  value: string;
}

/** A stretch nested too deeply to be parsed. */
export interface RawPiece {
  type: "rawPiece";
  value: string;
  position: Nodes["position"];
}

const treeOfTables = gfmTableFromMarkdown();
const treeOfFootnotes = gfmFootnoteFromMarkdown();
const treeOfFrontMatter = frontmatterFromMarkdown(["yaml"]);

/** A remark parser with these constructs and no others. They may depend on the text, hence one parser a text. */
function remark(syntax: SyntaxExtension[], tree: Extension[]) {
  return unified().use(remarkParse).data({ micromarkExtensions: syntax, fromMarkdownExtensions: tree });
}

/** A text without front matter as an mdast tree. */
export function parseTree(text: string): Root {
  const syntax = [gfmTable(), gfmFootnote(), paperSyntax(text)];
  return remark(syntax, [treeOfTables, treeOfFootnotes, treeOfPaper]).parse(text);
}

/** Front matter alone, as one `yaml` node. */
export function parseFrontMatter(text: string): Root {
  return remark([frontmatter(["yaml"])], [treeOfFrontMatter]).parse(text);
}

const blockConstructs = [
  "headingAtx",
  "setextUnderline",
  "list",
  "blockQuote",
  "codeIndented",
  "codeFenced",
  "thematicBreak",
  "definition",
  "gfmTable",
  "paperFence",
];

/** Paragraphs alone: marks of headings, lists and other blocks are plain characters. */
export function parseParagraphs(text: string): Root {
  return remark([paperSyntax(text), { disable: { null: blockConstructs } }], [treeOfPaper]).parse(text);
}

function paperSyntax(text: string): SyntaxExtension {
  const { amongWords, inLines } = comments(text);
  return {
    text: { 36: mathAmongWords, 58: directive, 60: amongWords },
    flow: { 36: displayIn(text), 58: environmentFence, 60: inLines },
    disable: { null: ["htmlFlow", "htmlText"] },
  };
}

const treeOfPaper: Extension = {
  enter: {
    paperDirective(token) {
      enterRaw(this, token, { type: "rawDirective", value: this.sliceSerialize(token) });
    },
    paperFence(token) {
      enterRaw(this, token, { type: "rawFence", value: this.sliceSerialize(token) });
    },
    paperMath(token) {
      const source = this.sliceSerialize(token);
      if (source.startsWith("$$")) this.enter({ type: "math", value: source.slice(2, -2) }, token);
      else this.enter({ type: "inlineMath", value: source.slice(1, -1) }, token);
    },
    paperDisplay(token) {
      this.enter({ type: "math", value: this.sliceSerialize(token).slice(2, -2) }, token);
    },
  },
  exit: { paperDirective: leave, paperFence: leave, paperMath: leave, paperDisplay: leave },
};

function leave(this: CompileContext, token: Token): void {
  this.exit(token);
}

/** The same outside the parser. */
export function pushRaw(root: Root, node: RawPiece): void {
  root.children.push(node as unknown as RootContent);
}

/** Raw nodes live only between parsing and dressing, so mdast's own union of nodes does not know them. */
function enterRaw(context: CompileContext, token: Token, node: RawDirective | RawFence): void {
  context.enter(node as unknown as Nodes, token);
}

export { bibliographyItem, citationText } from "./bibliography/index.ts";
export { ENVIRONMENTS } from "./environments.ts";
export { UNTITLED } from "./front-matter.ts";
export { readInline } from "./inline.ts";
export { Lines, lineAt } from "./lines.ts";
export { mathTex } from "./math.ts";
export type {
  BoundNumberNode,
  CellNode,
  CitationNode,
  EnvironmentNode,
  PrintedPart,
  ReferenceNode,
} from "./nodes.ts";
export { NUMBER_ATTRIBUTES } from "./numbers.ts";
export { plainText, referenceText } from "./plain-text.ts";
export { PRINTED_PARTS } from "./printed.ts";
export { readPaper } from "./read.ts";
export type {
  Author,
  BibliographyEntry,
  BoundNumber,
  Cell,
  FrontMatter,
  Paper,
  Problem,
  Span,
  Target,
  Yaml,
  YamlEntry,
} from "./types.ts";
export type { PaperNode } from "./walk.ts";
export { walk } from "./walk.ts";

export { readBibliography } from "./bibtex.ts";
export type { ItemRun } from "./items.ts";
export { bibliographyItem, citationText } from "./items.ts";

/** A paper as LaTeX source, made from its tree and its results. Pure. */
export type { LatexOptions, LatexPaper } from "./latex.ts";
export { paperToLatex } from "./latex.ts";
export { plateToLatex } from "./plate.ts";
export type { LatexFile } from "./printing.ts";
export type { PrintProblem } from "./writer.ts";

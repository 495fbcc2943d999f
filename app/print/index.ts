/** What a paper says when it is set, on the galley and in print alike: its numbers, the state of its results, its notes. */
export type { Doubts, Note, SetCell, SetNumber, SetPaper } from "./set-paper.ts";
export { cellTitle, doubtsOf, provenanceLine, provenanceParts, setPaper } from "./set-paper.ts";

import { emptyPaper, quotedInYaml } from "./new-paper.ts";
import firstPassage from "./starts/first-passage.md?raw";
import harris from "./starts/harris.bib?raw";
import sweep from "./starts/sweep.md?raw";
import tailComparison from "./starts/tail-comparison.md?raw";

/** Something to begin a paper from. */
export interface StartingPoint {
  /** In the form's button. */
  readonly id: string;
  /** "a first-passage study" */
  readonly words: string;
  text(author: string): string;
  readonly bibliography: string;
}

const from = (id: string, words: string, text: string, bibliography = ""): StartingPoint => ({
  id,
  words,
  text: (author) => text.replace("- name: AUTHOR", () => `- name: ${quotedInYaml(author)}`),
  bibliography,
});

export const EMPTY_SHEET: StartingPoint = { id: "empty", words: "an empty sheet", text: emptyPaper, bibliography: "" };

/** Papers that compute as they are, for their authors to change. */
export const STARTING_POINTS: readonly StartingPoint[] = [
  from("first-passage", "a first-passage study", firstPassage, harris),
  from("tail-comparison", "a tail comparison", tailComparison),
  from("sweep", "a sweep", sweep),
];

/** The starting point of that id; the empty sheet where there is none. */
export function startingPoint(id: unknown): StartingPoint {
  return STARTING_POINTS.find((start) => start.id === id) ?? EMPTY_SHEET;
}

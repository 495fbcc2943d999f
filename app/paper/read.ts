import type { Root, RootContent } from "mdast";
import { readBibliography } from "./bibliography/index.ts";
import { markContinuations } from "./continuations.ts";
import { dressBlocks } from "./dress.ts";
import { readFrontMatter } from "./front-matter.ts";
import { Lines } from "./lines.ts";
import { collectDefinitions } from "./links.ts";
import { numberPaper } from "./numbering.ts";
import { Reading } from "./reading.ts";
import { citedKeys, resolveMarks } from "./resolve.ts";
import { parseBlocks } from "./syntax/index.ts";
import type { Paper } from "./types.ts";

/**
 * Reads a paper: everything its text says before anything is computed. Pure; any text gives a paper, and what is wrong
 * in it is among the problems, sorted by place.
 * @param text the paper's text
 * @param bibliography BibTeX
 */
export function readPaper(text: string, bibliography: string): Paper {
  return readParsed(text, bibliography, parseBlocks(text));
}

/** The same from a tree of the text, which is changed. */
export function readParsed(text: string, bibliography: string, root: Root): Paper {
  const reading = new Reading(text, new Lines(text));
  const yaml = root.children.find((node) => node.type === "yaml");
  collectDefinitions(reading, root);
  const front = readFrontMatter(reading, yaml === undefined ? null : reading.span(yaml));
  root.children = dressBlocks(reading, root.children);
  markContinuations(root.children);
  const { targets, silent } = numberPaper(reading, root.children);
  const everything: RootContent[] = [...front.titleNodes, ...front.abstractNodes, ...root.children];
  const { entries, problems } = readBibliography(bibliography, citedKeys(everything));
  resolveMarks(reading, everything, targets, silent, entries);
  return {
    text,
    front,
    root,
    cells: reading.cells,
    numbers: reading.numbers.sort((a, b) => a.span.from - b.span.from),
    targets,
    bibliography: entries,
    problems: [...reading.problems.sort((a, b) => a.from - b.from), ...problems],
  };
}

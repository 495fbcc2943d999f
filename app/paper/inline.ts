import type { PhrasingContent } from "mdast";
import { readPhrasing } from "./dress.ts";
import { Lines } from "./lines.ts";
import { Reading } from "./reading.ts";
import { resolveMarks } from "./resolve.ts";
import type { Paper } from "./types.ts";

/**
 * Reads a short text (a caption, a head of a table) as words with math, numbers, references and citations.
 * Marks of blocks are plain characters. Never fails.
 * @param offset where the text begins in the paper; numbers are told apart by it
 * @param context the paper, whose labels and bibliography references are resolved against; without it they stay open
 */
export function readInline(text: string, offset: number, context?: Paper): PhrasingContent[] {
  const lines = context === undefined ? new Lines(text) : new Lines(context.text);
  const reading = new Reading(context?.text ?? `${" ".repeat(offset)}${text}`, lines);
  const nodes = readPhrasing(reading, text, (index) => offset + index);
  if (context !== undefined) resolveMarks(reading, nodes, context.targets, new Set(), context.bibliography);
  return nodes;
}

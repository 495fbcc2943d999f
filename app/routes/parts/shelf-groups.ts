import type { ShelfRow } from "../../../db/index.server.ts";

/** A paper on the shelf, as JSON. */
export interface ShelfPaper extends Omit<ShelfRow, "changedAt"> {
  /** ISO. */
  readonly changedAt: string;
}

export interface ShelfGroup {
  readonly name: "On the desk" | "With referees" | "To read" | "Put by";
  readonly papers: readonly ShelfPaper[];
}

/** The groups that have papers, in the order of the shelf; "On the desk" is there even when empty. */
export function groupShelf(papers: readonly ShelfPaper[]): readonly ShelfGroup[] {
  const writes = (paper: ShelfPaper) => paper.role === "owner" || paper.role === "author";
  const up = papers.filter((paper) => !paper.putBy);
  const groups: readonly ShelfGroup[] = [
    { name: "On the desk", papers: up.filter((paper) => writes(paper) && !paper.refereed) },
    { name: "With referees", papers: up.filter((paper) => writes(paper) && paper.refereed) },
    { name: "To read", papers: up.filter((paper) => !writes(paper)) },
    { name: "Put by", papers: papers.filter((paper) => paper.putBy) },
  ];
  return groups.filter((group) => group.name === "On the desk" || group.papers.length > 0);
}

const AND = new Intl.ListFormat("en-GB", { type: "conjunction" });

/**
 * The authors' line of a paper, as its reader would say it: "with Tormod Hagelund", "by you alone".
 * @param authors names parted by commas, as the front matter has them
 */
export function authorsInWords(authors: string, you: string): string {
  const names = authors.split(", ").filter((name) => name !== "");
  const others = names.filter((name) => name !== you);
  if (others.length === names.length) return AND.format(names);
  return others.length === 0 ? "by you alone" : `with ${AND.format(others)}`;
}

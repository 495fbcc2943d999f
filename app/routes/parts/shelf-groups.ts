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

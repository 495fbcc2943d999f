import type { Nodes } from "mdast";
import type { Lines } from "./lines.ts";

/** Moves the positions of a tree read from a part of the text to where that part stands in the text. */
export function relocate(node: Nodes, place: (index: number) => number, lines: Lines): void {
  const pending: Nodes[] = [node];
  for (let next = pending.pop(); next !== undefined; next = pending.pop()) {
    const position = next.position;
    if (position !== undefined) {
      next.position = {
        start: point(place(position.start.offset ?? 0), lines),
        end: point(place(position.end.offset ?? 0), lines),
      };
    }
    if ("children" in next) pending.push(...next.children);
  }
}

function point(offset: number, lines: Lines): { line: number; column: number; offset: number } {
  const line = lines.lineAt(offset);
  return { line, column: offset - lines.startOf(line) + 1, offset };
}

import type { CellWork } from "../../app/cells/index.ts";
import type { Computable } from "./board.ts";
import type { PlannedWork } from "./worker.ts";

/** True of cells whose body is in order, and that of all they read. */
export function isComputable(cell: PlannedWork): cell is Computable {
  return cell.key !== null && cell.task !== null && cell.workingKey !== null;
}

/** The cells asked for, and all that they read, themselves or through others, in the plan's order. */
export function withNeeds(planned: readonly PlannedWork[], asked: ReadonlySet<string>): PlannedWork[] {
  const wanted = new Set(asked);
  for (const cell of planned.toReversed()) {
    if (wanted.has(cell.id)) for (const need of cell.needs) wanted.add(need);
  }
  return planned.filter((cell) => wanted.has(cell.id));
}

/** Ids of the cells that `cell` reads and that have to be computed first. */
export function unmet(cell: Computable, absent: readonly Computable[]): string[] {
  return absent.filter(({ id }) => cell.needs.includes(id)).map(({ id }) => id);
}

/** True of work that waits, itself or through others, for a cell that failed: nobody is at it, and it is not stale. */
export function isBlocked(work: Readonly<Record<string, CellWork>>, slot: string): boolean {
  const own = work[slot];
  // Only named cells are read by others, and the slot of a named cell is its name.
  return own?.state === "waiting" && own.needs.some((need) => work[need]?.state === "failed" || isBlocked(work, need));
}

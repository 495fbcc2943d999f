import type { CordRun } from "./cord-run.ts";
import { armOf, type Course, courseOf } from "./course.ts";
import { drawPlies, middleOf, type Twist } from "./plies.ts";
import type { CordDrawing } from "./types.ts";

/** How a state is drawn. `twisted`: which of a cord lies twisted; `loose`: how the rest of it does. */
interface Look {
  readonly twisted: "all" | "done" | "stub" | "none";
  readonly loose: CordDrawing["loose"];
}

const LOOKS: Readonly<Record<CordRun["cell"]["state"], Look>> = {
  current: { twisted: "all", loose: "none" },
  preview: { twisted: "all", loose: "none" },
  outOfDate: { twisted: "none", loose: "dashed" },
  cancelled: { twisted: "none", loose: "dashed" },
  stands: { twisted: "none", loose: "solid" },
  computing: { twisted: "done", loose: "dashed" },
  waiting: { twisted: "none", loose: "dotted" },
  empty: { twisted: "none", loose: "dotted" },
  failed: { twisted: "stub", loose: "none" },
};

/** How far a failed cord reaches from its ring, past the bend [px]. */
const STUB = 24;

/** A cord in its lane: its course, its strands along it, its ring and what is across it. */
export function drawCord(run: CordRun, lane: number, edge: number, still: boolean): CordDrawing {
  const { cell, ring, ties, lit } = run;
  const look = LOOKS[cell.state];
  const [main, ...arms] = coursesOf(run, lane, edge);
  const front = look.twisted === "done" ? main.from + (cell.done ?? 0) * (main.to - main.from) : null;
  const stub = look.twisted === "stub" ? stubOf(run, main, arms) : null;
  const twists = [main, ...arms].map((course, k): Twist | null => {
    const whole = { from: course.from, to: course.to };
    if (look.twisted === "all") return whole;
    if (stub !== null) return stub.course === course ? stub.twist : null;
    if (front === null || still) return null;
    if (k === 0) return front > main.from + 1 ? { from: main.from, to: front } : null;
    return course.at(0).y < main.at(front).y ? whole : null;
  });
  const dotted = look.loose === "dotted";
  const plies = dotted
    ? [{ id: "0", place: null, under: "", over: "", loose: [main, ...arms].map(middleOf).join("") }]
    : drawPlies(cell.strands, [main, ...arms], twists, look.loose !== "none");
  return {
    slot: cell.slot,
    lit,
    course: stub === null && look.twisted === "stub" ? "" : groundOf(main, arms, stub),
    plies,
    loose: look.loose,
    ring: ring === null ? null : { x: edge, y: ring, open: cell.state === "waiting" },
    ties,
    bar: front === null ? null : acrossAt(main, front),
    cut: stub === null ? null : acrossAt(stub.course, stub.at),
  };
}

/** The cord itself, then the straight arms of what is tied to it between its ends. */
function coursesOf({ ring, ties, from, to, leavesAbove, leavesBelow }: CordRun, lane: number, edge: number) {
  const main = courseOf(lane, edge, { y: from, bends: !leavesAbove }, { y: to, bends: !leavesBelow });
  const ys = [...ties.map(({ y }) => y), ...(ring === null ? [] : [ring])];
  const between = ys.filter((y) => (leavesAbove || y > from) && (leavesBelow || y < to));
  return [main, ...[...new Set(between)].map((y) => armOf(lane, edge, y))] as const;
}

interface Stub {
  readonly course: Course;
  readonly twist: Twist;
  /** Where it is cut. */
  readonly at: number;
}

/** What is left of a failed cord: the part at its ring. */
function stubOf(
  { ring, from, to, leavesAbove, leavesBelow }: CordRun,
  main: Course,
  arms: readonly Course[],
): Stub | null {
  if (ring === null) return null;
  const reach = Math.min(0.6 * (main.to - main.from), (main.joints[1] ?? main.from) - main.from + STUB);
  if (ring === from && !leavesAbove) {
    return { course: main, twist: { from: main.from, to: main.from + reach }, at: main.from + reach + 4 };
  }
  if (ring === to && !leavesBelow) {
    const back = Math.min(0.6 * (main.to - main.from), main.to - (main.joints.at(-2) ?? main.to) + STUB);
    return { course: main, twist: { from: main.to - back, to: main.to }, at: main.to - back - 4 };
  }
  const arm = arms.find((each) => each.at(0).y === ring);
  return arm === undefined ? null : { course: arm, twist: { from: arm.from + 10, to: arm.to }, at: arm.from + 6 };
}

function groundOf(main: Course, arms: readonly Course[], stub: Stub | null): string {
  if (stub === null) return [main, ...arms].map(middleOf).join("");
  const { course, twist } = stub;
  return middleOf({ ...course, from: twist.from, to: twist.to });
}

function acrossAt(course: Course, s: number): { x: number; y: number; upright: boolean } {
  const { x, y, nx } = course.at(s);
  return { x, y, upright: Math.abs(nx) < 0.7 };
}

import type { Frame, Point } from "./curve.ts";
import type { LabelRun } from "./label.ts";
import type { Colour } from "./palette.ts";
import { spread } from "./spread.ts";

/** A label wanted at the start or end of what it names; its point in plotted coordinates. */
export interface SideLabel extends Point {
  readonly tex: string;
  readonly runs: readonly LabelRun[];
  readonly colour: Colour | "quiet";
}

export interface PlacedLabel {
  readonly runs: readonly LabelRun[];
  readonly tex: string;
  readonly colour: Colour | "quiet";
  readonly x: number;
  /** Middle of the text's height for labels of curves; baseline for labels of axes. */
  readonly y: number;
  readonly anchor: "start" | "middle" | "end";
  /** Path from the curve to a label that had to move. */
  readonly leader: string | null;
}

export interface Side {
  readonly left: readonly SideLabel[];
  readonly right: readonly SideLabel[];
}

export interface LabelFrame {
  readonly frame: Frame;
  readonly inner: Frame;
  readonly toX: (at: number) => number;
  readonly toY: (at: number) => number;
  readonly unit: number;
  readonly fontSize: number;
  readonly tickWidth: number;
}

/** Labels stand at least this far apart (at the page's font size). */
const LABEL_GAP = 14;
/** A label moved less than this needs no line to say what it names. */
const LEADER_FROM = 3;

/** Places the labels of curves and levels beside the plot, apart from one another, with leader lines where they had to move. */
export function placeLabels(sides: Side, at: LabelFrame): readonly PlacedLabel[] {
  return [...placeSide(sides.left, "start", at), ...placeSide(sides.right, "end", at)];
}

function placeSide(labels: readonly SideLabel[], side: "start" | "end", at: LabelFrame): readonly PlacedLabel[] {
  const { inner, unit } = at;
  const wanted = labels.map((label) => Math.min(inner.bottom, Math.max(inner.top, at.toY(label.y))));
  const placed = spread(wanted, LABEL_GAP * unit, inner.top - 4 * unit, at.frame.bottom - 2 * unit);
  const outward = side === "start" ? -1 : 1;
  return labels.map((label, i): PlacedLabel => {
    const from: Point = { x: at.toX(label.x), y: wanted[i] ?? 0 };
    const y = placed[i] ?? from.y;
    const moved = Math.abs(y - from.y) > LEADER_FROM * unit;
    const x = from.x + outward * (moved ? 16 : 9) * unit;
    return {
      runs: label.runs,
      tex: label.tex,
      colour: label.colour,
      x,
      y,
      anchor: side === "start" ? "end" : "start",
      leader: moved ? leaderPath(from, { x: x - outward * 3 * unit, y }, outward, unit) : null,
    };
  });
}

/** A short way out along the level of the curve, then straight to the label. */
function leaderPath(from: Point, to: Point, outward: number, unit: number): string {
  const knee = from.x + outward * 4 * unit;
  return `M${knee.toFixed(2)} ${from.y.toFixed(2)}L${to.x.toFixed(2)} ${to.y.toFixed(2)}`;
}

import { entriesOf } from "./cell-entries.ts";
import type { CordRun } from "./cord-run.ts";
import { px } from "./course.ts";
import { drawCord } from "./draw-cord.ts";
import { COUNT_BELOW } from "./frame.ts";
import { packLanes } from "./lanes.ts";
import type { Lighting } from "./lighting.ts";
import type { TieLines } from "./tie-lines.ts";
import type { BundleDrawing, CordDrawing, End, Mark, Scene, SceneCell } from "./types.ts";

export interface LaidCords {
  readonly cords: readonly CordDrawing[];
  readonly bundle: BundleDrawing | null;
  readonly lanes: ReadonlyMap<string, number>;
}

/** Id of the bundle among the lanes. */
const BUNDLE = " bundle";

/** The cords of the cells that are quoted in view, each in a lane of its own, or the unlit ones in a bundle. */
export function layCords(scene: Scene, ties: TieLines, lighting: Lighting): LaidCords {
  const { frame } = scene;
  const runs = scene.cells
    .flatMap((cell) => runOf(scene, cell, ties, lighting) ?? [])
    .filter(({ lit }) => lit || scene.mode === "shown");
  const bundling = runs.length > frame.cordLanes.most;
  const single = bundling ? runs.filter(({ lit }) => lit) : runs;
  // A narrow margin has no room for a bundle beside what is lit.
  const lone = frame.size === "narrow" && single.length > 0;
  const bundled = bundling && !lone ? runs.filter(({ lit }) => !lit) : [];
  const spans = single.map(({ cell, from, to }) => ({ id: cell.slot, from, to }));
  const lanes = packLanes([...spans, ...(bundled.length === 0 ? [] : [spanOf(bundled)])], scene.lanes);
  const laneX = laneXs(scene, lanes);
  return {
    cords: single.map((run) => drawCord(run, laneX(run.cell.slot), frame.edge, scene.still)),
    bundle: bundled.length === 0 ? null : drawBundle(scene, bundled, laneX(BUNDLE)),
    lanes,
  };
}

function spanOf(bundled: readonly CordRun[]) {
  return {
    id: BUNDLE,
    from: Math.min(...bundled.map(({ from }) => from)),
    to: Math.max(...bundled.map(({ to }) => to)),
  };
}

/** Where lanes lie: as far apart as there is room. */
function laneXs({ frame }: Scene, lanes: ReadonlyMap<string, number>): (id: string) => number {
  const { outer, inner, gap } = frame.cordLanes;
  const last = Math.max(0, ...lanes.values());
  const apart = Math.min(gap, (inner - outer) / Math.max(1, last));
  return (id) => outer + apart * (lanes.get(id) ?? 0);
}

function runOf(scene: Scene, cell: SceneCell, ties: TieLines, lighting: Lighting): CordRun | null {
  if (!cell.quoted) return null;
  const { top, bottom, frame } = scene;
  const lines = ties.cords.get(cell.slot) ?? [];
  const ringAt = cell.box === null ? null : entriesOf(cell.box, (cell.enters ?? cell.strands).length, true).ring;
  const all = [...lines.map(({ y }) => y), ...(ringAt === null ? [] : [ringAt])];
  const inView = (y: number) => y >= top && y <= bottom;
  const ys = all.filter(inView);
  const lit = lighting.cord(cell);
  const leavesAbove = cell.above || all.some((y) => y < top);
  const leavesBelow = cell.below || all.some((y) => y > bottom);
  // Of a cord that only passes through, nothing can be told but that it is long.
  if (ys.length === 0 || (ys.length === 1 && !leavesAbove && !leavesBelow)) return null;
  const ends = lines
    .filter(({ y }) => inView(y))
    .map(({ id, y, quotes }): End => {
      const failed = quotes.some(({ state }) => state === "failed");
      const faint = quotes.every(({ state }) => FAINT.has(state));
      return { id: `cord ${cell.slot} ${id}`, x: frame.edge, y, mark: failed ? "‡" : (MARKS[cell.state] ?? ""), faint };
    });
  return {
    cell,
    ring: ringAt !== null && inView(ringAt) ? ringAt : null,
    ties: ends,
    from: leavesAbove ? top : Math.min(...ys),
    to: leavesBelow ? bottom : Math.max(...ys),
    leavesAbove,
    leavesBelow,
    lit,
  };
}

const FAINT: ReadonlySet<string> = new Set(["computing", "waiting", "empty"]);
/** A value that is shown is only as good as its cell. */
const MARKS: Readonly<Partial<Record<SceneCell["state"], Mark>>> = {
  outOfDate: "†",
  cancelled: "†",
  stands: "†",
  failed: "†",
};

function drawBundle(scene: Scene, bundled: readonly CordRun[], lane: number): BundleDrawing {
  const { edge } = scene.frame;
  const trunks = joined(bundled).map(({ from, to }) =>
    [-2.4, 0, 2.4].map((aside) => `M${px(lane + aside)} ${px(from)}V${px(to)}`).join(""),
  );
  const ys = bundled.flatMap(({ ring, ties }) => [...ties.map(({ y }) => y), ...(ring === null ? [] : [ring])]);
  const arms = ys.map((y) => `M${px(lane)} ${px(y)}H${px(edge)}`);
  const span = spanOf(bundled);
  return {
    course: [...trunks, ...arms].join(""),
    rings: bundled.flatMap(({ ring, cell }) => (ring === null ? [] : [{ id: cell.slot, x: edge, y: ring }])),
    ties: bundled.flatMap(({ ties }) => ties),
    count: {
      x: lane,
      y: Math.min(Math.max(span.from + 16, scene.stepTop + COUNT_BELOW), span.to - 12),
      words: String(bundled.length),
    },
  };
}

/** Stretches that meet are one. */
function joined(runs: readonly CordRun[]): { from: number; to: number }[] {
  const made: { from: number; to: number }[] = [];
  for (const { from, to } of [...runs].sort((a, b) => a.from - b.from)) {
    const last = made.at(-1);
    if (last !== undefined && from <= last.to) last.to = Math.max(last.to, to);
    else made.push({ from, to });
  }
  return made;
}

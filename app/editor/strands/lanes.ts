/** A cord as packing sees it. */
export interface Interval {
  readonly id: string;
  readonly from: number;
  readonly to: number;
}

/** Two cords in one lane stand at least this far apart [px]. */
const APART = 16;

/**
 * Lanes for cords, the outermost first (lane 0). A cord that had a lane keeps it where it can; of the others the longest
 * come first, so that what spans most lies outermost and is crossed least. No two in one lane come closer than 16 px.
 *
 * @param before lanes of an earlier packing, by id
 * @returns the lane of each interval, by id; lanes are numbered without gaps
 */
export function packLanes(
  intervals: readonly Interval[],
  before: ReadonlyMap<string, number> = new Map(),
): Map<string, number> {
  const lanes: Interval[][] = [];
  const taken = new Map<string, number>();
  const isFree = (lane: number, { from, to }: Interval) =>
    (lanes[lane] ?? []).every((other) => other.to + APART <= from || to + APART <= other.from);
  const take = (lane: number, interval: Interval) => {
    while (lanes.length <= lane) lanes.push([]);
    lanes[lane]?.push(interval);
    taken.set(interval.id, lane);
  };
  const order = [...intervals].sort(
    (a, b) => Number(before.has(b.id)) - Number(before.has(a.id)) || length(b) - length(a) || a.from - b.from,
  );
  for (const interval of order) {
    const wanted = before.get(interval.id);
    let lane = wanted !== undefined && wanted < order.length && isFree(wanted, interval) ? wanted : 0;
    while (!isFree(lane, interval)) lane += 1;
    take(lane, interval);
  }
  return withoutEmpty(taken);
}

function length({ from, to }: Interval): number {
  return to - from;
}

function withoutEmpty(taken: ReadonlyMap<string, number>): Map<string, number> {
  const used = [...new Set(taken.values())].sort((a, b) => a - b);
  return new Map([...taken].map(([id, lane]) => [id, used.indexOf(lane)]));
}

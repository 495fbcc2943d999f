/** Points that Page Up and Page Down pass over. */
const LEAP = 10;

const STEPS: Readonly<Record<string, (at: number, last: number) => number>> = {
  ArrowRight: (at) => at + 1,
  ArrowLeft: (at) => at - 1,
  ArrowUp: (at) => at + 1,
  ArrowDown: (at) => at - 1,
  PageUp: (at) => at + LEAP,
  PageDown: (at) => at - LEAP,
  Home: () => 0,
  End: (_, last) => last,
};

/** Where a key leads from one point of a curve of `count`; null for a key that does not walk. */
export function walkedTo(key: string, at: number, count: number): number | null {
  const to = STEPS[key]?.(at, count - 1);
  return to === undefined ? null : Math.min(Math.max(to, 0), count - 1);
}

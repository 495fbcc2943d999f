/** "about 3 s", "about 2 min"; nothing for what passes unnoticed. */
export function aboutSeconds(seconds: number | null): string {
  if (seconds === null || !(seconds >= UNNOTICED)) return "";
  if (seconds < 1) return `about ${seconds.toFixed(1)} s`;
  if (seconds < 90) return `about ${Math.round(seconds)} s`;
  return `about ${Math.round(seconds / 60)} min`;
}

/** Seconds below which a wait is not worth a word. */
const UNNOTICED = 0.2;

/** "14:32" in the reader's own time. */
export function clock(time: Date): string {
  return `${String(time.getHours()).padStart(2, "0")}:${String(time.getMinutes()).padStart(2, "0")}`;
}

/** "Table 1 and 2 numbers", "Figure 1, Table 1 and Table 2". */
export function listed(things: readonly string[]): string {
  if (things.length <= 1) return things[0] ?? "";
  return `${things.slice(0, -1).join(", ")} and ${things.at(-1)}`;
}

export function counted(count: number, one: string, many = `${one}s`): string {
  return `${count} ${count === 1 ? one : many}`;
}

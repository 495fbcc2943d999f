/**
 * Number of single-letter changes (insert, delete, replace, swap neighbours) that turn `a` into `b`.
 * Source: optimal string alignment distance, Damerau (1964), Comm. ACM 7, 171-176.
 */
function distance(a: string, b: string): number {
  let beforeLast: number[] = [];
  let last = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const replace = (last[j - 1] ?? 0) + (a[i - 1] === b[j - 1] ? 0 : 1);
      let best = Math.min((last[j] ?? 0) + 1, (row[j - 1] ?? 0) + 1, replace);
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) {
        best = Math.min(best, (beforeLast[j - 2] ?? 0) + 1);
      }
      row.push(best);
    }
    beforeLast = last;
    last = row;
  }
  return last[b.length] ?? 0;
}

/** The candidate that is nearest to `word` in spelling, or null when none is near enough to be what was meant. */
export function nearestSpelling(word: string, candidates: Iterable<string>): string | null {
  const longest = 40;
  if (word.length > longest) return null;
  const limit = word.length <= 2 ? 1 : word.length <= 5 ? 2 : 3;
  let best: string | null = null;
  let bestDistance = limit + 1;
  for (const candidate of candidates) {
    if (Math.abs(candidate.length - word.length) > limit) continue;
    // A change of case alone is nearer than a change of letters.
    const d = distance(word.toLowerCase(), candidate.toLowerCase()) + (word[0] === candidate[0] ? 0 : 0.5);
    if (d < bestDistance) {
      bestDistance = d;
      best = candidate;
    }
  }
  return best;
}

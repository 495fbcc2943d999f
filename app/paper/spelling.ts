/**
 * Number of single-character insertions, deletions, replacements and exchanges of neighbours between two words.
 * Source: optimal string alignment distance, R. A. Wagner and M. J. Fischer, J. ACM 21 (1974) 168–173, with exchanges.
 */
export function spellingDistance(a: string, b: string): number {
  let beforeLast: number[] = [];
  let last = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const same = a[i - 1] === b[j - 1] ? 0 : 1;
      let best = Math.min((last[j] ?? 0) + 1, (row[j - 1] ?? 0) + 1, (last[j - 1] ?? 0) + same);
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1])
        best = Math.min(best, (beforeLast[j - 2] ?? 0) + 1);
      row.push(best);
    }
    beforeLast = last;
    last = row;
  }
  return last[b.length] ?? 0;
}

/** The candidate nearest in spelling to a word, or null when none is near (a third of its length, 1 at least). */
export function nearestSpelling(word: string, candidates: Iterable<string>): string | null {
  if (word.length > 64) return null;
  const limit = Math.max(1, Math.floor(word.length / 3));
  let nearest: string | null = null;
  let least = limit + 1;
  for (const candidate of candidates) {
    if (Math.abs(candidate.length - word.length) > limit) continue;
    const distance = spellingDistance(word.toLowerCase(), candidate.toLowerCase());
    if (distance < least || (distance === least && nearest !== null && candidate < nearest && distance <= limit)) {
      least = distance;
      nearest = candidate;
    }
  }
  return nearest;
}

/** " Did you mean “…”?", or nothing when no candidate is near: the end of a message. */
export function didYouMean(word: string, candidates: Iterable<string>): string {
  const nearest = nearestSpelling(word, candidates);
  return nearest === null || nearest === word ? "" : ` Did you mean “${nearest}”?`;
}

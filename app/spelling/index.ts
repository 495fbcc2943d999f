/** What a misspelt word was probably meant to be; one judgement for the paper language, formulas and cells alike. */

/** Longer words are not compared: the work grows with the square of the length. */
const LONGEST = 40;
/** A word of this many letters for each change is still taken for a misspelling. */
const LETTERS_PER_CHANGE = 3;
/** What another first letter adds to the distance: people rarely mistake it. */
const OTHER_FIRST_LETTER = 0.5;

/**
 * The candidate that is nearest to `word` in spelling, whatever their case, or null when none is near enough to be what
 * was meant: one change to a word of up to five letters, two of up to eight, and so on. Of equally near ones, the first.
 */
export function nearestSpelling(word: string, candidates: Iterable<string>): string | null {
  if (word.length > LONGEST) return null;
  const limit = Math.max(1, Math.floor(word.length / LETTERS_PER_CHANGE));
  let nearest: string | null = null;
  let least = limit + 1;
  for (const candidate of candidates) {
    if (Math.abs(candidate.length - word.length) > limit) continue;
    const changes = distance(word.toLowerCase(), candidate.toLowerCase());
    const apart = changes + (word[0] === candidate[0] ? 0 : OTHER_FIRST_LETTER);
    if (changes <= limit && apart < least) {
      least = apart;
      nearest = candidate;
    }
  }
  return nearest;
}

/**
 * Number of single-character insertions, deletions, replacements and exchanges of neighbours between two words.
 * Source: optimal string alignment distance, R. A. Wagner and M. J. Fischer, J. ACM 21 (1974) 168–173, with the exchanges
 * of F. J. Damerau, Comm. ACM 7 (1964) 171–176.
 */
function distance(a: string, b: string): number {
  let beforeLast: number[] = [];
  let last = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const replaced = (last[j - 1] ?? 0) + (a[i - 1] === b[j - 1] ? 0 : 1);
      let best = Math.min((last[j] ?? 0) + 1, (row[j - 1] ?? 0) + 1, replaced);
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

/** What was typed into the case, word by word. */
export interface Asked {
  /** All of it. */
  readonly all: string;
  /** As typed, without those that only join the others. */
  readonly words: readonly string[];
}

const JOINING: ReadonlySet<string> = new Set(
  "a an and as at be by do for from has have how i in is it its me my now of on or please set some that the to want with".split(
    " ",
  ),
);

export function askedFor(query: string): Asked {
  const all = query.trim();
  const words = all.split(/[\s,;:?!()[\]{}"$]+/).flatMap((word) => {
    const bare = word.replace(/^\.+|\.+$/g, "");
    return bare === "" || JOINING.has(bare.toLowerCase()) ? [] : [bare];
  });
  return { all, words: words.length === 0 && all !== "" ? [all] : words };
}

/** Words of one kind that may answer to what is asked, and how much an answer among them counts. */
export interface Field {
  readonly words: string;
  readonly weight: number;
}

/** A word that is given in full counts all, one that is begun most of it, one that is within another a part. */
const [WHOLE, BEGUN, WITHIN] = [1, 0.8, 0.4];
const LEAST_WITHIN = 3;

/** How well one word is answered by some fields; 0: not. */
export function answersWord(word: string, fields: readonly Field[]): number {
  const sought = word.toLowerCase();
  let best = 0;
  for (const { words, weight } of fields) {
    for (const each of words.toLowerCase().split(/[\s,;:()]+/)) {
      const how = each === sought ? WHOLE : each.startsWith(sought) ? BEGUN : 0;
      const within = how === 0 && sought.length >= LEAST_WITHIN && each.includes(sought) ? WITHIN : how;
      best = Math.max(best, weight * within);
    }
  }
  return best;
}

/** How well all that is asked is answered; 0 where a word is not. Where nothing is asked, everything answers alike. */
export function answers({ words }: Asked, fields: readonly Field[]): number {
  if (words.length === 0) return 1;
  const each = words.map((word) => answersWord(word, fields));
  return each.includes(0) ? 0 : each.reduce((sum, one) => sum + one, 0);
}

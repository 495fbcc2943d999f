/**
 * Remembers what a pure function gave for a text, up to a total length of texts; the longest unused go first.
 * What is remembered is shared: it must not be changed.
 */
export function remembered<Result>(read: (text: string) => Result, longest: number): (text: string) => Result {
  const results = new Map<string, Result>();
  let length = 0;
  return (text) => {
    const known = results.get(text);
    if (known !== undefined) {
      results.delete(text);
      results.set(text, known);
      return known;
    }
    const result = read(text);
    results.set(text, result);
    length += text.length;
    for (const oldest of results.keys()) {
      if (length <= longest || oldest === text) break;
      results.delete(oldest);
      length -= oldest.length;
    }
    return result;
  };
}
